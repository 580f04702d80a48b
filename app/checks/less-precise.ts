import { places, subtract, toNumber } from "#app/thermo/digits.ts";
import { showNumber } from "#app/thermo/notation.ts";
import { expandedUncertainty } from "#app/thermo/uncertainty.ts";
import { type Replacement, replacements } from "./comparing.ts";
import type { Policy } from "./policy.ts";
import type { Check, FindingDraft, ViewedSpecies } from "./types.ts";
import { unitSlipAgainst } from "./unit-slip.ts";
import { shownWithUncertainty, symbolOf, unitOf } from "./words.ts";

export const lessPrecise: Check = {
  code: "less-precise",
  version: 1,
  title: "Less precise than what stands",
  severities: ["look"],
  appliesTo: "Proposed values that would replace a standing one.",
  formula: ["fewer decimals than what stands", "an uncertainty more than 1.5 times as wide, or none where one stands"],
  source: "Common practice.",
  explanation: [
    "A value with fewer digits or a wider uncertainty may still be the better one, but replacing a precise value by a rounded copy of itself loses information. The finding asks whether the new value is meant to replace the old one.",
  ],
  example: {
    given: "ΔfH° of ZnO(cr), −350.1 ± 0.5 where −350.46 ± 0.27 stands",
    sentence:
      "Fewer digits and a wider uncertainty than what stands for ΔfH° of ZnO(cr), −350.46 ± 0.27 kJ/mol. Agrees with it (E_n 0.63): is it meant to replace it?",
  },
  run: (species, _view, policy) =>
    replacements(species)
      .filter(({ value, standing }) => !value.conventional && unitSlipAgainst(value, standing, policy) === undefined)
      .flatMap((replacement) => weaker(species, replacement, policy)),
};

function weaker(species: ViewedSpecies, replacement: Replacement, policy: Policy): FindingDraft[] {
  const { value, standing, normalizedError: ratio } = replacement;
  const { property } = value;
  const before = expandedUncertainty(standing.uncertainty) ?? 0;
  const now = expandedUncertainty(value.uncertainty);
  const faults = [
    ...(places(value.digits) < places(standing.digits) ? ["fewer digits"] : []),
    ...(now !== null && before > 0 && now > policy.widerUncertainty * before ? ["a wider uncertainty"] : []),
  ];
  const lacksUncertainty = now === null && before > 0;
  if (faults.length === 0 && !lacksUncertainty) return [];

  const stands = `${shownWithUncertainty(standing)} ${unitOf(property)}`;
  const of = `${symbolOf(property)} of ${species.key}`;
  const less = capital(`${faults.join(" and ")} than what stands for ${of}, ${stands}`);
  const sentence =
    faults.length === 0
      ? `No uncertainty is stated for ${of}, where ${stands} stands.`
      : `${less}${lacksUncertainty ? ", and no uncertainty" : ""}.`;
  return [
    {
      severity: "look",
      property,
      sentence: `${sentence}${agreement(replacement)}`,
      data: {
        value: value.digits,
        standing: standing.digits,
        uncertainty: value.uncertainty?.digits ?? null,
        standingUncertainty: standing.uncertainty?.digits ?? null,
        normalizedError: ratio === null ? null : Number(ratio.toPrecision(3)),
      },
    },
  ];
}

function agreement({ value, standing, normalizedError: ratio }: Replacement): string {
  if (ratio !== null) {
    return ratio <= 1 ? ` Agrees with it (E_n ${showNumber(ratio, 2)}): is it meant to replace it?` : "";
  }
  return toNumber(subtract(value.digits, standing.digits)) === 0 ? " The number is the same." : "";
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
