import { beforeAll, describe, expect, test } from "vitest";
import { useDatabase as makeApplicationUse } from "#app/db/database.server.ts";
import { makeKey } from "#app/people/apiKey.server.ts";
import { SCOPES } from "#app/people/key.ts";
import { ROLES } from "#app/people/person.ts";
import { addressOf, dataAddressOf, isApiPattern, routePatterns } from "#tests/support/manifest.ts";
import { makePerson, signedIn } from "#tests/support/people.ts";
import { useServer } from "#tests/support/server.ts";

/*
 * Every address of the manifest is sent what no page of ours would send, by somebody who holds every role. Each answer is
 * a refusal in the 400s, and the server goes on answering. useServer looks at the log for errors nobody foresaw.
 */

let cookie = "";
let key = "";
const server = useServer({
  prepare: async ({ app }) => {
    makeApplicationUse(app);
    const acting = await makePerson("Everybody At Once", ...ROLES);
    cookie = await signedIn(acting);
    key = (await makeKey(acting, { name: "broken", scopes: [...SCOPES], days: 1 })).key;
  },
});
beforeAll(() => {
  makeApplicationUse(server.database.app);
});

const all = routePatterns();
const BOUNDARY = "multipart/form-data; boundary=b";

const bodies: readonly [what: string, type: string | null, body: string][] = [
  ["JSON", "application/json", '{"intent":"accept"}'],
  ["JSON broken off", "application/json", '{"intent":'],
  ["plain text", "text/plain", "intent=accept"],
  ["no type", null, "intent=accept"],
  ["a type that is none", "form", "intent=accept"],
  ["multipart broken off in a head", BOUNDARY, "--b\r\nContent-Disposition: form-data; na"],
  ["multipart broken off in a part", BOUNDARY, '--b\r\nContent-Disposition: form-data; name="intent"\r\n\r\nacc'],
  ["multipart without a boundary", "multipart/form-data", "--b\r\n"],
  ["multipart of nothing", BOUNDARY, ""],
  ["NUL in a field", "application/x-www-form-urlencoded", "intent=a%00b&email=a%00b&name=%00&password=%00"],
];

/** Programs come with their key, people with their cookie. */
function asking(address: string): Record<string, string> {
  return isApiPattern(address) ? { Authorization: `Bearer ${key}` } : { Cookie: cookie };
}

async function statusOf(address: string, type: string | null, body: string, more: Record<string, string> = {}) {
  const headers = { ...asking(address), ...(type ? { "Content-Type": type } : {}), ...more };
  const answer = await server.fetch(address, {
    method: "POST",
    // Bytes, so that fetch adds no type of its own.
    body: new TextEncoder().encode(body),
    headers,
  });
  await answer.arrayBuffer();
  return answer.status;
}

const isRefusal = (status: number): boolean => status >= 400 && status < 500;

describe.each(all.filter((pattern) => pattern !== "/sign-out").map((pattern) => [pattern]))("%s", (pattern) => {
  const address = addressOf(pattern);

  test.each(bodies)("refuses %s", async (_what, type, body) => {
    const where = isApiPattern(pattern) ? [address] : [address, dataAddressOf(address)];
    for (const one of where) {
      const status = await statusOf(one, type, body);
      expect(isRefusal(status), `${one} answered ${status}`).toBe(true);
    }
  });

  if (!isApiPattern(pattern))
    test("refuses a form that another site sends", async () => {
      for (const one of [address, dataAddressOf(address)]) {
        const form = ["application/x-www-form-urlencoded", "intent=accept"] as const;
        expect(await statusOf(one, ...form, { Origin: "https://elsewhere.example" })).toBe(403);
        expect(await statusOf(one, ...form, { "Sec-Fetch-Site": "cross-site" })).toBe(403);
      }
    });

  test.each(["PUT", "PATCH", "DELETE", "OPTIONS", "HEAD"])("answers %s without a fault", async (method) => {
    const answer = await server.fetch(address, { method, headers: asking(address) });
    await answer.arrayBuffer();
    expect(answer.status).toBeLessThan(500);
  });
});

// Signing out reads no form: whatever is sent from our own site ends the session. From another site it must not.
test("/sign-out refuses what another site sends", async () => {
  const form = ["application/x-www-form-urlencoded", ""] as const;
  expect(await statusOf("/sign-out", ...form, { Origin: "https://elsewhere.example" })).toBe(403);
});

test("the server still answers", async () => {
  expect((await server.fetch("/healthz")).status).toBe(200);
  expect((await server.fetch("/conventions", { headers: { Cookie: cookie } })).status).toBe(200);
});
