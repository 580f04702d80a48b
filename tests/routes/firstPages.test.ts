import { beforeAll, describe, expect, test } from "vitest";
import { useDatabase as makeApplicationUse } from "#app/db/database.server.ts";
import { problemKinds } from "#app/http/problem.ts";
import { makeKey } from "#app/people/apiKey.server.ts";
import type { Acting, Role } from "#app/people/person.ts";
import { returnRevision } from "#app/review/decide.server.ts";
import { sendToReview } from "#app/review/revise.server.ts";
import { examplesFor } from "#app/routes/api/examples.ts";
import { publishThreeEditions } from "#tests/support/editions.ts";
import { makePerson, signedIn } from "#tests/support/people.ts";
import { acceptAll, propose } from "#tests/support/revisions.ts";
import { useServer } from "#tests/support/server.ts";
import { sheetRead } from "#tests/support/sheets.ts";

/*
 * The pages people begin at, as the built service serves them: what waits for whom, the find box, the pages that explain
 * problems, and the guide for programs.
 */

type Who = Role | "roleless";
const cookies = new Map<Who, string>();
let key = "";
/** Numbers of the revisions by what became of them. */
const revisions = { sent: 0, returned: 0, draft: 0, decided: 0 };

const REMARK = "The third run is missing its blank.";
const SHEET = "species,phase,S (J/mol/K)\nNe,g,146.33\nAr,g,one hundred\n";

const server = useServer({
  prepare: async (database) => {
    await publishThreeEditions(database.app);
    makeApplicationUse(database.app);
    const people = new Map<Role, Acting>();
    for (const role of ["analyst", "steward", "reviewer", "administrator"] as const) {
      const acting = await makePerson(`The ${role}`, role);
      people.set(role, acting);
      cookies.set(role, await signedIn(acting));
    }
    cookies.set("roleless", await signedIn(await makePerson("Newcomer")));
    const steward = people.get("steward")!;
    const reviewer = people.get("reviewer")!;
    key = (await makeKey(people.get("analyst")!, { name: "guide", scopes: ["read"], days: 1 })).key;

    const entropy = (species: string, digits: string) => ({
      values: [{ key: species, property: "entropy" as const, digits, sourceId: "src_codata1989" }],
    });
    revisions.decided = await propose(steward, entropy("NH3(g)", "192.80"), "Ammonia, entropy anew");
    await acceptAll(steward, reviewer, revisions.decided);
    revisions.sent = await propose(steward, entropy("H2O(g)", "188.84"), "Steam tables, spring campaign");
    await sendToReview(steward, revisions.sent, "");
    revisions.returned = await propose(steward, entropy("H2O(l)", "69.96"), "Water, third run");
    await sendToReview(steward, revisions.returned, "");
    await returnRevision(reviewer, revisions.returned, REMARK);
    revisions.draft = await propose(steward, entropy("Na+(aq)", "58.5"), "Sodium ion");
    await sheetRead(steward, { name: "noble gases.csv", bytes: new TextEncoder().encode(SHEET) });
  },
});

/** An address as somebody, or as nobody. */
function get(address: string, who?: Who): Promise<Response> {
  return server.fetch(address, { headers: who ? { Cookie: cookies.get(who) ?? "" } : {} });
}

/** What a person reads on the page: its text between the tags of `main`. */
async function textOf(response: Response): Promise<string> {
  const html = await response.text();
  const main = /<main[\s\S]*<\/main>/.exec(html)?.[0] ?? "";
  return main
    .replace(/<!-- -->/g, "")
    .replace(/<\/?(?:su[bp]|span|a|b|time|svg|path)\b[^>]*>/g, "")
    .replace(/<[^>]*>/g, " ")
    .replaceAll("&#x27;", "'")
    .replaceAll("&quot;", '"')
    .replaceAll("&amp;", "&")
    .replace(/\s+/g, " ");
}

const read = async (address: string, who?: Who): Promise<string> => {
  const response = await get(address, who);
  expect(response.status, address).toBe(200);
  return textOf(response);
};

describe("the first page", () => {
  test("tells nobody in particular what this is, and nothing of the table", async () => {
    const response = await get("/");
    expect(response.status).toBe(200);
    const html = await response.text();
    expect(html).toContain('href="/sign-in"');
    expect(html).toContain('href="/conventions"');
    expect(html).not.toMatch(/Edition \d|ammonia|Steam tables/i);
  });

  test("tells a reviewer what to decide and what is ready", async () => {
    const text = await read("/", "reviewer");
    expect(text).toContain("What waits for you One revision needs a decision.");
    expect(text).toContain(`${revisions.sent} · Steam tables, spring campaign`);
    expect(text).toContain("since today");
    expect(text).toContain(`Ready for edition 4 Revision ${revisions.decided} is decided: 1 changed value.`);
    expect(text).not.toContain("Your sheets");
    expect(await (await get("/", "reviewer")).text()).toContain('href="/publish"');
  });

  test("tells a steward what came back, with the reviewer's words, and what a sheet needs", async () => {
    const text = await read("/", "steward");
    expect(text).toContain("One sheet needs you, one revision came back and one draft is not sent.");
    expect(text).toContain("noble gases.csv 1 refused mend one row or leave them out");
    expect(text).toContain(`The reviewer writes: “${REMARK}”`);
    const order = ["Water, third run", "Sodium ion", "Steam tables", "Ammonia, entropy anew"].map((title) =>
      text.indexOf(title),
    );
    expect(order).toEqual([...order].sort((a, b) => a - b));
    expect(text).toContain("1 accepted, for edition 4");
    // Only reviewers decide and publish.
    expect(await (await get("/", "steward")).text()).not.toContain('href="/publish"');
  });

  test("tells an analyst what the newest edition changed, and how programs read it", async () => {
    const text = await read("/", "analyst");
    expect(text).toContain("Edition 3 Published");
    expect(text).toContain("It withdraws edition 2: The ammonia value was read from the wrong column.");
    expect(text).toContain("H2(g)");
    expect(text).toContain("130.680");
    expect(text).not.toContain("Your revisions");
    const html = await (await get("/", "analyst")).text();
    for (const address of ["/editions/2/compare/3", "/editions/3/table", "/account/keys", "/api"]) {
      expect(html).toContain(`href="${address}"`);
    }
  });

  test("tells an administrator of people and the record, and nobody else", async () => {
    const text = await read("/", "administrator");
    expect(text).toContain("5 accounts are in use.");
    expect(text).toContain("The record");
    expect(await read("/", "steward")).not.toContain("The record");
  });

  test("tells what happened lately, the newest first", async () => {
    const text = await read("/", "analyst");
    const lately = text.slice(text.indexOf("Lately"));
    expect(lately).toContain(`The reviewer returned revision ${revisions.returned} with comments`);
    expect(lately.indexOf(`revision ${revisions.returned}`)).toBeLessThan(lately.indexOf(`revision ${revisions.sent}`));
  });

  test("tells somebody without a role whom to ask, and nothing of the table", async () => {
    const text = await read("/", "roleless");
    expect(text).toContain("An administrator of the laboratory gives roles.");
    expect(text).not.toMatch(/Edition \d|Lately/);
  });
});

describe("the find box", () => {
  const find = (q: string) => `/find?${new URLSearchParams({ q })}`;

  test.each([
    ["H2O(l)", "/editions/3/species/H2O(l)"],
    ["H2O (liq)", "/editions/3/species/H2O(l)"],
    ["Na+ (aq)", "/editions/3/species/Na%2B(aq)"],
    ["Na+", "/editions/3/species/Na%2B(aq)"],
    ["7664-41-7", "/editions/3/species/NH3(g)"],
    ["spirits of hartshorn", "/editions/3/species/NH3(g)"],
    // A key that it had before edition 2.
    ["CaCO3(cr)", "/editions/3/species/CaCO3(cr%2Ccalcite)"],
    ["edition 2", "/editions/2"],
    ["doi:10.1063/1.555845", "/sources/src_nbstables1982"],
  ])("goes straight to what %s names", async (q, address) => {
    const response = await get(find(q), "analyst");
    expect(response.status).toBe(302);
    expect(response.headers.get("Location")).toBe(address);
  });

  test("goes straight to a revision by its number", async () => {
    const response = await get(find(`revision ${revisions.draft}`), "analyst");
    expect(response.headers.get("Location")).toBe(`/revisions/${revisions.draft}`);
  });

  test.each([
    ["water", ["H2O(g)", "H2O(l)"]],
    ["H2O", ["H2O(g)", "H2O(l)"]],
    ["7732-18-5", ["H2O(g)", "H2O(l)"]],
    ["codata", ["CODATA Key Values for Thermodynamics"]],
    ["spring", ["Steam tables, spring campaign"]],
    ["1", ["Edition 1"]],
  ])("lists what %s may mean", async (q, expected) => {
    const text = await read(find(q), "analyst");
    for (const one of expected) expect(text).toContain(one);
    expect(text).not.toContain("Nothing in edition");
  });

  test("says what to try when nothing fits, and what comes near", async () => {
    expect(await read(find("H2O(cr)"), "analyst")).toMatch(
      /Nothing in edition 3.*What comes near.*H2O\(g\).*the same atoms.*H2O\(l\)/,
    );
    expect(await read(find("7732-18-4"), "analyst")).toContain("A digit was mistyped.");
    expect(await read(find("unobtainium"), "analyst")).toContain(
      "Nothing in edition 3, and no revision, fits “unobtainium”.",
    );
    expect(await read("/find", "analyst")).toContain("What can be found");
  });

  test.each([`/find?q=${"a".repeat(201)}`, "/find?q=%00", "/find?q=%ff", "/find?q=%E0%A4%A"])(
    "refuses what cannot be looked for: %s",
    async (address) => {
      expect((await get(address, "analyst")).status).toBe(400);
    },
  );

  test.each([
    "%25",
    "_",
    "\\",
    "'",
    '"; --',
    "(",
    "((((",
    "H2O(l",
    "10.1/",
    "#",
    "9".repeat(200),
    "<script>",
    "\u0007",
    "\u{1F9EA}",
    "٣",
    "­",
    "(aq,)",
    "C60C60C60",
    "edition 999999999",
    "revision 999999999",
    "__proto__",
    "$&",
  ])("answers a page to %s", async (q) => {
    expect((await get(find(q), "analyst")).status).toBe(200);
  });

  test("shows typed text as text", async () => {
    const html = await (await get(find("<img src=x>"), "analyst")).text();
    expect(html).not.toContain("<img src=x>");
  });

  test.each(["/find?q=a&q=b", "/find?other=1", "/find?q", "/?q=%25&&&=", "/api?edition=x&edition=y"])(
    "passes over what it does not know: %s",
    async (address) => {
      expect((await get(address, "analyst")).status).toBe(200);
    },
  );
});

describe("the pages that explain problems", () => {
  test.each(Object.entries(problemKinds))("%s", async (slug, { title, status, explanation, cure }) => {
    const text = await read(`/problems/${slug}`);
    for (const part of [title, `Status ${status}`, explanation, cure, `${server.url}/problems/${slug}`]) {
      expect(text).toContain(part);
    }
  });

  test.each(["nothing", "__proto__", "constructor", "%20", "x".repeat(2000)])("%s is none: 404", async (slug) => {
    expect((await get(`/problems/${slug}`)).status).toBe(404);
  });

  test("are where a problem document's type leads", async () => {
    const answer = await server.fetch("/api/v1/editions");
    const { type } = (await answer.json()) as { type: string };
    const page = await get(type.slice(server.url.length));
    expect(page.status).toBe(200);
    expect(await textOf(page)).toContain("Authorization: Bearer");
  });
});

describe("the guide for programs", () => {
  let html = "";
  beforeAll(async () => {
    html = await (await get("/api", "analyst")).text();
  });

  test("is a page like the others, under the pages' policy", async () => {
    const response = await get("/api");
    expect(response.status).toBe(200);
    expect(response.headers.get("Content-Type")).toContain("text/html");
    expect(response.headers.get("Content-Security-Policy")).toContain("'nonce-");
  });

  test("shows each address of the contract and each problem", async () => {
    const { paths } = (await (await server.fetch("/api/v1/openapi.json")).json()) as { paths: Record<string, object> };
    expect(Object.keys(paths).length).toBeGreaterThan(5);
    const text = await textOf(new Response(html));
    for (const [path, methods] of Object.entries(paths)) {
      for (const method of Object.keys(methods)) expect(text).toContain(`${method.toUpperCase()} ${path}`);
    }
    for (const slug of Object.keys(problemKinds)) expect(html).toContain(`href="/problems/${slug}"`);
  });

  test("names the newest edition to those who may know it, and edition 1 to a stranger", async () => {
    expect(html).toContain(`${server.url}/api/v1/editions/3/species/H2O(l)`);
    const stranger = await (await get("/api")).text();
    expect(stranger).toContain(`${server.url}/api/v1/editions/1/species/H2O(l)`);
    expect(stranger).not.toContain("/editions/3");
  });

  test("every request it shows is answered", async () => {
    const { newest, first, more } = examplesFor(server.url, 3);
    const text = await textOf(new Response(html));
    for (const { id, path, command } of [newest, first, ...more]) {
      expect(text, id).toContain(command.replace(/\s+/g, " "));
      const answer = await server.fetch(`/api/v1${path}`, { headers: { Authorization: `Bearer ${key}` } });
      expect(answer.status, command).toBe(200);
    }
  });
});

describe("before the first edition", () => {
  const fresh = useServer({
    prepare: async (database) => {
      makeApplicationUse(database.app);
      cookies.set("steward", await signedIn(await makePerson("First steward", "steward")));
      cookies.set("reviewer", await signedIn(await makePerson("First reviewer", "reviewer")));
    },
  });
  const page = async (address: string, who: Who) =>
    textOf(await fresh.fetch(address, { headers: { Cookie: cookies.get(who) ?? "" } }));

  test("the first page says how to begin", async () => {
    expect(await page("/", "steward")).toMatch(/Bring a sheet.*No edition is published yet/);
    expect(await page("/", "reviewer")).toMatch(/No revision waits for a decision.*No edition is published yet/);
  });

  test("the find box says that there is nothing yet", async () => {
    expect(await page("/find?q=H2O(l)", "steward")).toContain("No edition is published yet");
  });
});
