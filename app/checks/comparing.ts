import { normalizedError } from "#app/thermo/uncertainty.ts";
import { PROPERTIES } from "#app/thermo/property.ts";
import type { ViewedSpecies, ViewedValue } from "./types.ts";

/** A proposed value beside the one it would replace. */
export interface Replacement {
  readonly value: ViewedValue;
  readonly standing: ViewedValue;
  /** E_n; null where an uncertainty is missing or both are zero. */
  readonly normalizedError: number | null;
}

/** The proposed values of a species that would replace a standing one, in the order of the handbooks. */
export function replacements(species: ViewedSpecies): Replacement[] {
  return PROPERTIES.flatMap((property) => {
    const value = species.values[property];
    const standing = species.standing[property];
    if (value === undefined || standing === undefined || value.lineRef === null) return [];
    return [{ value, standing, normalizedError: normalizedError(value, standing) }];
  });
}
