import type { Database } from "#app/db/database.server.ts";
import { findNewestEdition } from "#app/editions/editions.queries.server.ts";
import { findCandidates } from "#app/species/species.queries.server.ts";
import type { DecodedRow } from "./decode.ts";
import {
  findReadRowsOfHills,
  findRepairs,
  findRowsByNumber,
  findRowsInDispute,
  type RepairRow,
  type Sheet,
  type StoredRow,
  upsertRows,
} from "./intake.queries.server.ts";
import { matchSpecies, type RowToSettle, settleRows } from "./match.ts";
import { ANSWER } from "./meaning.ts";
import { answeredKeys } from "./sourceChoice.ts";
import { readRows, type RowOutcome, type SheetFrame, type SheetRow } from "./readRows.ts";

/** The newest repair of each cell, by row and column. */
export type RepairsByRow = ReadonlyMap<number, ReadonlyMap<number, string>>;

/** Lays repairs of one cell over each other: the newest counts. */
export function repairsByRow(repairs: readonly Pick<RepairRow, "row" | "column" | "becomes">[]): RepairsByRow {
  const byRow = new Map<number, Map<number, string>>();
  for (const { row, column, becomes } of repairs) {
    byRow.set(row, (byRow.get(row) ?? new Map<number, string>()).set(column, becomes));
  }
  return byRow;
}

/** A row with the repairs of its cells laid over it. */
export function repairedRow(row: Pick<DecodedRow, "number" | "cells">, repairs: RepairsByRow): SheetRow {
  const own = repairs.get(row.number);
  return {
    number: row.number,
    cells: own ? row.cells.map((cell, column) => own.get(column) ?? cell) : row.cells,
    answer: own?.get(ANSWER) || null,
  };
}

/** What reading needs to know of a sheet whose plan was confirmed. */
export function frameOf(sheet: Sheet): SheetFrame {
  const sourceKeys = answeredKeys(sheet.sourceChoice);
  return {
    ...(sourceKeys ? { sourceKeys } : {}),
    heads: sheet.heads ?? [],
    headRow: sheet.plan?.headRow ?? 1,
    plan: sheet.plan?.columns ?? [],
    settings: sheet.settings,
  };
}

/** Reads rows and matches their species against the table and the open revisions; rows are not yet compared. */
export async function readAndMatch(
  rows: readonly DecodedRow[],
  repairs: RepairsByRow,
  frame: SheetFrame,
  db: Database,
): Promise<StoredRow[]> {
  const repaired = rows.map((row) => repairedRow(row, repairs));
  const outcomes = readRows(repaired, frame);
  const read = outcomes.flatMap((outcome, index) => {
    const row = repaired[index];
    return outcome.outcome === "read" && row
      ? [{ number: row.number, answer: row.answer, reading: outcome.reading }]
      : [];
  });
  const hills = [...new Set(read.map((row) => row.reading.species.formula.hill))];
  const edition = (await findNewestEdition(db))?.number ?? 0;
  const matched = matchSpecies(read, await findCandidates(edition, hills, db), frame);
  const matchOf = new Map(read.map((row, index) => [row.number, matched[index]]));
  return rows.map((row, index): StoredRow => {
    const match = matchOf.get(row.number);
    if (match?.outcome === "read") return storedRow(row, { outcome: "read", problems: [], reading: match.reading });
    if (match) return storedRow(row, { outcome: "refused", problems: match.problems, reading: null });
    const outcome = outcomes[index] as Exclude<RowOutcome, { outcome: "read" }>;
    return storedRow(row, { outcome: outcome.outcome, problems: outcome.problems, reading: null });
  });
}

function storedRow(
  row: Pick<DecodedRow, "number" | "cells">,
  result: Pick<StoredRow, "outcome" | "problems" | "reading">,
): StoredRow {
  return { number: row.number, cells: row.cells, ...result };
}

/** Compares rows with each other; answers those whose outcome changes by it. */
export function settleStored(rows: readonly StoredRow[], frame: SheetFrame): StoredRow[] {
  const toSettle = rows.flatMap((row): RowToSettle[] =>
    row.reading === null ? [] : [{ number: row.number, reading: row.reading }],
  );
  const byNumber = new Map(rows.map((row) => [row.number, row]));
  return settleRows(toSettle, frame).flatMap((outcome, index) => {
    const row = byNumber.get(toSettle[index]?.number ?? -1);
    if (!row) return [];
    if (outcome.outcome === "refused") {
      return [storedRow(row, { outcome: "refused", problems: outcome.problems, reading: null })];
    }
    const same = JSON.stringify(outcome.reading.match) === JSON.stringify(row.reading?.match);
    return same ? [] : [storedRow(row, { outcome: "read", problems: [], reading: outcome.reading })];
  });
}

/**
 * Reads rows again after a repair or after others were left out, together with every row that was in dispute with
 * another and every row of the same composition, since mending one row may settle the next.
 */
export async function rereadRows(sheet: Sheet, numbers: readonly number[], trx: Database): Promise<void> {
  const frame = frameOf(sheet);
  const disputed = await findRowsInDispute(sheet.id, trx);
  const wanted = [...new Set([...numbers, ...disputed.map((row) => row.number)])];
  if (wanted.length === 0) return;
  const rows = await findRowsByNumber(sheet.id, wanted, trx);
  const repairs = repairsByRow(await findRepairs(sheet.id, wanted, trx));
  const reread = await readAndMatch(rows, repairs, frame, trx);

  const hills = [...rows.map((row) => row.reading), ...reread.map((row) => row.reading)].flatMap((reading) =>
    reading ? [reading.species.formula.hill] : [],
  );
  const beside = (await findReadRowsOfHills(sheet.id, [...new Set(hills)], trx)).filter(
    (row) => !wanted.includes(row.number),
  );
  const settled = new Map(
    settleStored(
      [...reread, ...beside].sort((a, b) => a.number - b.number),
      frame,
    ).map((row) => [row.number, row]),
  );
  const changed = [
    ...reread.map((row) => settled.get(row.number) ?? row),
    ...beside.flatMap((row) => settled.get(row.number) ?? []),
  ];
  await upsertRows(sheet.id, changed, trx);
}
