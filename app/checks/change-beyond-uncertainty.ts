import { places, subtract, toNumber } from "#app/thermo/digits.ts";
import { showDigits, showNumber } from "#app/thermo/notation.ts";
import { propertyInfo } from "#app/thermo/property.ts";
import { expandedUncertainty } from "#app/thermo/uncertainty.ts";
import { type Replacement, replacements } from "./comparing.ts";
import { explainDifference } from "./explainDifference.ts";
import type { Policy } from "./policy.ts";
import type { Check, FindingDraft, ViewedSpecies } from "./types.ts";
import { unitSlipAgainst } from "./unit-slip.ts";
import { shownSigned, shownTerm, symbolOf, trimmed, unitOf } from "./words.ts";

export const changeBeyondUncertainty: Check = {
  code: "change-beyond-uncertainty",
  version: 1,
  title: "Change beyond the uncertainties",
  severities: ["look"],
  appliesTo: "Proposed values that would replace a standing one.",
  formula: [
    "E_n = |new − standing| / √(U(new)² + U(standing)²), U expanded (k = 2)",
    "E_n > 1: a look",
    "an uncertainty missing: a look when the change exceeds 1 kJ/mol or 1 J/(mol K) and 1 % of the standing value",
  ],
  source: "Normalised error E_n, ISO 13528.",
  explanation: [
    "Two values of one quantity should agree within their expanded uncertainties. Where they do not, one of the two is wrong or its uncertainty is too small, and a person should decide which. E_n says nothing when both rest on the same measurement.",
    "A change that is the factor between two units is reported as such instead. If a single slip of the pen leads from what stands to the new value, the finding names it.",
  ],
  example: {
    given: "ΔfH° of NH3(g), −49.54 ± 0.30 where −45.94 ± 0.35 stands",
    sentence: "ΔfH° of NH3(g) changes by −3.60 kJ/mol, more than both uncertainties allow (E_n 7.8).",
  },
  run: (species, _view, policy) =>
    replacements(species)
      .filter(({ value, standing }) => unitSlipAgainst(value, standing, policy) === undefined)
      .flatMap((replacement) => change(species, replacement, policy)),
};

function change(species: ViewedSpecies, replacement: Replacement, policy: Policy): FindingDraft[] {
  const { value, standing, normalizedError: ratio } = replacement;
  const { property } = value;
  const difference = subtract(value.digits, standing.digits);
  const isBeyond = ratio === null ? isLarge(replacement, policy) : ratio > policy.normalizedErrorLimit;
  if (!isBeyond) return [];
  const decimals = Math.max(places(value.digits), places(standing.digits));
  const changes = `${symbolOf(property)} of ${species.key} changes by ${shownSigned(toNumber(difference), decimals)} ${unitOf(property)}, `;
  return [
    {
      severity: "look",
      property,
      sentence:
        ratio === null
          ? `${changes}and ${missingUncertainty(replacement)}. Is the new value meant?`
          : `${changes}more than both uncertainties allow (E_n ${ratioInWords(ratio)}).`,
      arithmetic: ratio === null ? [] : [arithmetic(replacement, ratio)],
      data: {
        value: value.digits,
        standing: standing.digits,
        normalizedError: ratio === null ? null : Number(ratio.toPrecision(3)),
      },
      suggestions: explainDifference(value, standing, species.identity.phase === "aq"),
    },
  ];
}

function isLarge({ value, standing }: Replacement, policy: Policy): boolean {
  const size = Math.abs(toNumber(subtract(value.digits, standing.digits)));
  const floor = propertyInfo[value.property].unit === "kJ/mol" ? policy.largeEnergyChange : policy.largeEntropyChange;
  return size > floor && size > policy.largeRelativeChange * Math.abs(toNumber(standing.digits));
}

function missingUncertainty({ value, standing }: Replacement): string {
  const lacks = (one: typeof value) => (expandedUncertainty(one.uncertainty) ?? 0) === 0;
  if (lacks(value) && lacks(standing)) return "no uncertainty says whether the two agree";
  return lacks(value)
    ? "it states no uncertainty to compare with what stands"
    : "what stands has no uncertainty to compare it with";
}

function arithmetic({ value, standing }: Replacement, ratio: number): string {
  const of = (one: typeof value) => trimmed(expandedUncertainty(one.uncertainty) ?? 0);
  return `E_n = |${showDigits(value.digits)} − ${shownTerm(showDigits(standing.digits))}| / √(${of(value)}² + ${of(standing)}²) = ${ratioInWords(ratio)}`;
}

function ratioInWords(ratio: number): string {
  return ratio >= 100 ? showNumber(ratio, 0) : showNumber(ratio, ratio < 1.05 ? 2 : 1);
}
