import { database } from "#app/db/database.server.ts";
import { demand } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { act } from "./act.server.ts";
import { countRecord, findRecordFrom, findRecordHead, type RecordFilter } from "./audit.queries.server.ts";
import { type ExportedEntry, recordFileHead, recordFileLines, type RecordFormat } from "./recordFile.ts";

const BATCH = 1000;

/**
 * Hands out the entries that fit a filter as a file, oldest first, up to the newest one of this moment. That it was handed
 * out, to whom and how far is an entry of its own.
 *
 * @returns the file's name and its bytes, read from the database as they are sent
 * @throws Forbidden
 */
export async function exportRecord(
  acting: Acting,
  filter: RecordFilter,
  format: RecordFormat,
): Promise<{ name: string; bytes: AsyncGenerator<Buffer> }> {
  demand(acting, "record:read");
  const wanted = Object.fromEntries(
    Object.entries({ ...filter, before: undefined }).filter(([, value]) => value !== undefined),
  ) as RecordFilter;
  const head = await act(acting, async ({ trx, record }) => {
    const newest = await findRecordHead(trx);
    const number = Number(newest?.number ?? 0);
    const entries = await countRecord({ ...wanted, before: String(number + 1) }, trx);
    record({
      act: "record.exported",
      objectId: number,
      detail: { format, filter: wanted, entries, head: newest?.hash.toString("hex") ?? null },
    });
    return number;
  });
  return {
    name: `tablewright record to ${head}.${format}`,
    bytes: linesOf({ ...wanted, before: String(head + 1) }, format),
  };
}

async function* linesOf(filter: RecordFilter, format: RecordFormat): AsyncGenerator<Buffer> {
  let before = recordFileHead(format);
  let after = 0;
  for (;;) {
    const batch = await findRecordFrom(filter, after, BATCH, database());
    yield Buffer.from(before + recordFileLines(format, batch.map(exported)));
    if (batch.length < BATCH) return;
    before = "";
    after = Number(batch.at(-1)?.number);
  }
}

function exported(row: Awaited<ReturnType<typeof findRecordFrom>>[number]): ExportedEntry {
  return {
    number: Number(row.number),
    at: row.at.toISOString(),
    actor: row.actor,
    apiKeyId: row.api_key_id,
    act: row.act,
    objectKind: row.object_kind,
    objectId: row.object_id,
    detail: row.detail,
    requestId: row.request_id,
    previousHash: row.previous_hash.toString("hex"),
    hash: row.hash.toString("hex"),
    person: row.person,
  };
}
