import type { Database } from "#app/db/database.server.ts";

/** The two kinds of single-use links, each with a table of its own. */
export type LinkTable = "invitation" | "password_reset";

/** A link that can still be followed. */
export interface FoundLink {
  id: string;
  personId: string;
  email: string;
  name: string;
}

/** The link of a token, unless it was used, has run out or its person is switched off. */
export async function findLink(
  table: LinkTable,
  tokenHash: Buffer,
  now: Date,
  db: Database,
): Promise<FoundLink | undefined> {
  // Both tables have the columns read here; the compiler follows one name only.
  const source = table as "invitation";
  return db
    .selectFrom(`${source} as link`)
    .innerJoin("person", "person.id", "link.person_id")
    .where("link.token_hash", "=", tokenHash)
    .where("link.used_at", "is", null)
    .where("link.ends_at", ">", now)
    .where("person.switched_off_at", "is", null)
    .select(["link.id", "link.person_id as personId", "person.email", "person.name"])
    .executeTakeFirst();
}

export async function insertInvitation(
  link: { tokenHash: Buffer; personId: string; invitedBy: string | null; endsAt: Date },
  trx: Database,
): Promise<void> {
  await trx
    .insertInto("invitation")
    .values({ token_hash: link.tokenHash, person_id: link.personId, invited_by: link.invitedBy, ends_at: link.endsAt })
    .execute();
}

export async function insertReset(
  link: { tokenHash: Buffer; personId: string; endsAt: Date },
  trx: Database,
): Promise<void> {
  await trx
    .insertInto("password_reset")
    .values({ token_hash: link.tokenHash, person_id: link.personId, ends_at: link.endsAt })
    .execute();
}

/**
 * Marks a link as used.
 * @returns false when somebody else used it at the same moment
 */
export async function updateUsed(table: LinkTable, id: string, usedAt: Date, trx: Database): Promise<boolean> {
  const { numUpdatedRows } = await trx
    .updateTable(table)
    .set({ used_at: usedAt })
    .where("id", "=", id)
    .where("used_at", "is", null)
    .executeTakeFirst();
  return numUpdatedRows === 1n;
}

/** Voids whatever links a person still holds: once a password is set, no older letter sets another. */
export async function updateAllUsed(personId: string, usedAt: Date, trx: Database): Promise<void> {
  for (const table of ["invitation", "password_reset"] as const) {
    await trx
      .updateTable(table)
      .set({ used_at: usedAt })
      .where("person_id", "=", personId)
      .where("used_at", "is", null)
      .execute();
  }
}
