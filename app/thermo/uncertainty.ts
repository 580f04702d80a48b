import { type Digits, toNumber } from "./digits.ts";

/**
 * A stated uncertainty, kept as it was given (GUM, JCGM 100:2008).
 *
 * - `exact`: none, the value holds by convention;
 * - `standard`: one standard deviation (k = 1);
 * - `expanded`: k times the standard uncertainty, with its k (the CODATA habit is k = 2, about 95 %);
 * - `unstated`: a ± whose kind the source does not say; counted as k = 2 and marked as assumed.
 *
 * Where a source gives none at all, `null` stands in place of the object.
 */
export interface Uncertainty {
  /** In the unit of the value it belongs to. */
  readonly digits: Digits;
  readonly kind: "exact" | "standard" | "expanded" | "unstated";
  /** The k of an expanded uncertainty; null for the other kinds. */
  readonly coverageFactor: number | null;
}

/** A value with what its source says about how well it is known. */
export interface UncertainValue {
  readonly digits: Digits;
  readonly uncertainty: Uncertainty | null;
}

/** The coverage factor of expanded uncertainties that do not say theirs, and of the ones we print: about 95 %. */
export const CUSTOMARY_COVERAGE_FACTOR = 2;

/** Whether the coverage factor had to be assumed, so that a page can say so. */
export function isAssumed(uncertainty: Uncertainty | null): boolean {
  return uncertainty?.kind === "unstated" || (uncertainty?.kind === "expanded" && uncertainty.coverageFactor === null);
}

/** The standard uncertainty u (k = 1) in the unit of the value; null when none is stated. */
export function standardUncertainty(uncertainty: Uncertainty | null): number | null {
  if (uncertainty === null) return null;
  const stated = toNumber(uncertainty.digits);
  switch (uncertainty.kind) {
    case "exact":
      return 0;
    case "standard":
      return stated;
    case "expanded":
      return stated / (uncertainty.coverageFactor ?? CUSTOMARY_COVERAGE_FACTOR);
    case "unstated":
      return stated / CUSTOMARY_COVERAGE_FACTOR;
  }
}

/** The expanded uncertainty U with k = 2 (about 95 %), whatever the source gave; null when none is stated. */
export function expandedUncertainty(uncertainty: Uncertainty | null): number | null {
  const standard = standardUncertainty(uncertainty);
  return standard === null ? null : CUSTOMARY_COVERAGE_FACTOR * standard;
}

/**
 * Normalised error of two values of one quantity: how many of their joined expanded uncertainties they lie apart.
 *
 *   E_n = |a − b| / √(U_a² + U_b²)          (ISO 13528; both values in one unit)
 *
 * Two values agree when E_n ≤ 1. It says nothing about values that rest on the same measurement.
 *
 * @returns null when either uncertainty is missing or both are zero
 */
export function normalizedError(a: UncertainValue, b: UncertainValue): number | null {
  const ofA = expandedUncertainty(a.uncertainty);
  const ofB = expandedUncertainty(b.uncertainty);
  if (ofA === null || ofB === null) return null;
  const joined = Math.hypot(ofA, ofB);
  return joined === 0 ? null : Math.abs(toNumber(a.digits) - toNumber(b.digits)) / joined;
}
