import type { FieldError } from "#app/http/errors.ts";
import { readIdentity } from "#app/species/identityForm.ts";
import { readCas } from "#app/thermo/cas.ts";
import { digits } from "#app/thermo/digits.ts";
import { showDigits } from "#app/thermo/notation.ts";
import { type Property, PROPERTIES, propertyInfo } from "#app/thermo/property.ts";
import { formatKey, isSolute, type SpeciesIdentity } from "#app/thermo/speciesKey.ts";
import { printedAtBar } from "#app/thermo/standardState.ts";
import type { DetailContent, ValueContent } from "./content.ts";
import { readFigure, UNCERTAINTY_CHOICES, type UncertaintyChoice } from "./writtenValue.ts";

/*
 * What the forms say in which a change is begun on the page of a species, read into the contents of lines. Pure: what was
 * typed comes in as text by field name, and everything that is wrong comes out at once, each at its field.
 */

/** What was typed into a field; an empty text where there is no such field. */
export type Typed = (name: string) => string;

/** What is wrong with a form, and which readings an ambiguous entry has, by the name of its field. */
export interface FormTrouble {
  errors: FieldError[];
  readings: Record<string, readonly string[]>;
}

export const noTrouble = (): FormTrouble => ({ errors: [], readings: {} });

/** Whether anything is wrong. */
export const isTroubled = ({ errors }: FormTrouble): boolean => errors.length > 0;

export function wrong(trouble: FormTrouble, field: string, detail: string): void {
  trouble.errors.push({ pointer: `/${field}`, detail });
}

/** A text of at most so many characters. */
export function textOf(typed: Typed, field: string, most: number, trouble: FormTrouble): string {
  const text = typed(field).trim();
  if (text.length > most) wrong(trouble, field, `At most ${most} characters; this has ${text.length}.`);
  return text;
}

/** Why something is proposed; the reviewer reads it beside the line. */
export function reasonOf(typed: Typed, trouble: FormTrouble): string {
  const reason = textOf(typed, "reason", 2000, trouble);
  if (reason === "") wrong(trouble, "reason", "Say why. The reviewer reads it beside the change.");
  return reason;
}

// --- Values -------------------------------------------------------------------

/** A value that was written into the form, all but its source. */
export interface WrittenValue {
  property: Property;
  content: Omit<ValueContent, "sourceId">;
}

/** The name of a property's field: `entropy.value`. */
export const valueField = (property: Property, part: "value" | "unit" | "uncertainty" | "valueIs" | "uncertaintyIs") =>
  `${property}.${part}`;

/** The standard pressures a value may be given at, in pascal. */
export const PRESSURES = ["100000", "101325"] as const;

/**
 * Reads the rows that were filled in: value, unit and uncertainty of each, and what holds for all of them. A row without
 * a value says nothing. Values at 1 atm are brought to 1 bar.
 */
export function readValues(typed: Typed, identity: SpeciesIdentity, trouble: FormTrouble): WrittenValue[] {
  const kind = UNCERTAINTY_CHOICES.find((one): one is UncertaintyChoice => one === (typed("kind") || "none"));
  const pressure = PRESSURES.find((one) => one === (typed("pressure") || "100000"));
  const basis = typed("basis");
  if (!kind) wrong(trouble, "kind", "Choose the kind of uncertainty.");
  if (!pressure) wrong(trouble, "pressure", "Choose the standard pressure.");
  if (!["", "molality", "concentration"].includes(basis)) wrong(trouble, "basis", "Choose one of the list.");
  const method = textOf(typed, "method", 500, trouble);
  const remark = textOf(typed, "remark", 1000, trouble);
  if (kind && kind !== "expanded" && typed("k").trim() !== "") {
    wrong(trouble, "k", "A coverage factor belongs to an expanded uncertainty. Choose that kind, or leave this empty.");
  }
  if (!kind || !pressure) return [];

  const values: WrittenValue[] = [];
  for (const property of PROPERTIES) {
    const field = (part: Parameters<typeof valueField>[1]): string => typed(valueField(property, part));
    if (field("value").trim() === "") {
      if (field("uncertainty").trim() !== "") {
        wrong(trouble, valueField(property, "value"), "An uncertainty stands here without its value.");
      }
      continue;
    }
    const reading = readFigure(
      {
        value: field("value"),
        unit: field("unit"),
        uncertainty: field("uncertainty"),
        kind,
        k: typed("k"),
        valueIs: field("valueIs"),
        uncertaintyIs: field("uncertaintyIs"),
        mayStateNone: true,
      },
      property,
    );
    if (reading.outcome === "wrong") {
      for (const [part, detail] of Object.entries(reading.errors)) {
        if (part === "k") {
          if (!trouble.errors.some((error) => error.pointer === "/k")) wrong(trouble, "k", detail);
        } else wrong(trouble, `${property}.${part}`, detail);
      }
      for (const [part, readings] of Object.entries(reading.readings)) {
        trouble.readings[`${property}.${part}`] = readings;
      }
      continue;
    }
    const { figure } = reading;
    const atBar = pressure === "101325" ? printedAtBar(property, figure.digits, identity) : undefined;
    if (pressure === "101325" && !atBar) {
      wrong(
        trouble,
        valueField(property, "value"),
        `${propertyInfo[property].symbol} at 1 atm cannot be brought to 1 bar: an element of this formula has no reference state in the table.`,
      );
      continue;
    }
    const note = [figure.given.note, atBar?.note].filter((one) => one !== null && one !== undefined).join("; ");
    values.push({
      property,
      content: {
        kind: "value",
        ...figure,
        digits: atBar?.digits ?? figure.digits,
        given: { ...figure.given, note: note === "" ? null : note },
        temperature: digits("298.15"),
        standardPressure: digits("100000"),
        basis: isSolute(identity) && (basis === "molality" || basis === "concentration") ? basis : null,
        origin: "stated",
        method: method === "" ? null : method,
        remark: remark === "" ? null : remark,
      },
    });
  }
  return values;
}

/** How a value is filled into the form that writes it anew: in the table's unit, as the line says it now. */
export function typedValue(content: ValueContent, property: Property): Record<string, string> {
  const { uncertainty } = content;
  return {
    [valueField(property, "value")]: showDigits(content.digits),
    [valueField(property, "unit")]: propertyInfo[property].unit,
    [valueField(property, "uncertainty")]: uncertainty && uncertainty.kind !== "exact" ? uncertainty.digits : "",
    kind: uncertainty?.kind ?? "none",
    k: uncertainty?.coverageFactor ? String(uncertainty.coverageFactor) : "",
    pressure: "100000",
    basis: content.basis ?? "",
    method: content.method ?? "",
    remark: content.remark ?? "",
    source: content.sourceId,
  };
}

// --- What a species is called ---------------------------------------------------

const INCHIKEY = /^[A-Z]{14}-[A-Z]{10}-[A-Z]$/;
const MOST_SYNONYMS = 50;

/** Names and numbers of a species: everything of its detail that does not go into its key. */
export type WrittenNames = Pick<DetailContent, "name" | "cas" | "inchikey" | "synonyms">;

/** Reads name, CAS number, InChIKey and synonyms (one a line). */
export function readNames(typed: Typed, trouble: FormTrouble): WrittenNames {
  const name = textOf(typed, "name", 200, trouble);
  let cas: string | null = null;
  if (typed("cas").trim() !== "") {
    const reading = readCas(typed("cas"));
    if (reading.outcome === "read") cas = reading.value;
    else wrong(trouble, "cas", reading.sentence);
  }
  const inchikey = typed("inchikey")
    .trim()
    .replace(/^InChIKey=/i, "");
  if (inchikey !== "" && !INCHIKEY.test(inchikey)) {
    wrong(
      trouble,
      "inchikey",
      "An InChIKey is 14, 10 and 1 capital letters with hyphens, as in XLYOFNOQVPJJNP-UHFFFAOYSA-N.",
    );
  }
  const synonyms = [
    ...new Set(
      typed("synonyms")
        .split(/\r?\n/)
        .map((line) => line.trim())
        .filter((line) => line !== ""),
    ),
  ];
  if (synonyms.length > MOST_SYNONYMS) wrong(trouble, "synonyms", `At most ${MOST_SYNONYMS} synonyms.`);
  if (synonyms.some((one) => one.length > 200)) wrong(trouble, "synonyms", "A synonym has at most 200 characters.");
  return { name, cas, inchikey: inchikey === "" ? null : inchikey, synonyms };
}

/**
 * Reads the whole detail of a species that is there already: its printed formula and label make the key, and they must
 * still say the same composition and charge.
 */
export function readDetail(typed: Typed, identity: SpeciesIdentity, trouble: FormTrouble): DetailContent {
  const names = readNames(typed, trouble);
  const written = {
    formula: typed("formula"),
    phase: identity.phase,
    label: typed("label"),
    formulaIs: typed("formulaIs"),
  };
  const reading = readIdentity(written);
  let read: SpeciesIdentity = identity;
  if (reading.outcome === "wrong") {
    for (const [field, detail] of Object.entries(reading.errors)) {
      wrong(trouble, field === "phase" ? "formula" : field, detail);
    }
    if (reading.readings.length > 0) trouble.readings["formula"] = reading.readings;
  } else {
    read = reading.identity;
    if (read.formula.hill !== identity.formula.hill || read.formula.charge !== identity.formula.charge) {
      wrong(
        trouble,
        "formula",
        `${read.formula.printed} is another composition or charge, and so another species. Take “It is another species” instead: the values are withdrawn here and set there.`,
      );
    }
  }
  return {
    kind: "detail",
    key: formatKey(read),
    printed: read.formula.printed,
    label: read.label ?? null,
    ...names,
  };
}

/** How a detail is filled into the form that changes it. */
export function typedDetail(detail: DetailContent): Record<string, string> {
  return {
    formula: detail.printed,
    label: detail.label ?? "",
    name: detail.name,
    cas: detail.cas ?? "",
    inchikey: detail.inchikey ?? "",
    synonyms: detail.synonyms.join("\n"),
  };
}

// --- Questions ------------------------------------------------------------------

/** Another species that is named like the one proposed. */
export interface Namesake {
  key: string;
  name: string;
  hill: string;
  charge: number;
  phase: string;
  cas: string | null;
  inchikey: string | null;
  synonyms: readonly string[];
  /** The open revision that proposes it; null where it stands. */
  revisionId: number | null;
}

/**
 * What must be asked before a species is called so: formula, charge and phase do not tell isomers apart, so one CAS
 * number, InChIKey or name on two species is a question and never passed over. Phases of one substance may share them.
 */
export function namesakeQuestions(
  detail: DetailContent,
  identity: SpeciesIdentity,
  others: readonly Namesake[],
): string[] {
  const questions: string[] = [];
  const plain = (text: string): string => text.toLowerCase().replace(/[^\p{L}\p{N}]/gu, "");
  for (const other of others) {
    const where = other.revisionId === null ? "" : ` (proposed in revision ${other.revisionId})`;
    const sameFormula = other.hill === identity.formula.hill && other.charge === identity.formula.charge;
    const another = sameFormula ? "another species of the same formula and phase" : "a species of another formula";
    if (sameFormula && other.phase !== identity.phase) continue;
    if (detail.cas !== null && detail.cas === other.cas) {
      questions.push(`${other.key}${where}, ${another}, carries the CAS number ${detail.cas} already.`);
    }
    if (detail.inchikey !== null && detail.inchikey === other.inchikey) {
      questions.push(`${other.key}${where}, ${another}, carries the InChIKey ${detail.inchikey} already.`);
    }
    const called = [other.name, ...other.synonyms].map(plain).filter((one) => one !== "");
    if (detail.name !== "" && called.includes(plain(detail.name))) {
      questions.push(`${other.key}${where}, ${another}, is called ${detail.name} already.`);
    }
  }
  return [...new Set(questions)];
}

/** What stands in the way of a new species, or of a name: species it may be the same as, and what must be answered. */
export interface FormQuestions {
  /** Species of the same composition, charge and phase. */
  matches: readonly { key: string; name: string; cas: string | null; revisionId: number | null }[];
  sentences: readonly string[];
}

/** The field that answers the questions; it holds what was asked, so that another question is asked anew. */
export const ANSWER = "answer";

/** The text that answers these questions and no others. */
export function answerTo({ matches, sentences }: FormQuestions): string {
  return [...matches.map((one) => one.key), ...sentences].join(" | ");
}

// --- Names of fields --------------------------------------------------------------

/** Value of the choice that describes a source anew. */
export const NEW_SOURCE = "new";

/** Name of the box that withdraws a value, or moves it to another species. */
export const takesField = (property: Property): string => `takes.${property}`;

/** Name of the box that takes them all. */
export const TAKES_ALL = "takes.all";
