import { readdirSync, readFileSync } from "node:fs";
import path from "node:path";
import { expect, test } from "vitest";
import { useServer } from "#tests/support/server.ts";

const CANARY = "canary-0123456789abcdef0123456789abcdef";

const server = useServer({ env: { SESSION_SECRET: CANARY } });

/** Every file that a browser may ask for. */
function files(): { name: string; text: string }[] {
  const folder = path.join("build", "client");
  return readdirSync(folder, { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile() && /\.(js|css|json|html|map)$/.test(entry.name))
    .map((entry) => path.join(entry.parentPath, entry.name))
    .map((name) => ({ name, text: readFileSync(name, "utf8") }));
}

test("what is sent to browsers holds nothing of the server: no setting, no query, no driver", () => {
  const sent = files();
  expect(sent.length).toBeGreaterThan(5);
  for (const word of [
    "DATABASE_URL",
    "SESSION_SECRET",
    "SMTP_URL",
    "postgres://",
    "graphile_worker",
    "argon2id",
    "selectFrom(",
  ]) {
    const found = sent.filter(({ text }) => text.includes(word)).map(({ name }) => name);
    expect(found, word).toEqual([]);
  }
});

test("a page shows no secret of the process that serves it", async () => {
  for (const where of ["/sign-in", "/conventions", "/no/such/page", "/healthz", "/readyz", "/api/v1/editions"]) {
    const answer = await server.fetch(where);
    const everything = JSON.stringify([...answer.headers]) + (await answer.text());
    expect(everything, where).not.toContain(CANARY);
    expect(everything, where).not.toContain(new URL(server.database.appUrl).password);
  }
  expect(server.log()).not.toContain(CANARY);
});
