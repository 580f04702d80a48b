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
