import { compare, type Digits, digits, isZero, places } from "#app/thermo/digits.ts";
import { showDigits } from "#app/thermo/notation.ts";
import { PROPERTIES } from "#app/thermo/property.ts";
import type { Uncertainty } from "#app/thermo/uncertainty.ts";
import type { Policy } from "./policy.ts";
import type { Check, FindingDraft, ViewedSpecies, ViewedValue } from "./types.ts";
import { listed, significantDigits, symbolOf, unitOf } from "./words.ts";

const ZERO = digits("0");

export const uncertaintyDigits: Check = {
  code: "uncertainty-digits",
  version: 1,
  title: "Digits of value and uncertainty",
  severities: ["block", "look", "remark"],
  appliesTo: "Proposed values with a stated uncertainty.",
  formula: [
    "U ≥ 0; U = 0 only for values that are exact by convention",
    "U with at most two significant digits, and no finer than the value",
    "value with at most two decimals beyond the first digit of U",
  ],
  source: "GUM (JCGM 100:2008), 7.2.6.",
  explanation: [
    "An uncertainty is itself known to one or two digits, and the value is printed to the same place. Digits far beyond the uncertainty are carried by accident; they do no harm, so they only get a remark.",
    "An uncertainty below zero is a misread cell and stops. One of exactly zero would claim that a measured value is exact.",
  ],
  example: {
    given: "ΔfH° −285.83041 with U 0.4 kJ/mol",
    sentence:
      "ΔfH° of H2O(l), −285.83041, is printed to four decimals beyond the first digit of its uncertainty, 0.4 kJ/mol.",
  },
  run: (species, _view, policy) =>
    PROPERTIES.flatMap((property) => {
      const value = species.values[property];
      if (value === undefined || value.lineRef === null || value.conventional) return [];
      return value.uncertainty === null || value.uncertainty.kind === "exact"
        ? []
        : examined(species, value, value.uncertainty, policy);
    }),
};

function examined(
  species: ViewedSpecies,
  value: ViewedValue,
  uncertainty: Uncertainty,
  policy: Policy,
): FindingDraft[] {
  const { property } = value;
  const of = `${symbolOf(property)} of ${species.key}`;
  const stated = `${showDigits(uncertainty.digits)} ${unitOf(property)}`;
  const data = { value: value.digits, uncertainty: uncertainty.digits };
  if (compare(uncertainty.digits, ZERO) < 0) {
    return [
      {
        severity: "block",
        property,
        sentence: `The uncertainty of ${of} is ${stated}; an uncertainty cannot be negative. Compare the cell with the source.`,
        data,
      },
    ];
  }
  if (isZero(uncertainty.digits)) {
    return [
      {
        severity: "look",
        property,
        sentence: `The uncertainty of ${of} is given as 0, which would make it exact. If none is stated, leave the cell empty.`,
        data,
      },
    ];
  }
  const beyond = places(value.digits) - firstPlace(uncertainty.digits);
  const significant = significantDigits(uncertainty.digits);
  const faults = [
    ...(beyond > policy.digitsBeyondUncertainty
      ? [`is printed to ${counted(beyond)} decimals beyond the first digit of its uncertainty, ${stated}`]
      : []),
    ...(places(uncertainty.digits) > places(value.digits)
      ? [`is printed to fewer decimals than its uncertainty, ${stated}`]
      : []),
    ...(significant > 2 && places(uncertainty.digits) > 0
      ? [
          `has an uncertainty with ${counted(significant)} significant digits, ${stated}, where two say all there is to say`,
        ]
      : []),
  ];
  if (faults.length === 0) return [];
  return [{ severity: "remark", property, sentence: `${of}, ${showDigits(value.digits)}, ${listed(faults)}.`, data }];
}

/** Decimal place of the first digit that is not zero: 2 for `0.040`, −1 for `10`. */
function firstPlace(value: Digits): number {
  return -Math.floor(Math.log10(Math.abs(Number(value))));
}

function counted(count: number): string {
  return ["no", "one", "two", "three", "four", "five", "six", "seven", "eight", "nine"][count] ?? String(count);
}
