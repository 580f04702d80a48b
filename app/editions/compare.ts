import { compare as compareSize, type Digits, isZero, places, subtract, toNumber } from "#app/thermo/digits.ts";
import type { Property } from "#app/thermo/property.ts";
import { normalizedError, type Uncertainty } from "#app/thermo/uncertainty.ts";
import { compareBytes } from "./digest.ts";

/*
 * Comparing two editions is net: what stands in the one against what stands in the other, whatever happened in between.
 * A value that was changed and set back is not a change. Going from b to a is the mirror image of going from a to b, and
 * edition a with the changes applied is edition b; tests hold both.
 */

/** What a comparison needs to know of a value as it stands in an edition. */
export interface ComparedValue {
  speciesId: string;
  key: string;
  property: Property;
  digits: Digits;
  uncertainty: Uncertainty | null;
  temperature: Digits;
  standardPressure: Digits;
  basis: string | null;
  origin: string;
  sourceId: string;
  rowHash: Uint8Array;
}

export type What = "came" | "went" | "changed";

/** In what two values of one species and property differ. */
export type Aspect = "value" | "digits" | "uncertainty" | "source" | "state" | "origin";

export interface ValueChange<Value extends ComparedValue = ComparedValue> {
  what: What;
  speciesId: string;
  /** Key as the second edition has it, or the first where the value went. */
  key: string;
  property: Property;
  before: Value | null;
  after: Value | null;
  /** Empty unless it changed. "digits": the same number with more or fewer digits. */
  aspects: readonly Aspect[];
  /** After less before, in the property's unit; null unless both are there. */
  difference: Digits | null;
  /** The difference over the size of what stood before; null where that is zero or one is missing. */
  relative: number | null;
  /** E_n of the two (ISO 13528); null where an uncertainty is missing or both are zero. */
  normalizedError: number | null;
  /** The number is the same; only the digits it is printed with differ. */
  digitsOnly: boolean;
}

function sameUncertainty(a: Uncertainty | null, b: Uncertainty | null): boolean {
  if (a === null || b === null) return a === b;
  return a.digits === b.digits && a.kind === b.kind && a.coverageFactor === b.coverageFactor;
}

function aspectsOf(before: ComparedValue, after: ComparedValue): Aspect[] {
  const aspects: Aspect[] = [];
  if (compareSize(before.digits, after.digits) !== 0) aspects.push("value");
  else if (places(before.digits) !== places(after.digits)) aspects.push("digits");
  if (!sameUncertainty(before.uncertainty, after.uncertainty)) aspects.push("uncertainty");
  if (before.sourceId !== after.sourceId) aspects.push("source");
  if (
    before.temperature !== after.temperature ||
    before.standardPressure !== after.standardPressure ||
    before.basis !== after.basis
  ) {
    aspects.push("state");
  }
  if (before.origin !== after.origin) aspects.push("origin");
  return aspects;
}

/** The change from what stood to what stands; at least one of the two must be there. */
export function valueChange<Value extends ComparedValue>(
  before: Value | null,
  after: Value | null,
): ValueChange<Value> | null {
  const subject = after ?? before;
  if (!subject) return null;
  const change: ValueChange<Value> = {
    what: before ? (after ? "changed" : "went") : "came",
    speciesId: subject.speciesId,
    key: subject.key,
    property: subject.property,
    before,
    after,
    aspects: [],
    difference: null,
    relative: null,
    normalizedError: null,
    digitsOnly: false,
  };
  if (!before || !after) return change;
  const difference = subtract(after.digits, before.digits);
  const aspects = aspectsOf(before, after);
  return {
    ...change,
    aspects,
    difference,
    relative: isZero(before.digits) ? null : toNumber(difference) / Math.abs(toNumber(before.digits)),
    normalizedError: normalizedError(before, after),
    digitsOnly: aspects.length === 1 && aspects[0] === "digits",
  };
}

/** Pairs rows by subject, drops the equal ones and orders by the UTF-8 bytes of key, then property. */
export function pairValues<Value extends ComparedValue>(
  before: readonly Value[],
  after: readonly Value[],
): ValueChange<Value>[] {
  const subject = (value: Value): string => `${value.speciesId} ${value.property}`;
  const stood = new Map(before.map((value) => [subject(value), value]));
  const changes: ValueChange<Value>[] = [];
  const add = (from: Value | null, to: Value | null): void => {
    const change = valueChange(from, to);
    if (change) changes.push(change);
  };
  for (const value of after) {
    const old = stood.get(subject(value)) ?? null;
    stood.delete(subject(value));
    if (!old || Buffer.compare(old.rowHash, value.rowHash) !== 0) add(old, value);
  }
  for (const value of stood.values()) add(value, null);
  return changes.sort((a, b) => compareBytes(a.key, b.key) || compareBytes(a.property, b.property));
}

/** The same change seen from the other side. */
export function turnRound<Value extends ComparedValue>(change: ValueChange<Value>): ValueChange<Value> {
  return valueChange(change.after, change.before) ?? change;
}

/** The values of the second edition from those of the first and the changes between them. */
export function applyChanges<Value extends ComparedValue>(
  values: readonly Value[],
  changes: readonly ValueChange<Value>[],
): Value[] {
  const subject = (value: { speciesId: string; property: Property }): string => `${value.speciesId} ${value.property}`;
  const result = new Map(values.map((value) => [subject(value), value]));
  for (const change of changes) {
    if (change.after) result.set(subject(change), change.after);
    else result.delete(subject(change));
  }
  return [...result.values()].sort((a, b) => compareBytes(a.key, b.key) || compareBytes(a.property, b.property));
}

export interface ChangeCounts {
  came: number;
  went: number;
  changed: number;
}

/** How many of each kind. */
export function countChanges(changes: readonly { what: What }[]): ChangeCounts {
  const counts: ChangeCounts = { came: 0, went: 0, changed: 0 };
  for (const { what } of changes) counts[what] += 1;
  return counts;
}

/** The changes behind a place (key, property), at most `limit`, and whether there are more. */
export function pageOfChanges<Change extends { key: string; property: Property }>(
  changes: readonly Change[],
  place: readonly string[] | null,
  limit: number,
): { page: Change[]; more: boolean } {
  const [key = "", property = ""] = place ?? [];
  const behind = place
    ? changes.filter((one) => (compareBytes(one.key, key) || compareBytes(one.property, property)) > 0)
    : changes;
  return { page: behind.slice(0, limit), more: behind.length > limit };
}

// --- What things are called --------------------------------------------------

/** A field of a species or a source that two editions have differently, as text. */
export interface TextChange {
  field: string;
  before: string;
  after: string;
}

export interface RecordChange<Row> {
  what: What;
  before: Row | null;
  after: Row | null;
  texts: readonly TextChange[];
}

/** Which of the named fields differ between two records, as text for a comparison word by word. */
export function textChanges<Row>(
  before: Row,
  after: Row,
  fields: readonly { name: string; text: (row: Row) => string }[],
): TextChange[] {
  return fields
    .map(({ name, text }) => ({ field: name, before: text(before), after: text(after) }))
    .filter((change) => change.before !== change.after);
}

/** Pairs species or sources by their opaque id and drops the equal ones. Keeps the order of `after`, then what went. */
export function pairRecords<Row extends { rowHash: Uint8Array }>(
  before: readonly Row[],
  after: readonly Row[],
  id: (row: Row) => string,
  fields: readonly { name: string; text: (row: Row) => string }[],
): RecordChange<Row>[] {
  const stood = new Map(before.map((row) => [id(row), row]));
  const changes: RecordChange<Row>[] = [];
  for (const row of after) {
    const old = stood.get(id(row)) ?? null;
    stood.delete(id(row));
    if (!old) changes.push({ what: "came", before: null, after: row, texts: [] });
    else if (Buffer.compare(old.rowHash, row.rowHash) !== 0) {
      changes.push({ what: "changed", before: old, after: row, texts: textChanges(old, row, fields) });
    }
  }
  for (const row of stood.values()) changes.push({ what: "went", before: row, after: null, texts: [] });
  return changes;
}
