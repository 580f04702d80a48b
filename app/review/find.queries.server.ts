import type { Database } from "#app/db/database.server.ts";

/** A text to be found as it is within another: % and _ stand for themselves. */
function partOf(text: string): string {
  return `%${text.replace(/[\\%_]/g, "\\$&")}%`;
}

/** Sheets by a part of their name, or the one of this number; the newest first. */
export async function findSheetsLike(text: string | null, number: number | null, limit: number, db: Database) {
  return db
    .selectFrom("sheet as s")
    .where((eb) =>
      eb.or([
        ...(text === null ? [] : [eb("s.name", "ilike", partOf(text))]),
        ...(number === null ? [] : [eb("s.id", "=", number)]),
      ]),
    )
    .select(["s.id", "s.name"])
    .orderBy("s.id", "desc")
    .limit(limit)
    .execute();
}

/** People by a part of their name or address. */
export async function findPeopleLike(text: string, limit: number, db: Database) {
  return db
    .selectFrom("person as p")
    .where((eb) => eb.or([eb("p.name", "ilike", partOf(text)), eb("p.email", "ilike", partOf(text))]))
    .select(["p.id", "p.name", "p.email"])
    .orderBy("p.name")
    .limit(limit)
    .execute();
}
