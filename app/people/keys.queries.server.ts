import { sql } from "kysely";
import type { Database } from "#app/db/database.server.ts";
import type { Scope } from "./key.ts";
import type { Person, Role } from "./person.ts";

/** A key with its owner, as a request needs it. */
export interface FoundKey {
  id: string;
  name: string;
  secretHash: Buffer;
  scopes: readonly Scope[];
  endsAt: Date;
  withdrawnAt: Date | null;
  lastUsedAt: Date | null;
  ownerSwitchedOffAt: Date | null;
  owner: Person;
}

export async function findKey(id: string, db: Database): Promise<FoundKey | undefined> {
  const row = await db
    .selectFrom("api_key")
    .innerJoin("person", "person.id", "api_key.person_id")
    .where("api_key.id", "=", id)
    .select((eb) => [
      "api_key.name as keyName",
      "api_key.secret_hash",
      "api_key.scopes",
      "api_key.ends_at",
      "api_key.withdrawn_at",
      "api_key.last_used_at",
      "person.id as person_id",
      "person.name",
      "person.email",
      "person.switched_off_at",
      sql<Role[]>`array(${eb
        .selectFrom("person_role")
        .select("person_role.role")
        .whereRef("person_role.person_id", "=", "person.id")
        .orderBy("person_role.role")})`.as("roles"),
    ])
    .executeTakeFirst();
  return (
    row && {
      id,
      name: row.keyName,
      secretHash: row.secret_hash,
      scopes: row.scopes as Scope[],
      endsAt: row.ends_at,
      withdrawnAt: row.withdrawn_at,
      lastUsedAt: row.last_used_at,
      ownerSwitchedOffAt: row.switched_off_at,
      owner: { id: row.person_id, name: row.name, email: row.email, roles: row.roles },
    }
  );
}

/** One line of the list of a person's keys. */
export interface ListedKey {
  id: string;
  name: string;
  scopes: readonly Scope[];
  madeAt: Date;
  endsAt: Date;
  withdrawnAt: Date | null;
  lastUsedAt: Date | null;
}

/** A person's keys, the newest first; at most 200. */
export async function findKeys(personId: string, db: Database): Promise<ListedKey[]> {
  const rows = await db
    .selectFrom("api_key")
    .where("person_id", "=", personId)
    .select([
      "id",
      "name",
      "scopes",
      "made_at as madeAt",
      "ends_at as endsAt",
      "withdrawn_at as withdrawnAt",
      "last_used_at as lastUsedAt",
    ])
    .orderBy("made_at", "desc")
    .orderBy("id")
    .limit(200)
    .execute();
  return rows.map((row) => ({ ...row, scopes: row.scopes as Scope[] }));
}

/** How many keys of a person can be used at a moment. */
export async function countKeys(personId: string, now: Date, db: Database): Promise<number> {
  const { count } = await db
    .selectFrom("api_key")
    .where("person_id", "=", personId)
    .where("withdrawn_at", "is", null)
    .where("ends_at", ">", now)
    .select(({ fn }) => fn.countAll<string>().as("count"))
    .executeTakeFirstOrThrow();
  return Number(count);
}

export async function insertKey(
  key: {
    id: string;
    personId: string;
    name: string;
    scopes: readonly Scope[];
    secretHash: Buffer;
    madeAt: Date;
    endsAt: Date;
  },
  trx: Database,
): Promise<void> {
  await trx
    .insertInto("api_key")
    .values({
      id: key.id,
      person_id: key.personId,
      name: key.name,
      scopes: [...key.scopes],
      secret_hash: key.secretHash,
      made_at: key.madeAt,
      ends_at: key.endsAt,
    })
    .execute();
}

/**
 * Withdraws a key of this person.
 * @returns false when the person has no such key, or it was withdrawn before
 */
export async function updateWithdrawn(id: string, personId: string, at: Date, trx: Database): Promise<boolean> {
  const { numUpdatedRows } = await trx
    .updateTable("api_key")
    .set({ withdrawn_at: at })
    .where("id", "=", id)
    .where("person_id", "=", personId)
    .where("withdrawn_at", "is", null)
    .executeTakeFirst();
  return numUpdatedRows === 1n;
}

/**
 * Dates the use of a key that was never used.
 * @returns false when another request was first
 */
export async function updateFirstUsed(id: string, at: Date, trx: Database): Promise<boolean> {
  const { numUpdatedRows } = await trx
    .updateTable("api_key")
    .set({ last_used_at: at })
    .where("id", "=", id)
    .where("last_used_at", "is", null)
    .executeTakeFirst();
  return numUpdatedRows === 1n;
}

export async function updateLastUsed(id: string, at: Date, db: Database): Promise<void> {
  await db.updateTable("api_key").set({ last_used_at: at }).where("id", "=", id).execute();
}
