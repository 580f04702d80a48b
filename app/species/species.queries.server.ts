import { sql } from "kysely";
import type { Database } from "#app/db/database.server.ts";
import type { Phase } from "#app/thermo/phase.ts";

/** Identities of species by id: what they are made of, whatever they are called. */
export async function findSpeciesByIds(ids: readonly string[], db: Database) {
  if (ids.length === 0) return [];
  return db
    .selectFrom("species")
    .select(["id", "hill", "charge"])
    .select((eb) => [
      eb.ref("composition").$castTo<Record<string, number>>().as("composition"),
      eb.ref("phase").$castTo<Phase>().as("phase"),
    ])
    .where(sql<boolean>`id = any(${[...ids]}::text[])`)
    .execute();
}

/** A species as a sheet's row may be matched to it. */
export interface SpeciesCandidate {
  speciesId: string;
  key: string;
  printed: string;
  hill: string;
  charge: number;
  phase: Phase;
  label: string | null;
  name: string;
  cas: string | null;
  synonyms: readonly string[];
  /** The open revision that proposes it; null when it stands in the newest edition. */
  revisionId: number | null;
  /** Whether its detail stands or waits accepted, so that a further revision need not propose it again. */
  named: boolean;
}

/**
 * The species of these compositions (Hill order, without charge): those of an edition, with the names that wait accepted
 * for the next one, and those that a revision which is
 * not withdrawn proposes and no edition holds yet.
 */
export async function findCandidates(
  edition: number,
  hills: readonly string[],
  db: Database,
): Promise<SpeciesCandidate[]> {
  if (hills.length === 0) return [];
  const { rows } = await sql<SpeciesCandidate>`
    select d.species_id as "speciesId", d.key, d.printed, s.hill, s.charge, s.phase, d.label,
           coalesce(w.content ->> 'name', d.name) as name,
           case when w.content is null then d.cas else w.content ->> 'cas' end as cas,
           case when w.content is null then d.synonyms
                else array(select jsonb_array_elements_text(w.content -> 'synonyms')) end as synonyms,
           null as "revisionId", true as named
      from species s join species_detail d on d.species_id = s.id
      left join lateral (select v.content from revision_line l join line_version v on v.line_id = l.id
                          where l.kind = 'detail' and l.state = 'accepted' and l.species_id = d.species_id
                          order by v.version desc limit 1) w on true
     where s.hill = any(${[...hills]}::text[])
       and d.since <= ${edition} and (d.until is null or d.until > ${edition})
    union all
    (select distinct on (l.species_id)
           l.species_id, v.content ->> 'key', v.content ->> 'printed', s.hill, s.charge, s.phase, v.content ->> 'label',
           v.content ->> 'name', v.content ->> 'cas', array(select jsonb_array_elements_text(v.content -> 'synonyms')),
           l.revision_id, l.state = 'accepted'
      from revision_line l
      join species s on s.id = l.species_id
      join lateral (select content from line_version where line_id = l.id order by version desc limit 1) v on true
     where l.kind = 'detail' and l.state in ('open', 'accepted')
       and s.hill = any(${[...hills]}::text[])
       and not exists (select from species_detail d where d.species_id = l.species_id
                          and d.since <= ${edition} and (d.until is null or d.until > ${edition}))
     order by l.species_id, l.state = 'accepted' desc, l.id)
    order by 2`.execute(db);
  return rows;
}

/** Inserts the identities of new species. */
export async function insertSpecies(
  species: readonly {
    id: string;
    hill: string;
    composition: Readonly<Record<string, number>>;
    charge: number;
    phase: Phase;
  }[],
  trx: Database,
): Promise<void> {
  for (let start = 0; start < species.length; start += 1000) {
    await trx
      .insertInto("species")
      .values(
        species.slice(start, start + 1000).map((one) => ({
          id: one.id,
          hill: one.hill,
          composition: JSON.stringify(one.composition),
          charge: one.charge,
          phase: one.phase,
        })),
      )
      .execute();
  }
}

/** Holds the naming of new species until the transaction ends, so that two sheets do not bring one species twice. */
export async function lockNaming(trx: Database): Promise<void> {
  await sql`select pg_advisory_xact_lock(7270920)`.execute(trx);
}
