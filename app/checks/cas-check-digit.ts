import { readCas } from "#app/thermo/cas.ts";
import type { Check, FindingDraft } from "./types.ts";

export const casCheckDigit: Check = {
  code: "cas-check-digit",
  version: 1,
  title: "CAS check digit",
  severities: ["block"],
  appliesTo: "Every species with a CAS Registry Number.",
  formula: ["last digit = (1·d1 + 2·d2 + 3·d3 + …) modulo 10, with d1, d2, d3 … the other digits read from the right"],
  source: "CAS Registry Number and check digit, as published by Chemical Abstracts Service. Common practice.",
  explanation: [
    "The last digit of a CAS Registry Number is worked out from the others, so a digit misread or two digits exchanged nearly always show. The number is what other tables are matched by, so a wrong one would tie the value to another substance.",
    "The digit misses some errors, and it cannot tell whether the number belongs to this substance.",
  ],
  example: {
    given: "H2O(l) with CAS 7732-18-6",
    sentence: "The CAS number 7732-18-6 of H2O(l) does not end in its check digit: the other digits ask for 5, not 6.",
  },
  run: (species) => {
    if (species.cas === null || readCas(species.cas).outcome === "read") return [];
    return [badNumber(species.key, species.cas)];
  },
};

function badNumber(key: string, cas: string): FindingDraft {
  const shape = /^(\d{2,7})-?(\d{2})-?(\d)$/.exec(cas.trim());
  const data = { cas };
  if (shape === null) {
    return {
      severity: "block",
      property: null,
      sentence: `“${cas}” is not a CAS number of ${key}. Write it as 7732-18-5, or leave it out.`,
      data,
    };
  }
  const body = `${shape[1] ?? ""}${shape[2] ?? ""}`;
  const fromRight = Array.from(body, Number).reverse();
  const sum = fromRight.reduce((total, digit, index) => total + digit * (index + 1), 0);
  return {
    severity: "block",
    property: null,
    sentence:
      `The CAS number ${cas} of ${key} does not end in its check digit: the other digits ask for ${sum % 10}, not ` +
      `${shape[3] ?? ""}. Compare it with the source.`,
    arithmetic: [
      `${fromRight.map((digit, index) => `${digit}·${index + 1}`).join(" + ")} = ${sum}, so the last digit is ${sum % 10}.`,
    ],
    data: { ...data, sum, checkDigit: sum % 10 },
  };
}
