import { compare, digits, isZero, negate } from "#app/thermo/digits.ts";
import { showDigits } from "#app/thermo/notation.ts";
import type { Property } from "#app/thermo/property.ts";
import { isReferenceState } from "#app/thermo/referenceStates.ts";
import type { Check, FindingDraft, Suggestion, ViewedSpecies, ViewedValue } from "./types.ts";
import { shownValue, symbolOf } from "./words.ts";

const ZERO = digits("0");
const POSITIVE: readonly Property[] = ["entropy", "heatCapacity", "enthalpyIncrement"];

const WHY: Partial<Record<Property, string>> = {
  entropy: "the entropy of a pure substance is greater than zero (third law)",
  heatCapacity: "a pure substance takes up heat when it is warmed, so its heat capacity is greater than zero",
  enthalpyIncrement:
    "a pure substance takes up heat on the way from 0 K, so its enthalpy increment is greater than zero",
};

export const entropyPositive: Check = {
  code: "entropy-positive",
  version: 1,
  title: "Entropy above zero",
  severities: ["block"],
  appliesTo:
    "S°, Cp° and H°(T)−H°(0) of every pure substance. Not solutes: their values count from H+(aq) and may be negative.",
  formula: ["S° > 0", "Cp° > 0", "H°(T)−H°(0) > 0"],
  source: "Third law of thermodynamics; solutes by the convention for H+(aq). Common practice.",
  explanation: [
    "Absolute entropies count from zero at 0 K, and a heat capacity below zero would mean a substance that cools when it is heated. A value at or below zero is therefore never a measurement: most often the sign came from the next column, or a missing value was typed as 0.",
    "The entropy of an element in its reference state is not zero: only its ΔfH° and ΔfG° are.",
  ],
  example: {
    given: "H2O(l) with S° −69.95 J/(mol K)",
    sentence:
      "S° of H2O(l) is −69.95 J/(mol K), but the entropy of a pure substance is greater than zero (third law). Did the sign come from another column?",
  },
  run: (species) =>
    species.identity.phase === "aq"
      ? []
      : POSITIVE.map((property) => species.values[property])
          .filter((value) => value !== undefined)
          .filter((value) => compare(value.digits, ZERO) <= 0)
          .map((value) => notPositive(species, value)),
};

function notPositive(species: ViewedSpecies, value: ViewedValue): FindingDraft {
  const { property } = value;
  const start = `${symbolOf(property)} of ${species.key} is ${shownValue(value)}, but ${WHY[property] ?? ""}. `;
  const data = { value: value.digits };
  if (!isZero(value.digits)) {
    return {
      severity: "block",
      property,
      sentence: `${start}Did the sign come from another column?`,
      data,
      suggestions: [withoutSign(value)],
    };
  }
  return {
    severity: "block",
    property,
    sentence:
      property === "entropy" && isReferenceState(species.identity)
        ? `${start}Only ΔfH° and ΔfG° of an element are zero. Give the entropy or leave the cell empty.`
        : `${start}If a missing value was typed as 0, leave the cell empty.`,
    data,
  };
}

function withoutSign(value: ViewedValue): Suggestion {
  const becomes = negate(value.digits);
  return {
    property: value.property,
    becomes,
    slip: "sign-lost",
    sentence: `A sign too many in ${symbolOf(value.property)} would explain it: ${showDigits(becomes)}.`,
    also: [],
    rank: 1,
    before: null,
    after: null,
  };
}
