import { describe, expect, test } from "vitest";
import { useDatabase as workOn } from "#app/db/database.server.ts";
import { publishThreeEditions } from "#tests/support/editions.ts";
import { makePerson, signedIn } from "#tests/support/people.ts";
import { useServer } from "#tests/support/server.ts";

/* The pages of the sources as the built service renders them, without scripts. */

let steward = "";
let analyst = "";
const server = useServer({
  async prepare(database) {
    await publishThreeEditions(database.app);
    workOn(database.app);
    steward = await signedIn(await makePerson("Ines Halvard", "steward"));
    analyst = await signedIn(await makePerson("Mina Corvin", "analyst"));
  },
});

const read = async (path: string, cookie = analyst) => {
  const answer = await server.fetch(path, { headers: { Cookie: cookie } });
  const html = await answer.text();
  return {
    status: answer.status,
    location: answer.headers.get("Location"),
    headers: answer.headers,
    html,
    words: wordsOf(html),
  };
};

const send = async (path: string, fields: Record<string, string>, cookie = steward) => {
  const answer = await server.fetch(path, {
    method: "POST",
    headers: { Cookie: cookie, Origin: server.url },
    body: new URLSearchParams(fields),
  });
  const html = await answer.text();
  return { status: answer.status, location: answer.headers.get("Location"), html, words: wordsOf(html) };
};

/** A page's words: markup and runs of space taken out. */
function wordsOf(html: string): string {
  return html
    .replace(/<!--[\s\S]*?-->/g, "")
    .replace(/<(script|style|head)[\s\S]*?<\/\1>/g, " ")
    .replace(/<\/?(?:sub|sup|i|b|span|cite|a)(?:\s[^>]*)?>/g, "")
    .replace(/<[^>]+>/g, " ")
    .replaceAll("&#x27;", "'")
    .replaceAll("&amp;", "&")
    .replace(/\s+/g, " ");
}

describe("addresses", () => {
  test.each([
    ["/sources", "/editions/3/sources"],
    ["/sources?kind=measurement", "/editions/3/sources?kind=measurement"],
    ["/sources/src_codata1989", "/editions/3/sources/src_codata1989"],
    ["/editions/current/sources?q=cox", "/editions/3/sources?q=cox"],
    ["/editions/current/sources/src_codata1989", "/editions/3/sources/src_codata1989"],
  ])("%s leads to %s", async (path, to) => {
    expect(await read(path)).toMatchObject({ status: 302, location: to });
  });

  test.each([
    ["/sources/src_nothing00", "There is no source src_nothing00"],
    [
      "/editions/1/sources/src_calderpoint9",
      "Edition 1 has no source src_calderpoint9 yet; it came in with edition 2.",
    ],
    ["/editions/9/sources", "There is no edition 9"],
    ["/editions/1/sources/src_nothing00/values.csv", "Edition 1 has no source src_nothing00."],
  ])("%s: %s", async (path, sentence) => {
    const { status, words } = await read(path);
    expect(status).toBe(404);
    expect(words).toContain(sentence);
  });

  test("who may not write gets neither form, nor a link to one", async () => {
    expect((await read("/sources/new")).status).toBe(403);
    expect((await read("/sources/src_codata1989/mend")).status).toBe(403);
    expect((await read("/editions/3/sources")).html).not.toContain('href="/sources/new"');
    expect((await read("/editions/3/sources/src_codata1989")).html).not.toContain("/mend");
    expect((await read("/editions/3/sources", steward)).html).toContain('href="/sources/new"');
  });
});

describe("the list", () => {
  test("cites each source in full, its DOI as a link, with its kind and values", async () => {
    const { html, words } = await read("/editions/1/sources");
    expect(words).toContain("Edition 1, published");
    expect(words).toContain(
      "J. D. Cox, D. D. Wagman, V. A. Medvedev, CODATA Key Values for Thermodynamics, Hemisphere, 1989",
    );
    expect(html).toContain("<cite>CODATA Key Values for Thermodynamics</cite>");
    expect(html).toContain('href="https://doi.org/10.1063/1.555845"');
    expect(words).toMatch(/evaluated 1989 10\b/);
  });

  test("is filtered and sorted by its address", async () => {
    const found = await read("/editions/2/sources?kind=measurement&sort=-values");
    expect(found.words).toContain("1 of 3");
    expect(found.html).toContain('aria-sort="descending"');
    expect((await read("/editions/2/sources?q=nothing+like+it")).words).toContain(
      "No source of edition 2 is like that.",
    );
  });
});

describe("the page of a source", () => {
  test("an edition keeps its citation; a later one tells what was mended, word by word", async () => {
    const [first, third] = [
      await read("/editions/1/sources/src_nbstables1982"),
      await read("/editions/3/sources/src_nbstables1982"),
    ];
    expect(first.words).toContain("The NBS Tables of Chemical Thermodynamic Properties, Calder Point Laboratory");
    expect(first.html).not.toMatch(/<(?:ins|del)>/);
    expect(first.words).toContain("edition 3 stands");
    expect(third.words).toContain("The NBS tables of chemical thermodynamic properties, Calder Point Laboratory");
    expect(third.html).toMatch(/<del>Tables<\/del><ins>tables<\/ins>/);
  });

  test("lists the values by species and property, each species leading to its page in that edition", async () => {
    const { html, words } = await read("/editions/1/sources/src_nbstables1982");
    expect(html).toContain('href="/editions/1/species/NH3(g)"');
    expect(words).toContain("3 values of edition 1 lean on it");
    const one = await read("/editions/1/sources/src_nbstables1982?property=entropy");
    expect(one.html).not.toContain('href="/editions/1/species/NH3(g)"');
    expect(one.html).toContain("CaCO3(cr)");
  });

  test("downloads its lines of the edition's file", async () => {
    const { status, headers, html: text } = await read("/editions/1/sources/src_nbstables1982/values.csv");
    expect(status).toBe(200);
    expect(headers.get("Content-Type")).toBe("text/csv; charset=utf-8; header=present");
    expect(headers.get("Content-Disposition")).toBe(
      'attachment; filename="tablewright-edition-1-src_nbstables1982.csv"',
    );
    const [head, ...lines] = text.split("\r\n").filter(Boolean);
    expect(head).toMatch(/^edition,id,species,/);
    expect(lines.map((line) => line.split(",")[2])).toEqual(["CaCO3(cr)", "H2O(l)", "NH3(g)"]);
  });
});

const filled = {
  work: "inhouse",
  title: "Cell 9, notebook 4",
  authors: "Calder Point Laboratory",
  year: "2026",
  sourceKind: "measurement",
  note: "Invented.",
  revisionTitle: "Cell 9",
  reason: "",
};

describe("adding a source", () => {
  test("what is wrong comes back at its field with everything that was typed", async () => {
    const { status, html, words } = await send("/sources/new", {
      ...filled,
      title: "",
      doi: "10.x",
      reason: "For the salts.",
    });
    expect(status).toBe(422);
    expect(words).toContain("Title: Give the title, or what the notebook is called.");
    expect(words).toContain("DOI: A DOI begins with 10.");
    expect(html).toContain('value="Cell 9"');
    expect(html).toContain("For the salts.");
  });

  test("a known DOI is shown with the source that has it", async () => {
    const { status, html, words } = await send("/sources/new", { ...filled, doi: "https://doi.org/10.1063/1.555845" });
    expect(status).toBe(409);
    expect(words).toContain("A source with this DOI is there already:");
    expect(html).toContain('href="/sources/src_nbstables1982"');
    expect(html).not.toContain('name="anyway"');
  });

  test("leads to the revision that proposes it, which is where its address leads until it is published", async () => {
    const { status, location } = await send("/sources/new", filled);
    expect(status).toBe(303);
    expect(location).toMatch(/^\/revisions\/\d+$/);
    const revision = await read(location ?? "", steward);
    expect(revision.words).toContain("Calder Point Laboratory, Cell 9, notebook 4, in-house record, 2026");
    // A second one of the same title, year and author is asked about.
    const again = await send("/sources/new", filled);
    expect(again.status).toBe(409);
    expect(again.html).toContain('name="anyway"');
    expect(again.words).toContain(`proposed in revision ${(location ?? "").replace("/revisions/", "")}`);
  });

  test("a revision that is none of the list is refused, not looked up", async () => {
    expect((await send("/sources/new", { ...filled, title: "Other", into: "0; drop" })).status).toBe(422);
    expect((await send("/sources/new", { ...filled, title: "Other", into: "999999" })).status).toBe(404);
  });
});

describe("mending a citation", () => {
  const path = "/sources/src_calderpoint9/mend";
  const fieldsOf = (html: string): Record<string, string> =>
    Object.fromEntries(
      [...html.matchAll(/<input[^>]*?name="([^"]+)"[^>]*?value="([^"]*)"/g)].map(([, name = "", value = ""]) => [
        name,
        value,
      ]),
    );

  test("begins with what stands, shows the change, and proposes it", async () => {
    const page = await read(path, steward);
    expect(page.words).toContain("So cites it edition 3.");
    const fields = {
      ...fieldsOf(page.html),
      sourceKind: "measurement",
      work: "report",
      notice: "Retracted: the cell leaked.",
    };
    const shown = await send(path, { ...fields, intent: "show" });
    expect(shown.status).toBe(200);
    expect(shown.html).toContain("<ins>Retracted: the cell leaked.</ins>");
    const unreasoned = await send(path, { ...fields, intent: "propose" });
    expect(unreasoned.status).toBe(422);
    expect(unreasoned.words).toContain("Reason: Say why the citation is mended.");
    const sent = await send(path, { ...fields, intent: "propose", reason: "The authors withdrew it." });
    expect(sent.status).toBe(303);
    expect((await read(sent.location ?? "", steward)).words).toContain("Retracted: the cell leaked.");
  });

  test("a source that is not in the table yet is said to be mended in its revision", async () => {
    const { status, words } = await read("/sources/src_nothing00/mend", steward);
    expect(status).toBe(404);
    expect(words).toContain("mended in its revision");
  });
});
