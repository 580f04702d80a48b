import { database } from "#app/db/database.server.ts";
import { demand } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { findRecord, type RecordFilter } from "./audit.queries.server.ts";

/** Entries on one page of the record. */
const ENTRIES_A_PAGE = 100;

/** One page of the record, newest first, and the number before which the next page begins. @throws Forbidden */
export async function findRecordPage(acting: Acting, filter: RecordFilter) {
  demand(acting, "record:read");
  const entries = await findRecord(filter, ENTRIES_A_PAGE + 1, database());
  const shown = entries.slice(0, ENTRIES_A_PAGE);
  const next = entries.length > ENTRIES_A_PAGE ? (shown.at(-1)?.number ?? null) : null;
  return { entries: shown, next };
}
