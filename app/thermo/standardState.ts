import { GAS_CONSTANT, REFERENCE_TEMPERATURE, STANDARD_ATMOSPHERE, STANDARD_PRESSURE } from "./constants.ts";
import { referenceStateOf } from "./referenceStates.ts";
import { isSolute, type SpeciesIdentity } from "./speciesKey.ts";

/**
 * From the older standard pressure of 1 atm to 1 bar (100 kPa, since 1982), and back. Enthalpies do not change; the
 * steps follow from the ideal gas and can be seen only where values carry two decimals.
 */

/** S°(1 bar) − S°(1 atm) of one mole of gas: R ln 1.01325 = 0.1094 J/(mol K). */
export const GAS_ENTROPY_STEP = GAS_CONSTANT * Math.log(STANDARD_ATMOSPHERE / STANDARD_PRESSURE);

/** S°(1 bar) − S°(1 atm) of a species in J/(mol K): the step for a gas, nothing for anything else. */
export function entropyStepToBar(identity: SpeciesIdentity): number {
  return identity.phase === "g" ? GAS_ENTROPY_STEP : 0;
}

/**
 * ΔfG°(1 bar) − ΔfG°(1 atm) of a species in kJ/mol:
 *
 *   −Δν · RT ln 1.01325 = −0.0326 kJ/mol · Δν   at 298.15 K
 *
 * with Δν from `gasFormed`. H2O(l): Δν = −1.5, so + 0.049.
 *
 * @returns undefined when an element of the formula has no reference state
 */
export function gibbsStepToBar(identity: SpeciesIdentity): number | undefined {
  const formed = gasFormed(identity);
  return formed === undefined ? undefined : (-formed * REFERENCE_TEMPERATURE * GAS_ENTROPY_STEP) / 1000;
}

/**
 * Δν, moles of gas formed with one mole of the species from the elements: its own, less those of the elements, plus
 * z/2 for a solute, since an ion forms against H+(aq) with z/2 of H2(g) given off.
 *
 * @returns undefined when an element of the formula has no reference state
 */
export function gasFormed(identity: SpeciesIdentity): number | undefined {
  let formed = identity.phase === "g" ? 1 : 0;
  for (const [element, count] of Object.entries(identity.formula.composition)) {
    const state = referenceStateOf(element);
    if (state === undefined) return undefined;
    if (state.phase === "g") formed -= count / state.atoms;
  }
  return isSolute(identity) ? formed + identity.formula.charge / 2 : formed;
}
