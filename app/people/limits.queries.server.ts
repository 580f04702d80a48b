import { createHash } from "node:crypto";
import { sql } from "kysely";
import type { Database } from "#app/db/database.server.ts";
import type { Limit } from "./limits.ts";

const LONGEST_WINDOW = 24 * 60 * 60 * 1000;

const hashOf = (subject: readonly string[]): Buffer => createHash("sha256").update(JSON.stringify(subject)).digest();

/**
 * Counts one try, in one statement, so that many at once are all counted.
 *
 * @param subject what the limit counts by
 * @returns the seconds to wait when the try is one too many, else 0
 */
export async function insertTry(limit: Limit, subject: readonly string[], now: Date, db: Database): Promise<number> {
  const opens = new Date(now.getTime() - limit.window);
  const { rows } = await sql<{ tries: number; began_at: Date }>`
    insert into try_count as c (limit_name, subject_hash, began_at, tries)
    values (${limit.name}, ${hashOf(subject)}, ${now}, 1)
    on conflict (limit_name, subject_hash) do update set
      -- The count stops a little above the limit, so that it cannot run over.
      tries = case when c.began_at <= ${opens} then 1 else least(c.tries + 1, ${limit.most + 1}) end,
      began_at = case when c.began_at <= ${opens} then excluded.began_at else c.began_at end
    returning tries, began_at
  `.execute(db);
  const { tries, began_at: began } = rows[0]!;
  return tries <= limit.most ? 0 : Math.max(1, Math.ceil((began.getTime() + limit.window - now.getTime()) / 1000));
}

/** Forgets the tries of a subject, and of every window long past. */
export async function deleteTries(limit: Limit, subject: readonly string[], now: Date, db: Database): Promise<void> {
  await db
    .deleteFrom("try_count")
    .where(({ eb, and, or }) =>
      or([
        and([eb("limit_name", "=", limit.name), eb("subject_hash", "=", hashOf(subject))]),
        eb("began_at", "<", new Date(now.getTime() - LONGEST_WINDOW)),
      ]),
    )
    .execute();
}

/** Takes one try back, for one that turned out to be no failure. The last one stays: it only keeps the window open. */
export async function updateTryTakenBack(limit: Limit, subject: readonly string[], db: Database): Promise<void> {
  await db
    .updateTable("try_count")
    .set(({ eb }) => ({ tries: eb("tries", "-", 1) }))
    .where("limit_name", "=", limit.name)
    .where("subject_hash", "=", hashOf(subject))
    .where("tries", ">", 1)
    .execute();
}
