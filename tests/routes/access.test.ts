import { beforeAll, describe, expect, test } from "vitest";
import { useDatabase as makeApplicationUse } from "#app/db/database.server.ts";
import { makeKey } from "#app/people/apiKey.server.ts";
import { type Scope, scopeInfo, SCOPES } from "#app/people/key.ts";
import { may, type Permission } from "#app/people/permissions.ts";
import { type Acting, type Role, ROLES } from "#app/people/person.ts";
import { type Door, routePermissions } from "#app/people/routePermissions.ts";
import { addressOf, dataAddressOf, isApiPattern as isApi, routePatterns } from "#tests/support/manifest.ts";
import { makePerson, signedIn } from "#tests/support/people.ts";
import { useServer } from "#tests/support/server.ts";

/*
 * Every route of the manifest, asked for as nobody, as somebody without a role, as each role and with keys: as a page, as
 * the data of a page (the same address with .data), and by POST. What each may is the table of permissions; what the
 * service does is looked at from outside.
 */

const all = routePatterns();

test("every route has its line in app/people/routePermissions.ts, and every line its route", () => {
  expect(Object.keys(routePermissions).sort()).toEqual([...all].sort());
});

/** Fields that make each form of a revision's page complete, so that nothing but the permission can refuse it. */
const fields: Readonly<Record<string, Record<string, string>>> = {
  accept: { seen: "1:1" },
  "accept-clean": { digest: "0".repeat(64) },
  decline: { seen: "1:1", reason: "No." },
  "set-aside": { finding: "1", reason: "Known." },
  return: { remark: "Mend it." },
  comment: { body: "Why?" },
  answer: { comment: "1", body: "So." },
  rewrite: {
    line: "1",
    version: "1",
    value: "1.0",
    unit: "kJ/mol",
    uncertainty: "",
    kind: "none",
    reason: "Typed wrongly.",
  },
  "take-suggestion": { finding: "1", index: "0", seen: "1:1" },
  "take-out": { line: "1", reason: "No." },
  describe: { title: "A title", summary: "" },
  send: { remark: "" },
  withdraw: { reason: "No." },
};

interface Visitor {
  name: string;
  roles: readonly Role[];
  acting: Acting | null;
  cookie: string;
}
const visitors: Visitor[] = [];
const keys = new Map<string, { scopes: readonly Scope[]; roles: readonly Role[]; key: string }>();

const server = useServer({
  prepare: async (database) => {
    makeApplicationUse(database.app);
    visitors.push({ name: "nobody", roles: [], acting: null, cookie: "" });
    for (const roles of [[], ...ROLES.map((role) => [role])] as Role[][]) {
      const name = `walker ${roles[0] ?? "without role"}`;
      const acting = await makePerson(name, ...roles);
      visitors.push({ name, roles, acting, cookie: await signedIn(acting) });
    }
  },
});

beforeAll(async () => {
  makeApplicationUse(server.database.app);
  for (const { name, roles, acting } of visitors) {
    for (const scope of SCOPES) {
      if (!acting || !may(roles, scopeInfo[scope].permission)) continue;
      const { key } = await makeKey(acting, { name: "walk", scopes: [scope], days: 1 });
      keys.set(`${name} with ${scope}`, { scopes: [scope], roles, key });
    }
  }
});

/** What came of a request, in the words of the table. */
type Outcome = "let in" | "sent to sign in" | "nobody" | "refused" | "no such door" | "a fault";

async function outcomeOf(response: Response): Promise<Outcome> {
  const { status } = response;
  const body = await response.text();
  const to = response.headers.get("Location") ?? "";
  if (status >= 500) return "a fault";
  if (status === 401) return "nobody";
  if (status === 403) return "refused";
  if (status === 405) return "no such door";
  if (status >= 300 && status < 400 && to.startsWith("/sign-in?to=")) return "sent to sign in";
  // A redirect of a page's data: 202 with the address in the framework's own encoding.
  if (status === 202 && body.includes("/sign-in?to=")) return "sent to sign in";
  return "let in";
}

const isOpenTo = (door: Door, roles: readonly Role[]): boolean =>
  door === "public" || (typeof door === "string" && may(roles, door));

function get(address: string, cookie: string): Promise<Response> {
  return server.fetch(address, { headers: cookie ? { Cookie: cookie } : {} });
}

function post(address: string, cookie: string, body: Record<string, string> = {}): Promise<Response> {
  const headers = cookie ? { Cookie: cookie } : undefined;
  return server.fetch(address, { method: "POST", body: new URLSearchParams(body), ...(headers && { headers }) });
}

/** Signing out ends the walker's session, so that each time there is a new one. */
async function cookieFor(visitor: Visitor, pattern: string): Promise<string> {
  return visitor.acting && pattern === "/sign-out" ? signedIn(visitor.acting) : visitor.cookie;
}

describe.each(all.filter((pattern) => !isApi(pattern)).map((pattern) => [pattern]))("%s", (pattern) => {
  const doors = routePermissions[pattern] ?? { read: null, change: null };
  const address = addressOf(pattern);

  test("is read by whom the table says, as a page and as data", async () => {
    for (const { name, roles, acting, cookie } of visitors) {
      const shut = acting ? "refused" : "sent to sign in";
      const expected = doors.read === null ? "no such door" : isOpenTo(doors.read, roles) ? "let in" : shut;
      expect(await outcomeOf(await get(address, cookie)), `${name} reading ${address}`).toBe(expected);
      const data = dataAddressOf(address);
      expect(await outcomeOf(await get(data, cookie)), `${name} reading ${data}`).toBe(expected);
    }
  });

  test("is changed by whom the table says, by form and by script", async () => {
    for (const visitor of visitors) {
      const { name, roles, acting } = visitor;
      const shut = acting ? "refused" : "nobody";
      const expected = doors.change === null ? "no such door" : isOpenTo(doors.change, roles) ? "let in" : shut;
      for (const where of [address, dataAddressOf(address)]) {
        const got = await outcomeOf(await post(where, await cookieFor(visitor, pattern)));
        expect(got, `${name} posting to ${where}`).toBe(expected);
      }
    }
  });

  if (doors.intents)
    test("does for each what their roles allow, form by form", async () => {
      for (const [intent, permission] of Object.entries(doors.intents ?? {}) as [string, Permission][]) {
        for (const { name, roles, acting, cookie } of visitors) {
          const got = await outcomeOf(await post(address, cookie, { intent, ...fields[intent] }));
          const open = isOpenTo(doors.change, roles) && may(roles, permission);
          expect(got, `${name}: ${intent}`).toBe(open ? "let in" : acting ? "refused" : "nobody");
        }
      }
    });
});

describe.each(all.filter(isApi).map((pattern) => [pattern]))("%s", (pattern) => {
  const doors = routePermissions[pattern] ?? { read: null, change: null };
  const address = addressOf(pattern);
  const ask = (method: string, headers: Record<string, string>) =>
    server.fetch(address, { method, headers, ...(method === "POST" ? { body: "" } : {}) });

  test.each([
    ["GET", doors.read],
    ["POST", doors.change],
  ])("answers %s to keys only, and to those the table says", async (method, door) => {
    const scope = typeof door === "object" && door !== null ? door.scope : null;
    const without: Outcome = door === null ? "no such door" : door === "public" ? "let in" : "nobody";
    for (const { name, cookie } of visitors) {
      const got = await outcomeOf(await ask(method, cookie ? { Cookie: cookie } : {}));
      expect(got, `${name} with the cookie alone`).toBe(without);
    }
    for (const [name, { scopes, key }] of keys) {
      const got = await outcomeOf(await ask(method, { Authorization: `Bearer ${key}` }));
      const expected = scope === null ? without : scopes.includes(scope) ? "let in" : "refused";
      expect(got, `${name} by key`).toBe(expected);
    }
  });
});
