import { database } from "#app/db/database.server.ts";
import { findNewestEdition } from "#app/editions/editions.queries.server.ts";
import { NotFound } from "#app/http/errors.ts";
import { demand, may } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { shortCitation } from "#app/sources/citation.ts";
import { findChoosableSources } from "#app/sources/sources.queries.server.ts";
import {
  countRows,
  countSpecies,
  findNotes,
  findRepairs,
  findRowsByOutcome,
  findSheet,
  findSheetBytes,
  findSheets,
  findSkipReasons,
  findUnfinishedSheetsOf,
  type Sheet,
} from "./intake.queries.server.ts";
import { columnName } from "./plan.ts";
import { ANSWER } from "./meaning.ts";
import { repairsByRow, type RepairsByRow } from "./rereadRows.server.ts";
import { chosenSources } from "./sourceChoice.ts";
import { guessSource } from "./sourceKeys.ts";
import type { FindingLine } from "./findingsFile.ts";
import type { ListedSheet, ReadRowLine, RefusedRow } from "./sheetPage.ts";

/** As many refused rows stand on one page. */
const REFUSED_ON_A_PAGE = 50;
/** As many of the rows that were read are shown. */
const READ_SHOWN = 25;
const SHEETS_SHOWN = 200;
const UNFINISHED_SHOWN = 20;

/** The list of sheets, the newest first. */
export async function findSheetsPage(acting: Acting) {
  demand(acting, "sheet:read");
  const found = await findSheets(SHEETS_SHOWN, database());
  return { sheets: found.map(listed), mayWork: may(acting.person.roles, "sheet:work") };
}

/** One's own sheets that no revision was built from yet, the newest first: what waits for their steward. */
export async function findOwnUnfinishedSheets(acting: Acting): Promise<ListedSheet[]> {
  demand(acting, "sheet:work");
  return (await findUnfinishedSheetsOf(acting.person.id, UNFINISHED_SHOWN, database())).map(listed);
}

function listed(sheet: Awaited<ReturnType<typeof findSheets>>[number]): ListedSheet {
  return {
    id: sheet.id,
    name: sheet.name,
    state: sheet.state,
    receivedAt: sheet.receivedAt,
    by: sheet.uploadedByName,
    rowsTotal: sheet.rowsTotal ?? 0,
    rowsDone: sheet.rowsDone,
    refused: Number(sheet.refused ?? 0),
    revisionId: sheet.revisionId,
  };
}

async function sheetOf(acting: Acting, id: number): Promise<Sheet> {
  demand(acting, "sheet:read");
  const sheet = await findSheet(id, database());
  if (!sheet) throw new NotFound(`There is no sheet ${id}.`);
  return sheet;
}

/** Everything the page of a sheet shows; `after` is the row after which the refused rows are listed. */
export async function findSheetPage(acting: Acting, id: number, after: number) {
  const sheet = await sheetOf(acting, id);
  const db = database();
  const edition = (await findNewestEdition(db))?.number ?? 0;
  const choosable = await findChoosableSources(edition, db);
  const sources = choosable.map((one) => ({
    id: one.sourceId,
    name: shortCitation(one.citation) || one.sourceId,
    proposed: one.revisionId,
  }));
  const choice = sheet.sourceChoice;
  const readingBegan = sheet.state !== "received" && sheet.state !== "planned";
  return {
    sheet: {
      id: sheet.id,
      name: sheet.name,
      state: sheet.state,
      failure: sheet.failure,
      bytes: Number(sheet.byteLength),
      sha256: sheet.sha256.toString("hex"),
      receivedAt: sheet.receivedAt,
      by: sheet.uploadedByName,
      dialect: sheet.dialect,
      headRow: sheet.plan?.headRow ?? 1,
      rowsTotal: sheet.rowsTotal ?? 0,
      rowsDone: sheet.rowsDone,
      revisionId: sheet.revisionId,
      confirmedBy: sheet.planConfirmedByName,
      confirmedAt: sheet.planConfirmedAt,
    },
    columns: (sheet.plan?.columns ?? []).map((column, index) => ({
      ...column,
      name: columnName(column.head, index),
      sample: sheet.plan?.samples[index] ?? [],
      /** What could be keys of sources, each with the known source it seems to stand for. */
      keys: (sheet.plan?.keys?.[index] ?? []).map((key) => ({ key, guess: guessSource(key, choosable) })),
    })),
    notices: sheet.plan?.notices ?? [],
    bareSolid: sheet.plan?.bareSolid ?? false,
    settings: sheet.settings,
    sources,
    chosenSource: choice,
    sourceName:
      [
        ...new Set(
          chosenSources(choice).map(({ choice: one }) =>
            one.kind === "known"
              ? (sources.find(({ id }) => id === one.sourceId)?.name ?? one.sourceId)
              : one.source.title,
          ),
        ),
      ].join("; ") || null,
    rows: readingBegan ? await findRowsOfPage(sheet, after) : null,
    mayWork: may(acting.person.roles, "sheet:work"),
    may: { revision: may(acting.person.roles, "revision:read") },
  };
}

export type SheetPage = Awaited<ReturnType<typeof findSheetPage>>;

async function findRowsOfPage(sheet: Sheet, after: number) {
  const db = database();
  const { id } = sheet;
  const refused = await findRowsByOutcome(id, "refused", { after, limit: REFUSED_ON_A_PAGE + 1 }, db);
  const shown = refused.slice(0, REFUSED_ON_A_PAGE);
  const numbers = shown.map((row) => row.number);
  const repairs = repairsByRow(await findRepairs(id, numbers, db));
  const read = await findRowsByOutcome(id, "read", { after: 0, limit: READ_SHOWN }, db);
  return {
    counts: await countRows(id, db),
    species: await countSpecies(id, db),
    skipped: await findSkipReasons(id, db),
    notes: await findNotes(id, db),
    refused: shown.map((row) => shownRow(row, repairs)),
    after: after > 0 ? after : null,
    next: refused.length > REFUSED_ON_A_PAGE ? (numbers.at(-1) ?? null) : null,
    read: read.map((row): ReadRowLine => ({
      number: row.number,
      key: row.reading?.match.key ?? "",
      isNew: row.reading?.match.kind === "new",
      adds: row.reading?.match.kind === "known" ? (row.reading.match.adds ?? null) : null,
      sourceKey: row.reading?.sourceKey ?? null,
      values: (row.reading?.values ?? []).map((value) => ({
        property: value.property,
        digits: value.digits,
        given: value.given.text,
        unit: value.given.unit,
        note: value.given.note,
      })),
    })),
  };
}

function shownRow(row: Awaited<ReturnType<typeof findRowsByOutcome>>[number], repairs: RepairsByRow): RefusedRow {
  const mended = repairs.get(row.number);
  const wrong = new Set(row.problems.map((problem) => problem.column));
  return {
    number: row.number,
    cells: row.cells.map((original, column) => ({
      column,
      text: mended?.get(column) ?? original,
      original: mended?.has(column) ? original : null,
      wrong: wrong.has(column),
    })),
    problems: row.problems,
    answer: mended?.get(ANSWER) ?? null,
    leftOut: row.leftOutAt !== null,
  };
}

/** How far the reading is. */
export async function findProgress(acting: Acting, id: number) {
  const { state, rowsDone, rowsTotal } = await sheetOf(acting, id);
  return { state, done: rowsDone, total: rowsTotal ?? 0 };
}

/** The uploaded file, byte for byte. */
export async function findOriginal(acting: Acting, id: number): Promise<{ name: string; bytes: Buffer }> {
  const { name } = await sheetOf(acting, id);
  return { name, bytes: await findSheetBytes(id, database()) };
}

/** What is wrong with the rows of a sheet, one finding a line, refused rows first to last. */
export async function findFindings(acting: Acting, id: number): Promise<{ name: string; findings: FindingLine[] }> {
  const sheet = await sheetOf(acting, id);
  const rows = await findRowsByOutcome(id, "refused", { after: 0, limit: 100_000 }, database());
  const findings = rows.flatMap((row) =>
    row.problems.map((problem): FindingLine => ({
      row: row.number,
      column: problem.column === null ? "" : columnName(sheet.heads?.[problem.column] ?? "", problem.column),
      cell: problem.column === null ? "" : (row.cells[problem.column] ?? ""),
      wrong: problem.sentence,
      cure: problem.repairs.map((repair) => repair.label).join("; "),
    })),
  );
  return { name: sheet.name, findings };
}
