import { atomCount, soleElement } from "./formula.ts";
import type { Phase } from "./phase.ts";
import type { Property } from "./property.ts";
import type { SpeciesIdentity } from "./speciesKey.ts";

/** The state of an element from which formation is counted: ΔfH° = ΔfG° = 0 by definition, S° is not zero. */
export interface ReferenceState {
  readonly element: string;
  /** `O2(g)`, `C(cr,graphite)`, `Fe(cr)`. */
  readonly key: string;
  readonly phase: Phase;
  /** Atoms in the formula of the key: 2 for O2(g), 1 for P(cr,white). */
  readonly atoms: number;
  /** The form of a solid that has several. */
  readonly label?: string;
}

/** Elements whose reference state is a gas, with the atoms of its molecule. */
const GASES: Readonly<Record<string, number>> = {
  H: 2,
  D: 2,
  T: 2,
  N: 2,
  O: 2,
  F: 2,
  Cl: 2,
  He: 1,
  Ne: 1,
  Ar: 1,
  Kr: 1,
  Xe: 1,
  Rn: 1,
};

/** Elements whose reference state is a liquid. */
const LIQUIDS: Readonly<Record<string, number>> = { Br: 2, Hg: 1 };

/**
 * Solids of which several forms are known: the name of the reference form first, then other names of the same form.
 * White phosphorus is the reference by agreement although it is not the stablest form.
 */
const NAMED_FORMS: Readonly<Record<string, readonly [form: string, ...synonyms: string[]]>> = {
  C: ["graphite"],
  S: ["rhombic", "orthorhombic", "alpha"],
  P: ["white", "yellow", "alpha-white"],
  Sn: ["white", "beta", "tetragonal"],
  B: ["rhombohedral", "beta", "beta-rhombohedral"],
  As: ["grey", "gray", "alpha", "rhombohedral"],
  Se: ["trigonal", "hexagonal", "grey", "gray"],
  Mn: ["alpha"],
};

/** Other solids with one atom in the formula of their reference state; iodine has two. */
const PLAIN_SOLIDS =
  "Li Be Na Mg Al Si K Ca Sc Ti V Cr Fe Co Ni Cu Zn Ga Ge Rb Sr Y Zr Nb Mo Tc Ru Rh Pd Ag Cd In Sb Te Cs Ba La Ce Pr " +
  "Nd Pm Sm Eu Gd Tb Dy Ho Er Tm Yb Lu Hf Ta W Re Os Ir Pt Au Tl Pb Bi Po Ra Ac Th Pa U Np Pu Am Cm";

/** Names that sheets give to the only stable form of a plain solid at 298.15 K. */
const PLAIN_SYNONYMS = ["alpha", "metal", "I"];
/** Cerium is stable in its γ form, and no other metal of the list is stable in a form called otherwise than α. */
const PLAIN_EXCEPTIONS: Readonly<Record<string, readonly string[]>> = { Ce: ["gamma", "metal"] };

const REFERENCE_STATES: ReadonlyMap<string, ReferenceState> = new Map(
  [
    ...Object.entries(GASES).map(([element, atoms]) => stateOf(element, "g", atoms)),
    ...Object.entries(LIQUIDS).map(([element, atoms]) => stateOf(element, "l", atoms)),
    ...Object.entries(NAMED_FORMS).map(([element, [form]]) => stateOf(element, "cr", 1, form)),
    ...PLAIN_SOLIDS.split(" ").map((element) => stateOf(element, "cr", 1)),
    stateOf("I", "cr", 2),
  ].map((state) => [state.element, state]),
);

/** The reference state of an element, or undefined for the few elements that have none (astatine, francium, Z > 96). */
export function referenceStateOf(element: string): ReferenceState | undefined {
  return REFERENCE_STATES.get(element);
}

/**
 * Whether a species is the reference state of its element.
 *
 * A solid may be written per atom or per molecule (`S8(cr,rhombic)`, `P4(cr,white)`), as `s` or `cr`, and under
 * another name of the same form; a sheet that names no form means the reference one (common practice). A gas must
 * be the molecule itself: O3(g) and O(g) are not reference states.
 */
export function isReferenceState(identity: SpeciesIdentity): boolean {
  const { formula, phase, label } = identity;
  const element = soleElement(formula);
  const state = element === undefined ? undefined : referenceStateOf(element);
  if (element === undefined || state === undefined || formula.charge !== 0) return false;
  switch (state.phase) {
    case "g":
      return phase === "g" && atomCount(formula) === state.atoms && label === undefined;
    case "l":
      return phase === "l" && label === undefined;
    default:
      if (phase !== "cr" && phase !== "s") return false;
      return label === undefined || formNames(element).includes(label);
  }
}

/**
 * Whether the conventions make this property of this species exactly zero: ΔfH° and ΔfG° of an element in its
 * reference state; ΔfH°, ΔfG°, S° and Cp° of H+(aq), at every temperature.
 */
export function isConventionalZero(identity: SpeciesIdentity, property: Property): boolean {
  if (isHydrogenIon(identity)) return property !== "enthalpyIncrement";
  const formation = property === "enthalpyOfFormation" || property === "gibbsEnergyOfFormation";
  return formation && isReferenceState(identity);
}

/** H+(aq), the zero of the ions in solution. */
export function isHydrogenIon({ formula, phase }: SpeciesIdentity): boolean {
  return phase === "aq" && formula.hill === "H" && formula.charge === 1;
}

/**
 * H3O+(aq): the same ion written with a water molecule. It carries the values of H2O(l), not zeros; a sheet that lists
 * it as the zero uses the same convention under another name.
 */
export function isOxonium({ formula, phase }: SpeciesIdentity): boolean {
  return phase === "aq" && formula.hill === "H3O" && formula.charge === 1;
}

function formNames(element: string): readonly string[] {
  return NAMED_FORMS[element] ?? PLAIN_EXCEPTIONS[element] ?? PLAIN_SYNONYMS;
}

function stateOf(element: string, phase: Phase, atoms: number, label?: string): ReferenceState {
  const formula = atoms === 1 ? element : `${element}${atoms}`;
  if (label === undefined) return { element, key: `${formula}(${phase})`, phase, atoms };
  return { element, key: `${formula}(${phase},${label})`, phase, atoms, label };
}
