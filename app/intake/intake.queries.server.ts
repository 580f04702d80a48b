import { sql } from "kysely";
import type { Database } from "#app/db/database.server.ts";
import type { Dialect } from "./decode.ts";
import type { MatchedReading } from "./match.ts";
import type { ColumnPlan, SheetSettings } from "./plan.ts";
import type { CellProblem } from "./readRows.ts";
import type { SourceChoice } from "./sourceChoice.ts";
import type { SheetState } from "./states.ts";

/** A chunk of the uploaded bytes: 1 MB, as the table allows. */
const CHUNK = 1024 * 1024;

/** Rows written in one statement. */
export const ROW_BATCH = 500;

// --- Sheets -----------------------------------------------------------------

function sheets(db: Database) {
  return db
    .selectFrom("sheet as s")
    .innerJoin("person as p", "p.id", "s.uploaded_by")
    .leftJoin("person as c", "c.id", "s.plan_confirmed_by")
    .select([
      "s.id",
      "s.name",
      "s.sha256",
      "s.uploaded_by as uploadedBy",
      "p.name as uploadedByName",
      "s.received_at as receivedAt",
      "s.failure",
      "s.heads",
      "c.name as planConfirmedByName",
      "s.plan_confirmed_at as planConfirmedAt",
      "s.rows_total as rowsTotal",
      "s.rows_done as rowsDone",
      "s.revision_id as revisionId",
    ])
    .select((eb) => [
      eb.ref("s.byte_length").$castTo<string>().as("byteLength"),
      eb.ref("s.state").$castTo<SheetState>().as("state"),
      eb.ref("s.dialect").$castTo<Dialect | null>().as("dialect"),
      eb.ref("s.plan").$castTo<StoredPlan | null>().as("plan"),
      eb.ref("s.source_choice").$castTo<SourceChoice | null>().as("sourceChoice"),
      eb.ref("s.settings").$castTo<SheetSettings>().as("settings"),
    ]);
}

/** What `sheet.plan` holds: the columns, and what was noticed about the whole sheet when they were guessed. */
export interface StoredPlan {
  columns: ColumnPlan;
  notices: readonly string[];
  headRow: number;
  /** The first values of each column, for the page. */
  samples: readonly (readonly string[])[];
  /** Whether a cell says only that something is solid, so that the page asks what that means. */
  bareSolid: boolean;
  /** The different texts of each column that could be keys of sources; left out in sheets planned before they were. */
  keys?: readonly (readonly string[])[];
}

/** A sheet without its bytes and rows. */
export type Sheet = NonNullable<Awaited<ReturnType<typeof findSheet>>>;

/** One sheet, or undefined. */
export function findSheet(id: number, db: Database) {
  return sheets(db).where("s.id", "=", id).executeTakeFirst();
}

/** The same, holding its row until the transaction ends: acts on one sheet come one after the other. */
export async function findSheetForUpdate(id: number, trx: Database) {
  await trx.selectFrom("sheet").select("id").where("id", "=", id).forUpdate().execute();
  return findSheet(id, trx);
}

/** The newest sheets first, with their counts of rows. */
export async function findSheets(limit: number, db: Database) {
  return listedSheets(db).limit(limit).execute();
}

/** The newest sheets of one person that no revision was built from yet. */
export async function findUnfinishedSheetsOf(personId: string, limit: number, db: Database) {
  return listedSheets(db).where("s.uploaded_by", "=", personId).where("s.state", "<>", "built").limit(limit).execute();
}

function listedSheets(db: Database) {
  return sheets(db)
    .select((eb) => [
      eb
        .selectFrom("sheet_row as r")
        .select(({ fn }) => fn.countAll<string>().as("n"))
        .whereRef("r.sheet_id", "=", "s.id")
        .where("r.outcome", "=", "refused")
        .where("r.left_out_at", "is", null)
        .as("refused"),
    ])
    .orderBy("s.id", "desc");
}

/** The newest sheet of the same bytes that is still being worked on. */
export function findOpenSheetOfBytes(sha256: Buffer, db: Database) {
  return db
    .selectFrom("sheet")
    .select(["id", "name"])
    .where("sha256", "=", sha256)
    .where("state", "in", ["received", "planned", "reading", "read"])
    .orderBy("id", "desc")
    .limit(1)
    .executeTakeFirst();
}

/** Waits for others who are receiving the same bytes at this moment. */
export async function lockBytes(sha256: Buffer, trx: Database): Promise<void> {
  await sql`select pg_advisory_xact_lock(${sha256.readInt32BE(0)}, ${sha256.readInt32BE(4)})`.execute(trx);
}

/** Inserts a received sheet with its bytes in chunks; answers its number. */
export async function insertSheet(
  sheet: { name: string; bytes: Uint8Array; sha256: Buffer; uploadedBy: string },
  trx: Database,
): Promise<number> {
  const { id } = await trx
    .insertInto("sheet")
    .values({
      name: sheet.name,
      byte_length: sheet.bytes.length,
      sha256: sheet.sha256,
      uploaded_by: sheet.uploadedBy,
    })
    .returning("id")
    .executeTakeFirstOrThrow();
  for (let number = 0; number * CHUNK < sheet.bytes.length; number += 1) {
    const bytes = Buffer.from(sheet.bytes.subarray(number * CHUNK, (number + 1) * CHUNK));
    await trx.insertInto("sheet_chunk").values({ sheet_id: id, number, bytes }).execute();
  }
  return id;
}

/** The bytes as they were uploaded. */
export async function findSheetBytes(id: number, db: Database): Promise<Buffer> {
  const chunks = await db
    .selectFrom("sheet_chunk")
    .select("bytes")
    .where("sheet_id", "=", id)
    .orderBy("number")
    .execute();
  return Buffer.concat(chunks.map((chunk) => chunk.bytes));
}

/** The sheet's columns have a meaning now, guessed or chosen again; the steward is to confirm them. */
export async function updateSheetPlanned(
  id: number,
  planned: { dialect: Dialect; heads: readonly string[]; plan: StoredPlan; settings: SheetSettings; rowsTotal: number },
  trx: Database,
): Promise<void> {
  await trx
    .updateTable("sheet")
    .set({
      state: "planned",
      failure: null,
      dialect: JSON.stringify(planned.dialect),
      heads: [...planned.heads],
      plan: JSON.stringify(planned.plan),
      settings: JSON.stringify(planned.settings),
      rows_total: planned.rowsTotal,
      rows_done: 0,
    })
    .where("id", "=", id)
    .execute();
}

/** Back to the plan, with what was confirmed before still filled in. */
export async function updateSheetReopened(id: number, trx: Database): Promise<void> {
  await trx.updateTable("sheet").set({ state: "planned", failure: null, rows_done: 0 }).where("id", "=", id).execute();
}

/** The plan is confirmed and the rows are to be read. */
export async function updateSheetConfirmed(
  id: number,
  confirmed: { plan: StoredPlan; settings: SheetSettings; sourceChoice: SourceChoice | null; by: string },
  trx: Database,
): Promise<void> {
  await trx
    .updateTable("sheet")
    .set({
      state: "reading",
      plan: JSON.stringify(confirmed.plan),
      settings: JSON.stringify(confirmed.settings),
      source_choice: confirmed.sourceChoice === null ? null : JSON.stringify(confirmed.sourceChoice),
      plan_confirmed_by: confirmed.by,
      plan_confirmed_at: new Date(),
      rows_done: 0,
    })
    .where("id", "=", id)
    .execute();
}

export async function updateSheetProgress(id: number, rowsDone: number, trx: Database): Promise<void> {
  await trx.updateTable("sheet").set({ rows_done: rowsDone }).where("id", "=", id).execute();
}

export async function updateSheetRead(id: number, trx: Database): Promise<void> {
  await trx.updateTable("sheet").set({ state: "read" }).where("id", "=", id).execute();
}

export async function updateSheetFailed(id: number, failure: string, trx: Database): Promise<void> {
  await trx.updateTable("sheet").set({ state: "failed", failure }).where("id", "=", id).execute();
}

export async function updateSheetBuilt(id: number, revisionId: number, trx: Database): Promise<void> {
  await trx.updateTable("sheet").set({ state: "built", revision_id: revisionId }).where("id", "=", id).execute();
}

// --- Rows -------------------------------------------------------------------

/** A row as it was read, with its cells as uploaded. */
export interface StoredRow {
  number: number;
  cells: readonly string[];
  outcome: "read" | "refused" | "skipped";
  problems: readonly CellProblem[];
  reading: MatchedReading | null;
}

function rows(sheetId: number, db: Database) {
  return db
    .selectFrom("sheet_row as r")
    .where("r.sheet_id", "=", sheetId)
    .select(["r.number", "r.cells", "r.left_out_at as leftOutAt"])
    .select((eb) => [
      eb.ref("r.outcome").$castTo<StoredRow["outcome"]>().as("outcome"),
      eb.ref("r.problems").$castTo<StoredRow["problems"]>().as("problems"),
      eb.ref("r.reading").$castTo<MatchedReading | null>().as("reading"),
    ])
    .orderBy("r.number");
}

/** Writes what became of rows; a row read before is read anew. Its cells are those of the bytes, never repaired ones. */
export async function upsertRows(sheetId: number, read: readonly StoredRow[], trx: Database): Promise<void> {
  for (let start = 0; start < read.length; start += ROW_BATCH) {
    await trx
      .insertInto("sheet_row")
      .values(
        read.slice(start, start + ROW_BATCH).map((row) => ({
          sheet_id: sheetId,
          number: row.number,
          cells: [...row.cells],
          outcome: row.outcome,
          problems: JSON.stringify(row.problems),
          reading: row.reading === null ? null : JSON.stringify(row.reading),
        })),
      )
      .onConflict((oc) =>
        oc.columns(["sheet_id", "number"]).doUpdateSet((eb) => ({
          cells: eb.ref("excluded.cells"),
          outcome: eb.ref("excluded.outcome"),
          problems: eb.ref("excluded.problems"),
          reading: eb.ref("excluded.reading"),
          left_out_by: null,
          left_out_at: null,
        })),
      )
      .execute();
  }
}

/** One row, or undefined. */
export function findRow(sheetId: number, number: number, db: Database) {
  return rows(sheetId, db).where("r.number", "=", number).executeTakeFirst();
}

/** Rows of one outcome in their order, from after a row number on. */
export function findRowsByOutcome(
  sheetId: number,
  outcome: StoredRow["outcome"],
  page: { after: number; limit: number },
  db: Database,
) {
  return rows(sheetId, db)
    .where("r.outcome", "=", outcome)
    .where("r.number", ">", page.after)
    .limit(page.limit)
    .execute();
}

/** Rows by their numbers. */
export function findRowsByNumber(sheetId: number, numbers: readonly number[], db: Database) {
  return rows(sheetId, db)
    .where(sql<boolean>`r.number = any(${[...numbers]}::integer[])`)
    .execute();
}

/** Every row that was read. */
export function findReadRows(sheetId: number, db: Database) {
  return rows(sheetId, db).where("r.outcome", "=", "read").execute();
}

/** The rows that were read as species of these compositions. */
export function findReadRowsOfHills(sheetId: number, hills: readonly string[], db: Database) {
  return rows(sheetId, db)
    .where("r.outcome", "=", "read")
    .where(sql<boolean>`r.reading #>> '{species,formula,hill}' = any(${[...hills]}::text[])`)
    .execute();
}

/** The refused rows whose trouble lies between rows, and that were not left out. */
export function findRowsInDispute(sheetId: number, db: Database) {
  return rows(sheetId, db)
    .where("r.outcome", "=", "refused")
    .where("r.left_out_at", "is", null)
    .where(sql<boolean>`r.problems @? '$[*].amongRows'`)
    .execute();
}

/** How many rows came to what. `refused` are those that wait; `leftOut` those that the steward gave up. */
export async function countRows(sheetId: number, db: Database) {
  const { rows: counted } = await sql<{
    read: number;
    refused: number;
    leftOut: number;
    skipped: number;
    values: number;
  }>`
    select count(*) filter (where outcome = 'read')::int as read,
           count(*) filter (where outcome = 'refused' and left_out_at is null)::int as refused,
           count(*) filter (where outcome = 'refused' and left_out_at is not null)::int as "leftOut",
           count(*) filter (where outcome = 'skipped')::int as skipped,
           coalesce(sum(jsonb_array_length(reading -> 'values')), 0)::int as values
      from sheet_row where sheet_id = ${sheetId}`.execute(db);
  return counted[0] ?? { read: 0, refused: 0, leftOut: 0, skipped: 0, values: 0 };
}

/** How many rows were read as which species: those new to the table, and those it knows. */
export async function countSpecies(sheetId: number, db: Database) {
  const { rows: counted } = await sql<{ kind: "known" | "new"; n: number }>`
    select reading #>> '{match,kind}' as kind, count(distinct reading #>> '{match,key}')::int as n
      from sheet_row where sheet_id = ${sheetId} and outcome = 'read' group by 1`.execute(db);
  const of = (kind: "known" | "new"): number => counted.find((row) => row.kind === kind)?.n ?? 0;
  return { known: of("known"), new: of("new") };
}

/** Why rows were skipped, with how many for each reason. */
export async function findSkipReasons(sheetId: number, db: Database) {
  const { rows: reasons } = await sql<{ reason: string; n: number; first: number }>`
    select problems #>> '{0,sentence}' as reason, count(*)::int as n, min(number) as first
      from sheet_row where sheet_id = ${sheetId} and outcome = 'skipped' group by 1 order by 3`.execute(db);
  return reasons;
}

/** What was taken for granted while reading, with the rows it was taken for granted in. */
export async function findNotes(sheetId: number, db: Database) {
  const { rows: notes } = await sql<{ note: string; rows: number[] }>`
    select note, array_agg(number order by number) as rows
      from (select r.number, n.note
              from sheet_row r,
                   lateral (select jsonb_array_elements_text(r.reading -> 'notes') as note
                            union select r.reading #>> '{match,note}') n
             where r.sheet_id = ${sheetId} and r.outcome = 'read' and n.note is not null) noted
     group by note order by min(number) limit 200`.execute(db);
  return notes;
}

/** Leaves refused rows out; `numbers` null means all that wait. Answers the numbers of the rows that were left out. */
export async function updateRowsLeftOut(
  sheetId: number,
  numbers: readonly number[] | null,
  by: string,
  trx: Database,
): Promise<number[]> {
  let query = trx
    .updateTable("sheet_row")
    .set({ left_out_by: by, left_out_at: new Date() })
    .where("sheet_id", "=", sheetId)
    .where("outcome", "=", "refused")
    .where("left_out_at", "is", null);
  if (numbers) query = query.where(sql<boolean>`number = any(${[...numbers]}::integer[])`);
  const left = await query.returning("number").execute();
  return left.map((row) => row.number).sort((a, b) => a - b);
}

// --- Repairs ----------------------------------------------------------------

/** The repairs of a sheet or of some of its rows, oldest first: the newest of a cell counts. */
export function findRepairs(sheetId: number, numbers: readonly number[] | null, db: Database) {
  let query = db
    .selectFrom("sheet_repair as r")
    .innerJoin("person as p", "p.id", "r.repaired_by")
    .select([
      "r.row_number as row",
      "r.column_index as column",
      "r.was",
      "r.becomes",
      "p.name as by",
      "r.repaired_at as at",
    ])
    .where("r.sheet_id", "=", sheetId)
    .orderBy("r.id");
  if (numbers) query = query.where(sql<boolean>`r.row_number = any(${[...numbers]}::integer[])`);
  return query.execute();
}

export type RepairRow = Awaited<ReturnType<typeof findRepairs>>[number];

export async function insertRepair(
  repair: { sheetId: number; row: number; column: number; was: string; becomes: string; by: string },
  trx: Database,
): Promise<void> {
  await trx
    .insertInto("sheet_repair")
    .values({
      sheet_id: repair.sheetId,
      row_number: repair.row,
      column_index: repair.column,
      was: repair.was,
      becomes: repair.becomes,
      repaired_by: repair.by,
    })
    .execute();
}

// --- Remembered plans -------------------------------------------------------

/** The newest plan that was confirmed for a sheet with these heads. */
export function findColumnPlan(headsHash: Buffer, db: Database) {
  return db
    .selectFrom("column_plan as c")
    .innerJoin("person as p", "p.id", "c.saved_by")
    .select(["p.name as savedByName", "c.saved_at as savedAt"])
    .select((eb) => [
      eb.ref("c.plan").$castTo<unknown>().as("plan"),
      eb.ref("c.settings").$castTo<unknown>().as("settings"),
    ])
    .where("c.heads_hash", "=", headsHash)
    .orderBy("c.id", "desc")
    .limit(1)
    .executeTakeFirst();
}

export async function insertColumnPlan(
  plan: { headsHash: Buffer; heads: readonly string[]; columns: ColumnPlan; settings: SheetSettings; by: string },
  trx: Database,
): Promise<void> {
  await trx
    .insertInto("column_plan")
    .values({
      heads_hash: plan.headsHash,
      heads: [...plan.heads],
      plan: JSON.stringify(plan.columns),
      settings: JSON.stringify(plan.settings),
      saved_by: plan.by,
    })
    .execute();
}
