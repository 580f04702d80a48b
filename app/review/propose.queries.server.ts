import { sql } from "kysely";
import type { Database } from "#app/db/database.server.ts";
import type { Property } from "#app/thermo/property.ts";
import { type LineContent, lineContent } from "./content.ts";
import type { Namesake } from "./proposal.ts";

/** Those of these sources that have an identity in the table. */
export async function findKnownSourceIds(ids: readonly string[], db: Database): Promise<Set<string>> {
  if (ids.length === 0) return new Set();
  const rows = await db
    .selectFrom("source")
    .select("id")
    .where(sql<boolean>`id = any(${[...ids]}::text[])`)
    .execute();
  return new Set(rows.map((row) => row.id));
}

/** A species that holds a key, and where: standing (no revision), or proposed in a revision that is not withdrawn. */
export interface KeyHolder {
  key: string;
  speciesId: string;
  revisionId: number | null;
  /** Whether it stands or waits accepted; an open proposal may still be declined. */
  settled: boolean;
}

/** Who holds these keys now: species standing in the newest edition, and those that open revisions propose. */
export async function findKeyHolders(keys: readonly string[], db: Database): Promise<KeyHolder[]> {
  if (keys.length === 0) return [];
  const { rows } = await sql<KeyHolder>`
    select d.key, d.species_id as "speciesId", null as "revisionId", true as settled
      from species_detail d
     where d.until is null and d.key = any(${[...keys]}::text[])
    union all
    select v.content ->> 'key', l.species_id, l.revision_id, l.state = 'accepted'
      from revision_line l
      join lateral (select content from line_version where line_id = l.id order by version desc limit 1) v on true
     where l.kind = 'detail' and l.state in ('open', 'accepted') and v.content ->> 'key' = any(${[...keys]}::text[])
     order by 4 desc`.execute(db);
  return rows;
}

/** What a species' places hold now: every standing row and every accepted line that waits, with what it says. */
export interface PlaceNow {
  /** Null for what the species is called. */
  property: Property | null;
  version: string;
  /** The revision in which it waits; null where it stands. */
  revisionId: number | null;
  content: LineContent;
}

/** What stands and what waits in the places of a species. A waiting line comes after the row that stands. */
export async function findPlaces(speciesId: string, db: Database): Promise<PlaceNow[]> {
  const { rows } = await sql<Omit<PlaceNow, "content"> & { content: unknown }>`
    select v.property, lv.id::text as version, null::integer as "revisionId", lv.content
      from table_value v join line_version lv on lv.id = v.line_version_id
     where v.species_id = ${speciesId} and v.until is null
    union all
    select null, lv.id::text, null, lv.content
      from species_detail d join line_version lv on lv.id = d.line_version_id
     where d.species_id = ${speciesId} and d.until is null
    union all
    (select l.property, v.id::text, l.revision_id, v.content
       from revision_line l
       join lateral (select id, content from line_version where line_id = l.id order by version desc limit 1) v on true
      where l.species_id = ${speciesId} and l.state = 'accepted')
    order by 3 nulls first`.execute(db);
  return rows.map((row) => ({ ...row, content: lineContent.parse(row.content) }));
}

/** A line that is proposed for a species and not decided yet. */
export interface OpenLine {
  revisionId: number;
  title: string;
  state: string;
  property: Property | null;
  content: LineContent;
}

/** The undecided lines of a species in revisions that are not withdrawn, the oldest first. */
export async function findOpenLines(speciesId: string, db: Database): Promise<OpenLine[]> {
  const { rows } = await sql<Omit<OpenLine, "content"> & { content: unknown }>`
    select l.revision_id as "revisionId", r.title, r.state, l.property, v.content
      from revision_line l
      join revision r on r.id = l.revision_id
      join lateral (select content from line_version where line_id = l.id order by version desc limit 1) v on true
     where l.species_id = ${speciesId} and l.state = 'open'
     order by l.revision_id, l.position`.execute(db);
  return rows.map((row) => ({ ...row, content: lineContent.parse(row.content) }));
}

/**
 * Other species that share a CAS number, an InChIKey or a name with one to be proposed: those that stand, and those that
 * open revisions propose.
 */
export async function findNamesakes(
  of: { cas: string | null; inchikey: string | null; name: string; except: string | null },
  db: Database,
): Promise<Namesake[]> {
  const { rows } = await sql<Namesake>`
    with called as (
      select d.species_id, d.key, d.name, d.cas, d.inchikey, d.synonyms, null::integer as revision_id
        from species_detail d where d.until is null
      union all
      select l.species_id, v.content ->> 'key', v.content ->> 'name', v.content ->> 'cas', v.content ->> 'inchikey',
             array(select jsonb_array_elements_text(v.content -> 'synonyms')), l.revision_id
        from revision_line l
        join lateral (select content from line_version where line_id = l.id order by version desc limit 1) v on true
       where l.kind = 'detail' and l.state in ('open', 'accepted')
    )
    select c.key, c.name, s.hill, s.charge, s.phase, c.cas, c.inchikey, c.synonyms, c.revision_id as "revisionId"
      from called c join species s on s.id = c.species_id
     where c.species_id is distinct from ${of.except}
       and (c.cas = ${of.cas} or c.inchikey = ${of.inchikey}
            or (${of.name} <> '' and (lower(c.name) = lower(${of.name}) or lower(${of.name}) = any (select lower(unnest(c.synonyms))))))
     order by c.key, c.revision_id nulls first
     limit 20`.execute(db);
  return rows;
}

/** Lines of a draft that propose a source, by its id: a draft says each source once. */
export async function findProposedSourceIds(revisionId: number, db: Database): Promise<Set<string>> {
  const rows = await db
    .selectFrom("revision_line")
    .select("source_id as id")
    .where("revision_id", "=", revisionId)
    .where("kind", "=", "source")
    .where("state", "<>", "dropped")
    .execute();
  return new Set(rows.flatMap((row) => row.id ?? []));
}

/** Species that a draft names or brings, by id. */
export async function findNamedSpeciesIds(revisionId: number, db: Database): Promise<Set<string>> {
  const rows = await db
    .selectFrom("revision_line")
    .select("species_id as id")
    .where("revision_id", "=", revisionId)
    .where("kind", "=", "detail")
    .where("state", "<>", "dropped")
    .execute();
  return new Set(rows.flatMap((row) => row.id ?? []));
}

/** Drafts and returned revisions that lines may be added to: a person's own, and one named besides. */
export function findWritableRevisions(personId: string, besides: number | null, db: Database) {
  return db
    .selectFrom("revision as r")
    .innerJoin("person as p", "p.id", "r.made_by")
    .select(["r.id", "r.title", "r.state", "p.name as by"])
    .where("r.state", "in", ["draft", "returned"])
    .where((eb) => eb.or([eb("r.made_by", "=", personId), ...(besides === null ? [] : [eb("r.id", "=", besides)])]))
    .orderBy("r.id", "desc")
    .limit(100)
    .execute();
}
