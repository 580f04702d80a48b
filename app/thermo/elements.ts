/** A chemical element, or hydrogen's isotopes D and T, which thermochemistry counts as elements of their own. */
export interface Element {
  readonly symbol: string;
  readonly name: string;
  /** Number of protons, Z. */
  readonly atomicNumber: number;
}

/** IUPAC symbols and names in order of atomic number, hydrogen first. */
const NAMES =
  "H hydrogen He helium Li lithium Be beryllium B boron C carbon N nitrogen O oxygen F fluorine Ne neon " +
  "Na sodium Mg magnesium Al aluminium Si silicon P phosphorus S sulfur Cl chlorine Ar argon K potassium Ca calcium " +
  "Sc scandium Ti titanium V vanadium Cr chromium Mn manganese Fe iron Co cobalt Ni nickel Cu copper Zn zinc " +
  "Ga gallium Ge germanium As arsenic Se selenium Br bromine Kr krypton Rb rubidium Sr strontium Y yttrium " +
  "Zr zirconium Nb niobium Mo molybdenum Tc technetium Ru ruthenium Rh rhodium Pd palladium Ag silver Cd cadmium " +
  "In indium Sn tin Sb antimony Te tellurium I iodine Xe xenon Cs caesium Ba barium La lanthanum Ce cerium " +
  "Pr praseodymium Nd neodymium Pm promethium Sm samarium Eu europium Gd gadolinium Tb terbium Dy dysprosium " +
  "Ho holmium Er erbium Tm thulium Yb ytterbium Lu lutetium Hf hafnium Ta tantalum W tungsten Re rhenium Os osmium " +
  "Ir iridium Pt platinum Au gold Hg mercury Tl thallium Pb lead Bi bismuth Po polonium At astatine Rn radon " +
  "Fr francium Ra radium Ac actinium Th thorium Pa protactinium U uranium Np neptunium Pu plutonium Am americium " +
  "Cm curium Bk berkelium Cf californium Es einsteinium Fm fermium Md mendelevium No nobelium Lr lawrencium " +
  "Rf rutherfordium Db dubnium Sg seaborgium Bh bohrium Hs hassium Mt meitnerium Ds darmstadtium Rg roentgenium " +
  "Cn copernicium Nh nihonium Fl flerovium Mc moscovium Lv livermorium Ts tennessine Og oganesson";

const ELEMENTS: ReadonlyMap<string, Element> = new Map(
  [
    ...pairs(NAMES.split(" ")).map(([symbol, name], index) => ({ symbol, name, atomicNumber: index + 1 })),
    { symbol: "D", name: "deuterium", atomicNumber: 1 },
    { symbol: "T", name: "tritium", atomicNumber: 1 },
  ].map((element) => [element.symbol, element]),
);

/** The element with a symbol (`Fe`, `D`), or undefined. Symbols are case-sensitive: `Co` is cobalt, `CO` is not. */
export function elementOf(symbol: string): Element | undefined {
  return ELEMENTS.get(symbol);
}

/** Every element symbol, in order of atomic number, then D and T. */
export function elementSymbols(): string[] {
  return [...ELEMENTS.keys()];
}

const NONMETALS = new Set("H D T He B C N O F Ne Si P S Cl Ar Ge As Se Br Kr Te I Xe At Rn Ts Og".split(" "));

/** Whether an element counts as a metal here; boron, silicon, germanium, arsenic and tellurium do not. */
export function isMetal(symbol: string): boolean {
  return ELEMENTS.has(symbol) && !NONMETALS.has(symbol);
}

function pairs(words: string[]): [string, string][] {
  const result: [string, string][] = [];
  for (let index = 0; index + 1 < words.length; index += 2) result.push([words[index] ?? "", words[index + 1] ?? ""]);
  return result;
}
