import { execFile } from "node:child_process";
import path from "node:path";
import { expect, test } from "vitest";
import { useServer } from "#tests/support/server.ts";

const server = useServer();

/** Runs one of the built commands on the test's database. */
function run(name: string, ...args: string[]): Promise<{ code: number; out: string; error: string }> {
  const env = {
    PATH: process.env["PATH"],
    NODE_ENV: "production",
    LOG_LEVEL: "warn",
    DATABASE_URL: server.database.appUrl,
    SESSION_SECRET: "only for tests, only for tests, only",
    PUBLIC_URL: server.url,
  };
  return new Promise((resolve) => {
    execFile(
      process.execPath,
      [path.join("build", "server", `${name}.js`), ...args],
      { env },
      (failure, out, error) => {
        resolve({ code: failure ? Number(failure.code ?? 1) : 0, out, error });
      },
    );
  });
}
const post = (where: string, body: Record<string, string>) =>
  server.fetch(where, { method: "POST", body: new URLSearchParams(body) });

test("from an empty database to the first answer of the API: an administrator, a password, a key", async () => {
  const email = "chief@calderpoint.example";
  const made = await run("admin", "--email", email, "--name", "The Chief");
  expect(made.code).toBe(0);
  const link = /^http\S+\/invitation\/\S+$/m.exec(made.out)?.[0] ?? "";
  expect(link.startsWith(server.url)).toBe(true);
  expect((await post(new URL(link).pathname, { password: "nine oak drawers" })).status).toBe(302);
  expect((await post("/sign-in", { email, password: "nine oak drawers" })).status).toBe(302);

  const again = await run("admin", "--email", "other@calderpoint.example");
  expect(again).toMatchObject({ code: 1, out: "" });
  expect(again.error).toContain("There is an administrator already");

  const key = await run("key", "--person", email, "--name", "titration-2", "--scope", "read");
  expect(key.code).toBe(0);
  expect(key.out).toMatch(/^twk_[0-9a-z]{12}_[\w-]{43}\n$/);
  const answer = await server.fetch("/api/v1/editions", { headers: { Authorization: `Bearer ${key.out.trim()}` } });
  expect(answer.status).toBe(200);
});

test.each([
  ["admin", [], 2, "--email is missing."],
  ["admin", ["--email", "no address"], 1, "This is not an e-mail address"],
  ["admin", ["--mail", "x"], 2, "--mail"],
  ["key", ["--person", "x"], 2, "--name is missing."],
  ["key", ["--person", "x@calderpoint.example", "--name", "n", "--scope", "all"], 2, 'There is no scope "all"'],
  ["key", ["--person", "x@calderpoint.example", "--name", "n", "--scope", "read"], 1, "There is no account in use"],
])("npm run %s with %j ends with %i and says why", async (name, args, code, sentence) => {
  const result = await run(name, ...args);
  expect(result).toMatchObject({ code, out: "" });
  expect(result.error).toContain(sentence);
  expect(result.error).not.toMatch(/^\s+at /m);
});

test.each(["admin", "key"])("npm run %s -- --help says how it is used", async (name) => {
  const { code, out } = await run(name, "--help");
  expect(code).toBe(0);
  expect(out).toContain(`npm run ${name} --`);
});
