import { database } from "#app/db/database.server.ts";
import { hashPassword } from "#app/people/passwordHash.server.ts";
import { insertPerson, replaceRoles } from "#app/people/people.queries.server.ts";
import type { Acting, Role } from "#app/people/person.ts";
import { SESSION_COOKIE } from "#app/people/sessionCookie.server.ts";
import { beginSession } from "#app/people/sessions.server.ts";

/** The password of everybody whom `makePerson` makes. */
export const PASSWORD = "seven grey kettles";

let hash: Promise<string> | undefined;

/** An account with a password, ready to act and to sign in. The address is made from the name. */
export async function makePerson(name: string, ...roles: Role[]): Promise<Acting> {
  hash ??= hashPassword(PASSWORD);
  const email = `${name.toLowerCase().replace(/[^a-z0-9]+/g, ".")}@calderpoint.example`;
  const id = await insertPerson({ email, name, passwordHash: await hash }, database());
  await replaceRoles(id, roles, null, database());
  return { person: { id, name, email, roles }, apiKeyId: null, requestId: null };
}

/** Begins a session without the sign-in page and gives the `Cookie` header that carries it. */
export async function signedIn({ person }: Acting, now: Date = new Date()): Promise<string> {
  const token = await beginSession(person, { agent: "test", formerToken: null, requestId: null }, now);
  return `${SESSION_COOKIE}=${token}`;
}

/** The acts on record about an object, oldest first. */
export async function actsOn(objectId: string): Promise<string[]> {
  const rows = await database()
    .selectFrom("audit_entry")
    .select("act")
    .where("object_id", "=", objectId)
    .orderBy("number")
    .execute();
  return rows.map(({ act }) => act);
}
