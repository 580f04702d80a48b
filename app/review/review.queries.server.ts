import { sql } from "kysely";
import { batches } from "#app/db/batches.ts";
import type { Database } from "#app/db/database.server.ts";
import type { Finding } from "#app/checks/types.ts";
import type { Property } from "#app/thermo/property.ts";
import { type LineContent, contentHash, lineContent } from "./content.ts";
import type { RevisionState } from "./states.ts";

/** A line as a steward's hand or a sheet proposes it, before it has an id. */
export interface NewLine {
  kind: LineContent["kind"];
  speciesId: string | null;
  property: Property | null;
  sourceId: string | null;
  /** The sheet row it was read from; null when written by hand. */
  rowNumber: number | null;
  content: LineContent;
  /** Id of the standing row it was written against (by kind: table_value, species_detail, source_detail). */
  againstRow: string | null;
  /** Id of the version of the accepted line that waited for the same place when it was written. */
  againstVersion: string | null;
  /** Why it is proposed, for its first version; a sheet's lines say it once, in the summary of their revision. */
  reason?: string;
}

/** A line with its newest version and the newest decision on that version. */
export interface LineRow {
  id: string;
  revisionId: number;
  position: number;
  kind: LineContent["kind"];
  speciesId: string | null;
  property: Property | null;
  sourceId: string | null;
  rowNumber: number | null;
  againstRow: string | null;
  againstVersion: string | null;
  state: "open" | "accepted" | "declined" | "dropped" | "published";
  publishedIn: number | null;
  /** The revision it was taken over from, and when; null for a line that never left its revision. */
  cameFrom: number | null;
  cameAt: Date | null;
  versionId: string;
  version: number;
  content: LineContent;
  contentHash: Buffer;
  madeBy: string;
  madeAt: Date;
}

/** The revision with the names of its people, or undefined. */
export function findRevision(id: number, db: Database) {
  return db
    .selectFrom("revision as r")
    .innerJoin("person as p", "p.id", "r.made_by")
    .leftJoin("sheet as s", "s.id", "r.sheet_id")
    .select([
      "r.id",
      "r.title",
      "r.summary",
      "r.state",
      "r.round",
      "r.sheet_id as sheetId",
      "s.name as sheetName",
      "r.made_by as madeBy",
      "p.name as madeByName",
      "r.made_at as madeAt",
      "r.sent_at as sentAt",
      "r.decided_at as decidedAt",
    ])
    .$narrowType<{ state: RevisionState }>()
    .where("r.id", "=", id)
    .executeTakeFirst();
}

/** The same, holding the row until the transaction ends, so that two people decide one after the other. */
export async function findRevisionForUpdate(id: number, trx: Database) {
  await trx.selectFrom("revision").select("id").where("id", "=", id).forUpdate().execute();
  return findRevision(id, trx);
}

function listedRevisions(db: Database) {
  return db
    .selectFrom("revision as r")
    .innerJoin("person as p", "p.id", "r.made_by")
    .leftJoinLateral(
      (eb) =>
        eb
          .selectFrom("examination as e")
          .select(["e.blocks", "e.looks", "e.remarks"])
          .whereRef("e.revision_id", "=", "r.id")
          .orderBy("e.id", "desc")
          .limit(1)
          .as("e"),
      (join) => join.onTrue(),
    )
    .select((eb) => [
      "r.id",
      "r.title",
      "r.state",
      "r.round",
      "r.made_by as madeBy",
      "p.name as madeByName",
      "r.made_at as madeAt",
      "r.sent_at as sentAt",
      "r.decided_at as decidedAt",
      "e.blocks",
      "e.looks",
      "e.remarks",
      eb
        .selectFrom("revision_line as l")
        .select(({ fn }) => fn.countAll<string>().as("n"))
        .whereRef("l.revision_id", "=", "r.id")
        .where("l.state", "<>", "dropped")
        .as("lines"),
      eb
        .selectFrom("revision_line as l")
        .select(({ fn }) => fn.countAll<string>().as("n"))
        .whereRef("l.revision_id", "=", "r.id")
        .where("l.state", "=", "accepted")
        .as("waiting"),
      eb
        .selectFrom("revision_line as l")
        .select(({ fn }) => fn.max("l.published_in").as("n"))
        .whereRef("l.revision_id", "=", "r.id")
        .as("publishedIn"),
    ])
    .$narrowType<{ state: RevisionState }>()
    .orderBy("r.id", "desc");
}

/** Revisions in the given states, newest first, with counts of lines and of the findings of the newest examination. */
export function findRevisionsByState(states: readonly RevisionState[], limit: number, db: Database) {
  return listedRevisions(db)
    .where("r.state", "in", [...states])
    .limit(limit)
    .execute();
}

/** The same of one person's own, in any state. */
export function findRevisionsOf(personId: string, limit: number, db: Database) {
  return listedRevisions(db).where("r.made_by", "=", personId).limit(limit).execute();
}

/** Revisions whose title holds a text, or which have this number; newest first. */
export function findRevisionsLike(text: string, number: number | null, limit: number, db: Database) {
  // The text is looked for as it is: % and _ stand for themselves.
  const part = `%${text.replace(/[\\%_]/g, "\\$&")}%`;
  return listedRevisions(db)
    .where((eb) => eb.or([eb("r.title", "ilike", part), ...(number === null ? [] : [eb("r.id", "=", number)])]))
    .limit(limit)
    .execute();
}

function lineQuery(db: Database) {
  return db
    .selectFrom("revision_line as l")
    .innerJoinLateral(
      (eb) =>
        eb
          .selectFrom("line_version as v")
          .selectAll("v")
          .whereRef("v.line_id", "=", "l.id")
          .orderBy("v.version", "desc")
          .limit(1)
          .as("v"),
      (join) => join.onTrue(),
    )
    .select([
      "l.id",
      "l.revision_id as revisionId",
      "l.position",
      "l.kind",
      "l.species_id as speciesId",
      "l.property",
      "l.source_id as sourceId",
      "l.row_number as rowNumber",
      "l.against_row as againstRow",
      "l.against_version as againstVersion",
      "l.state",
      "l.published_in as publishedIn",
      "l.came_from as cameFrom",
      "l.came_at as cameAt",
      "v.id as versionId",
      "v.version",
      "v.content",
      "v.content_hash as contentHash",
      "v.made_by as madeBy",
      "v.made_at as madeAt",
    ]);
}

type RawLine = Awaited<ReturnType<ReturnType<typeof lineQuery>["execute"]>>[number];

function toLine(raw: RawLine): LineRow {
  // The content was checked when it was written; reading it back through the same schema keeps its type honest.
  return { ...raw, content: lineContent.parse(raw.content) } as LineRow;
}

/** The lines of a revision in their order; those taken out are left away. */
export async function findLines(revisionId: number, db: Database): Promise<LineRow[]> {
  const rows = await lineQuery(db)
    .where("l.revision_id", "=", revisionId)
    .where("l.state", "<>", "dropped")
    .orderBy("l.position")
    .orderBy("l.id")
    .execute();
  return rows.map(toLine);
}

/** One line, or undefined. */
export async function findLine(id: string, db: Database): Promise<LineRow | undefined> {
  const row = await lineQuery(db).where("l.id", "=", id).executeTakeFirst();
  return row && toLine(row);
}

/** Accepted lines that no edition holds yet. `decidedOnly` keeps those whose revision is decided: the next edition. */
export async function findWaitingLines(options: { decidedOnly: boolean }, db: Database): Promise<LineRow[]> {
  let query = lineQuery(db).where("l.state", "=", "accepted");
  if (options.decidedOnly) {
    query = query.innerJoin("revision as r", "r.id", "l.revision_id").where("r.state", "=", "decided") as typeof query;
  }
  const rows = await query.orderBy("l.revision_id").orderBy("l.position").orderBy("l.id").execute();
  return rows.map(toLine);
}

/** What stands and what waits now in a line's place, by line id: the base it would have to be written against. */
export interface LineBase {
  lineId: string;
  /** Id of the standing row, null when nothing stands. */
  standingRow: string | null;
  /** The line version the standing row came from. */
  standingVersion: string | null;
  /** The newest version of another accepted line for the same place, null when none waits. */
  waitingVersion: string | null;
  /** The revision of that waiting line. */
  waitingRevision: number | null;
}

/** The bases of these lines, read in one statement. */
export async function findLineBases(lineIds: readonly string[], db: Database): Promise<Map<string, LineBase>> {
  if (lineIds.length === 0) return new Map();
  const result = await sql<LineBase>`
    select l.id::text as "lineId",
           coalesce(tv.id, sd.id, so.id)::text as "standingRow",
           coalesce(tv.line_version_id, sd.line_version_id, so.line_version_id)::text as "standingVersion",
           -- Newest by version, which the unique index gives; max(id) would walk the whole primary key for each line.
           (select v.id from line_version v where v.line_id = coalesce(ws.id, wo.id) order by v.version desc limit 1)::text as "waitingVersion",
           coalesce(ws.revision_id, wo.revision_id) as "waitingRevision"
      from revision_line l
      left join table_value tv on l.kind in ('value', 'withdrawal') and tv.species_id = l.species_id and tv.property = l.property and tv.until is null
      left join species_detail sd on l.kind = 'detail' and sd.species_id = l.species_id and sd.until is null
      left join source_detail so on l.kind = 'source' and so.source_id = l.source_id and so.until is null
      -- Two joins by equality rather than one with "or": each has its partial unique index, or is hashed.
      left join revision_line ws on ws.state = 'accepted' and ws.species_id is not null and ws.id <> l.id
           and ws.species_id = l.species_id and coalesce(ws.property, '') = coalesce(l.property, '')
      left join revision_line wo on wo.state = 'accepted' and wo.source_id is not null and wo.id <> l.id
           and wo.source_id = l.source_id
     where l.id = any(${sql.val([...lineIds])}::bigint[])
  `.execute(db);
  return new Map(result.rows.map((row) => [row.lineId, row]));
}

/** The newest accepted line that waits for a place, or undefined. */
export async function findWaitingForPlace(
  place: { speciesId: string | null; property: Property | null; sourceId: string | null },
  db: Database,
): Promise<LineRow | undefined> {
  let query = lineQuery(db).where("l.state", "=", "accepted");
  if (place.sourceId) query = query.where("l.source_id", "=", place.sourceId);
  else {
    query = query.where("l.species_id", "=", place.speciesId);
    query = place.property ? query.where("l.property", "=", place.property) : query.where("l.property", "is", null);
  }
  const row = await query.executeTakeFirst();
  return row && toLine(row);
}

/** Inserts a revision and answers its number. */
export async function insertRevision(
  revision: { title: string; summary: string; sheetId: number | null; madeBy: string },
  trx: Database,
): Promise<number> {
  const row = await trx
    .insertInto("revision")
    .values({
      title: revision.title,
      summary: revision.summary,
      sheet_id: revision.sheetId,
      made_by: revision.madeBy,
    })
    .returning("id")
    .executeTakeFirstOrThrow();
  return row.id;
}

/** Inserts lines with their first version, after the positions the revision already has; answers their ids in order. */
export async function insertLines(
  revisionId: number,
  lines: readonly NewLine[],
  madeBy: string,
  trx: Database,
): Promise<string[]> {
  const last = await trx
    .selectFrom("revision_line")
    .select(({ fn }) => fn.max("position").as("position"))
    .where("revision_id", "=", revisionId)
    .executeTakeFirst();
  let position = last?.position ?? 0;
  const ids: string[] = [];
  for (const batch of batches(lines)) {
    const placed = batch.map((line) => ({ line, position: (position += 1) }));
    const rows = await trx
      .insertInto("revision_line")
      .values(
        placed.map((one) => ({
          revision_id: revisionId,
          position: one.position,
          kind: one.line.kind,
          species_id: one.line.speciesId,
          property: one.line.property,
          source_id: one.line.sourceId,
          row_number: one.line.rowNumber,
          against_row: one.line.againstRow,
          against_version: one.line.againstVersion,
        })),
      )
      .returning(["id", "position"])
      .execute();
    const idAt = new Map(rows.map((row) => [row.position, row.id]));
    const versions = placed.map((one) => {
      const id = idAt.get(one.position);
      if (id === undefined) throw new Error("A line was inserted without an id.");
      ids.push(id);
      return {
        line_id: id,
        version: 1,
        content: JSON.stringify(one.line.content),
        content_hash: contentHash(one.line.content),
        made_by: madeBy,
        reason: one.line.reason ?? "",
      };
    });
    await trx.insertInto("line_version").values(versions).execute();
  }
  return ids;
}

/** Adds a version to a line; the trigger reopens the line. */
export async function insertLineVersion(
  line: { id: string; version: number; content: LineContent; madeBy: string; reason: string },
  trx: Database,
): Promise<void> {
  await trx
    .insertInto("line_version")
    .values({
      line_id: line.id,
      version: line.version,
      content: JSON.stringify(line.content),
      content_hash: contentHash(line.content),
      made_by: line.madeBy,
      reason: line.reason,
    })
    .execute();
}

/** Writes a line anew against what stands and waits now. */
export async function updateLineBase(
  id: string,
  base: { againstRow: string | null; againstVersion: string | null },
  trx: Database,
): Promise<void> {
  await trx
    .updateTable("revision_line")
    .set({ against_row: base.againstRow, against_version: base.againstVersion })
    .where("id", "=", id)
    .execute();
}

/** Takes lines out of their revision; they stay on record. */
export async function updateLinesDropped(ids: readonly string[], trx: Database): Promise<void> {
  if (ids.length === 0) return;
  await trx
    .updateTable("revision_line")
    .set({ state: "dropped" })
    .where("id", "in", [...ids])
    .execute();
}

/** Takes lines over into another revision, after the lines it has and in the order they had. */
export async function updateLinesRevision(ids: readonly string[], into: number, trx: Database): Promise<void> {
  if (ids.length === 0) return;
  await sql`
    with last as (select coalesce(max(position), 0) as position from revision_line where revision_id = ${into}),
         placed as (
           select id, row_number() over (order by position, id) as n
             from revision_line where id = any(${sql.val([...ids])}::bigint[])
         )
    update revision_line l
       set revision_id = ${into}, position = last.position + placed.n,
           begun_in = coalesce(l.begun_in, l.revision_id), came_from = l.revision_id, came_at = clock_timestamp()
      from placed, last
     where l.id = placed.id
  `.execute(trx);
}

/** Marks accepted lines as published in the open edition. */
export async function updateLinesPublished(ids: readonly string[], edition: number, trx: Database): Promise<void> {
  for (const batch of batches(ids)) {
    await trx
      .updateTable("revision_line")
      .set({ state: "published", published_in: edition })
      .where("id", "in", [...batch])
      .execute();
  }
}

/** Moves a revision to another state and writes the step down. */
export async function updateRevisionState(
  move: { id: number; from: RevisionState; to: RevisionState; round: number; by: string; remark: string },
  trx: Database,
): Promise<void> {
  await trx
    .updateTable("revision")
    .set({
      state: move.to,
      round: move.round,
      ...(move.to === "in_review" ? { sent_at: sql<Date>`clock_timestamp()` } : {}),
      ...(move.to === "decided" ? { decided_at: sql<Date>`clock_timestamp()` } : {}),
    })
    .where("id", "=", move.id)
    .execute();
  await trx
    .insertInto("revision_move")
    .values({
      revision_id: move.id,
      came_from: move.from,
      went_to: move.to,
      round: move.round,
      moved_by: move.by,
      remark: move.remark,
    })
    .execute();
}

/** Changes title and summary. */
export async function updateRevisionText(
  id: number,
  text: { title: string; summary: string },
  trx: Database,
): Promise<void> {
  await trx.updateTable("revision").set(text).where("id", "=", id).execute();
}

/** Every step of a revision with the names of who took it. */
export function findMoves(revisionId: number, db: Database) {
  return db
    .selectFrom("revision_move as m")
    .innerJoin("person as p", "p.id", "m.moved_by")
    .select([
      "m.id",
      "m.came_from as from",
      "m.went_to as to",
      "m.round",
      "m.moved_at as at",
      "m.remark",
      "p.name as by",
    ])
    .where("m.revision_id", "=", revisionId)
    .orderBy("m.id")
    .execute();
}

/** The newest step of each of these revisions. */
export async function findNewestMoves(revisionIds: readonly number[], db: Database) {
  if (revisionIds.length === 0) return [];
  return movesWithTitles(db)
    .distinctOn("m.revision_id")
    .where("m.revision_id", "in", [...revisionIds])
    .orderBy("m.revision_id")
    .orderBy("m.id", "desc")
    .execute();
}

/** The newest steps of all revisions, newest first. */
export function findLatestMoves(limit: number, db: Database) {
  return movesWithTitles(db).orderBy("m.id", "desc").limit(limit).execute();
}

function movesWithTitles(db: Database) {
  return db
    .selectFrom("revision_move as m")
    .innerJoin("revision as r", "r.id", "m.revision_id")
    .innerJoin("person as p", "p.id", "m.moved_by")
    .select([
      "m.revision_id as revisionId",
      "r.title",
      "m.came_from as from",
      "m.went_to as to",
      "m.round",
      "m.moved_at as at",
      "m.remark",
      "p.name as by",
    ])
    .$narrowType<{ from: RevisionState; to: RevisionState }>();
}

/** The lines of the next edition, counted by revision, kind and whether something stands in their place. */
export async function countNextLines(db: Database) {
  const { rows } = await sql<{ revisionId: number; kind: LineContent["kind"]; replaces: boolean; n: number }>`
    select l.revision_id as "revisionId", l.kind,
           (l.against_row is not null or l.against_version is not null) as replaces, count(*)::int as n
      from revision_line l
      join revision r on r.id = l.revision_id
     where l.state = 'accepted' and r.state = 'decided'
     group by 1, 2, 3 order by 1`.execute(db);
  return rows;
}

/** Inserts decisions; the triggers hold four eyes and move the lines. */
export async function insertDecisions(
  decisions: readonly { versionId: string; decision: "accept" | "decline"; reason: string; decidedBy: string }[],
  trx: Database,
): Promise<void> {
  for (const batch of batches(decisions)) {
    await trx
      .insertInto("line_decision")
      .values(
        batch.map((one) => ({
          line_version_id: one.versionId,
          decision: one.decision,
          reason: one.reason,
          decided_by: one.decidedBy,
        })),
      )
      .execute();
  }
}

/** All decisions on the lines of a revision, oldest first; `void` where the line was edited afterwards. */
export async function findDecisions(revisionId: number, db: Database) {
  return db
    .selectFrom("line_decision as d")
    .innerJoin("line_version as v", "v.id", "d.line_version_id")
    .innerJoin("revision_line as l", "l.id", "v.line_id")
    .innerJoin("person as p", "p.id", "d.decided_by")
    .select((eb) => [
      "l.id as lineId",
      "v.version",
      "d.decision",
      "d.reason",
      "d.decided_at as at",
      "p.name as by",
      eb
        .exists(
          eb
            .selectFrom("line_version as later")
            .select("later.id")
            .whereRef("later.line_id", "=", "l.id")
            .whereRef("later.version", ">", "v.version"),
        )
        .as("void"),
    ])
    .where("l.revision_id", "=", revisionId)
    .orderBy("d.id")
    .execute();
}

/** Earlier versions of the lines of a revision with their authors, oldest first. */
export async function findVersions(revisionId: number, db: Database) {
  const rows = await db
    .selectFrom("line_version as v")
    .innerJoin("revision_line as l", "l.id", "v.line_id")
    .innerJoin("person as p", "p.id", "v.made_by")
    .select(["l.id as lineId", "v.version", "v.content", "v.made_at as at", "v.reason", "p.name as by"])
    .where("l.revision_id", "=", revisionId)
    .orderBy("v.id")
    .execute();
  return rows.map((row) => ({ ...row, content: lineContent.parse(row.content) }));
}

/** Ids of the lines of a revision in which a person had a hand. */
export async function findLinesWithHandOf(revisionId: number, personId: string, db: Database): Promise<Set<string>> {
  const result = await sql<{ id: string }>`
    select l.id::text as id from revision_line l
     where l.revision_id = ${revisionId} and ${personId}::uuid in (select line_hands(l.id))
  `.execute(db);
  return new Set(result.rows.map((row) => row.id));
}

/** Writes a comment. */
export async function insertComment(
  comment: {
    revisionId: number;
    lineId: string | null;
    round: number;
    body: string;
    writtenBy: string;
    /** The comment it answers; left out where it opens a thread. */
    answers?: string;
  },
  trx: Database,
): Promise<void> {
  await trx
    .insertInto("comment")
    .values({
      revision_id: comment.revisionId,
      line_id: comment.lineId,
      round: comment.round,
      body: comment.body,
      written_by: comment.writtenBy,
      answers: comment.answers ?? null,
    })
    .execute();
}

/** The comments of a revision and of the lines it took over, with their answers; oldest first. */
export function findComments(revisionId: number, db: Database) {
  return db
    .selectFrom("comment as c")
    .innerJoin("person as p", "p.id", "c.written_by")
    .select([
      "c.id",
      "c.line_id as lineId",
      "c.round",
      "c.body",
      "c.written_at as at",
      "p.name as by",
      "c.written_by as byId",
      "c.answers",
    ])
    .where((eb) =>
      eb.or([
        eb("c.revision_id", "=", revisionId),
        eb(
          "c.line_id",
          "in",
          eb
            .selectFrom("revision_line as l")
            .select("l.id")
            .where("l.revision_id", "=", revisionId)
            .where("l.came_from", "is not", null),
        ),
      ]),
    )
    .orderBy("c.id")
    .execute();
}

/** One comment with the address of who wrote it, or undefined. */
export function findComment(id: string, db: Database) {
  return db
    .selectFrom("comment as c")
    .innerJoin("person as p", "p.id", "c.written_by")
    .select([
      "c.id",
      "c.revision_id as revisionId",
      "c.line_id as lineId",
      "c.answers",
      "c.written_by as byId",
      "p.email",
    ])
    .where("c.id", "=", id)
    .executeTakeFirst();
}

/** A finding ready to be stored. */
export interface StoredFinding extends Finding {
  fingerprint: Buffer;
}

/** Writes one examination with its findings and answers its id. */
export async function insertExamination(
  examination: {
    revisionId: number | null;
    edition: number | null;
    occasion: "build" | "edit" | "send" | "publish";
    policy: number;
    checks: Record<string, number>;
    inputDigest: Buffer;
    lines: number;
    findings: readonly StoredFinding[];
  },
  trx: Database,
): Promise<string> {
  const count = (severity: Finding["severity"]) =>
    examination.findings.filter((one) => one.severity === severity).length;
  const row = await trx
    .insertInto("examination")
    .values({
      revision_id: examination.revisionId,
      edition: examination.edition,
      occasion: examination.occasion,
      policy: examination.policy,
      checks: JSON.stringify(examination.checks),
      input_digest: examination.inputDigest,
      lines: examination.lines,
      blocks: count("block"),
      looks: count("look"),
      remarks: count("remark"),
    })
    .returning("id")
    .executeTakeFirstOrThrow();
  for (const batch of batches(examination.findings)) {
    await trx
      .insertInto("finding")
      .values(
        batch.map((finding) => ({
          examination_id: row.id,
          revision_id: examination.revisionId,
          line_id: finding.lineRef,
          species_id: finding.speciesId,
          property: finding.property,
          check_code: finding.check,
          severity: finding.severity,
          sentence: finding.sentence,
          arithmetic: JSON.stringify(finding.arithmetic),
          data: JSON.stringify(finding.data),
          suggestions: JSON.stringify(finding.suggestions),
          fingerprint: finding.fingerprint,
        })),
      )
      .execute();
  }
  return row.id;
}

/** The newest examination of a revision, or undefined. */
export function findNewestExamination(revisionId: number, db: Database) {
  return db
    .selectFrom("examination")
    .selectAll()
    .where("revision_id", "=", revisionId)
    .orderBy("id", "desc")
    .limit(1)
    .executeTakeFirst();
}

/** The findings of an examination, with who set them aside and why. */
export function findFindings(examinationId: string, db: Database) {
  return db
    .selectFrom("finding as f")
    .leftJoin("finding_set_aside as a", (join) =>
      join.onRef("a.revision_id", "=", "f.revision_id").onRef("a.fingerprint", "=", "f.fingerprint"),
    )
    .leftJoin("person as p", "p.id", "a.set_aside_by")
    .select((eb) => [
      "f.id",
      "f.line_id as lineId",
      "f.species_id as speciesId",
      eb.ref("f.property").$castTo<Property | null>().as("property"),
      "f.check_code as check",
      eb.ref("f.severity").$castTo<Finding["severity"]>().as("severity"),
      "f.sentence",
      eb.ref("f.arithmetic").$castTo<Finding["arithmetic"]>().as("arithmetic"),
      eb.ref("f.data").$castTo<Finding["data"]>().as("data"),
      eb.ref("f.suggestions").$castTo<Finding["suggestions"]>().as("suggestions"),
      "f.fingerprint",
      "a.reason as setAsideReason",
      "a.set_aside_at as setAsideAt",
      "p.name as setAsideBy",
    ])
    .where("f.examination_id", "=", examinationId)
    .orderBy("f.id")
    .execute();
}

/** One finding by id. */
export function findFinding(id: string, db: Database) {
  return db.selectFrom("finding").selectAll().where("id", "=", id).executeTakeFirst();
}

/** Fingerprints set aside in these revisions, as hexadecimal. */
export async function findSetAside(revisionIds: readonly number[], db: Database): Promise<Set<string>> {
  if (revisionIds.length === 0) return new Set();
  const rows = await db
    .selectFrom("finding_set_aside")
    .select("fingerprint")
    .where("revision_id", "in", [...revisionIds])
    .execute();
  return new Set(rows.map((row) => row.fingerprint.toString("hex")));
}

/** Sets a finding aside. `sentence` is what it says, where no examination of the revision holds it. */
export async function insertSetAside(
  one: { revisionId: number; fingerprint: Buffer; reason: string; by: string; sentence?: string },
  trx: Database,
): Promise<void> {
  await trx
    .insertInto("finding_set_aside")
    .values({
      revision_id: one.revisionId,
      fingerprint: one.fingerprint,
      reason: one.reason,
      set_aside_by: one.by,
      sentence: one.sentence ?? null,
    })
    .execute();
}

/**
 * Accepted values of a revision that would stand on nothing: whose species or source neither stands, nor is accepted
 * beside them, nor waits in a revision that is decided.
 */
export async function findGroundless(
  revisionId: number,
  db: Database,
): Promise<{ speciesId: string; lacksSpecies: boolean; lacksSource: boolean }[]> {
  const result = await sql<{ speciesId: string; lacksSpecies: boolean; lacksSource: boolean }>`
    with accepted as (
      select l.species_id, v.content->>'sourceId' as source_id
        from revision_line l
        join lateral (select content from line_version where line_id = l.id order by version desc limit 1) v on true
       where l.revision_id = ${revisionId} and l.state = 'accepted' and l.kind = 'value'
    ), sure as (
      select l.kind, l.species_id, l.source_id
        from revision_line l
        join revision r on r.id = l.revision_id
       where l.state = 'accepted' and l.kind in ('detail', 'source') and (l.revision_id = ${revisionId} or r.state = 'decided')
    ), judged as (
      select a.species_id as "speciesId",
             not exists (select from species_detail d where d.species_id = a.species_id and d.until is null)
               and not exists (select from sure where sure.kind = 'detail' and sure.species_id = a.species_id) as "lacksSpecies",
             not exists (select from source_detail s where s.source_id = a.source_id and s.until is null)
               and not exists (select from sure where sure.kind = 'source' and sure.source_id = a.source_id) as "lacksSource"
        from accepted a
    )
    select * from judged where "lacksSpecies" or "lacksSource"
  `.execute(db);
  return result.rows;
}

/** Opens the next edition; the database refuses when the expected number has moved. */
export async function openEdition(
  edition: {
    expectedPrevious: number;
    publisher: string;
    notes: string;
    licence: string;
    withdraws: number | null;
    reason: string | null;
  },
  trx: Database,
): Promise<number> {
  const result = await sql<{ number: number }>`
    select open_edition(${edition.expectedPrevious}::int, ${edition.publisher}::uuid, ${edition.notes}::text,
                        ${edition.licence}::text, ${edition.withdraws}::int, ${edition.reason}::text) as number
  `.execute(trx);
  const number = result.rows[0]?.number;
  if (number === undefined) throw new Error("open_edition answered nothing.");
  return number;
}

/** Seals the open edition and answers its digest. */
export async function sealEdition(number: number, trx: Database): Promise<Buffer> {
  const result = await sql<{ digest: Buffer }>`select seal_edition(${number}::int) as digest`.execute(trx);
  const digest = result.rows[0]?.digest;
  if (!digest) throw new Error("seal_edition answered nothing.");
  return digest;
}
