import { type ExpressionBuilder, sql } from "kysely";
import type { Database } from "#app/db/database.server.ts";
import type { DB } from "#app/db/types.ts";
import type { AccountState, Person, Role } from "./person.ts";

const PEOPLE_LOCK = 7270919;
const MOST_PEOPLE = 1000;

/** An account with what only this room may see. */
export interface Account extends Person {
  passwordHash: string | null;
  switchedOffAt: Date | null;
  createdAt: Date;
}

function accounts(db: Database) {
  return db
    .selectFrom("person")
    .select((eb) => [
      "person.id",
      "person.email",
      "person.name",
      "person.password_hash as passwordHash",
      "person.switched_off_at as switchedOffAt",
      "person.created_at as createdAt",
      sql<Role[]>`array(${eb
        .selectFrom("person_role")
        .select("person_role.role")
        .whereRef("person_role.person_id", "=", "person.id")
        .orderBy("person_role.role")})`.as("roles"),
    ]);
}

export async function findAccount(id: string, db: Database): Promise<Account | undefined> {
  return accounts(db).where("person.id", "=", id).executeTakeFirst();
}

/** @param email as `readEmail` gives it */
export async function findAccountByEmail(email: string, db: Database): Promise<Account | undefined> {
  return accounts(db).where("person.email", "=", email).executeTakeFirst();
}

/** Which accounts are looked for; what is left out does not restrict. */
export interface PeopleFilter {
  /** Part of the name or the address. */
  text?: string | undefined;
  role?: Role | undefined;
  state?: AccountState | undefined;
}

/** An account with what the administrator's list says of it. */
export interface AccountLine extends Account {
  lastSignIn: Date | null;
  /** Sessions that can still be used. */
  sessions: number;
}

/** The accounts that fit, those who may sign in first, by name; at most 1000. */
export async function findAccountLines(
  filter: PeopleFilter,
  limits: { seenAfter: Date; now: Date },
  db: Database,
): Promise<AccountLine[]> {
  const { text, role, state } = filter;
  let query = accounts(db).select((eb) => [
    eb
      .selectFrom("session")
      .whereRef("session.person_id", "=", "person.id")
      .select(({ fn }) => fn.max("session.begun_at").as("at"))
      .as("lastSignIn"),
    eb
      .selectFrom("session")
      .whereRef("session.person_id", "=", "person.id")
      .where("session.ended_at", "is", null)
      .where("session.ends_at", ">", limits.now)
      .where("session.seen_at", ">", limits.seenAfter)
      .select(({ fn }) => fn.countAll<string>().as("count"))
      .as("sessions"),
  ]);
  if (text) {
    const part = `%${text.replace(/[\\%_]/g, "\\$&")}%`;
    query = query.where((eb) => eb.or([eb("person.name", "ilike", part), eb("person.email", "ilike", part)]));
  }
  if (role) query = query.where(holds(role));
  if (state === "switched off") query = query.where("person.switched_off_at", "is not", null);
  else if (state) {
    query = query
      .where("person.switched_off_at", "is", null)
      .where("person.password_hash", state === "invited" ? "is" : "is not", null);
  }
  const rows = await query
    .orderBy(sql`person.switched_off_at is not null`)
    .orderBy("person.name")
    .orderBy("person.email")
    .limit(MOST_PEOPLE)
    .execute();
  return rows.map((row) => ({ ...row, sessions: Number(row.sessions ?? 0) }));
}

function holds(role: Role) {
  return ({ exists, selectFrom }: ExpressionBuilder<DB, "person">) =>
    exists(
      selectFrom("person_role")
        .select("person_role.role")
        .whereRef("person_role.person_id", "=", "person.id")
        .where("person_role.role", "=", role),
    );
}

/** Everybody with this role whose account is in use. */
export async function findPeopleWithRole(role: Role, db: Database): Promise<Person[]> {
  const found = await accounts(db)
    .where("person.switched_off_at", "is", null)
    .where(holds(role))
    .orderBy("person.email")
    .limit(MOST_PEOPLE)
    .execute();
  return found.map(asPerson);
}

/** The account without what only this room may see. */
export function asPerson({ id, email, name, roles }: Account): Person {
  return { id, email, name, roles };
}

/** Administrators who can sign in: not switched off, with a password. */
export async function countAdministrators(db: Database): Promise<number> {
  const { count } = await db
    .selectFrom("person")
    .innerJoin("person_role", "person_role.person_id", "person.id")
    .where("person_role.role", "=", "administrator")
    .where("person.switched_off_at", "is", null)
    .where("person.password_hash", "is not", null)
    .select(({ fn }) => fn.countAll<string>().as("count"))
    .executeTakeFirstOrThrow();
  return Number(count);
}

/** Holds back every other change of roles and accounts until the transaction ends. */
export async function lockPeople(trx: Database): Promise<void> {
  await sql`select pg_advisory_xact_lock(${PEOPLE_LOCK})`.execute(trx);
}

export async function insertPerson(
  person: { email: string; name: string; passwordHash: string | null },
  trx: Database,
): Promise<string> {
  const { id } = await trx
    .insertInto("person")
    .values({ email: person.email, name: person.name, password_hash: person.passwordHash })
    .returning("id")
    .executeTakeFirstOrThrow();
  return id;
}

/** Makes these the person's roles, and no others. */
export async function replaceRoles(
  personId: string,
  roles: readonly Role[],
  givenBy: string | null,
  trx: Database,
): Promise<void> {
  await trx
    .deleteFrom("person_role")
    .where("person_id", "=", personId)
    .$if(roles.length > 0, (query) => query.where("role", "not in", [...roles]))
    .execute();
  if (roles.length === 0) return;
  await trx
    .insertInto("person_role")
    .values(roles.map((role) => ({ person_id: personId, role, given_by: givenBy })))
    .onConflict((conflict) => conflict.columns(["person_id", "role"]).doNothing())
    .execute();
}

export async function updatePassword(personId: string, passwordHash: string, trx: Database): Promise<void> {
  await trx.updateTable("person").set({ password_hash: passwordHash }).where("id", "=", personId).execute();
}

/** @param at when the account is switched off, or null to switch it on again */
export async function updateSwitchedOff(personId: string, at: Date | null, trx: Database): Promise<void> {
  await trx.updateTable("person").set({ switched_off_at: at }).where("id", "=", personId).execute();
}

/** Writes the name, the address or both anew. */
export async function updateAccount(
  personId: string,
  changes: { name?: string; email?: string },
  trx: Database,
): Promise<void> {
  await trx.updateTable("person").set(changes).where("id", "=", personId).execute();
}
