import { atomicWeight } from "./atomicWeights.ts";
import type { Formula } from "./formula.ts";

/**
 * Molar mass of a formula in g/mol: the sum of the standard atomic weights of its atoms.
 * The electrons that an ion lost or gained (0.0005 g/mol each) are left out.
 *
 * @returns undefined when an element has no standard atomic weight
 */
export function molarMass(formula: Formula): number | undefined {
  let sum = 0;
  for (const [element, count] of Object.entries(formula.composition)) {
    const weight = atomicWeight(element);
    if (weight === undefined) return undefined;
    sum += count * weight;
  }
  return sum;
}
