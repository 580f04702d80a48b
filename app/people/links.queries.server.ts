import type { Database } from "#app/db/database.server.ts";

/** The two kinds of single-use links that set a password, each with a table of its own. */
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

/** A confirmation of a new address that can still be used. */
export interface FoundAddressChange extends FoundLink {
  /** The address that the account is to take; `email` is the one it has. */
  newEmail: string;
}

export async function findAddressChange(
  tokenHash: Buffer,
  now: Date,
  db: Database,
): Promise<FoundAddressChange | undefined> {
  return db
    .selectFrom("address_change as link")
    .innerJoin("person", "person.id", "link.person_id")
    .where("link.token_hash", "=", tokenHash)
    .where("link.used_at", "is", null)
    .where("link.ends_at", ">", now)
    .where("person.switched_off_at", "is", null)
    .select(["link.id", "link.person_id as personId", "link.email as newEmail", "person.email", "person.name"])
    .executeTakeFirst();
}

export async function insertAddressChange(
  link: { tokenHash: Buffer; personId: string; email: string; endsAt: Date },
  db: Database,
): Promise<void> {
  await db
    .insertInto("address_change")
    .values({ token_hash: link.tokenHash, person_id: link.personId, email: link.email, ends_at: link.endsAt })
    .execute();
}

/** When the newest invitation of a person that can still be taken up runs out; undefined when there is none. */
export async function findInvitationEnd(personId: string, db: Database): Promise<{ endsAt: Date } | undefined> {
  return db
    .selectFrom("invitation")
    .where("person_id", "=", personId)
    .where("used_at", "is", null)
    .select("ends_at as endsAt")
    .orderBy("ends_at", "desc")
    .limit(1)
    .executeTakeFirst();
}

/**
 * Marks a link as used.
 * @returns false when somebody else used it at the same moment
 */
export async function updateUsed(
  table: LinkTable | "address_change",
  id: string,
  usedAt: Date,
  trx: Database,
): Promise<boolean> {
  const { numUpdatedRows } = await trx
    .updateTable(table)
    .set({ used_at: usedAt })
    .where("id", "=", id)
    .where("used_at", "is", null)
    .executeTakeFirst();
  return numUpdatedRows === 1n;
}

/** Voids whatever links a person still holds: once password or address are set, no older letter sets another. */
export async function updateAllUsed(personId: string, usedAt: Date, trx: Database): Promise<void> {
  for (const table of ["invitation", "password_reset", "address_change"] as const) {
    await trx
      .updateTable(table)
      .set({ used_at: usedAt })
      .where("person_id", "=", personId)
      .where("used_at", "is", null)
      .execute();
  }
}
