import { refused, type Reading } from "./reading.ts";

/** A chemical formula with its charge. */
export interface Formula {
  /** Plain text in the order the source gave, charge at the end: `CuSO4·5H2O`, `SO4-2`, `Na+`. Reads back as itself. */
  readonly printed: string;
  /** Atoms of each element; D and T count as elements of their own. */
  readonly composition: Readonly<Record<string, number>>;
  /** Charge number z. */
  readonly charge: number;
  /** Hill order with exact counts (fractions where they occur), without the charge: for comparing formulas. */
  readonly hill: string;
}

/** Reads a formula as sheets and handbooks spell it. */
export function readFormula(text: string): Reading<Formula> {
  return refused(`${text} cannot be read.`);
}
