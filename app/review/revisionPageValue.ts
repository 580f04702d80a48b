import { readDigits } from "#app/thermo/digits.ts";
import { showDigits } from "#app/thermo/notation.ts";
import { type Property, propertyInfo } from "#app/thermo/property.ts";
import { isLikeUnit, type Unit, UNITS } from "#app/thermo/unit.ts";
import type { ValueContent } from "./content.ts";
import { type FigureField, readFigure, type UncertaintyChoice } from "./writtenValue.ts";

/*
 * A value as a steward writes it by hand on the page of a revision, read by the same reader as a sheet's cell and
 * converted by the same rules.
 */

export interface WrittenValue {
  value: string;
  unit: Unit;
  uncertainty: string;
  kind: UncertaintyChoice;
}

/** What writing came to: the new content, or what is wrong with which field. */
export type ReadWritten =
  { outcome: "read"; content: ValueContent } | { outcome: "wrong"; errors: Partial<Record<FigureField, string>> };

/** The units in which a property may be written, its own first. */
export function unitsFor(property: Property): readonly Unit[] {
  const { unit: own } = propertyInfo[property];
  return [own, ...UNITS.filter((unit) => unit !== own && isLikeUnit(unit, own))];
}

/**
 * Reads what the steward wrote. An uncertainty written with the value, "−45.94(35)" or "−45.94 ± 0.35", counts; otherwise
 * the field beside it does.
 *
 * @param before the content that the line has, of which everything but value, uncertainty and wording stays
 */
export function readWritten(written: WrittenValue, property: Property, before: ValueContent): ReadWritten {
  const reading = readFigure(written, property);
  if (reading.outcome === "wrong") return { outcome: "wrong", errors: reading.errors };
  return { outcome: "read", content: { ...before, ...reading.figure } };
}

/** How a value is filled into the form that edits it. */
export function writtenFrom(content: Pick<ValueContent, "digits" | "uncertainty">, property: Property): WrittenValue {
  const { uncertainty } = content;
  return {
    value: showDigits(content.digits),
    unit: propertyInfo[property].unit,
    uncertainty: uncertainty && uncertainty.kind !== "exact" ? uncertainty.digits : "",
    kind: uncertainty?.kind ?? "none",
  };
}

/**
 * The content after one of a finding's suggestions was taken, and the note that says so: "Two digits exchanged: −49.54
 * becomes −45.94."
 *
 * @returns null when the suggestion's digits are no number
 */
export function takeSuggestion(
  content: ValueContent,
  becomes: string,
  slip: string,
): { content: ValueContent; note: string } | null {
  const mended = readDigits(becomes);
  if (mended === undefined) return null;
  const note = `${SLIP_NOTES[slip] ?? "Slip repaired"}: ${showDigits(content.digits)} becomes ${showDigits(mended)}.`;
  const given = content.given.note ? `${content.given.note}; ${note}` : note;
  return { content: { ...content, digits: mended, given: { ...content.given, note: given } }, note };
}

/** How each slip is called in the note of the version that repairs it. */
const SLIP_NOTES: Readonly<Record<string, string>> = {
  "digits-exchanged": "Two digits exchanged",
  "sign-lost": "Sign lost",
  "digit-misread": "One digit misread",
  "decimal-moved": "Decimal point moved",
  thousandfold: "Kilojoules taken as joules",
  thousandth: "Joules taken as kilojoules",
  "calories-as-joules": "Calories taken as joules",
  "joules-as-calories": "Joules converted as if they were calories",
  "enthalpy-and-gibbs-exchanged": "Two values exchanged",
  "joules-in-entropy-term": "Joules not turned into kilojoules in the entropy term",
  "celsius-in-entropy-term": "Degrees Celsius in the entropy term",
  "oxonium-as-zero": "The zero belongs to another ion",
};
