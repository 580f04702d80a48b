import { sql } from "kysely";
import type { Database } from "#app/db/database.server.ts";

/**
 * The species of edition n that bear any of these names, as name or synonym, whatever the case.
 * @param names in small letters
 */
export async function findIdsNamed(n: number, names: readonly string[], db: Database): Promise<string[]> {
  const { rows } = await sql<{ id: string }>`
    select d.species_id as id from species_detail d
     where d.since <= ${n} and (d.until is null or d.until > ${n})
       and (lower(d.name) = any(${[...names]}::text[])
            or exists (select from unnest(d.synonyms) as known(name) where lower(known.name) = any(${[...names]}::text[])))`.execute(
    db,
  );
  return rows.map((row) => row.id);
}

/** Which species had which of these keys in edition n or in one before it. */
export async function findIdsOnceCalled(
  n: number,
  keys: readonly string[],
  db: Database,
): Promise<{ key: string; id: string }[]> {
  const { rows } = await sql<{ key: string; id: string }>`
    select distinct d.key, d.species_id as id from species_detail d
     where d.key = any(${[...keys]}::text[]) and d.since <= ${n} order by 1, 2`.execute(db);
  return rows;
}
