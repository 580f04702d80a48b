import { sql } from "kysely";
import type { Database } from "#app/db/database.server.ts";
import type { Finding } from "#app/checks/types.ts";
import type { Property } from "#app/thermo/property.ts";
import type { StoredRow } from "./intake.queries.server.ts";
import type { CellProblem } from "./readRows.ts";

/** The newest sheet of these bytes that a person handed in and that is still being worked on. */
export async function findOwnOpenSheetOfBytes(
  sha256: Buffer,
  personId: string,
  db: Database,
): Promise<number | undefined> {
  const row = await db
    .selectFrom("sheet")
    .select("id")
    .where("sha256", "=", sha256)
    .where("uploaded_by", "=", personId)
    .where("state", "in", ["received", "planned", "reading", "read"])
    .orderBy("id", "desc")
    .limit(1)
    .executeTakeFirst();
  return row?.id;
}

/** The newest sheet that a person handed in. */
export async function findNewestSheetOf(personId: string, db: Database): Promise<number | undefined> {
  const row = await db
    .selectFrom("sheet")
    .select("id")
    .where("uploaded_by", "=", personId)
    .orderBy("id", "desc")
    .limit(1)
    .executeTakeFirst();
  return row?.id;
}

function rememberedPlans(db: Database) {
  return db
    .selectFrom("column_plan as c")
    .innerJoin("person as p", "p.id", "c.saved_by")
    .select(["c.id", "c.heads_hash as headsHash", "p.name as savedBy", "c.saved_at as savedAt"])
    .select((eb) => [
      eb.ref("c.plan").$castTo<unknown>().as("plan"),
      eb.ref("c.settings").$castTo<unknown>().as("settings"),
    ]);
}

/** A remembered plan by its number. */
export function findRememberedPlan(id: number, db: Database) {
  return rememberedPlans(db).where("c.id", "=", id).executeTakeFirst();
}

/** The newest plan that was confirmed for a sheet with these heads. */
export function findNewestRememberedPlan(headsHash: Buffer, db: Database) {
  return rememberedPlans(db).where("c.heads_hash", "=", headsHash).orderBy("c.id", "desc").limit(1).executeTakeFirst();
}

/** A remembered plan with its number. */
export type RememberedPlan = NonNullable<Awaited<ReturnType<typeof findRememberedPlan>>>;

/** How the revision that was built from a sheet stands. */
export async function findBuiltRevision(revisionId: number, db: Database) {
  const { rows } = await sql<{ state: string; lines: number }>`
    select r.state, (select count(*)::int from revision_line l where l.revision_id = r.id and l.state <> 'dropped') as lines
      from revision r where r.id = ${revisionId}`.execute(db);
  return rows[0];
}

/** How many findings of each severity a sheet has: of its reading, and of the newest examination of its revision. */
export async function countSheetFindings(sheetId: number, db: Database) {
  const { rows } = await sql<{ severity: Finding["severity"]; n: number }>`
    select 'block' as severity, coalesce(sum(jsonb_array_length(problems)), 0)::int as n
      from sheet_row where sheet_id = ${sheetId} and outcome = 'refused'
    union all
    select f.severity, count(*)::int from finding f
     where f.examination_id = ${newestExamination(sheetId)} group by 1`.execute(db);
  const of = (severity: Finding["severity"]): number =>
    rows.filter((row) => row.severity === severity).reduce((sum, row) => sum + row.n, 0);
  return { block: of("block"), look: of("look"), remark: of("remark") };
}

function newestExamination(sheetId: number) {
  return sql`(select e.id from examination e join sheet s on s.revision_id = e.revision_id
               where s.id = ${sheetId} order by e.id desc limit 1)`;
}

/** The rows of a sheet behind a row number, of one outcome or of all. */
export async function findRowsAfter(
  sheetId: number,
  { outcome, after, limit }: { outcome: StoredRow["outcome"] | null; after: number; limit: number },
  db: Database,
) {
  let query = db
    .selectFrom("sheet_row as r")
    .where("r.sheet_id", "=", sheetId)
    .where("r.number", ">", after)
    .select(["r.number", "r.cells", "r.left_out_at as leftOutAt"])
    .select((eb) => [
      eb.ref("r.outcome").$castTo<StoredRow["outcome"]>().as("outcome"),
      eb.ref("r.problems").$castTo<StoredRow["problems"]>().as("problems"),
      eb.ref("r.reading").$castTo<StoredRow["reading"]>().as("reading"),
    ])
    .orderBy("r.number")
    .limit(limit);
  if (outcome !== null) query = query.where("r.outcome", "=", outcome);
  return query.execute();
}

/** What was wrong with the rows of a sheet, problem by problem, behind a place. */
export async function findProblemsAfter(
  sheetId: number,
  { row, index, limit }: { row: number; index: number; limit: number },
  db: Database,
): Promise<{ row: number; index: number; problem: CellProblem }[]> {
  const { rows } = await sql<{ row: number; index: number; problem: CellProblem }>`
    select r.number as row, p.index::int as index, p.problem
      from sheet_row r, lateral jsonb_array_elements(r.problems) with ordinality as p(problem, index)
     where r.sheet_id = ${sheetId} and r.outcome = 'refused'
       and (r.number, p.index) > (${row}::integer, ${index}::bigint)
     order by 1, 2 limit ${limit}`.execute(db);
  return rows;
}

/** A finding of the examination of a sheet's revision, with the row of the sheet that it speaks of. */
export interface ExaminedFinding {
  id: string;
  row: number | null;
  /** Index of the column that the value was read from. */
  column: number | null;
  species: string | null;
  property: Property | null;
  check: string;
  severity: Finding["severity"];
  sentence: string;
  arithmetic: Finding["arithmetic"];
  data: Finding["data"];
  suggestions: Finding["suggestions"];
}

/** The findings of the newest examination of a sheet's revision, behind one of them. */
export async function findExaminedAfter(
  sheetId: number,
  { after, limit }: { after: string; limit: number },
  db: Database,
): Promise<ExaminedFinding[]> {
  const { rows } = await sql<ExaminedFinding>`
    select f.id::text as id, l.row_number as row, f.property, f.check_code as check, f.severity, f.sentence,
           f.arithmetic, f.data, f.suggestions,
           coalesce(r.reading #>> '{match,key}',
                    (select d.key from species_detail d where d.species_id = f.species_id and d.until is null)) as species,
           (select (v.value ->> 'column')::int from jsonb_array_elements(r.reading -> 'values') v
             where v.value ->> 'property' = f.property limit 1) as column
      from finding f
      left join revision_line l on l.id = f.line_id
      left join sheet_row r on r.sheet_id = ${sheetId} and r.number = l.row_number
     where f.examination_id = ${newestExamination(sheetId)} and f.id > ${after}::bigint
     order by f.id limit ${limit}`.execute(db);
  return rows;
}
