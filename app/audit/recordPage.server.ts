import { database } from "#app/db/database.server.ts";
import { demand } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { findActors, findRecord, type RecordFilter } from "./audit.queries.server.ts";

/** Entries on one page of the record. */
const ENTRIES_A_PAGE = 100;

/** One page of the record, newest first, and the number before which the next page begins. @throws Forbidden */
export async function findRecordPage(acting: Acting, filter: RecordFilter, most: number = ENTRIES_A_PAGE) {
  demand(acting, "record:read");
  const entries = await findRecord(filter, most + 1, database());
  const shown = entries.slice(0, most);
  const next = entries.length > most ? (shown.at(-1)?.number ?? null) : null;
  return { entries: shown, next };
}

/** Who can be filtered for: everybody who ever acted. @throws Forbidden */
export async function findRecordActors(acting: Acting): Promise<{ id: string; name: string }[]> {
  demand(acting, "record:read");
  return findActors(database());
}
