import { act } from "#app/audit/act.server.ts";
import { database } from "#app/db/database.server.ts";
import { decodeSheet } from "./decode.ts";
import {
  countRows,
  findReadRows,
  findRepairs,
  findSheet,
  findSheetBytes,
  findSheetForUpdate,
  ROW_BATCH,
  updateSheetFailed,
  updateSheetProgress,
  updateSheetRead,
  upsertRows,
} from "./intake.queries.server.ts";
import { frameOf, readAndMatch, repairsByRow, settleStored } from "./rereadRows.server.ts";

/**
 * Reads the rows of a sheet whose plan was confirmed: the worker's task. Each batch is a transaction of its own, so that
 * the page sees the progress and a worker that was stopped goes on where it was. Safe to run twice: a sheet that is not
 * being read is left alone.
 */
export async function readSheet(sheetId: number): Promise<void> {
  const sheet = await findSheet(sheetId, database());
  if (sheet?.state !== "reading") return;
  const decoding = decodeSheet(await findSheetBytes(sheetId, database()), sheet.dialect?.encoding);
  if (decoding.outcome === "refused") {
    await fail(sheetId, decoding.sentence);
    return;
  }
  const { rows } = decoding.sheet;
  const frame = frameOf(sheet);
  const repairs = repairsByRow(await findRepairs(sheetId, null, database()));

  for (let done = sheet.rowsDone; done < rows.length; done += ROW_BATCH) {
    const batch = rows.slice(done, done + ROW_BATCH);
    const goesOn = await act(null, async ({ trx }) => {
      const now = await findSheetForUpdate(sheetId, trx);
      // Stopped in the meantime, or another worker is further on.
      if (now?.state !== "reading" || now.rowsDone !== done) return false;
      await upsertRows(sheetId, await readAndMatch(batch, repairs, frame, trx), trx);
      await updateSheetProgress(sheetId, done + batch.length, trx);
      return true;
    });
    if (!goesOn) return;
  }

  await act(null, async ({ trx, record }) => {
    const now = await findSheetForUpdate(sheetId, trx);
    if (now?.state !== "reading") return;
    await upsertRows(sheetId, settleStored(await findReadRows(sheetId, trx), frame), trx);
    const counts = await countRows(sheetId, trx);
    const accounted = counts.read + counts.refused + counts.leftOut + counts.skipped;
    if (accounted !== rows.length) {
      throw new Error(`sheet ${sheetId} has ${rows.length} rows, but ${accounted} are read, refused or skipped`);
    }
    await updateSheetRead(sheetId, trx);
    record({ act: "sheet.read", objectId: sheetId, detail: { rows: rows.length, ...counts } });
  });
}

async function fail(sheetId: number, reason: string): Promise<void> {
  await act(null, async ({ trx, record }) => {
    const now = await findSheetForUpdate(sheetId, trx);
    if (now?.state !== "reading") return;
    await updateSheetFailed(sheetId, reason, trx);
    record({ act: "sheet.failed", objectId: sheetId, detail: { reason } });
  });
}
