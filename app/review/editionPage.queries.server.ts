import { sql } from "kysely";
import type { Finding } from "#app/checks/types.ts";
import type { Database } from "#app/db/database.server.ts";
import type { Property } from "#app/thermo/property.ts";

/*
 * Who and what stands behind a published edition: its revisions, the hands in them, the examination it passed.
 */

/** The revisions whose lines edition n brought, with how many lines of each. */
export function findRevisionsIn(n: number, db: Database) {
  return db
    .selectFrom("revision_line as l")
    .innerJoin("revision as r", "r.id", "l.revision_id")
    .where("l.published_in", "=", n)
    .groupBy("r.id")
    .select((eb) => ["r.id", "r.title", eb.cast<number>(eb.fn.countAll(), "integer").as("lines")])
    .orderBy("r.id")
    .execute();
}

/** Everybody with a hand in the lines that edition n brought, once for each revision: by a version or by a mended cell. */
export async function findHandsIn(n: number, db: Database) {
  const { rows } = await sql<{ revisionId: number; name: string }>`
    select l.revision_id as "revisionId", p.name
      from revision_line l
      join line_version v on v.line_id = l.id
      join person p on p.id = v.made_by
     where l.published_in = ${n}
    union
    select l.revision_id, p.name
      from revision_line l
      join revision r on r.id = coalesce(l.begun_in, l.revision_id)
      join sheet_repair s on s.sheet_id = r.sheet_id and s.row_number = l.row_number
      join person p on p.id = s.repaired_by
     where l.published_in = ${n}
     order by 1, 2`.execute(db);
  return rows;
}

/** Who accepted the lines that edition n brought: how many in each revision, and when the last of them. */
export async function findAcceptancesIn(n: number, db: Database) {
  const { rows } = await sql<{ revisionId: number; name: string; lines: number; at: Date }>`
    with newest as (
      select distinct on (l.id) l.id, l.revision_id, d.decided_by, d.decided_at
        from revision_line l
        join line_version v on v.line_id = l.id
        join line_decision d on d.line_version_id = v.id
       where l.published_in = ${n}
       order by l.id, v.version desc, d.id desc
    )
    select newest.revision_id as "revisionId", p.name, count(*)::int as lines, max(newest.decided_at) as at
      from newest
      join person p on p.id = newest.decided_by
     group by newest.revision_id, p.id, p.name
     order by 1, 3 desc, 2`.execute(db);
  return rows;
}

/**
 * The examination that edition n passed when it was published: of all its lines together, against the edition before.
 * A publication that was refused leaves none, so there is one at most; undefined where the edition was made otherwise.
 */
export function findExaminationOf(n: number, db: Database) {
  return db
    .selectFrom("examination as e")
    .where("e.occasion", "=", "publish")
    .where("e.edition", "is not distinct from", n > 1 ? n - 1 : null)
    .orderBy("e.id", "desc")
    .limit(1)
    .select((eb) => [
      "e.id",
      "e.examined_at as at",
      "e.policy",
      "e.lines",
      "e.blocks",
      "e.looks",
      "e.remarks",
      "e.input_digest as inputDigest",
      eb.ref("e.checks").$castTo<Record<string, number>>().as("checks"),
    ])
    .executeTakeFirst();
}

/** How many findings of an examination each check made, by severity. */
export function countFindingsByCheck(examinationId: string, db: Database) {
  return db
    .selectFrom("finding as f")
    .where("f.examination_id", "=", examinationId)
    .groupBy(["f.check_code", "f.severity"])
    .select((eb) => [
      "f.check_code as check",
      eb.ref("f.severity").$castTo<Finding["severity"]>().as("severity"),
      eb.cast<number>(eb.fn.countAll(), "integer").as("n"),
    ])
    .execute();
}

/** The findings of an examination that were set aside in a revision of edition n, with who did so, when and why. */
export async function findFindingsSetAside(n: number, examinationId: string, limit: number, db: Database) {
  return db
    .selectFrom("finding as f")
    .innerJoin("finding_set_aside as a", "a.fingerprint", "f.fingerprint")
    .innerJoin("person as p", "p.id", "a.set_aside_by")
    .where("f.examination_id", "=", examinationId)
    .where((eb) =>
      eb.exists(
        eb
          .selectFrom("revision_line as l")
          .whereRef("l.revision_id", "=", "a.revision_id")
          .where("l.published_in", "=", n)
          .select("l.id"),
      ),
    )
    .distinctOn("f.id")
    .orderBy("f.id")
    .orderBy("a.id", "desc")
    .limit(limit)
    .select((eb) => [
      "f.id",
      "f.species_id as speciesId",
      "f.check_code as check",
      eb.ref("f.property").$castTo<Property | null>().as("property"),
      eb.ref("f.severity").$castTo<Finding["severity"]>().as("severity"),
      "f.sentence",
      eb.ref("f.arithmetic").$castTo<Finding["arithmetic"]>().as("arithmetic"),
      "a.revision_id as revisionId",
      "a.reason",
      "a.set_aside_at as at",
      "p.name as by",
    ])
    .execute();
}

/** How many findings of an examination were set aside in a revision of edition n. */
export async function countFindingsSetAside(n: number, examinationId: string, db: Database): Promise<number> {
  const { rows } = await sql<{ n: number }>`
    select count(distinct f.id)::int as n
      from finding f
      join finding_set_aside a on a.fingerprint = f.fingerprint
     where f.examination_id = ${examinationId}
       and exists (select from revision_line l where l.revision_id = a.revision_id and l.published_in = ${n})`.execute(
    db,
  );
  return rows[0]?.n ?? 0;
}
