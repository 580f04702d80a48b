import { GAS_CONSTANT, REFERENCE_TEMPERATURE, STANDARD_ATMOSPHERE, STANDARD_PRESSURE } from "./constants.ts";
import { add, compare, type Digits, digitsOf, isZero, places, roundTo } from "./digits.ts";
import type { Property } from "./property.ts";
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

/** Places to which a step is written out before a printed value is rounded to its own. */
const STEP_PLACES = 4;

/**
 * A printed value at 1 atm as it is at 1 bar, rounded to the places it was printed with: S° and ΔfG° take their step,
 * the others stay. `note` says what was done, for the record.
 *
 * @param value in the table's unit for the property
 * @returns undefined for a ΔfG° when an element of the formula has no reference state
 */
export function printedAtBar(
  property: Property,
  value: Digits,
  identity: SpeciesIdentity,
): { digits: Digits; note: string } | undefined {
  const step =
    property === "entropy"
      ? entropyStepToBar(identity)
      : property === "gibbsEnergyOfFormation"
        ? gibbsStepToBar(identity)
        : 0;
  if (step === undefined) return undefined;
  const written = digitsOf(step, STEP_PLACES);
  if (isZero(written)) return { digits: value, note: "1 atm to 1 bar: no change" };
  const sign = written.startsWith("-") ? "−" : "+";
  const stepped = roundTo(add(value, written), places(value));
  const unseen = compare(stepped, value) === 0 ? ", less than the last place printed" : "";
  return { digits: stepped, note: `1 atm to 1 bar: ${sign} ${written.replace("-", "")}${unseen}` };
}
