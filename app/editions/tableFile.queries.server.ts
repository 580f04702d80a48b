import { sql } from "kysely";
import type { Database } from "#app/db/database.server.ts";

/** The species of edition n that have no value in it: every one of theirs was withdrawn. */
export async function findIdsWithoutValue(n: number, db: Database): Promise<string[]> {
  const { rows } = await sql<{ id: string }>`
    select d.species_id as id from species_detail d
     where d.since <= ${n} and (d.until is null or d.until > ${n})
       and not exists (select from table_value v where v.species_id = d.species_id
                          and v.since <= ${n} and (v.until is null or v.until > ${n}))`.execute(db);
  return rows.map((row) => row.id);
}
