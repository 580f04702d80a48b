import { PROPERTIES } from "#app/thermo/property.ts";
import type { Check } from "./types.ts";
import { listed, symbolOf } from "./words.ts";

export const uncertaintyMissing: Check = {
  code: "uncertainty-missing",
  version: 1,
  title: "No uncertainty stated",
  severities: ["remark"],
  appliesTo: "Proposed values, except those that are exact by convention. One remark for each species.",
  formula: ["every value: exact, or with an uncertainty and its kind"],
  source: "GUM (JCGM 100:2008), 7.2: a result is complete only with its uncertainty.",
  explanation: [
    "Without an uncertainty nobody can say whether two values agree, and results that use the value carry none. Many handbooks print none, so this is only a remark; it is worth asking the source for it.",
    "A ± whose kind the source does not name is counted as k = 2 and marked as assumed.",
  ],
  example: {
    given: "CH4(g) from a handbook that prints no uncertainties",
    sentence: "No uncertainty is stated for ΔfH°, S° and ΔfG° of CH4(g).",
  },
  run: (species) => {
    const proposed = PROPERTIES.map((property) => species.values[property])
      .filter((value) => value !== undefined)
      .filter((value) => value.lineRef !== null && !value.conventional);
    const missing = proposed.filter((value) => value.uncertainty === null);
    const assumed = proposed.filter((value) => value.uncertainty?.kind === "unstated");
    const names = (values: typeof proposed) => listed(values.map((value) => symbolOf(value.property)));
    const [firstMissing] = missing;
    const [firstAssumed] = assumed;
    return [
      ...(firstMissing === undefined
        ? []
        : [
            {
              severity: "remark" as const,
              property: firstMissing.property,
              sentence: `No uncertainty is stated for ${names(missing)} of ${species.key}.`,
              data: { properties: missing.map((value) => value.property).join(" ") },
            },
          ]),
      ...(firstAssumed === undefined
        ? []
        : [
            {
              severity: "remark" as const,
              property: firstAssumed.property,
              sentence: `The source does not say what kind of uncertainty stands after ± for ${names(assumed)} of ${species.key}; it is counted as expanded with k = 2.`,
              data: { properties: assumed.map((value) => value.property).join(" ") },
            },
          ]),
    ];
  },
};
