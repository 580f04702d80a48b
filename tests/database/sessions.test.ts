import { createHash } from "node:crypto";
import { describe, expect, test } from "vitest";
import { Forbidden, NotFound, Unauthenticated } from "#app/http/errors.ts";
import { endSessionsOf, giveRoles, switchOff } from "#app/people/people.server.ts";
import type { Acting } from "#app/people/person.ts";
import { ABSOLUTE_LIMIT, IDLE_LIMIT, MOST_SESSIONS } from "#app/people/session.ts";
import { SESSION_COOKIE, sessionCookie } from "#app/people/sessionCookie.server.ts";
import { beginSession, endOwnSessions, findHolder, findOwnSessions, signOut } from "#app/people/sessions.server.ts";
import { findVisitor, requireActing } from "#app/people/visitor.server.ts";
import { useDatabase } from "#tests/support/database.ts";
import { actsOn, makePerson, signedIn } from "#tests/support/people.ts";

const database = useDatabase();
const from = { agent: "a browser", formerToken: null, requestId: null };
const begin = ({ person }: Acting, now?: Date) => beginSession(person, from, now);
const page = (path: string, init: { cookie?: string; method?: string } = {}) =>
  new Request(`http://localhost:3000${path}`, {
    method: init.method ?? "GET",
    headers: init.cookie ? { Cookie: init.cookie, "X-Request-Id": "request-1" } : {},
  });

describe("a session", () => {
  test("has a token of 256 random bits, of which the database holds the SHA-256 only", async () => {
    const analyst = await makePerson("Token Holder", "analyst");
    const token = await begin(analyst);
    expect(Buffer.from(token, "base64url")).toHaveLength(32);
    const { token_hash: stored } = await database.owner
      .selectFrom("session")
      .select("token_hash")
      .where("person_id", "=", analyst.person.id)
      .executeTakeFirstOrThrow();
    expect(stored.equals(createHash("sha256").update(token).digest())).toBe(true);
  });

  test("ends twelve hours after its last use, to the second", async () => {
    const begun = new Date("2026-03-02T08:00:00Z");
    const at = (milliseconds: number): Date => new Date(begun.getTime() + milliseconds);
    const token = await begin(await makePerson("Idle Hands", "analyst"), begun);
    // A use puts the limit off …
    expect(await findHolder(token, at(IDLE_LIMIT - 1000))).not.toBeNull();
    expect(await findHolder(token, at(2 * IDLE_LIMIT - 2000))).not.toBeNull();
    // … and twelve hours after the last one it is over.
    expect(await findHolder(token, at(3 * IDLE_LIMIT - 2000))).toBeNull();
  });

  test("ends seven days after sign-in however much it is used", async () => {
    const begun = new Date("2026-03-02T08:00:00Z");
    const token = await begin(await makePerson("Tireless", "analyst"), begun);
    for (let used = 0; used < ABSOLUTE_LIMIT - 1000; used += IDLE_LIMIT / 2) {
      expect(await findHolder(token, new Date(begun.getTime() + used))).not.toBeNull();
    }
    expect(await findHolder(token, new Date(begun.getTime() + ABSOLUTE_LIMIT - 1000))).not.toBeNull();
    expect(await findHolder(token, new Date(begun.getTime() + ABSOLUTE_LIMIT + 1000))).toBeNull();
  });

  test("gets a new token at the next sign-in, which ends the one the browser held", async () => {
    const analyst = await makePerson("Twice", "analyst");
    const first = await begin(analyst);
    const second = await beginSession(analyst.person, { ...from, formerToken: first });
    expect(second).not.toBe(first);
    expect(await findHolder(first)).toBeNull();
    expect(await findHolder(second)).not.toBeNull();
  });

  test("of another person, left open in the same browser, ends when somebody signs in over it", async () => {
    const [analyst, other] = [await makePerson("Before", "analyst"), await makePerson("After", "analyst")];
    const left = await begin(analyst);
    await beginSession(other.person, { ...from, formerToken: left });
    expect(await findHolder(left)).toBeNull();
  });

  test("beyond the allowed number ends the one unused for longest", async () => {
    const analyst = await makePerson("Everywhere", "analyst");
    const tokens: string[] = [];
    for (let run = 0; run <= MOST_SESSIONS; run++) {
      tokens.push(await begin(analyst, new Date(Date.now() - 60_000 + run * 1000)));
    }
    expect(await findHolder(tokens[0]!)).toBeNull();
    expect(await findOwnSessions(analyst)).toHaveLength(MOST_SESSIONS);
  });

  test("is over once signed out, also for whoever kept the token", async () => {
    const analyst = await makePerson("Signed Out", "analyst");
    const token = await begin(analyst);
    const holder = await findHolder(token);
    await signOut(analyst, holder!.sessionId);
    expect(await findHolder(token)).toBeNull();
    expect(await actsOn(analyst.person.id)).toEqual(["person.signed-in", "person.signed-out"]);
  });

  test("can be ended by its owner from another one, and nobody else's can", async () => {
    const analyst = await makePerson("Owner", "analyst");
    const other = await makePerson("Other Person", "analyst");
    const [here, there, theirs] = [await begin(analyst), await begin(analyst), await begin(other)];
    const theirId = (await findHolder(theirs))!.sessionId;
    await expect(endOwnSessions(analyst, { only: theirId })).rejects.toThrow(NotFound);
    expect(await findHolder(theirs)).not.toBeNull();
    await endOwnSessions(analyst, { but: (await findHolder(here))!.sessionId });
    expect(await findHolder(there)).toBeNull();
    expect(await findHolder(here)).not.toBeNull();
  });

  test("ends when an administrator ends it, and nobody else may", async () => {
    const admin = await makePerson("Session Admin", "administrator");
    const analyst = await makePerson("Ended", "analyst");
    const tokens = [await begin(analyst), await begin(analyst)];
    await expect(endSessionsOf(analyst, admin.person.id)).rejects.toThrow(Forbidden);
    expect(await endSessionsOf(admin, analyst.person.id)).toBe(2);
    for (const token of tokens) expect(await findHolder(token)).toBeNull();
  });
});

describe("who is behind a request", () => {
  test("is nobody without a cookie, with a mistyped one and with an unknown token", async () => {
    for (const cookie of [undefined, `${SESSION_COOKIE}=nonsense`, `${SESSION_COOKIE}=${"a".repeat(43)}`, "other=1"]) {
      expect(await findVisitor(page("/", cookie === undefined ? {} : { cookie }))).toBeNull();
    }
  });

  test("is found among other cookies, with the roles of this moment", async () => {
    const admin = await makePerson("Role Giver", "administrator");
    const analyst = await makePerson("Promoted", "analyst");
    const cookie = `a=1; ${await signedIn(analyst)}; b=2`;
    expect(await findVisitor(page("/", { cookie }))).toMatchObject({ id: analyst.person.id, roles: ["analyst"] });
    await giveRoles(admin, analyst.person.id, ["analyst", "steward"]);
    expect(await findVisitor(page("/", { cookie }))).toMatchObject({ roles: ["analyst", "steward"] });
  });

  test("may act, with the request's id for the record", async () => {
    const analyst = await makePerson("Acting", "analyst");
    const acting = await requireActing(page("/account", { cookie: await signedIn(analyst) }), "account:own");
    expect(acting).toEqual({ ...analyst, requestId: "request-1" });
  });

  test("without the role is refused, from the next request after it was taken away", async () => {
    const admin = await makePerson("Role Taker", "administrator");
    const steward = await makePerson("Demoted", "steward");
    const cookie = await signedIn(steward);
    await requireActing(page("/sheets/new", { cookie }), "sheet:work");
    await giveRoles(admin, steward.person.id, ["analyst"]);
    await expect(requireActing(page("/sheets/new", { cookie }), "sheet:work")).rejects.toThrow(Forbidden);
  });

  test("is nobody from the next request after the account was switched off", async () => {
    const admin = await makePerson("Switcher", "administrator");
    const analyst = await makePerson("Gone", "analyst");
    const cookie = await signedIn(analyst);
    await switchOff(admin, analyst.person.id);
    expect(await findVisitor(page("/", { cookie }))).toBeNull();
  });

  test.each([
    ["/revisions/12?x=1", "/sign-in?to=%2Frevisions%2F12%3Fx%3D1"],
    ["/revisions/12.data?_routes=routes%2Frevision", "/sign-in?to=%2Frevisions%2F12"],
    ["/", "/sign-in"],
    ["/_root.data", "/sign-in"],
  ])("nobody, asking to read %s, is sent to %s", async (path, to) => {
    const thrown: unknown = await requireActing(page(path), "table:read").catch((error: unknown) => error);
    expect(thrown).toBeInstanceOf(Response);
    expect((thrown as Response).status).toBe(302);
    expect((thrown as Response).headers.get("Location")).toBe(to);
  });

  test("nobody, asking to change something, is refused", async () => {
    await expect(requireActing(page("/publish", { method: "POST" }), "edition:publish")).rejects.toThrow(
      Unauthenticated,
    );
  });
});

test("the cookie is bound to this host, closed to scripts and sent over TLS only", () => {
  // ASVS 3.3.1 to 3.3.4.
  expect(sessionCookie("token")).toBe("__Host-tablewright=token; Path=/; Secure; HttpOnly; SameSite=Lax");
});
