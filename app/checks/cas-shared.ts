import type { Formula } from "#app/thermo/formula.ts";
import type { Check, FindingDraft, ViewedSpecies } from "./types.ts";

/** Rounding of composition ratios; fractions such as 8/3 are kept as binary numbers. */
const RATIO_ACCURACY = 1e-6;

export const casShared: Check = {
  code: "cas-shared",
  version: 1,
  title: "One CAS number on two formulas",
  severities: ["block", "look"],
  appliesTo: "Every species with a CAS Registry Number that another species also carries.",
  formula: [
    "same number, same formula: nothing (one number often covers several phases)",
    "same number, one formula a multiple of the other: a look",
    "same number, other formula or charge: blocks",
  ],
  source: "Common practice.",
  explanation: [
    "A CAS Registry Number names one substance. Several phases of it share the number, and so may two ways to write its formula, such as S and S8 or P2O5 and P4O10. Two different formulas under one number mean that one of them carries the number of another substance.",
  ],
  example: {
    given: "KCl(cr) with CAS 7647-14-5, which NaCl(cr) carries",
    sentence: "KCl(cr) carries the CAS number 7647-14-5, which NaCl(cr) carries too, and the formulas differ.",
  },
  run: (species, view) => {
    if (species.cas === null) return [];
    const { cas } = species;
    return view
      .withCas(cas)
      .filter((other) => other.id !== species.id)
      .flatMap((other) => shared(species, other, cas));
  },
};

function shared(species: ViewedSpecies, other: ViewedSpecies, cas: string): FindingDraft[] {
  const data = { cas, other: other.key };
  const start = `${species.key} carries the CAS number ${cas}, which ${other.key} carries too, and `;
  switch (relation(species.identity.formula, other.identity.formula)) {
    case "same":
      return [];
    case "multiple":
      return [
        {
          severity: "look",
          property: null,
          sentence: `${start}one formula is a multiple of the other. Are they the same substance written twice?`,
          data,
        },
      ];
    case "other":
      return [
        {
          severity: "block",
          property: null,
          sentence: `${start}the formulas differ. One of the two numbers belongs to another substance.`,
          data,
        },
      ];
  }
}

function relation(a: Formula, b: Formula): "same" | "multiple" | "other" {
  const elements = Object.keys(a.composition);
  const [first] = elements;
  if (first === undefined || elements.length !== Object.keys(b.composition).length) return "other";
  const ratio = (b.composition[first] ?? 0) / (a.composition[first] ?? 1);
  const isMultiple =
    ratio > 0 &&
    elements.every((element) => {
      const expected = (a.composition[element] ?? 0) * ratio;
      return Math.abs((b.composition[element] ?? 0) - expected) <= RATIO_ACCURACY * Math.max(1, expected);
    });
  if (!isMultiple || Math.abs(a.charge * ratio - b.charge) > RATIO_ACCURACY) return "other";
  return Math.abs(ratio - 1) <= RATIO_ACCURACY ? "same" : "multiple";
}
