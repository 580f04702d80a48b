import { type Digits, add, places, scaleBy, subtract } from "./digits.ts";
import { decimalOf, Fraction, fractionToNumber } from "./fraction.ts";
import { unitFactors } from "./unitFactors.ts";
import { plainText } from "./typography.ts";
import { ambiguous, isTooLong, quote, read, type Reading, refused } from "./reading.ts";

/** Units of an energy per amount of substance, or per particle. */
export type EnergyUnit = "kJ/mol" | "J/mol" | "kcal/mol" | "cal/mol" | "kcal(IT)/mol" | "cal(IT)/mol" | "eV" | "meV";
/** Units of an entropy or a heat capacity per amount of substance, or per particle. */
export type EntropyUnit =
  | "J/(mol K)"
  | "kJ/(mol K)"
  | "cal/(mol K)"
  | "kcal/(mol K)"
  | "cal(IT)/(mol K)"
  | "kcal(IT)/(mol K)"
  | "eV/K"
  | "meV/K";
/**
 * Every unit a sheet may use. `cal` is the thermochemical calorie, 4.184 J exactly; `cal(IT)` the International Table
 * calorie, 4.1868 J exactly; `eV` the electronvolt per particle, which is F in J/mol.
 */
export type Unit = EnergyUnit | EntropyUnit;

/** The units of the same kind of quantity as U. */
export type LikeUnit<U extends Unit> = U extends EnergyUnit ? EnergyUnit : EntropyUnit;

/** A number with its unit in its type: adding kilojoules to joules per kelvin does not compile. */
export interface Quantity<U extends Unit> {
  readonly digits: Digits;
  readonly unit: U;
}

/**
 * An electronvolt per particle in J/mol: e N_A = 1.602 176 634 × 10⁻¹⁹ C × 6.022 140 76 × 10²³ /mol, the product of two
 * constants that are exact since 2019 (SI Brochure, 9th ed.).
 */
const ELECTRONVOLT = new Fraction("1.602176634").mul("6.02214076").mul(10_000);

/** One unit in J/mol or J/(mol K), exact. */
const IN_JOULES: Readonly<Record<Unit, { readonly kind: "energy" | "entropy"; readonly joules: Fraction }>> = {
  "kJ/mol": { kind: "energy", joules: new Fraction(1000) },
  "J/mol": { kind: "energy", joules: new Fraction(1) },
  "kcal/mol": { kind: "energy", joules: new Fraction(4184) },
  "cal/mol": { kind: "energy", joules: new Fraction("4.184") },
  "kcal(IT)/mol": { kind: "energy", joules: new Fraction("4186.8") },
  "cal(IT)/mol": { kind: "energy", joules: new Fraction("4.1868") },
  eV: { kind: "energy", joules: ELECTRONVOLT },
  meV: { kind: "energy", joules: ELECTRONVOLT.div(1000) },
  "J/(mol K)": { kind: "entropy", joules: new Fraction(1) },
  "kJ/(mol K)": { kind: "entropy", joules: new Fraction(1000) },
  "cal/(mol K)": { kind: "entropy", joules: new Fraction("4.184") },
  "kcal/(mol K)": { kind: "entropy", joules: new Fraction(4184) },
  "cal(IT)/(mol K)": { kind: "entropy", joules: new Fraction("4.1868") },
  "kcal(IT)/(mol K)": { kind: "entropy", joules: new Fraction("4186.8") },
  "eV/K": { kind: "entropy", joules: ELECTRONVOLT },
  "meV/K": { kind: "entropy", joules: ELECTRONVOLT.div(1000) },
};

/** Every unit a sheet may use, energies first. */
export const UNITS = Object.keys(IN_JOULES) as readonly Unit[];

/** A number with its unit. */
export function quantity<U extends Unit>(value: Digits, unit: U): Quantity<U> {
  return { digits: value, unit };
}

/** a + b, exact, in their common unit. */
export function addQuantities<U extends Unit>(a: Quantity<U>, b: Quantity<NoInfer<U>>): Quantity<U> {
  return { digits: add(a.digits, b.digits), unit: a.unit };
}

/** a − b, exact, in their common unit. */
export function subtractQuantities<U extends Unit>(a: Quantity<U>, b: Quantity<NoInfer<U>>): Quantity<U> {
  return { digits: subtract(a.digits, b.digits), unit: a.unit };
}

/** The quantity in another unit of its kind, with the digits of `convert`. */
export function convertQuantity<U extends Unit, V extends LikeUnit<U>>(value: Quantity<U>, to: V): Quantity<V> {
  return { digits: convert(value.digits, value.unit, to).digits, unit: to };
}

/** Whether two units measure the same kind of quantity. */
export function isLikeUnit(a: Unit, b: Unit): boolean {
  return IN_JOULES[a].kind === IN_JOULES[b].kind;
}

/**
 * Converts a printed number to another unit of its kind by the exact factor, then rounds half-even to just enough
 * digits to come back: the last place is the coarsest one that is no coarser than the source's own last place.
 * `-68.315` kcal/mol becomes `-285.830` kJ/mol, and that is `-68.315` kcal/mol again.
 *
 * @returns the digits in `to`, and the step in words (`× 4.184`), null when the units are the same
 * @throws RangeError for unlike quantities (kJ/mol and J/(mol K))
 */
export function convert(value: Digits, from: Unit, to: Unit): { digits: Digits; note: string | null } {
  const { factor, magnitude, note } = conversionStep(from, to);
  if (from === to) return { digits: value, note: null };
  return { digits: scaleBy(value, factor, Math.max(0, places(value) - magnitude)), note };
}

/**
 * How many of one unit make up another, as the nearest double: for half units and uncertainties, whose own digits do
 * not matter.
 *
 * @throws RangeError for unlike quantities
 */
export function conversionFactor(from: Unit, to: Unit): number {
  return fractionToNumber(conversionStep(from, to).factor);
}

/**
 * How many of one unit make up another, in decimals: all of them, or undefined where they never end.
 *
 * @throws RangeError for unlike quantities
 */
export function exactDecimalFactor(from: Unit, to: Unit): string | undefined {
  return decimalOf(conversionStep(from, to).factor);
}

interface ConversionStep {
  factor: Fraction;
  /** The power of ten of its first figure. */
  magnitude: number;
  note: string;
}

/** Every step is worked out once: a reading of a sheet asks for the same few a hundred thousand times. */
const steps = new Map<string, ConversionStep>();

/** The exact factor from one unit to another, whether or not its decimals end. */
function conversionStep(from: Unit, to: Unit): ConversionStep {
  const known = steps.get(`${from}>${to}`);
  if (known !== undefined) return known;
  if (!isLikeUnit(from, to)) throw new RangeError(`${from} and ${to} measure different quantities`);
  const factor = IN_JOULES[from].joules.div(IN_JOULES[to].joules);
  const magnitude = Math.floor(Math.log10(fractionToNumber(factor)));
  const step = { factor, magnitude, note: stepInWords(from, to, factor) };
  steps.set(`${from}>${to}`, step);
  return step;
}

/** How a person would write the step: a factor, a divisor, or both where neither has an end. */
function stepInWords(from: Unit, to: Unit, factor: Fraction): string {
  const times = decimalOf(factor);
  if (times !== undefined && !(factor.compare(1) < 0 && factor.n === 1n)) return `× ${inTenFigures(times)}`;
  const inverse = factor.inverse();
  const divided = decimalOf(inverse);
  if (divided !== undefined && inverse.compare(1) > 0) return `÷ ${inTenFigures(divided)}`;
  // A kilo on both sides says nothing: × 4.1868 ÷ 4.184, not × 4186.8 ÷ 4184.
  const [a, b] = [IN_JOULES[from].joules, IN_JOULES[to].joules];
  const kilo = a.compare(1000) >= 0 && b.compare(1000) >= 0 ? 1000 : 1;
  return `× ${inTenFigures(decimalOf(a.div(kilo)) ?? "")} ÷ ${inTenFigures(decimalOf(b.div(kilo)) ?? "")}`;
}

/** A factor as steps show it: ten figures, as the Faraday constant is printed, though all of them are used. */
function inTenFigures(decimal: string): string {
  return decimal.replace(".", "").length <= 10 ? decimal : String(Number(Number(decimal).toPrecision(10)));
}

/** Texts that name a unit of some other kind, each with what to do instead. */
const NOT_READ: readonly (readonly [pattern: RegExp, why: string])[] = [
  [
    /^(?:E_?h|E_\{?h\}?|Ha|hartrees?|a\.?\s?u\.?)(?:[\s/].*)?$/i,
    "is the hartree per particle. Give the values in kJ/mol: 1 hartree is 2625.4996 kJ/mol (CODATA 2018).",
  ],
  [
    /cm\s*\^?[({]?-\s?1|1\s?\/\s?cm|wave\s?numbers?/i,
    "is a wavenumber. Give the values in kJ/mol: 1 cm-1 is 0.01196266 kJ/mol.",
  ],
  [/\b(?:Ry|rydbergs?)\b/i, "is the rydberg. Give the values in kJ/mol: 1 rydberg is 1312.7498 kJ/mol (CODATA 2018)."],
  [
    /^(?:[SH]°?|C_?\{?p\}?°?|G°?)?\s*\/?\s*\(?R\s?T?\)?$|units?\s+of\s+R\b|^R\s+units?$|dimensionless|^k_?\{?B\}?$/,
    "is a multiple of the gas constant. Multiply by R = 8.314462618 J/(mol K) and give the values in J/(mol K) or kJ/mol.",
  ],
  [/\bbtu|\blb/i, "is a British unit. Give the values in kJ/mol or J/(mol K)."],
  [
    /°\s?[FR]\b|\bdeg\.?\s?[FR]\b|fahrenheit|rankine/i,
    "counts degrees Fahrenheit or Rankine. Give the values per kelvin.",
  ],
  [/k[\s-]?mol|\bkmol|kilo-?mol|mmol/i, "is not per mole. Give the values per mol: 1 kJ/kmol is 1 J/mol."],
  [
    /\bg(?:ram)?[\s.-]*at(?:om|\.|\b)|mol(?:es?)?\s*(?:of\s*)?\(?atoms?|atoms?[\s-]*mol/i,
    "counts moles of atoms, not of the formula as written. Multiply by the number of atoms in the formula and give the values per mol.",
  ],
  [
    /\batoms?\b/i,
    "may count each atom or the formula as written. Write eV (or kJ/mol) where the values are per formula; else multiply by the number of atoms first.",
  ],
];

/**
 * Reads a unit as sheets spell it: `kJ mol-1`, `kJ·mol⁻¹`, `kJ/mol`, `J/mol/K`, `J K-1 mol-1`, `cal/mol·K`, `e.u.`,
 * `gibbs/mol`, `kcal(IT)/mol`, `eV` and their like. Energies per gram, per kilomole, per atom or of other kinds are
 * refused with what to do.
 */
export function readUnit(text: string): Reading<Unit> {
  if (isTooLong(text)) return refused(`${quote(text)} is too long for a unit.`);
  const plain = plainText(text).trim();
  if (plain === "") return refused("No unit is given. Write the unit, for example kJ/mol or J/(mol K).");
  const shown = text.trim();
  if (/^(?:e\.?\s?u\.?|entropy\s+units?)(?:\s*\/\s*mole?)?$/i.test(plain)) {
    return read("cal/(mol K)", [`${quote(shown)} is the entropy unit, 1 cal/(mol K) with 1 cal = 4.184 J.`]);
  }
  const factors = unitFactors(plain);
  if (factors?.otherCalorie) {
    return refused(
      `${quote(shown)} is neither the thermochemical calorie (4.184 J) nor that of the International Table (4.1868 J). Give the values in joules.`,
    );
  }
  const { energy, moles, kelvins, particles, rest } = factors ?? { rest: [plain] };
  if (factors === undefined || rest?.length || energy === undefined) return refused(whyNoUnit(plain, shown));
  if (energy === "Cal") {
    return ambiguous<Unit>(
      kelvins === 0 ? ["cal/mol", "kcal/mol"] : ["cal/(mol K)", "kcal/(mol K)"],
      `${quote(shown)} may mean the calorie or the “large” calorie, which is a kilocalorie. Write cal or kcal.`,
    );
  }
  const electronic = energy === "eV" || energy === "meV";
  if (electronic) {
    if (moles !== 0) {
      return refused(`${quote(shown)}: an electronvolt is counted per particle, not per mole. Write eV, or kJ/mol.`);
    }
    if ((kelvins !== 0 && kelvins !== -1) || (particles !== 0 && particles !== -1)) {
      return refused(whyNoUnit(plain, shown));
    }
    return read<Unit>(kelvins === 0 ? energy : `${energy}/K`, [
      ...factors.notes,
      `${quote(shown)} is read as electronvolts per particle of the formula: 1 eV is 96.48533212 kJ/mol.`,
    ]);
  }
  if (moles === 0 && particles !== 0) {
    return refused(`${quote(shown)} is per particle. Multiply by the Avogadro constant and give the values per mol.`);
  }
  if (moles === 0) return refused(`${quote(shown)} does not say per mole. Write for example ${energy}/mol.`);
  if (moles !== -1 || particles !== 0 || (kelvins !== 0 && kelvins !== -1)) return refused(whyNoUnit(plain, shown));
  return read<Unit>(kelvins === 0 ? `${energy}/mol` : `${energy}/(mol K)`, factors.notes);
}

function whyNoUnit(plain: string, shown: string): string {
  const known = NOT_READ.find(([pattern]) => pattern.test(plain));
  if (known) return `${quote(shown)} ${known[1]}`;
  if (/^M[Jj]\b|^mJ\b|^mj\b/.test(plain)) {
    return `${quote(shown)}: MJ and mJ are not read, because capitals get lost on the way. Give the values in kJ or J.`;
  }
  if (/^[kM]eV\b/.test(plain))
    return `${quote(shown)} is no unit of chemical energies. Give the values in eV or kJ/mol.`;
  if (/(?:\/|\bper\b|\s)\s*\(?\s*(?:k?g|mg|grams?|kilograms?)\b|\bk?g\s*\^?-1/i.test(plain)) {
    return `${quote(shown)} is per mass. Multiply by the molar mass and give the values per mol.`;
  }
  return (
    `${quote(shown)} is not a unit this table reads. ` +
    "Energies are read in kJ, J, kcal or cal per mol or in eV; entropies and heat capacities in the same per (mol K)."
  );
}
