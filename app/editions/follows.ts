import { derivedGibbsEnergy, type ElementEntropy, type ElementEntropyLookup } from "#app/thermo/closure.ts";
import { type Digits, digits, digitsOf, isZero, places } from "#app/thermo/digits.ts";
import { elementSymbols } from "#app/thermo/elements.ts";
import { isConventionalZero, isReferenceState, referenceStateOf } from "#app/thermo/referenceStates.ts";
import type { SpeciesIdentity } from "#app/thermo/speciesKey.ts";
import type { Uncertainty } from "#app/thermo/uncertainty.ts";
import { identityOf, type StoredIdentity } from "./identity.ts";

/** A value as far as a derivation needs it. */
interface Stated {
  digits: Digits;
  uncertainty: Uncertainty | null;
}

/** More decimals than this claim more than a ΔfG° that follows from two other numbers can hold, kJ/mol. */
const MOST_PLACES = 2;

/**
 * ΔfG° in kJ/mol that follows from ΔfH° and S° where the table states none: for showing in the lighter hand, never stored.
 * It is rounded to the last decimal that both have, at most two; a zero by convention has no last decimal and limits
 * nothing. Null where an element's S° is missing or the conventions make no ΔfG°.
 */
export function followingGibbsEnergy(
  identity: SpeciesIdentity,
  enthalpy: Stated,
  entropy: Stated,
  elementEntropy: ElementEntropyLookup,
): Digits | null {
  if (isConventionalZero(identity, "gibbsEnergyOfFormation")) return digits("0");
  const made = derivedGibbsEnergy(identity, enthalpy, entropy, elementEntropy);
  if (made.outcome !== "made") return null;
  const conventional = isConventionalZero(identity, "enthalpyOfFormation") && isZero(enthalpy.digits);
  const place = Math.min(MOST_PLACES, places(entropy.digits), conventional ? MOST_PLACES : places(enthalpy.digits));
  return digitsOf(made.value, place);
}

/** Hill formulas of the elements' reference states, for finding them in an edition. */
export function referenceHills(elements: Iterable<string> = elementSymbols()): string[] {
  return [...elements].flatMap((element) => {
    const state = referenceStateOf(element);
    return state ? [`${element}${state.atoms === 1 ? "" : state.atoms}`] : [];
  });
}

/**
 * The entropies of the elements, from the species of an edition that are their reference states.
 * @param species with the S° that stands for each; others are passed over
 */
export function elementEntropies(
  species: readonly (StoredIdentity & { key: string; entropy: Stated | undefined })[],
): ElementEntropyLookup {
  const found = new Map<string, ElementEntropy>();
  for (const one of species) {
    const [element, ...others] = Object.keys(one.composition);
    if (!element || others.length > 0 || !one.entropy || !isReferenceState(identityOf(one))) continue;
    found.set(element, { ...one.entropy, key: one.key, fromSheet: false });
  }
  return (element) => found.get(element);
}
