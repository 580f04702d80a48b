import { sql } from "kysely";
import type { Database } from "#app/db/database.server.ts";
import type { Person, Role } from "./person.ts";
import type { SessionTimes } from "./session.ts";

/** A session with the person it belongs to. */
export interface FoundSession extends SessionTimes {
  person: Person;
}

/** The session of a token, ended or not, unless its owner is switched off. One read with the roles of this moment. */
export async function findSession(tokenHash: Buffer, db: Database): Promise<FoundSession | undefined> {
  const row = await db
    .selectFrom("session")
    .innerJoin("person", "person.id", "session.person_id")
    .where("session.token_hash", "=", tokenHash)
    .where("person.switched_off_at", "is", null)
    .select((eb) => [
      "session.seen_at as seenAt",
      "session.ends_at as endsAt",
      "session.ended_at as endedAt",
      "person.id",
      "person.name",
      "person.email",
      sql<Role[]>`array(${eb
        .selectFrom("person_role")
        .select("person_role.role")
        .whereRef("person_role.person_id", "=", "person.id")
        .orderBy("person_role.role")})`.as("roles"),
    ])
    .executeTakeFirst();
  if (!row) return undefined;
  const { seenAt, endsAt, endedAt, ...person } = row;
  return { seenAt, endsAt, endedAt, person };
}

/** One line of the list of a person's sessions. `id` is the hash of its token in hexadecimal, which is no secret. */
export interface ListedSession {
  id: string;
  begunAt: Date;
  seenAt: Date;
  endsAt: Date;
  agent: string;
}

/** The sessions of a person that may still be used, the latest used first. */
export async function findSessions(
  personId: string,
  limits: { seenAfter: Date; now: Date },
  db: Database,
): Promise<ListedSession[]> {
  const rows = await db
    .selectFrom("session")
    .where("person_id", "=", personId)
    .where("ended_at", "is", null)
    .where("ends_at", ">", limits.now)
    .where("seen_at", ">", limits.seenAfter)
    .select(["token_hash", "begun_at as begunAt", "seen_at as seenAt", "ends_at as endsAt", "agent"])
    .orderBy("seen_at", "desc")
    .orderBy("begun_at", "desc")
    .limit(100)
    .execute();
  return rows.map(({ token_hash, ...row }) => ({ ...row, id: token_hash.toString("hex") }));
}

export async function insertSession(
  session: { tokenHash: Buffer; personId: string; agent: string; begunAt: Date; endsAt: Date },
  trx: Database,
): Promise<void> {
  await trx
    .insertInto("session")
    .values({
      token_hash: session.tokenHash,
      person_id: session.personId,
      agent: session.agent,
      begun_at: session.begunAt,
      seen_at: session.begunAt,
      ends_at: session.endsAt,
    })
    .execute();
}

export async function updateSeen(tokenHash: Buffer, seenAt: Date, db: Database): Promise<void> {
  await db
    .updateTable("session")
    .set({ seen_at: seenAt })
    .where("token_hash", "=", tokenHash)
    .where("seen_at", "<", seenAt)
    .execute();
}

/**
 * Ends sessions of a person that have not ended: all, only one, or all but one.
 * @returns how many were ended
 */
export async function updateEnded(
  personId: string,
  which: { only?: Buffer; but?: Buffer },
  endedAt: Date,
  trx: Database,
): Promise<number> {
  const { only, but } = which;
  const { numUpdatedRows } = await trx
    .updateTable("session")
    .set({ ended_at: endedAt })
    .where("person_id", "=", personId)
    .where("ended_at", "is", null)
    .$if(only !== undefined, (query) => query.where("token_hash", "=", only!))
    .$if(but !== undefined, (query) => query.where("token_hash", "!=", but!))
    .executeTakeFirst();
  return Number(numUpdatedRows);
}
