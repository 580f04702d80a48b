import { acts } from "./acts.ts";
import type { RecordFilter } from "./audit.queries.server.ts";

/*
 * The filter of the page that shows the record, read from its address. Pure.
 */

/** Fields of the filter as the address names them. */
export const RECORD_FIELDS = ["act", "object", "id", "person", "from", "to", "before"] as const;
export type RecordFields = Partial<Record<(typeof RECORD_FIELDS)[number], string>>;

/** Kinds of objects that acts are done to. */
export const OBJECT_KINDS: readonly string[] = [...new Set(Object.values(acts))];

/** What the address came to: a filter, or a sentence for each field that cannot be read. */
export interface ReadRecordFilter {
  filter: RecordFilter;
  wrong: Partial<Record<(typeof RECORD_FIELDS)[number], string>>;
}

/** Stands for the service itself and the command line, where a person's id would stand. */
export const SYSTEM = "system";
const PERSON_ID = /^[0-9a-f]{8}-(?:[0-9a-f]{4}-){3}[0-9a-f]{12}$/i;
const DAY = /^\d{4}-\d{2}-\d{2}$/;

function isDay(text: string): boolean {
  return DAY.test(text) && new Date(`${text}T00:00:00Z`).toISOString().slice(0, 10) === text;
}

/** Reads the filter. What cannot be read restricts nothing and gets its sentence. */
export function readRecordFilter(fields: RecordFields): ReadRecordFilter {
  const wrong: ReadRecordFilter["wrong"] = {};
  const filter: RecordFilter = {};
  const { act, object, id, person, from, to, before } = fields;
  if (act) {
    if (Object.hasOwn(acts, act)) filter.act = act;
    else wrong.act = "The record knows no such act.";
  }
  if (object) {
    if (OBJECT_KINDS.includes(object)) filter.objectKind = object;
    else wrong.object = "The record knows no such kind of thing.";
  }
  if (id) {
    if (id.length <= 100) filter.objectId = id.trim();
    else wrong.id = "No number or identifier is that long.";
  }
  if (person === SYSTEM) filter.actor = null;
  else if (person) {
    if (PERSON_ID.test(person)) filter.actor = person.toLowerCase();
    else wrong.person = "The record knows no such person.";
  }
  for (const [name, text] of [
    ["from", from],
    ["to", to],
  ] as const) {
    if (!text) continue;
    if (safeDay(text)) filter[name] = text;
    else wrong[name] = "Write the day as 2026-03-12.";
  }
  if (filter.from && filter.to && filter.from > filter.to) wrong.to = "This day is before the first one.";
  if (before) {
    if (/^[1-9]\d{0,17}$/.test(before)) filter.before = before;
    else wrong.before = "The address does not say where the page begins.";
  }
  return { filter, wrong };
}

function safeDay(text: string): boolean {
  try {
    return isDay(text);
  } catch {
    // Date refuses months and days that do not exist.
    return false;
  }
}
