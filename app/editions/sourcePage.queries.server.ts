import { sql } from "kysely";
import type { Database } from "#app/db/database.server.ts";
import type { Property } from "#app/thermo/property.ts";
import { acceptedBy, type SourceKind, standsIn } from "./editions.queries.server.ts";

/*
 * What the page of a source shows of it as of edition n. Nothing later than n is looked at, so the page of a sealed
 * edition says the same for ever.
 */

function valuesOn(n: number, sourceId: string, property: Property | null, db: Database) {
  const query = db
    .selectFrom("table_value as v")
    .where("v.source_id", "=", sourceId)
    .where((eb) => standsIn(n, eb.ref("v.since"), eb.ref("v.until")));
  return property === null ? query : query.where("v.property", "=", property);
}

/** How many values of edition n lean on a source, property by property. */
export async function countValuesByProperty(n: number, sourceId: string, db: Database) {
  const rows = await valuesOn(n, sourceId, null, db)
    .select((eb) => [eb.ref("v.property").$castTo<Property>().as("property"), eb.fn.countAll<string>().as("count")])
    .groupBy("v.property")
    .execute();
  return new Map(rows.map((row) => [row.property, Number(row.count)]));
}

/** How many species of edition n have a value that leans on a source. */
export async function countSpeciesOn(n: number, sourceId: string, property: Property | null, db: Database) {
  const { count } = await valuesOn(n, sourceId, property, db)
    .select((eb) => eb.fn.count<string>("v.species_id").distinct().as("count"))
    .executeTakeFirstOrThrow();
  return Number(count);
}

/** Those species, in the order of their keys: their ids, all of them or a slice. */
export async function findSpeciesOn(
  n: number,
  sourceId: string,
  property: Property | null,
  slice: { limit: number; offset: number } | null,
  db: Database,
): Promise<string[]> {
  const query = valuesOn(n, sourceId, property, db)
    .innerJoin("species_detail as d", "d.species_id", "v.species_id")
    .where((eb) => standsIn(n, eb.ref("d.since"), eb.ref("d.until")))
    .select(["v.species_id as speciesId", "d.key"])
    .distinct()
    .orderBy("d.key");
  const rows = await (slice === null ? query : query.limit(slice.limit).offset(slice.offset)).execute();
  return rows.map((row) => row.speciesId);
}

/** How a source was cited up to edition n, oldest first, with the people behind it. */
export async function findSourceHistory(n: number, sourceId: string, db: Database) {
  return db
    .selectFrom("source_detail as s")
    .innerJoin("line_version as lv", "lv.id", "s.line_version_id")
    .innerJoin("revision_line as l", "l.id", "lv.line_id")
    .innerJoin("person as writer", "writer.id", "lv.made_by")
    .where("s.source_id", "=", sourceId)
    .where("s.since", "<=", n)
    .select((eb) => [
      "s.id as rowId",
      "s.source_id as sourceId",
      "s.doi",
      "s.notice",
      "s.line_version_id as lineVersionId",
      "s.row_hash as rowHash",
      "s.since",
      "l.revision_id as revisionId",
      "writer.name as writer",
      acceptedBy().as("decider"),
      eb.ref("s.citation").$castTo<Record<string, unknown>>().as("citation"),
      eb.ref("s.kind").$castTo<SourceKind>().as("kind"),
    ])
    .orderBy("s.since")
    .execute();
}

/** How many values that lean on a source came in and went out with each edition up to n. */
export async function countValuesThroughEditions(n: number, sourceId: string, db: Database) {
  const { rows } = await sql<{ edition: number; came: number; went: number }>`
    select edition, sum(came)::int as came, sum(went)::int as went
      from (select since as edition, 1 as came, 0 as went from table_value where source_id = ${sourceId} and since <= ${n}
            union all
            select until, 0, 1 from table_value where source_id = ${sourceId} and until <= ${n}) moved
     group by edition order by edition`.execute(db);
  return rows;
}

/** The sheets that brought values with this source into an edition up to n, in the order they came. */
export async function findSheetsOf(n: number, sourceId: string, db: Database) {
  return (
    db
      .selectFrom("table_value as v")
      .innerJoin("line_version as lv", "lv.id", "v.line_version_id")
      .innerJoin("revision_line as l", "l.id", "lv.line_id")
      // A line that was taken over into another revision still comes from the sheet of the one it was begun in.
      .innerJoin("revision as r", (join) => join.on("r.id", "=", (eb) => eb.fn.coalesce("l.begun_in", "l.revision_id")))
      .innerJoin("sheet as s", "s.id", "r.sheet_id")
      .where("v.source_id", "=", sourceId)
      .where("v.since", "<=", n)
      .select((eb) => [
        "s.id",
        "s.name",
        "r.id as revisionId",
        "v.since as edition",
        eb.fn.countAll<string>().as("values"),
      ])
      .groupBy(["s.id", "s.name", "r.id", "v.since"])
      .orderBy("v.since")
      .orderBy("s.id")
      .execute()
  );
}

/** The edition in which a source came in; undefined while none has it. */
export async function findFirstEditionOf(sourceId: string, db: Database): Promise<number | undefined> {
  const row = await db
    .selectFrom("source_detail")
    .where("source_id", "=", sourceId)
    .select("since")
    .orderBy("since")
    .limit(1)
    .executeTakeFirst();
  return row?.since;
}
