import { sql } from "kysely";
import type { Database } from "#app/db/database.server.ts";
import type { SourceKind } from "#app/checks/types.ts";
import type { Digits } from "#app/thermo/digits.ts";
import type { Uncertainty } from "#app/thermo/uncertainty.ts";
import { lineContent } from "./content.ts";
import type { LineRow } from "./review.queries.server.ts";
import type { StoodContent } from "./revisionPage.ts";

/*
 * What the pages of the review show beside the lines themselves: rows that stood, names, citations. Everything is read by
 * lists of ids, so that a revision of thousands of lines costs the same number of statements as one of three.
 */

/** A list of ids as one parameter, however long it is. */
const anyNumber = (ids: readonly string[]) => sql`any(${[...ids]}::bigint[])`;
const anyText = (ids: readonly string[]) => sql`any(${[...ids]}::text[])`;

/** Standing or former rows of values by row id, in the shape of a line's content, with the editions they stood in. */
export async function findValueRows(ids: readonly string[], db: Database) {
  if (ids.length === 0) return [];
  const rows = await db
    .selectFrom("table_value as v")
    .select((eb) => [
      "v.id",
      "v.since",
      "v.until",
      "v.source_id as sourceId",
      eb.ref("v.value").$castTo<Digits>().as("digits"),
      eb.ref("v.uncertainty").$castTo<Digits | null>().as("uncertainty"),
      eb.ref("v.uncertainty_kind").$castTo<Uncertainty["kind"] | null>().as("kind"),
      eb.ref("v.coverage_factor").$castTo<string | null>().as("coverageFactor"),
    ])
    .where(sql<boolean>`v.id = ${anyNumber(ids)}`)
    .execute();
  return rows.map(({ id, since, until, sourceId, digits, uncertainty, kind, coverageFactor }) => ({
    id,
    since,
    until,
    content: {
      kind: "value",
      digits,
      uncertainty:
        uncertainty === null || kind === null
          ? null
          : { digits: uncertainty, kind, coverageFactor: coverageFactor === null ? null : Number(coverageFactor) },
      sourceId,
    } satisfies StoodContent,
  }));
}

/** Rows of what species are called, by row id. */
export async function findDetailRows(ids: readonly string[], db: Database) {
  if (ids.length === 0) return [];
  const rows = await db
    .selectFrom("species_detail as d")
    .select([
      "d.id",
      "d.since",
      "d.until",
      "d.key",
      "d.printed",
      "d.label",
      "d.name",
      "d.cas",
      "d.inchikey",
      "d.synonyms",
    ])
    .where(sql<boolean>`d.id = ${anyNumber(ids)}`)
    .execute();
  return rows.map(({ id, since, until, ...detail }) => ({
    id,
    since,
    until,
    content: { kind: "detail", ...detail } satisfies StoodContent,
  }));
}

/** Rows of citations, by row id. */
export async function findSourceRows(ids: readonly string[], db: Database) {
  if (ids.length === 0) return [];
  const rows = await db
    .selectFrom("source_detail as s")
    .select((eb) => [
      "s.id",
      "s.since",
      "s.until",
      "s.doi",
      "s.notice",
      eb.ref("s.citation").$castTo<Record<string, unknown>>().as("citation"),
      eb.ref("s.kind").$castTo<SourceKind>().as("sourceKind"),
    ])
    .where(sql<boolean>`s.id = ${anyNumber(ids)}`)
    .execute();
  return rows.map(({ id, since, until, ...source }) => ({
    id,
    since,
    until,
    content: { kind: "source", ...source } satisfies StoodContent,
  }));
}

/** What versions of lines say, by version id, with the revision each belongs to. */
export async function findVersionContents(ids: readonly string[], db: Database) {
  if (ids.length === 0) return [];
  const rows = await db
    .selectFrom("line_version as v")
    .innerJoin("revision_line as l", "l.id", "v.line_id")
    .select(["v.id", "v.content", "l.revision_id as revisionId", "l.published_in as publishedIn"])
    .where(sql<boolean>`v.id = ${anyNumber(ids)}`)
    .execute();
  return rows.map((row) => ({ ...row, content: lineContent.parse(row.content) }));
}

/** What species are called by the newest row that ever stood; `stands` tells whether it still does. */
export async function findNewestNames(speciesIds: readonly string[], db: Database) {
  if (speciesIds.length === 0) return [];
  return db
    .selectFrom("species_detail as d")
    .distinctOn("d.species_id")
    .select((eb) => ["d.species_id as speciesId", "d.key", "d.name", eb("d.until", "is", null).as("stands")])
    .where(sql<boolean>`d.species_id = ${anyText(speciesIds)}`)
    .orderBy("d.species_id")
    .orderBy("d.since", "desc")
    .execute();
}

/** What species are called by lines that propose or proposed it, newest line first; for species no edition holds yet. */
export async function findProposedNames(speciesIds: readonly string[], db: Database) {
  if (speciesIds.length === 0) return [];
  const result = await sql<{ speciesId: string; key: string; name: string }>`
    select distinct on (l.species_id) l.species_id as "speciesId", v.content->>'key' as key, v.content->>'name' as name
      from revision_line l
      join line_version v on v.line_id = l.id
     where l.kind = 'detail' and l.species_id = ${anyText(speciesIds)}
     order by l.species_id, (l.state = 'accepted') desc, v.id desc
  `.execute(db);
  return result.rows;
}

/** Citations by source id as the newest row has them. */
export async function findNewestCitations(sourceIds: readonly string[], db: Database) {
  if (sourceIds.length === 0) return [];
  return db
    .selectFrom("source_detail as s")
    .distinctOn("s.source_id")
    .select((eb) => [
      "s.source_id as sourceId",
      eb.ref("s.citation").$castTo<Record<string, unknown>>().as("citation"),
      eb("s.until", "is", null).as("stands"),
    ])
    .where(sql<boolean>`s.source_id = ${anyText(sourceIds)}`)
    .orderBy("s.source_id")
    .orderBy("s.since", "desc")
    .execute();
}

/** Citations by source id as lines propose them; for sources no edition holds yet. */
export async function findProposedCitations(sourceIds: readonly string[], db: Database) {
  if (sourceIds.length === 0) return [];
  const result = await sql<{ sourceId: string; citation: Record<string, unknown> }>`
    select distinct on (l.source_id) l.source_id as "sourceId", v.content->'citation' as citation
      from revision_line l
      join line_version v on v.line_id = l.id
     where l.kind = 'source' and l.source_id = ${anyText(sourceIds)}
     order by l.source_id, (l.state = 'accepted') desc, v.id desc
  `.execute(db);
  return result.rows;
}

/** Lines that were taken out of a revision or fell with it, as they last read, in their order. */
export async function findDroppedLines(revisionId: number, db: Database): Promise<LineRow[]> {
  const rows = await db
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
    .select((eb) => [
      "l.id",
      "l.revision_id as revisionId",
      "l.position",
      eb.ref("l.kind").$castTo<LineRow["kind"]>().as("kind"),
      "l.species_id as speciesId",
      eb.ref("l.property").$castTo<LineRow["property"]>().as("property"),
      "l.source_id as sourceId",
      "l.row_number as rowNumber",
      "l.against_row as againstRow",
      "l.against_version as againstVersion",
      eb.ref("l.state").$castTo<LineRow["state"]>().as("state"),
      "l.published_in as publishedIn",
      "l.came_from as cameFrom",
      "l.came_at as cameAt",
      "v.id as versionId",
      "v.version",
      "v.content",
      "v.content_hash as contentHash",
      "v.made_by as madeBy",
      "v.made_at as madeAt",
    ])
    .where("l.revision_id", "=", revisionId)
    .where("l.state", "=", "dropped")
    .orderBy("l.position")
    .orderBy("l.id")
    .execute();
  return rows.map((row) => ({ ...row, content: lineContent.parse(row.content) }));
}

/** Who took which line out and why, from the record. */
export async function findTakenOut(revisionId: number, db: Database) {
  const result = await sql<{ lineId: string; reason: string; at: Date; by: string }>`
    select e.detail->>'line' as "lineId", e.detail->>'reason' as reason, e.at, coalesce(p.name, 'the system') as by
      from audit_entry e
      left join person p on p.id = e.actor
     where e.object_kind = 'revision' and e.object_id = ${String(revisionId)} and e.act = 'revision.line-taken-out'
     order by e.number
  `.execute(db);
  return result.rows;
}

/** Findings set aside in a revision: what they said, who set them aside, when and why. */
export async function findSetAsides(revisionId: number, db: Database) {
  const result = await sql<{ sentence: string; reason: string; at: Date; by: string }>`
    select distinct on (a.id) coalesce(f.sentence, a.sentence, '') as sentence, a.reason, a.set_aside_at as at, p.name as by
      from finding_set_aside a
      join person p on p.id = a.set_aside_by
      left join finding f on f.revision_id = a.revision_id and f.fingerprint = a.fingerprint
     where a.revision_id = ${revisionId}
     order by a.id, f.id
  `.execute(db);
  return result.rows;
}

/** The findings of the examination made when a round of a revision was sent. */
export async function findFindingsOfRound(revisionId: number, round: number, db: Database) {
  return db
    .selectFrom("finding as f")
    .select((eb) => [
      "f.check_code as check",
      eb.ref("f.severity").$castTo<"block" | "look" | "remark">().as("severity"),
      "f.species_id as speciesId",
      "f.sentence",
    ])
    .where("f.examination_id", "=", (eb) =>
      eb
        .selectFrom("examination as e")
        .select("e.id")
        .where("e.revision_id", "=", revisionId)
        .where("e.occasion", "=", "send")
        .orderBy("e.id")
        .offset(round - 1)
        .limit(1),
    )
    .orderBy("f.id")
    .execute();
}

/** The revisions whose lines were taken over into this one: how many lines, when and by whom. */
export async function findTakenOver(revisionId: number, db: Database) {
  const result = await sql<{ from: number; lines: number; at: Date; by: string }>`
    select l.came_from as "from", count(*)::int as lines, max(l.came_at) as at, max(p.name) as by
      from revision_line l
      join revision_move m on m.revision_id = l.came_from and m.went_to = 'withdrawn'
      join person p on p.id = m.moved_by
     where l.revision_id = ${revisionId} and l.came_from is not null
     group by l.came_from
     order by 3
  `.execute(db);
  return result.rows;
}

/** The revisions that hold lines which were taken over from this one, wherever they went since. */
export async function findWentInto(revisionId: number, db: Database): Promise<number[]> {
  const rows = await db
    .selectFrom("revision_line")
    .select("revision_id as id")
    .distinct()
    .where((eb) => eb.or([eb("begun_in", "=", revisionId), eb("came_from", "=", revisionId)]))
    .orderBy("revision_id")
    .execute();
  return rows.map((row) => row.id);
}
