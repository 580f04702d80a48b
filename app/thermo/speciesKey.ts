import type { Formula } from "./formula.ts";
import type { Phase } from "./phase.ts";
import { refused, type Reading } from "./reading.ts";

/** What makes a species: formula with charge, phase and, where that leaves more than one substance, a label. */
export interface SpeciesIdentity {
  readonly formula: Formula;
  readonly phase: Phase;
  /** The form of a solid or the name of an isomer; holds no space. */
  readonly label?: string;
}

/** The key as the trade writes it: `H2O(l)`, `C(cr,graphite)`, `Fe+3(aq)`. */
export function formatKey(identity: SpeciesIdentity): string {
  const { formula, phase, label } = identity;
  return `${formula.printed}(${label === undefined ? phase : `${phase},${label}`})`;
}

/** Reads a key and its common variants. */
export function readKey(text: string): Reading<SpeciesIdentity> {
  return refused(`${text} cannot be read.`);
}
