import { ESLint } from "eslint";
import { describe, expect, test } from "vitest";

const eslint = new ESLint();

/** The complaints of the import rules about one line of code in a file of this name. */
async function complaintsAbout(line: string, filePath: string): Promise<string[]> {
  const [result] = await eslint.lintText(`${line}\n`, { filePath });
  // A file that does not exist has no place in the type checker's project; only the import rules are looked at here.
  return (result?.messages ?? [])
    .filter(({ ruleId }) => ruleId === "boundaries/dependencies")
    .map(({ message }) => message);
}

// Linting loads the compiler's view of the whole project once.
describe("the import directions", { timeout: 60_000 }, () => {
  test.each([
    ["the physics imports a room", "app/thermo/digits.ts", 'import { may } from "#app/people/permissions.ts";'],
    [
      "the physics imports it by a relative path",
      "app/thermo/digits.ts",
      'import { may } from "../people/permissions.ts";',
    ],
    ["the physics uses a package of another kind", "app/thermo/digits.ts", 'import { z } from "zod";'],
    ["the physics reads files", "app/thermo/digits.ts", 'import { readFileSync } from "node:fs";'],
    ["a check asks the database", "app/checks/types.ts", 'import { database } from "#app/db/database.server.ts";'],
    ["a pure file draws random numbers", "app/people/person.ts", 'import { randomBytes } from "node:crypto";'],
    ["a pure file reaches a .server file", "app/people/person.ts", 'import { config } from "#app/config.server.ts";'],
    [
      "a route asks the database itself",
      "app/routes/not-found.tsx",
      'import { database } from "#app/db/database.server.ts";',
    ],
    ["the pieces of a page know an act", "app/ui/Field.tsx", 'import { act } from "#app/audit/act.server.ts";'],
    ["people depend on review", "app/people/people.server.ts", 'import { LineContent } from "#app/review/content.ts";'],
    ["an act opens the driver itself", "app/review/publish.server.ts", 'import pg from "pg";'],
    [
      "the application imports a test",
      "app/people/people.server.ts",
      'import { useDatabase } from "#tests/support/database.ts";',
    ],
  ])("are kept by the linter: %s", async (_what, file, line) => {
    expect(await complaintsAbout(line, file)).toHaveLength(1);
  });

  test.each([
    ["a check uses the physics", "app/checks/types.ts", 'import { digits } from "#app/thermo/digits.ts";'],
    ["the physics uses its decimals", "app/thermo/digits.ts", 'import { Decimal } from "decimal.js";'],
    ["a pure file makes a digest", "app/audit/chain.ts", 'import { createHash } from "node:crypto";'],
    ["a query uses the query builder", "app/people/people.queries.server.ts", 'import { sql } from "kysely";'],
    ["an act keeps the record", "app/review/publish.server.ts", 'import { act } from "#app/audit/act.server.ts";'],
    ["an act throws a named error", "app/review/publish.server.ts", 'import { Refused } from "#app/http/errors.ts";'],
    [
      "a route calls an act",
      "app/routes/not-found.tsx",
      'import { publishEdition } from "#app/review/publish.server.ts";',
    ],
  ])("let through what is meant: %s", async (_what, file, line) => {
    expect(await complaintsAbout(line, file)).toEqual([]);
  });
});
