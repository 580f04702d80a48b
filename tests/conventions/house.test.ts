import { readdirSync, readFileSync } from "node:fs";
import path from "node:path";
import { describe, expect, test } from "vitest";
import { checks } from "#app/checks/registry.ts";

/*
 * The rules of DEVELOPERS.md as tests. Each message says what to do instead; an exception stands here with its reason.
 */

const root = path.resolve(import.meta.dirname, "../..");
/** What is made here or brought by the package manager, and so is not ours to keep in order. */
const MADE = new Set([".git", "node_modules", "build", ".data", ".react-router", "coverage"]);

// A walk, because a checkout that came as an archive has no git to ask.
function filesBelow(folder: string): string[] {
  return readdirSync(path.join(root, folder), { withFileTypes: true })
    .filter(({ name }) => !MADE.has(name))
    .flatMap((entry) => {
      const here = path.posix.join(folder, entry.name);
      return entry.isDirectory() ? filesBelow(here) : [here];
    });
}
const tracked = filesBelow(".");
const read = (file: string): string => readFileSync(path.join(root, file), "utf8");
const sources = tracked.filter((file) => /^(app|server|db|tests|scripts)\/.*\.(ts|tsx|mjs)$/.test(file)).filter(exists);
const developers = read("DEVELOPERS.md");
const readme = read("README.md");
const scripts = (JSON.parse(read("package.json")) as { scripts: Record<string, string> }).scripts;

function exists(file: string): boolean {
  try {
    read(file);
    return true;
  } catch {
    return false;
  }
}

describe("the tree", () => {
  const folders = readdirSync(path.join(root, "app"), { withFileTypes: true })
    .filter((entry) => entry.isDirectory())
    .map((entry) => `app/${entry.name}/`);
  test.each([...folders, "server/", "scripts/", "db/", "fixtures/", "tests/"])(
    "%s has its line in DEVELOPERS.md",
    (folder) => {
      expect(developers.split("\n").some((line) => line.startsWith(`| \`${folder}\` `))).toBe(true);
    },
  );

  test("nothing else stands at the top level", () => {
    const allowed = new Set(["app", "db", "fixtures", "tests", "server", "scripts", ".ci"]);
    const top = new Set(tracked.filter((file) => file.includes("/")).map((file) => file.split("/")[0] ?? ""));
    expect([...top].filter((folder) => !allowed.has(folder))).toEqual([]);
  });
});

describe("commands", () => {
  const named = new Set([...`${developers}\n${readme}`.matchAll(/npm run ([a-z:]+)/g)].map((match) => match[1] ?? ""));
  test.each([...named])("npm run %s exists", (command) => {
    expect(Object.keys(scripts)).toContain(command);
  });
});

describe("where things may stand", () => {
  test("SQL stands only in *.queries.server.ts", () => {
    const allowed = [/\.queries\.server\.tsx?$/, /^db\//, /^tests\//, /^scripts\//, /^app\/db\//, /\.test\.ts$/];
    // The job queue's own function is called where jobs are enqueued; it is the room's one statement.
    const excepted = new Set(["app/jobs/enqueue.server.ts"]);
    const found = sources
      .filter((file) => file.startsWith("app/") || file.startsWith("server/"))
      .filter((file) => !allowed.some((pattern) => pattern.test(file)) && !excepted.has(file))
      .filter((file) => /\.(selectFrom|insertInto|updateTable|deleteFrom)\(|\bsql`|\bsql<|\bsql\.raw/.test(read(file)));
    expect(found, "Move the statement into the room's *.queries.server.ts.").toEqual([]);
  });

  test("routes never reach for the database room", () => {
    const found = sources
      .filter((file) => file.startsWith("app/routes/"))
      .filter((file) => /["']#app\/db\//.test(read(file)));
    expect(found, "Call an act or a named read of a room instead.").toEqual([]);
  });

  test("pure files take the clock and randomness as arguments", () => {
    const pure = sources.filter((file) => /^app\/(thermo|checks)\/.*\.ts$/.test(file) && !/\.test\.ts$/.test(file));
    const found = pure.filter((file) =>
      /Date\.now\(|new Date\(\)|Math\.random\(|process\.env|from "node:/.test(read(file)),
    );
    expect(found, "Hand it in as an argument.").toEqual([]);
  });

  test("the server runs no shell, evaluates no text and makes no secret from a weak source", () => {
    const found = sources
      .filter((file) => file.startsWith("app/") && !/\.test\.tsx?$/.test(file))
      .filter((file) =>
        /child_process|\beval\(|new Function\(|Math\.random\(|createHash\("(md5|sha1)"|dangerouslySetInnerHTML/.test(
          read(file),
        ),
      );
    expect(found).toEqual([]);
  });
});

describe("what is left open or silenced", () => {
  test("nothing is left for later in the code", () => {
    const code = (file: string) =>
      read(file)
        .split("\n")
        .filter((line) => !/^\s*(\*|\/\/|\/\*)/.test(line) || /\b(TODO|FIXME|XXX)\b|@ts-ignore/.test(line))
        .join("\n");
    const found = sources
      .filter((file) => file !== "tests/conventions/house.test.ts")
      .filter((file) =>
        /\b(TODO|FIXME|XXX)\b|@ts-ignore|\bas any\b|: any\b|\.only\(|\.skip\(|\.todo\(/.test(code(file)),
      );
    expect(found).toEqual([]);
  });

  test("a silenced lint rule says why", () => {
    const found = sources.flatMap((file) =>
      read(file)
        .split("\n")
        .filter((line) => /eslint-disable/.test(line) && !/ -- \S/.test(line) && !line.includes("/eslint-disable/"))
        .map((line) => `${file}: ${line.trim()}`),
    );
    expect(found, "Write the reason behind two dashes.").toEqual([]);
  });
});

describe("checks", () => {
  test.each(checks.map((check) => check.code))("%s has a file of its name and a test", (code) => {
    expect(tracked).toContain(`app/checks/${code}.ts`);
    const tested = tracked.filter((file) => file.startsWith("app/checks/") && file.endsWith(".test.ts"));
    expect(tested.some((file) => file.includes(code) || read(file).includes(code))).toBe(true);
  });
});
