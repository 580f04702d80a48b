import { connect } from "node:net";
import { describe, expect, test } from "vitest";
import { useServer } from "#tests/support/server.ts";

const server = useServer();

/** Sends bytes as they are and gives back what comes, for what no client library would send. */
async function sendRaw(bytes: string): Promise<string> {
  return new Promise((resolve, reject) => {
    const socket = connect(server.port, "127.0.0.1", () => socket.end(bytes));
    let answer = "";
    socket.setEncoding("utf8").on("data", (text: string) => (answer += text));
    socket.on("error", reject).on("close", () => resolve(answer));
  });
}

async function stillAnswers(): Promise<void> {
  const answer = await server.fetch("/healthz");
  expect(answer.status).toBe(200);
  expect(await answer.json()).toEqual({ status: "ok" });
}

describe("what cannot be a request to this service", () => {
  const host = (): string => `Host: 127.0.0.1:${server.port}`;

  test.each([
    ["two slashes", "GET // HTTP/1.1", undefined, 400],
    ["a foreign host behind two slashes", "GET //elsewhere.example/ HTTP/1.1", undefined, 400],
    ["the absolute form", "GET http://elsewhere.example/ HTTP/1.1", undefined, 400],
    ["a bad percent escape", "GET /editions/%E0%A4%A HTTP/1.1", undefined, 400],
    ["NUL in the path", "GET /editions/%00 HTTP/1.1", undefined, 400],
    ["a bad host", "GET / HTTP/1.1", "Host: elsewhere.example", 400],
    ["a host with a space", "GET / HTTP/1.1", "Host: a b", 400],
    ["an empty host", "GET / HTTP/1.1", "Host: ", 400],
    ["no host", "GET / HTTP/1.1", "X-Nothing: here", 400],
    ["HTTP/1.0 without a host", "GET / HTTP/1.0", "X-Nothing: here", 400],
    ["TRACE", "TRACE / HTTP/1.1", undefined, 405],
    ["no HTTP at all", "hello", "there", 400],
    ["headers beyond measure", "GET / HTTP/1.1", `X-Long: ${"x".repeat(40_000)}`, 431],
  ])("%s is refused, and the server still answers", async (_what, line, header, status) => {
    const answer = await sendRaw(`${line}\r\n${header ?? host()}\r\nConnection: close\r\n\r\n`);
    expect(answer).toMatch(new RegExp(`^HTTP/1.1 ${status} `));
    await stillAnswers();
  });

  test("a refusal below /api is a problem document", async () => {
    const answer = await sendRaw(`GET /api/v1/%zz HTTP/1.1\r\n${host()}\r\nConnection: close\r\n\r\n`);
    expect(answer).toMatch(/^HTTP\/1.1 400 /);
    expect(answer).toContain("Content-Type: application/problem+json");
    const body = JSON.parse(
      answer.slice(answer.indexOf("\r\n\r\n") + 4).replace(/^[0-9a-f]+\r\n|\r\n0\r\n\r\n$/g, ""),
    ) as object;
    expect(body).toMatchObject({ status: 400, type: `${server.url}/problems/bad-request` });
  });
});

describe("headers of every answer", () => {
  const everywhere = {
    "x-content-type-options": "nosniff",
    "referrer-policy": "same-origin",
    "cross-origin-opener-policy": "same-origin",
    "cross-origin-resource-policy": "same-origin",
    "x-request-id": expect.stringMatching(/^[0-9a-f-]{36}$/),
    "content-security-policy": expect.stringContaining("frame-ancestors 'none'"),
  };

  test.each(["/healthz", "/conventions", "/no/such/page", "/assets/no-such-file.js", "/api/v1/no-such-thing"])(
    "%s",
    async (where) => {
      const { headers } = await server.fetch(where);
      expect(Object.fromEntries(headers)).toMatchObject(everywhere);
      expect(headers.get("x-powered-by")).toBeNull();
      // Only a service reached over https may bind browsers to it.
      expect(headers.get("strict-transport-security")).toBeNull();
    },
  );

  test("a page's policy names a nonce of its own each time, and its inline scripts carry it", async () => {
    const answers = await Promise.all([server.fetch("/conventions"), server.fetch("/conventions")]);
    const nonces = answers.map(
      ({ headers }) => /'nonce-([^']+)'/.exec(headers.get("content-security-policy") ?? "")?.[1],
    );
    expect(new Set(nonces).size).toBe(2);
    const page = await answers[0]!.text();
    const scripts = page.match(/<script[^>]*>/g) ?? [];
    expect(scripts.length).toBeGreaterThan(0);
    for (const script of scripts) expect(script).toContain(`nonce="${nonces[0]}"`);
  });

  test("a built file may be kept for ever", async () => {
    const page = await (await server.fetch("/conventions")).text();
    const file = /\/assets\/[^"]+\.css/.exec(page)?.[0];
    const answer = await server.fetch(file ?? "");
    expect(answer.status).toBe(200);
    expect(answer.headers.get("cache-control")).toBe("public, max-age=31536000, immutable");
  });
});

describe("requests that would change something", () => {
  test.each([
    ["a foreign origin", { Origin: "https://elsewhere.example" }],
    ["a foreign site", { "Sec-Fetch-Site": "cross-site" }],
    ["an opaque origin", { Origin: "null" }],
  ])("from %s are refused with 403", async (_from, headers) => {
    for (const where of ["/conventions", "/resources/anything", "/no/such/page"]) {
      const answer = await server.fetch(where, { method: "POST", headers, body: new URLSearchParams({ a: "b" }) });
      expect([where, answer.status]).toEqual([where, 403]);
    }
    await stillAnswers();
  });
});

test("is ready while the database has this version's schema", async () => {
  const answer = await server.fetch("/readyz");
  expect([answer.status, await answer.json()]).toEqual([200, { status: "ready" }]);
});
