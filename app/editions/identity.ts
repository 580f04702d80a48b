import type { Phase } from "#app/thermo/phase.ts";
import type { SpeciesIdentity } from "#app/thermo/speciesKey.ts";

/** What the table holds of a species' identity. */
export interface StoredIdentity {
  printed: string;
  composition: Record<string, number>;
  charge: number;
  hill: string;
  phase: Phase;
  label: string | null;
}

/** The identity of a stored species, as the physics takes it. */
export function identityOf(stored: StoredIdentity): SpeciesIdentity {
  const { printed, composition, charge, hill, phase, label } = stored;
  const formula = { printed, composition, charge, hill };
  return label === null ? { formula, phase } : { formula, phase, label };
}

/** Molar mass in g/mol from the standard atomic weights; null where an element has none. */
export function molarMass(
  composition: Readonly<Record<string, number>>,
  weight: (element: string) => number | undefined,
) {
  let mass = 0;
  for (const [element, count] of Object.entries(composition)) {
    const one = weight(element);
    if (one === undefined) return null;
    mass += one * count;
  }
  return mass;
}
