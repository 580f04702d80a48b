import { isZero, toNumber } from "#app/thermo/digits.ts";
import { atomCount } from "#app/thermo/formula.ts";
import { showDigits } from "#app/thermo/notation.ts";
import { PROPERTIES, type Property, propertyInfo } from "#app/thermo/property.ts";
import type { Policy } from "./policy.ts";
import { explanationSentence } from "./ranking.ts";
import { slipNumber, slipWords, type ValueSlip, type ValueSlipCode, valueSlips } from "./slips.ts";
import type { Check, FindingDraft, Suggestion, ViewedSpecies, ViewedValue } from "./types.ts";
import { shownValue, significantDigits, symbolOf, unitOf } from "./words.ts";

const FACTORS: Partial<Record<ValueSlipCode, string>> = {
  thousandfold: "1/1000 of",
  thousandth: "1000 times",
  "calories-as-joules": "1/4.184 of",
  "joules-as-calories": "4.184 times",
};

/** Fewer digits than these leave room for a factor by chance. */
const DIGITS_TO_BE_SURE = 3;

export const unitSlip: Check = {
  code: "unit-slip",
  version: 1,
  title: "Filed in another unit",
  severities: ["block", "look"],
  appliesTo:
    "Proposed values, against the standing value where there is one, else against what any substance can have.",
  formula: [
    "proposed/standing = 1000 or 1/1000 within 2 %: joules for kilojoules, or a decimal comma taken for a thousands mark",
    "proposed/standing = 4.184 or 1/4.184 within 2 %: calories for joules (1 cal = 4.184 J exactly)",
    "without a standing value: S° and Cp° of a pure substance between 1 J/(mol K) and 300 + 100·N for N atoms",
    "ΔfH° and ΔfG°, except ions in the gas: at most 1500·N kJ/mol",
  ],
  source: "Thermochemical calorie by definition; bounds by common practice.",
  explanation: [
    "ΔfH° and ΔfG° are tabulated in kilojoules and S° in joules, older tables use calories, and a decimal comma is easily taken for a thousands mark. Each of these changes a number by a known factor, so a value that is the standing one times that factor was most likely filed in another unit.",
    "A factor of 1000 has two explanations that the number alone cannot tell apart: both are named. Where nothing stands, a number far beyond what any substance has gets a look, and the Gibbs closure often tells more.",
  ],
  example: {
    given: "S° 16.72 J/(mol K) for H2O(l), where 69.95 stands",
    sentence: "S° of H2O(l), 16.72 J/(mol K), is 1/4.184 of what stands, 69.95.",
  },
  run: (species, _view, policy) =>
    PROPERTIES.flatMap((property) => {
      const value = species.values[property];
      if (value === undefined || value.lineRef === null || isZero(value.digits)) return [];
      const standing = species.standing[property];
      if (standing === undefined || isZero(standing.digits)) return implausible(species, value, policy);
      const slip = unitSlipAgainst(value, standing, policy);
      return slip === undefined ? [] : [sentenceFor(species, value, standing, slip)];
    }),
};

/** The unit slip that leads from what stands to this value, or undefined. */
export function unitSlipAgainst(value: ViewedValue, standing: ViewedValue, policy: Policy): ValueSlip | undefined {
  if (isZero(standing.digits)) return undefined;
  const stands = toNumber(standing.digits);
  return valueSlips(value, true)
    .filter((slip) => FACTORS[slip.code] !== undefined)
    .find((slip) => Math.abs(toNumber(slip.becomes) / stands - 1) <= policy.factorAgreement);
}

function sentenceFor(species: ViewedSpecies, value: ViewedValue, standing: ViewedValue, slip: ValueSlip): FindingDraft {
  const { property } = value;
  const isSure = Math.min(significantDigits(value.digits), significantDigits(standing.digits)) >= DIGITS_TO_BE_SURE;
  return {
    severity: isSure ? "block" : "look",
    property,
    sentence: `${symbolOf(property)} of ${species.key}, ${shownValue(value)}, is ${FACTORS[slip.code] ?? ""} what stands, ${showDigits(standing.digits)}. Compare the unit with the source.`,
    data: { value: value.digits, standing: standing.digits, slip: slip.code },
    suggestions: [suggestion(value, slip)],
  };
}

/** Values that no substance has, and that would be ordinary in another unit. */
function implausible(species: ViewedSpecies, value: ViewedValue, policy: Policy): FindingDraft[] {
  const code = implausibleBy(species, value, policy);
  if (code === undefined) return [];
  const { property } = value;
  const slip = valueSlips(value, true).find((one) => one.code === code);
  return [
    {
      severity: "look",
      property,
      sentence: `${symbolOf(property)} of ${species.key}, ${shownValue(value)}, is far ${code === "thousandth" ? "above" : "below"} what a substance of ${atomCount(species.identity.formula)} ${atomCount(species.identity.formula) === 1 ? "atom" : "atoms"} can have. Compare the unit with the source.`,
      data: { value: value.digits, slip: code },
      suggestions: slip === undefined ? [] : [suggestion(value, slip)],
    },
  ];
}

function implausibleBy(species: ViewedSpecies, value: ViewedValue, policy: Policy): ValueSlipCode | undefined {
  const { formula, phase } = species.identity;
  const size = Math.abs(toNumber(value.digits));
  const atoms = atomCount(formula);
  if (isEntropyLike(value.property)) {
    if (phase !== "aq" && size < policy.leastEntropy) return "thousandfold";
    return size > policy.mostEntropy + policy.mostEntropyPerAtom * atoms ? "thousandth" : undefined;
  }
  if (value.property === "enthalpyIncrement" || (phase === "g" && formula.charge !== 0)) return undefined;
  return size > policy.mostEnergyPerAtom * Math.max(1, atoms) ? "thousandth" : undefined;
}

function isEntropyLike(property: Property): boolean {
  return propertyInfo[property].unit === "J/(mol K)";
}

function suggestion(value: ViewedValue, slip: ValueSlip): Suggestion {
  const outcome = `${slipNumber(slip, value.property)}${slip.given === null ? ` ${unitOf(value.property)}` : ""}`;
  return {
    property: value.property,
    becomes: slip.becomes,
    slip: slip.code,
    sentence: explanationSentence(slipWords(slip.code, value.property), outcome.replace(/,$/, ""), 1, 0),
    also: [],
    rank: 1,
    before: null,
    after: null,
  };
}
