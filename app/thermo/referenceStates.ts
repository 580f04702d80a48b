import type { Property } from "./property.ts";
import type { SpeciesIdentity } from "./speciesKey.ts";
import type { Phase } from "./phase.ts";

/** The state of an element from which formation is counted. */
export interface ReferenceState {
  readonly element: string;
  /** `O2(g)`, `C(cr,graphite)`, `Fe(cr)`. */
  readonly key: string;
  readonly phase: Phase;
  /** Atoms in the formula of the key: 2 for O2, 1 for P(cr,white). */
  readonly atoms: number;
  readonly label?: string;
}

export function referenceStateOf(element: string): ReferenceState | undefined {
  void element;
  return undefined;
}
/** Whether a species is the reference state of its element. */
export function isReferenceState(identity: SpeciesIdentity): boolean {
  void identity;
  return false;
}
/** Whether the conventions make this property of this species exactly zero. */
export function isConventionalZero(identity: SpeciesIdentity, property: Property): boolean {
  void [identity, property];
  return false;
}
/** H+(aq), the zero of the ions. */
export function isHydrogenIon(identity: SpeciesIdentity): boolean {
  void identity;
  return false;
}
/** H3O+(aq): H+(aq) written with a water molecule. */
export function isOxonium(identity: SpeciesIdentity): boolean {
  void identity;
  return false;
}
