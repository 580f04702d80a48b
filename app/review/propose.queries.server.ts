import { sql } from "kysely";
import type { Database } from "#app/db/database.server.ts";

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
