import { PROPERTIES } from "#app/thermo/property.ts";
import type { Check, FindingDraft, SourceKind } from "./types.ts";
import { shownValue, symbolOf } from "./words.ts";

const KIND_NAMES: Record<SourceKind, string> = {
  measurement: "a measurement",
  evaluation: "an evaluation",
  calculation: "a calculation",
  estimate: "an estimate",
};

/** How much stands behind a kind of source; calculations rank below what was measured, estimates below those. */
const STANDING: Record<SourceKind, number> = { measurement: 2, evaluation: 2, calculation: 1, estimate: 0 };

export const weakerSource: Check = {
  code: "weaker-source",
  version: 1,
  title: "Weaker source than what stands",
  severities: ["look"],
  appliesTo: "Proposed values that would replace a standing value from another kind of source.",
  formula: ["measurement or evaluation, then calculation, then estimate"],
  source: "Common practice.",
  explanation: [
    "Values that were measured or evaluated carry more weight than values that were calculated, and those more than estimates. Replacing one by a weaker kind can be right, for instance after a retraction, but somebody should have meant it.",
  ],
  example: {
    given: "an estimate of ΔfH° of CuO(cr) where an evaluation stands",
    sentence: "ΔfH° of CuO(cr) comes from an estimate and would replace an evaluation, −157.3 kJ/mol. Is that meant?",
  },
  run: (species) =>
    PROPERTIES.flatMap((property): FindingDraft[] => {
      const value = species.values[property];
      const standing = species.standing[property];
      if (value === undefined || standing === undefined || value.lineRef === null) return [];
      if (value.conventional || STANDING[value.sourceKind] >= STANDING[standing.sourceKind]) return [];
      return [
        {
          severity: "look",
          property,
          sentence: `${symbolOf(property)} of ${species.key} comes from ${KIND_NAMES[value.sourceKind]} and would replace ${KIND_NAMES[standing.sourceKind]}, ${shownValue(standing)}. Is that meant?`,
          data: { kind: value.sourceKind, standingKind: standing.sourceKind },
        },
      ];
    }),
};
