import type { Digits } from "./digits.ts";
import type { SpeciesIdentity } from "./speciesKey.ts";
import type { Uncertainty } from "./uncertainty.ts";
import type { Unit } from "./unit.ts";

/** A value as a closure needs it; the room's callers pass their own richer values as they are. */
export interface ClosureValue {
  /** In the table's unit: kJ/mol or J/(mol K). */
  readonly digits: Digits;
  readonly uncertainty: Uncertainty | null;
  /** Text and unit of the source when they differ from the table's. */
  readonly given: { readonly text: string; readonly unit: Unit } | null;
  readonly sourceId: string;
  /** A zero by convention: printed without a rounding error. */
  readonly conventional: boolean;
}

/** S° of an element's reference state, as printed for the species named by `key` (per mole of H2, of P, …). */
export interface ElementEntropy {
  readonly digits: Digits;
  readonly uncertainty: Uncertainty | null;
  readonly key: string;
  /** Taken from the sheet under examination itself. */
  readonly fromSheet: boolean;
}

export type ElementEntropyLookup = (element: string) => ElementEntropy | undefined;

export type ClosureVerdict = "closes" | "look" | "block" | "notMade";

/** One element's part in an entropy of formation. */
export interface ElementPart {
  readonly element: string;
  readonly key: string;
  /** Atoms in the formula, ν_E. */
  readonly count: number;
  /** Atoms of elements that go in, n_E: ν_E, less z for the hydrogen of a solute. */
  readonly netCount: number;
  /** S° per atom of the reference state, J/(mol K). */
  readonly entropy: number;
}

export interface MadeEntropyOfFormation {
  readonly outcome: "made";
  /** ΔfS°, J/(mol K). */
  readonly value: number;
  readonly parts: readonly ElementPart[];
  /** (z/2) S°(H2) of the H+ convention, J/(mol K); 0 unless a charged solute. */
  readonly chargeTerm: number;
  /** S°(H2), J/(mol K), where the charge term needs it. */
  readonly hydrogenEntropy: number | null;
}

export interface ClosureNotMade {
  readonly outcome: "notMade";
  /** Keys of the reference states whose S° is not in the table. */
  readonly missing: readonly string[];
  readonly sentence: string;
}

export interface GibbsClosure {
  readonly verdict: ClosureVerdict;
  /** Why it was not made, or how it came out; one sentence. */
  readonly sentence: string;
  readonly missing: readonly string[];
  /** r = ΔfG°(stated) − (ΔfH° − T ΔfS°), kJ/mol; null when not made. */
  readonly residual: number | null;
  /** t, kJ/mol. */
  readonly tolerance: number | null;
  /** Above this |r| it blocks, kJ/mol. */
  readonly blockAbove: number | null;
  readonly parts: ClosureParts | null;
}

export interface ClosureParts {
  readonly enthalpy: number;
  readonly entropy: number;
  readonly gibbs: number;
  /** T, K. */
  readonly temperature: number;
  readonly entropyOfFormation: MadeEntropyOfFormation;
  /** ΔfG° that follows from ΔfH° and S°, kJ/mol. */
  readonly gibbsComputed: number;
  /** d: what the last printed digits leave open, kJ/mol. */
  readonly rounding: number;
  /** e: what the element entropies leave open, kJ/mol. */
  readonly elements: number;
  /** c: allowance for intermediate rounding, kJ/mol. */
  readonly allowance: number;
  /** u_c, kJ/mol; null for one source. */
  readonly combinedUncertainty: number | null;
  readonly oneSource: boolean;
  readonly constraintRelaxed: boolean;
}

export interface ClosureInput {
  readonly identity: SpeciesIdentity;
  readonly enthalpy: ClosureValue;
  readonly entropy: ClosureValue;
  readonly gibbs: ClosureValue;
  readonly elementEntropy: ElementEntropyLookup;
  /** The source itself says that the three values need not fit together. */
  readonly constraintRelaxed?: boolean;
}

export interface ClosureSettings {
  /** c per √(atoms + 1), kJ/mol. */
  readonly allowance: number;
}

export const CLOSURE_SETTINGS: ClosureSettings = { allowance: 0.05 };

export function entropyOfFormation(
  identity: SpeciesIdentity,
  entropy: Digits,
  elementEntropy: ElementEntropyLookup,
): MadeEntropyOfFormation | ClosureNotMade {
  void [identity, entropy, elementEntropy];
  return { outcome: "notMade", missing: [], sentence: "" };
}

export function gibbsClosure(input: ClosureInput, settings: ClosureSettings = CLOSURE_SETTINGS): GibbsClosure {
  void [input, settings];
  return {
    verdict: "notMade",
    sentence: "",
    missing: [],
    residual: null,
    tolerance: null,
    blockAbove: null,
    parts: null,
  };
}

/** The arithmetic of a closure, line by line, as plain text. */
export function closureArithmetic(closure: GibbsClosure): string[] {
  return [closure.sentence];
}
