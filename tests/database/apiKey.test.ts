import { describe, expect, test } from "vitest";
import { Forbidden, Invalid, NotFound, Refused, Unauthenticated } from "#app/http/errors.ts";
import { findOwnKeys, makeKey, requireKey, withdrawKey } from "#app/people/apiKey.server.ts";
import { LONGEST_KEY_DAYS, MOST_KEYS } from "#app/people/key.ts";
import { giveRoles, switchOff } from "#app/people/people.server.ts";
import { useDatabase } from "#tests/support/database.ts";
import { actsOn, makePerson, signedIn } from "#tests/support/people.ts";

const database = useDatabase();
const reading = { name: "titration-2", scopes: ["read"], days: 30 } as const;
const asking = (authorization: string | null, headers: Record<string, string> = {}) =>
  new Request("http://localhost:3000/api/v1/editions", {
    headers: { ...headers, ...(authorization === null ? {} : { Authorization: authorization }) },
  });
const withKey = (key: string) => asking(`Bearer ${key}`);

describe("an API key", () => {
  test("acts for its owner, within its scope", async () => {
    const analyst = await makePerson("Key Owner", "analyst");
    const { id, key } = await makeKey(analyst, reading);
    expect(await requireKey(withKey(key), "read")).toEqual({ ...analyst, apiKeyId: id });
    await expect(requireKey(withKey(key), "sheets:write")).rejects.toThrow(Forbidden);
    expect(await actsOn(id)).toEqual(["key.made", "key.first-used"]);
  });

  test("is shown once: of its secret the database holds the SHA-256 only", async () => {
    const analyst = await makePerson("Secret Owner", "analyst");
    const { id, key } = await makeKey(analyst, reading);
    const secret = key.slice(key.indexOf(id) + id.length + 1);
    expect(Buffer.from(secret, "base64url").length).toBeGreaterThanOrEqual(16);
    const row = await database.owner.selectFrom("api_key").selectAll().where("id", "=", id).executeTakeFirstOrThrow();
    expect(row.secret_hash).toHaveLength(32);
    expect(JSON.stringify([row, await findOwnKeys(analyst)])).not.toContain(secret);
  });

  test("is taken from the Authorization header only, as a Bearer token", async () => {
    const analyst = await makePerson("Header Only", "analyst");
    const { key } = await makeKey(analyst, reading);
    const wrong = [
      asking(null),
      asking(key),
      asking(`Basic ${key}`),
      asking(`Bearer ${key} ${key}`),
      asking("Bearer "),
      asking(null, { "X-Api-Key": key }),
      asking(null, { Cookie: await signedIn(analyst) }),
      new Request(`http://localhost:3000/api/v1/editions?access_token=${key}`),
    ];
    for (const request of wrong) await expect(requireKey(request, "read")).rejects.toThrow(Unauthenticated);
    // RFC 9110: the scheme's name is the same in any case.
    expect(await requireKey(asking(`bearer ${key}`), "read")).toMatchObject({ person: { id: analyst.person.id } });
  });

  test("with a wrong secret, an unknown id or another key's id is refused", async () => {
    const analyst = await makePerson("Mistyped", "analyst");
    const [one, two] = [await makeKey(analyst, reading), await makeKey(analyst, reading)];
    const flipped = one.key.slice(0, -2) + (one.key.endsWith("AA") ? "BB" : "AA");
    for (const key of [flipped, one.key.replace(one.id, two.id), one.key.replace(one.id, "000000000000"), "twk_x_y"]) {
      await expect(requireKey(withKey(key), "read")).rejects.toThrow(Unauthenticated);
    }
  });

  test("is refused from its last day on", async () => {
    const now = new Date();
    const { key } = await makeKey(await makePerson("Short Lived", "analyst"), { ...reading, days: 1 }, now);
    const at = (milliseconds: number): Date => new Date(now.getTime() + milliseconds);
    await requireKey(withKey(key), "read", at(24 * 3600_000 - 1000));
    await expect(requireKey(withKey(key), "read", at(24 * 3600_000 + 1000))).rejects.toThrow("past its time");
  });

  test("is refused at once when withdrawn, which nobody but its owner can do", async () => {
    const [owner, other] = [await makePerson("Withdrawer", "analyst"), await makePerson("Stranger", "administrator")];
    const { id, key } = await makeKey(owner, reading);
    await expect(withdrawKey(other, id)).rejects.toThrow(NotFound);
    await requireKey(withKey(key), "read");
    await withdrawKey(owner, id);
    await expect(requireKey(withKey(key), "read")).rejects.toThrow("was withdrawn");
    await expect(withdrawKey(owner, id)).rejects.toThrow(NotFound);
    expect(await actsOn(id)).toEqual(["key.made", "key.first-used", "key.withdrawn"]);
  });

  test("falls with its owner's account, and with the role its scope needs", async () => {
    const admin = await makePerson("Key Admin", "administrator");
    const steward = await makePerson("Key Steward", "steward");
    const { key } = await makeKey(steward, { ...reading, scopes: ["read", "sheets:write"] });
    await requireKey(withKey(key), "sheets:write");
    await giveRoles(admin, steward.person.id, ["analyst"]);
    await expect(requireKey(withKey(key), "sheets:write")).rejects.toThrow(Forbidden);
    await requireKey(withKey(key), "read");
    await switchOff(admin, steward.person.id);
    await expect(requireKey(withKey(key), "read")).rejects.toThrow(Unauthenticated);
  });

  test("shows when it was last used, to the minute", async () => {
    const analyst = await makePerson("Last Used", "analyst");
    const begun = new Date();
    const { key } = await makeKey(analyst, reading, begun);
    const lastUsed = async () => (await findOwnKeys(analyst))[0]?.lastUsedAt?.getTime() ?? null;
    expect(await lastUsed()).toBeNull();
    await requireKey(withKey(key), "read", begun);
    await requireKey(withKey(key), "read", new Date(begun.getTime() + 59_000));
    expect(await lastUsed()).toBe(begun.getTime());
    await requireKey(withKey(key), "read", new Date(begun.getTime() + 61_000));
    expect(await lastUsed()).toBe(begun.getTime() + 61_000);
  });
});

describe("making a key", () => {
  test("for handing in sheets needs the steward's role", async () => {
    const analyst = await makePerson("No Steward", "analyst");
    await expect(makeKey(analyst, { ...reading, scopes: ["sheets:write"] })).rejects.toThrow(Forbidden);
    expect(await findOwnKeys(analyst)).toEqual([]);
  });

  test.each([
    [{ name: " " }, "/name"],
    [{ name: "n".repeat(81) }, "/name"],
    [{ name: "a\nb" }, "/name"],
    [{ scopes: [] }, "/scopes"],
    [{ days: 0 }, "/days"],
    [{ days: 1.5 }, "/days"],
    [{ days: LONGEST_KEY_DAYS + 1 }, "/days"],
  ])("with %j is refused at %s", async (change, pointer) => {
    const owner = {
      person: { id: "", name: "", email: "", roles: ["analyst"] as const },
      apiKeyId: null,
      requestId: null,
    };
    const error: unknown = await makeKey(owner, { ...reading, ...change }).catch((thrown: unknown) => thrown);
    expect(error).toBeInstanceOf(Invalid);
    expect((error as Invalid).errors.map((one) => one.pointer)).toEqual([pointer]);
  });

  test(`stops at ${MOST_KEYS} in use; a withdrawn one makes room`, async () => {
    const analyst = await makePerson("Collector", "analyst");
    for (let made = 0; made < MOST_KEYS; made++) await makeKey(analyst, reading);
    await expect(makeKey(analyst, reading)).rejects.toThrow(Refused);
    await withdrawKey(analyst, (await findOwnKeys(analyst))[0]!.id);
    await makeKey(analyst, reading);
  });
});
