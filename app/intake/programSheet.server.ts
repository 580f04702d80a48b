import { createHash } from "node:crypto";
import { database } from "#app/db/database.server.ts";
import { findNewestEdition } from "#app/editions/editions.queries.server.ts";
import { Invalid, NotFound, Refused } from "#app/http/errors.ts";
import { demand } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { findChoosableSources } from "#app/sources/sources.queries.server.ts";
import { confirmPlan } from "./confirmPlan.server.ts";
import { decodeSheet } from "./decode.ts";
import { countRows, findSheet, type Sheet, type StoredRow } from "./intake.queries.server.ts";
import { checkPlan, columnName, columnPlan, type ColumnPlan, sheetSettings, type SheetSettings } from "./plan.ts";
import {
  countSheetFindings,
  findBuiltRevision,
  findExaminedAfter,
  findNewestRememberedPlan,
  findNewestSheetOf,
  findOwnOpenSheetOfBytes,
  findProblemsAfter,
  findRememberedPlan,
  findRowsAfter,
  type RememberedPlan,
} from "./programSheet.queries.server.ts";
import { headsHash, receiveSheet, type UploadedSheet } from "./receiveSheet.server.ts";

/*
 * A sheet that a program hands in, on behalf of the person whose key it holds: it counts as that person's, so somebody else
 * has to decide its lines. A program sees its own person's sheets only.
 */

/** What a program says beside the bytes. */
export interface HandIn {
  upload: UploadedSheet;
  /** Number of the remembered plan to read by; null: the newest for these heads, where there is one. */
  plan: number | null;
  /** Id of the source of the values; null where the program does not say. */
  source: string | null;
}

/** The number of a sheet, and whether it was taken in just now. */
export interface HandedIn {
  id: number;
  isNew: boolean;
}

/**
 * Takes a sheet in. The same bytes again, while they are being worked on, are the same sheet, so a program may repeat what
 * it is not sure of. Where a remembered plan fits the heads, its source is named and nothing about the columns is in
 * doubt, the plan counts as confirmed and the rows are read; else the sheet waits for its person.
 * @throws Invalid when the bytes are no sheet, when the plan named is of other heads or the source is not known; Refused
 *   when somebody else is working on the same bytes
 */
export async function handInSheet(acting: Acting, { upload, plan, source }: HandIn): Promise<HandedIn> {
  demand(acting, "sheet:work");
  const chosen = plan === null ? null : await planOfHeads(plan, upload);
  if (source !== null) await demandSource(source);
  const sha256 = createHash("sha256").update(upload.bytes).digest();
  const twin = await findOwnOpenSheetOfBytes(sha256, acting.person.id, database());
  const { id, isNew } = twin === undefined ? await receivedOnce(acting, upload, sha256) : { id: twin, isNew: false };
  const sheet = await ownSheet(acting, id);
  const confirmed = sheet.state === "planned" ? await confirmable(sheet, chosen, source) : null;
  if (confirmed) await confirmPlan(acting, id, confirmed);
  return { id, isNew };
}

/** Two requests with the same bytes at the same moment: the later one finds the sheet of the earlier one. */
async function receivedOnce(acting: Acting, upload: UploadedSheet, sha256: Buffer): Promise<HandedIn> {
  try {
    return { id: await receiveSheet(acting, upload), isNew: true };
  } catch (error) {
    const twin = error instanceof Refused && (await findOwnOpenSheetOfBytes(sha256, acting.person.id, database()));
    if (twin) return { id: twin, isNew: false };
    throw error;
  }
}

async function planOfHeads(id: number, { bytes }: UploadedSheet): Promise<RememberedPlan> {
  const refuse = (sentence: string): never => {
    throw new Invalid(sentence, [{ pointer: "/plan", detail: sentence }]);
  };
  const plan = await findRememberedPlan(id, database());
  if (!plan)
    return refuse(`There is no remembered plan ${id}. Leave it out, and confirm the columns on the page of the sheet.`);
  const decoding = decodeSheet(bytes);
  if (decoding.outcome === "decoded" && !headsHash(decoding.sheet.heads).equals(plan.headsHash)) {
    return refuse(`Plan ${id} is of a sheet with other heads, so it does not say what these columns hold.`);
  }
  return plan;
}

async function demandSource(id: string): Promise<void> {
  const edition = (await findNewestEdition(database()))?.number ?? 0;
  const known = await findChoosableSources(edition, database());
  if (known.some((one) => one.sourceId === id)) return;
  const sentence =
    "This source is neither in the table nor proposed. Describe it on the page of the sheet, or name another.";
  throw new Invalid(sentence, [{ pointer: "/source", detail: sentence }]);
}

/** What can be confirmed without asking anybody; null when a person has to look. */
async function confirmable(sheet: Sheet, chosen: RememberedPlan | null, source: string | null) {
  const heads = sheet.heads ?? [];
  const remembered = chosen ?? (await findNewestRememberedPlan(headsHash(heads), database()));
  const columns = columnPlan.safeParse(remembered?.plan);
  const settings = sheetSettings.safeParse(remembered?.settings);
  if (source === null || !columns.success || !settings.success) return null;
  const read: { columns: ColumnPlan; settings: SheetSettings } = {
    columns: columns.data,
    settings: { ...settings.data, decimalComma: sheet.settings.decimalComma },
  };
  // A guessed encoding, a unit that the table contradicts, a setting that is missing, keys of sources: a person looks.
  const isInDoubt = sheet.dialect?.guessed !== undefined || (sheet.plan?.columns.some((column) => column.asks) ?? true);
  const needsKeys = read.columns.some((column) => column.means === "sourceKey");
  if (isInDoubt || needsKeys || checkPlan(read.columns, read.settings).length > 0) return null;
  return { ...read, source: { kind: "known" as const, sourceId: source } };
}

/** @throws NotFound for a sheet that is not there or is somebody else's */
async function ownSheet(acting: Acting, id: number): Promise<Sheet> {
  const sheet = await findSheet(id, database());
  if (!sheet || sheet.uploadedBy !== acting.person.id) throw new NotFound(`You handed in no sheet ${id}.`);
  return sheet;
}

/** Number of the sheet that a person handed in last; null before the first. */
export async function findNewestOwnSheet(acting: Acting): Promise<number | null> {
  demand(acting, "sheet:work");
  return (await findNewestSheetOf(acting.person.id, database())) ?? null;
}

/** How far a sheet of one's own is. */
export async function followSheet(acting: Acting, id: number) {
  demand(acting, "sheet:work");
  const db = database();
  const sheet = await ownSheet(acting, id);
  return {
    sheet,
    counts: await countRows(id, db),
    findings: await countSheetFindings(id, db),
    plan: (await findNewestRememberedPlan(headsHash(sheet.heads ?? []), db)) ?? null,
    revision:
      sheet.revisionId === null
        ? null
        : { number: sheet.revisionId, ...(await findBuiltRevision(sheet.revisionId, db)) },
  };
}

/** The rows of a sheet of one's own behind a row number, and whether there are more. */
export async function followRows(
  acting: Acting,
  id: number,
  { outcome, after, limit }: { outcome: StoredRow["outcome"] | null; after: number; limit: number },
) {
  demand(acting, "sheet:work");
  const sheet = await ownSheet(acting, id);
  const rows = await findRowsAfter(id, { outcome, after, limit: limit + 1 }, database());
  return { nameOf: columnNames(sheet), rows: rows.slice(0, limit), more: rows.length > limit };
}

/** Where the list of findings goes on: after a problem of the reading, or after a finding of the examination. */
export type FindingPlace = { after: "problem"; row: number; index: number } | { after: "examined"; id: string };

/** The findings of a sheet of one's own: those of its reading by row, then those of its revision's examination. */
export async function followFindings(
  acting: Acting,
  id: number,
  { place, limit }: { place: FindingPlace; limit: number },
) {
  demand(acting, "sheet:work");
  const db = database();
  const sheet = await ownSheet(acting, id);
  const problems = place.after === "problem" ? await findProblemsAfter(id, { ...place, limit: limit + 1 }, db) : [];
  const left = limit + 1 - problems.length;
  const after = place.after === "examined" ? place.id : "0";
  const examined = left > 0 ? await findExaminedAfter(id, { after, limit: left }, db) : [];
  const found = [
    ...problems.map((one) => ({ kind: "problem" as const, ...one })),
    ...examined.map((one) => ({ kind: "examined" as const, ...one })),
  ];
  return { nameOf: columnNames(sheet), findings: found.slice(0, limit), more: found.length > limit };
}

function columnNames({ heads }: Sheet): (index: number | null) => string | null {
  return (index) => (index === null || index >= (heads ?? []).length ? null : columnName(heads?.[index] ?? "", index));
}
