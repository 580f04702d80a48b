import { showDigits } from "#app/thermo/notation.ts";
import { PROPERTIES } from "#app/thermo/property.ts";
import type { Check, FindingDraft, ViewedSpecies, ViewedValue } from "./types.ts";
import { listed, symbolOf, unitOf } from "./words.ts";

export const duplicate: Check = {
  code: "duplicate",
  version: 1,
  title: "Proposed twice",
  severities: ["block", "look"],
  appliesTo: "Every species: its proposed values, and other species of the same formula, charge and phase.",
  formula: ["one value for each species and property", "one species for each formula, charge, phase and label"],
  source: "The table holds one value for each quantity of a substance. Common practice.",
  explanation: [
    "A sheet that names a substance twice with two values leaves it open which one is meant, so it stops until one is left out. The same number twice only asks to be looked at.",
    "Formula and phase do not tell isomers apart. Two species of one formula and phase stand side by side only when a label says which substance each of them is.",
  ],
  example: {
    given: "NH3(g) twice in one sheet, with ΔfH° −45.94 and −46.11 kJ/mol",
    sentence: "Two values are proposed for ΔfH° of NH3(g): −45.94 and −46.11 kJ/mol. Keep one and leave the other out.",
  },
  run: (species, view) => [
    ...rivalValues(species),
    ...view.withSameFormula(species.id).flatMap((other) => sameSubstance(species, other)),
  ],
};

function rivalValues(species: ViewedSpecies): FindingDraft[] {
  return PROPERTIES.flatMap((property) => {
    const rivals = (species.rivals ?? []).filter((value) => value.property === property);
    if (rivals.length === 0) return [];
    const own = species.values[property];
    const all = own === undefined ? rivals : [own, ...rivals];
    return all.some((value) => value.lineRef !== null) ? [competing(species, all)] : [];
  });
}

function competing(species: ViewedSpecies, values: readonly ViewedValue[]): FindingDraft {
  const [first] = values;
  const property = first?.property ?? null;
  const of = first === undefined ? species.key : `${symbolOf(first.property)} of ${species.key}`;
  const numbers = [...new Set(values.map((value) => value.digits))];
  const data = Object.fromEntries(values.map((value, index) => [`value${index + 1}`, value.digits]));
  if (numbers.length === 1) {
    return {
      severity: "look",
      property,
      sentence: `The same value is proposed ${values.length === 2 ? "twice" : `${values.length} times`} for ${of}. Keep one line and leave the rest out.`,
      data,
    };
  }
  const unit = first === undefined ? "" : ` ${unitOf(first.property)}`;
  return {
    severity: "block",
    property,
    sentence: `${spelled(values.length)} values are proposed for ${of}: ${listed(numbers.map(showDigits))}${unit}. Keep one and leave the ${values.length === 2 ? "other" : "others"} out.`,
    data,
  };
}

function sameSubstance(species: ViewedSpecies, other: ViewedSpecies): FindingDraft[] {
  if (species.identity.phase !== other.identity.phase) return [];
  const { label } = species.identity;
  const data = { other: other.key };
  if (label === other.identity.label) {
    return [
      {
        severity: "block",
        property: null,
        sentence: `${species.key} and ${other.key} have the same formula, charge and phase. If they are one substance, use one key; if they are isomers, label each of them.`,
        data,
      },
    ];
  }
  if (label !== undefined && other.identity.label !== undefined) return [];
  const [bare, labelled] = label === undefined ? [species, other] : [other, species];
  return [
    {
      severity: "look",
      property: null,
      sentence: `${bare.key} stands beside ${labelled.key} without a label of its own. Say which form or isomer it is.`,
      data,
    },
  ];
}

function spelled(count: number): string {
  return ["No", "One", "Two", "Three", "Four", "Five"][count] ?? String(count);
}
