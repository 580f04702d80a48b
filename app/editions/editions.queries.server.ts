import { type Expression, type Kysely, type RawBuilder, type SqlBool, sql } from "kysely";
import type { Database } from "#app/db/database.server.ts";
import type { DB } from "#app/db/types.ts";
import type { Digits } from "#app/thermo/digits.ts";
import type { Phase } from "#app/thermo/phase.ts";
import type { Property } from "#app/thermo/property.ts";
import type { Uncertainty } from "#app/thermo/uncertainty.ts";
import type { Bare, ChargeKind, Search, SpeciesFilter } from "./search.ts";

/*
 * Reading the one append-only table as of an edition. Edition n is the rows with since <= n that had not gone out by n;
 * what happened after n cannot be seen from here, so an answer made of these rows is the same for ever. Edition 0 is the
 * table before its first edition: empty.
 */

/** The rows of a versioned table that stand in edition n. */
export function standsIn(n: number, since: Expression<number>, until: Expression<number | null>): Expression<SqlBool> {
  return sql<SqlBool>`(${since} <= ${n} and (${until} is null or ${until} > ${n}))`;
}

/** `column = any(list)`: one parameter however long the list is. */
function oneOf(column: Expression<string | null>, list: readonly string[]): Expression<SqlBool> {
  return sql<SqlBool>`${column} = any(${[...list]}::text[])`;
}

// --- Editions ---------------------------------------------------------------

function editions(db: Database) {
  return db
    .selectFrom("edition as e")
    .innerJoin("person as p", "p.id", "e.published_by")
    .leftJoin("edition as w", (join) => join.onRef("w.withdraws", "=", "e.number").on("w.state", "=", "sealed"))
    .where("e.state", "=", "sealed")
    .select([
      "e.number",
      "e.published_at as publishedAt",
      "e.published_by as publishedBy",
      "p.name as publisher",
      "e.notes",
      "e.licence",
      "e.withdraws",
      "e.withdrawal_reason as withdrawalReason",
      "e.previous_digest as previousDigest",
      "w.number as withdrawnBy",
      "w.withdrawal_reason as withdrawnBecause",
    ])
    .select((eb) => [
      // A sealed edition has all of these (edition_sealed_is_whole).
      eb.ref("e.digest").$castTo<Buffer>().as("digest"),
      eb.ref("e.species_count").$castTo<number>().as("speciesCount"),
      eb.ref("e.value_count").$castTo<number>().as("valueCount"),
      eb.ref("e.came").$castTo<number>().as("came"),
      eb.ref("e.changed").$castTo<number>().as("changed"),
      eb.ref("e.went").$castTo<number>().as("went"),
    ]);
}

/** The newest published edition; undefined before the first. */
export async function findNewestEdition(db: Database) {
  return editions(db).orderBy("e.number", "desc").limit(1).executeTakeFirst();
}

/** The published edition of this number. */
export async function findEdition(n: number, db: Database) {
  return editions(db).where("e.number", "=", n).executeTakeFirst();
}

/** Every published edition, the newest first. */
export async function findEditions(db: Database) {
  return editions(db).orderBy("e.number", "desc").execute();
}

/** A published edition. `withdrawnBy` names the later edition that withdrew it, and is therefore no part of its content. */
export type Edition = Awaited<ReturnType<typeof findEditions>>[number];

// --- Values -----------------------------------------------------------------

export interface ValueFilter {
  speciesIds?: readonly string[];
  properties?: readonly Property[];
  sourceIds?: readonly string[];
}

/**
 * The values of edition n, ordered by the UTF-8 bytes of species key, then property. An empty list in the filter asks for
 * nothing; a list left out asks for all.
 */
export async function findValuesAsOf(n: number, filter: ValueFilter, db: Database) {
  const rows = await valuesAsOf(n, filter, db).execute();
  return rows.map(withUncertainty);
}

/**
 * The values standing in edition `from` that had gone out by the later edition `to`, with the keys of `from`. Together with
 * `findValuesThatCame` this is all that can differ between the two, so a comparison costs what changed and not what stands.
 */
export async function findValuesThatWent(from: number, to: number, db: Database) {
  const rows = await valuesAsOf(from, {}, db).where("v.until", "<=", to).execute();
  return rows.map(withUncertainty);
}

/** The values standing in edition `to` that came in after the earlier edition `from`, with the keys of `to`. */
export async function findValuesThatCame(from: number, to: number, db: Database) {
  const rows = await valuesAsOf(to, {}, db).where("v.since", ">", from).execute();
  return rows.map(withUncertainty);
}

/** A value as it stands in an edition. */
export type ValueAsOf = Awaited<ReturnType<typeof findValuesAsOf>>[number];

function valuesAsOf(n: number, filter: ValueFilter, db: Database) {
  let query = db
    .selectFrom("table_value as v")
    .innerJoin("species_detail as d", "d.species_id", "v.species_id")
    .where((eb) => standsIn(n, eb.ref("v.since"), eb.ref("v.until")))
    .where((eb) => standsIn(n, eb.ref("d.since"), eb.ref("d.until")))
    .select([
      "v.id as rowId",
      "v.species_id as speciesId",
      "d.key",
      "v.method",
      "v.given_text as givenText",
      "v.given_unit as givenUnit",
      "v.given_note as givenNote",
      "v.remark",
      "v.source_id as sourceId",
      "v.line_version_id as lineVersionId",
      "v.row_hash as rowHash",
      "v.since",
    ])
    .select((eb) => [
      eb.ref("v.property").$castTo<Property>().as("property"),
      eb.ref("v.value").$castTo<Digits>().as("digits"),
      eb.ref("v.uncertainty").$castTo<Digits | null>().as("uncertaintyDigits"),
      eb.ref("v.uncertainty_kind").$castTo<Uncertainty["kind"] | null>().as("uncertaintyKind"),
      eb.ref("v.coverage_factor").$castTo<Digits | null>().as("coverageFactor"),
      eb.ref("v.temperature").$castTo<Digits>().as("temperature"),
      eb.ref("v.standard_pressure").$castTo<Digits>().as("standardPressure"),
      eb.ref("v.basis").$castTo<"molality" | "concentration" | null>().as("basis"),
      eb.ref("v.origin").$castTo<"stated" | "derived">().as("origin"),
    ])
    .orderBy("d.key")
    .orderBy("v.property");
  const { speciesIds, properties, sourceIds } = filter;
  if (speciesIds) query = query.where((eb) => oneOf(eb.ref("v.species_id"), speciesIds));
  if (properties) query = query.where((eb) => oneOf(eb.ref("v.property"), properties));
  if (sourceIds) query = query.where((eb) => oneOf(eb.ref("v.source_id"), sourceIds));
  return query;
}

/** Puts the three columns of an uncertainty back into one. */
function withUncertainty<
  Row extends {
    uncertaintyDigits: Digits | null;
    uncertaintyKind: Uncertainty["kind"] | null;
    coverageFactor: Digits | null;
  },
>(row: Row) {
  const { uncertaintyDigits, uncertaintyKind, coverageFactor, ...rest } = row;
  const uncertainty: Uncertainty | null =
    uncertaintyDigits === null || uncertaintyKind === null
      ? null
      : {
          digits: uncertaintyDigits,
          kind: uncertaintyKind,
          coverageFactor: coverageFactor === null ? null : Number(coverageFactor),
        };
  return { ...rest, uncertainty };
}

// --- Species ----------------------------------------------------------------

export interface DetailFilter {
  speciesIds?: readonly string[];
  keys?: readonly string[];
  /** Formulas in Hill order, without charge. */
  hill?: readonly string[];
  cas?: readonly string[];
}

/** The species of edition n with what they are called in it, ordered by the UTF-8 bytes of the key. */
export async function findDetailsAsOf(n: number, filter: DetailFilter, db: Database) {
  let query = detailsAsOf(n, db);
  const { speciesIds, keys, hill, cas } = filter;
  if (speciesIds) query = query.where((eb) => oneOf(eb.ref("d.species_id"), speciesIds));
  if (keys) query = query.where((eb) => oneOf(eb.ref("d.key"), keys));
  if (hill) query = query.where((eb) => oneOf(eb.ref("s.hill"), hill));
  if (cas) query = query.where((eb) => oneOf(eb.ref("d.cas"), cas));
  return query.execute();
}

/** The species' details standing in edition `from` that had gone out by the later edition `to`. */
export async function findDetailsThatWent(from: number, to: number, db: Database) {
  return detailsAsOf(from, db).where("d.until", "<=", to).execute();
}

/** The species' details standing in edition `to` that came in after the earlier edition `from`. */
export async function findDetailsThatCame(from: number, to: number, db: Database) {
  return detailsAsOf(to, db).where("d.since", ">", from).execute();
}

/** A species as it is called in an edition. */
export type DetailAsOf = Awaited<ReturnType<typeof findDetailsAsOf>>[number];

function detailsAsOf(n: number, db: Database) {
  return db
    .selectFrom("species_detail as d")
    .innerJoin("species as s", "s.id", "d.species_id")
    .where((eb) => standsIn(n, eb.ref("d.since"), eb.ref("d.until")))
    .select([
      "d.id as rowId",
      "d.species_id as speciesId",
      "d.key",
      "d.printed",
      "d.label",
      "d.name",
      "d.cas",
      "d.inchikey",
      "d.synonyms",
      "s.hill",
      "s.charge",
      "d.line_version_id as lineVersionId",
      "d.row_hash as rowHash",
      "d.since",
    ])
    .select((eb) => [
      eb.ref("s.composition").$castTo<Record<string, number>>().as("composition"),
      eb.ref("s.phase").$castTo<Phase>().as("phase"),
    ])
    .orderBy("d.key");
}

// --- History ------------------------------------------------------------------

/** `until` as it was known in edition n: a row that went out later still stood. */
function untilAsOf(n: number) {
  return sql<number | null>`case when v.until <= ${n} then v.until end`;
}

/** Who accepted the version `lv` of a line: the newest decision on it that did. */
export function acceptedBy() {
  return sql<string | null>`(select p.name from line_decision d join person p on p.id = d.decided_by
    where d.line_version_id = lv.id and d.decision = 'accept' order by d.id desc limit 1)`;
}

/**
 * Every value that a species had up to edition n, oldest first within each property, with the people behind it. Looks at
 * nothing later than n.
 */
export async function findValueHistory(n: number, speciesId: string, db: Database) {
  const rows = await db
    .selectFrom("table_value as v")
    .innerJoin("line_version as lv", "lv.id", "v.line_version_id")
    .innerJoin("revision_line as l", "l.id", "lv.line_id")
    .innerJoin("person as writer", "writer.id", "lv.made_by")
    .where("v.species_id", "=", speciesId)
    .where("v.since", "<=", n)
    .select([
      "v.id as rowId",
      "v.since",
      "v.source_id as sourceId",
      "l.revision_id as revisionId",
      "writer.name as writer",
    ])
    .select((eb) => [
      eb.ref("v.property").$castTo<Property>().as("property"),
      eb.ref("v.value").$castTo<Digits>().as("digits"),
      eb.ref("v.uncertainty").$castTo<Digits | null>().as("uncertaintyDigits"),
      eb.ref("v.uncertainty_kind").$castTo<Uncertainty["kind"] | null>().as("uncertaintyKind"),
      eb.ref("v.coverage_factor").$castTo<Digits | null>().as("coverageFactor"),
      untilAsOf(n).as("until"),
      acceptedBy().as("decider"),
    ])
    .orderBy("v.property")
    .orderBy("v.since")
    .execute();
  return rows.map(withUncertainty);
}

/** A value that stood at some time up to an edition. */
export type HistoricValue = Awaited<ReturnType<typeof findValueHistory>>[number];

/** Withdrawals of a species' values up to edition n: in which edition, by which revision, and why. */
export async function findWithdrawals(n: number, speciesId: string, db: Database) {
  return db
    .selectFrom("revision_line as l")
    .innerJoin("line_version as lv", "lv.line_id", "l.id")
    .innerJoin("person as writer", "writer.id", "lv.made_by")
    .where("l.species_id", "=", speciesId)
    .where("l.kind", "=", "withdrawal")
    .where("l.published_in", "<=", n)
    .where((eb) =>
      eb.not(
        eb.exists(
          eb
            .selectFrom("line_version as newer")
            .whereRef("newer.line_id", "=", "lv.line_id")
            .whereRef("newer.version", ">", "lv.version")
            .select("newer.id"),
        ),
      ),
    )
    .select(["l.revision_id as revisionId", "writer.name as writer", acceptedBy().as("decider")])
    .select((eb) => [
      eb.ref("l.property").$castTo<Property>().as("property"),
      eb.ref("l.published_in").$castTo<number>().as("edition"),
      sql<string>`coalesce(lv.content->>'reason', '')`.as("reason"),
    ])
    .orderBy("l.published_in")
    .execute();
}

/** What a species was called up to edition n, oldest first. */
export async function findDetailHistory(n: number, speciesId: string, db: Database) {
  return db
    .selectFrom("species_detail as d")
    .innerJoin("line_version as lv", "lv.id", "d.line_version_id")
    .innerJoin("revision_line as l", "l.id", "lv.line_id")
    .innerJoin("person as writer", "writer.id", "lv.made_by")
    .where("d.species_id", "=", speciesId)
    .where("d.since", "<=", n)
    .select([
      "d.key",
      "d.printed",
      "d.label",
      "d.name",
      "d.cas",
      "d.inchikey",
      "d.synonyms",
      "d.since",
      "l.revision_id as revisionId",
      "writer.name as writer",
      acceptedBy().as("decider"),
    ])
    .orderBy("d.since")
    .execute();
}

// --- Browsing ---------------------------------------------------------------

export interface SpeciesOrder {
  /** "hill": by formula in Hill order, counts compared as numbers. */
  by: "key" | "hill" | "name" | Property;
  direction: "ascending" | "descending";
}

export interface SpeciesSlice {
  order: SpeciesOrder;
  limit: number;
  /** How many to pass over; for pages with a number. */
  offset?: number;
  /** Only keys behind this one; for cursors, with the order by key. */
  after?: string | null;
}

/** Whether the species `d` has a value in edition n of which `what` holds; `v` is the value. */
function hasValue(n: number, what: RawBuilder<SqlBool>): RawBuilder<SqlBool> {
  return sql<SqlBool>`exists (select from table_value v
    where v.species_id = d.species_id and v.since <= ${n} and (v.until is null or v.until > ${n}) and ${what})`;
}

const CHARGED: Readonly<Record<ChargeKind, RawBuilder<SqlBool>>> = {
  neutral: sql`s.charge = 0`,
  ion: sql`s.charge <> 0`,
  cation: sql`s.charge > 0`,
  anion: sql`s.charge < 0`,
};

function lacking(n: number, what: Bare): RawBuilder<SqlBool> {
  switch (what) {
    case "uncertainty":
      return hasValue(n, sql`v.uncertainty is null`);
    case "cas":
      return sql`d.cas is null`;
    case "name":
      return sql`d.name = ''`;
    case "stated":
      return sql`${hasValue(n, sql`v.origin = 'derived'`)} and not ${hasValue(n, sql`v.origin = 'stated'`)}`;
  }
}

function filtered(n: number, filter: SpeciesFilter, db: Database) {
  const { search, elements, elementsHow = "all", phases, cas, holds, lacks, charge, bare = [], sourceIds } = filter;
  let query = detailsAsOf(n, db);
  if (elements.length > 0) {
    const list = sql`${[...elements]}::text[]`;
    if (elementsHow !== "only") query = query.where(sql<boolean>`s.composition ?& ${list}`);
    if (elementsHow !== "all") query = query.where(sql<boolean>`(s.composition - ${list}) = '{}'::jsonb`);
  }
  if (phases.length > 0) query = query.where((eb) => oneOf(eb.ref("s.phase"), phases));
  if (charge) query = query.where(CHARGED[charge]);
  if (cas !== null) query = query.where("d.cas", "=", cas);
  for (const property of holds) query = query.where(hasValue(n, sql`v.property = ${property}`));
  for (const property of lacks) query = query.where(sql<boolean>`not ${hasValue(n, sql`v.property = ${property}`)}`);
  for (const what of bare) query = query.where(lacking(n, what));
  if (sourceIds) query = query.where(hasValue(n, sql`v.source_id = any(${[...sourceIds]}::text[])`));
  if (search) query = query.where(searched(search));
  return query;
}

/** A text to be found as it is within another: % and _ stand for themselves. */
function asPart(text: string): string {
  return text.toLowerCase().replace(/[\\%_]/g, "\\$&");
}

/**
 * The ways in which a species can be what was typed. Each is a list of its own, so that each is found through its index
 * and no row is looked at that none of them names.
 */
function searched(search: Search): RawBuilder<SqlBool> {
  const part = asPart(search.text);
  const ofDetail = (what: RawBuilder<unknown>) => sql`select o.id from species_detail o where ${what}`;
  const ofSpecies = (what: RawBuilder<unknown>) =>
    sql`select o.id from species c join species_detail o on o.species_id = c.id where ${what}`;
  const ways = [
    ofDetail(sql`species_names(o.name, o.synonyms) like ${`%${part}%`}`),
    ofDetail(sql`lower(o.key) like ${`${part}%`}`),
  ];
  if (search.cas !== null) ways.push(ofDetail(sql`o.cas = ${search.cas}`));
  for (const { hill, charge } of search.formulas) {
    ways.push(ofSpecies(sql`c.hill = ${hill} and (${charge}::integer is null or c.charge = ${charge})`));
  }
  for (const { formula, phase, label } of search.identities) {
    ways.push(
      ofSpecies(sql`c.hill = ${formula.hill} and c.charge = ${formula.charge} and c.phase = ${phase}
        and (${label ?? null}::text is null or o.label = ${label ?? null})`),
    );
  }
  return sql<SqlBool>`d.id in (${sql.join(ways, sql` union `)})`;
}

/** Names of edition n that are written nearly like this one, the nearest first, with how near, 0 to 1. */
export async function findNamesNear(n: number, text: string, limit: number, db: Kysely<DB>) {
  return db.transaction().execute(async (trx) => {
    // Below the usual measure, so that "sulphate" still finds sulfate.
    await sql`set local pg_trgm.word_similarity_threshold = 0.45`.execute(trx);
    const { rows } = await sql<{ speciesId: string; near: number }>`
      select d.species_id as "speciesId", word_similarity(${text.toLowerCase()}, species_names(d.name, d.synonyms)) as near
        from species_detail d
       where species_names(d.name, d.synonyms) %> ${text.toLowerCase()}
         and d.since <= ${n} and (d.until is null or d.until > ${n})
       order by near desc, d.key limit ${limit}`.execute(trx);
    return rows;
  });
}

/** A slice of the species of edition n that a filter lets through. Species without the value sorted by stand last. */
export async function findSpeciesPageAsOf(n: number, filter: SpeciesFilter, slice: SpeciesSlice, db: Database) {
  const { order, limit, offset = 0, after } = slice;
  const turn = order.direction === "descending" ? "desc" : "asc";
  const query = filtered(n, filter, db).clearOrderBy().limit(limit).offset(offset);
  switch (order.by) {
    case "key":
      return (after === null || after === undefined ? query : query.where("d.key", ">", after))
        .orderBy("d.key", turn)
        .execute();
    case "name":
      // Species without a name stand last, as those without a value do.
      return query
        .orderBy(sql`nullif(lower(d.name), '')`, (ob) => (turn === "desc" ? ob.desc() : ob.asc()).nullsLast())
        .orderBy("d.key")
        .execute();
    case "hill":
      return query
        .orderBy(sql`hill_order(s.hill) collate "C"`, turn)
        .orderBy("d.key", turn)
        .execute();
    default:
      // Joined, and not looked up species by species, because the whole table is put in order.
      return query
        .leftJoin(
          sql<{ species_id: string; value: string }>`(select v.species_id, v.value from table_value v
            where v.property = ${order.by} and v.since <= ${n} and (v.until is null or v.until > ${n}))`.as("sorted"),
          (join) => join.onRef("sorted.species_id", "=", "d.species_id"),
        )
        .orderBy("sorted.value", (ob) => (turn === "desc" ? ob.desc() : ob.asc()).nullsLast())
        .orderBy("d.key")
        .execute();
  }
}

/** How many species of edition n a filter lets through. */
export async function countSpeciesAsOf(n: number, filter: SpeciesFilter, db: Database): Promise<number> {
  const { count } = await filtered(n, filter, db)
    .clearSelect()
    .clearOrderBy()
    .select((eb) => eb.fn.countAll<string>().as("count"))
    .executeTakeFirstOrThrow();
  return Number(count);
}

/** The species that had this key in edition n or in one before it, each id once: where an old key leads. */
export async function findSpeciesOnceCalled(n: number, key: string, db: Database) {
  return db
    .selectFrom("species_detail as d")
    .where("d.key", "=", key)
    .where("d.since", "<=", n)
    .select("d.species_id as speciesId")
    .distinct()
    .execute();
}

// --- Sources ----------------------------------------------------------------

export type SourceKind = "measurement" | "evaluation" | "calculation" | "estimate";

/** The sources of edition n with their citations (CSL-JSON), ordered by the bytes of their ids. */
export async function findSourceDetailsAsOf(n: number, filter: { ids?: readonly string[] }, db: Database) {
  const { ids } = filter;
  const query = sourcesAsOf(n, db);
  return (ids ? query.where((eb) => oneOf(eb.ref("s.source_id"), ids)) : query).execute();
}

/** The sources' details standing in edition `from` that had gone out by the later edition `to`. */
export async function findSourceDetailsThatWent(from: number, to: number, db: Database) {
  return sourcesAsOf(from, db).where("s.until", "<=", to).execute();
}

/** The sources' details standing in edition `to` that came in after the earlier edition `from`. */
export async function findSourceDetailsThatCame(from: number, to: number, db: Database) {
  return sourcesAsOf(to, db).where("s.since", ">", from).execute();
}

function sourcesAsOf(n: number, db: Database) {
  return db
    .selectFrom("source_detail as s")
    .where((eb) => standsIn(n, eb.ref("s.since"), eb.ref("s.until")))
    .select([
      "s.id as rowId",
      "s.source_id as sourceId",
      "s.doi",
      "s.notice",
      "s.line_version_id as lineVersionId",
      "s.row_hash as rowHash",
      "s.since",
    ])
    .select((eb) => [
      eb.ref("s.citation").$castTo<Record<string, unknown>>().as("citation"),
      eb.ref("s.kind").$castTo<SourceKind>().as("kind"),
    ])
    .orderBy("s.source_id");
}

/** A source as it is cited in an edition. */
export type SourceAsOf = Awaited<ReturnType<typeof findSourceDetailsAsOf>>[number];

/** Citations by source id, as of one edition. */
export type Sources = ReadonlyMap<string, SourceAsOf>;
