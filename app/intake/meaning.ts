/** What a column of a sheet can hold. */
export const COLUMN_MEANS = [
  "key",
  "formula",
  "phase",
  "label",
  "description",
  "name",
  "cas",
  "synonyms",
  "value",
  "uncertainty",
  "propertyName",
  "anyValue",
  "anyUncertainty",
  "unitName",
  "temperature",
  "sourceKey",
  "remark",
  "molarMass",
  "ignore",
] as const;

export type ColumnMeans = (typeof COLUMN_MEANS)[number];

/** How each meaning is called on the page. A value and its uncertainty carry the symbol of their quantity beside it. */
export const meaningWords: Readonly<Record<ColumnMeans, string>> = {
  key: "species key",
  formula: "formula",
  phase: "phase",
  label: "form or isomer",
  description: "description",
  name: "name",
  cas: "CAS number",
  synonyms: "synonyms",
  value: "value",
  uncertainty: "uncertainty",
  propertyName: "which quantity",
  anyValue: "value of that quantity",
  anyUncertainty: "uncertainty of that value",
  unitName: "unit of that value",
  temperature: "temperature",
  sourceKey: "source key",
  remark: "remark",
  molarMass: "molar mass",
  ignore: "not read",
};

/** Stands in place of a column for the answer to "which species is this?"; kept as a repair like the cells' own. */
export const ANSWER = 10_000;
