import { describe, expect, test } from "vitest";
import { useDatabase as workOn } from "#app/db/database.server.ts";
import { publishThreeEditions } from "#tests/support/editions.ts";
import { makePerson, signedIn } from "#tests/support/people.ts";
import { useServer } from "#tests/support/server.ts";

/* The pages by which people read the table, as the built service renders them without scripts. */

let cookie = "";
const server = useServer({
  async prepare(database) {
    await publishThreeEditions(database.app);
    workOn(database.app);
    cookie = await signedIn(await makePerson("A. Analyst", "analyst"));
  },
});
const empty = useServer({
  async prepare(database) {
    workOn(database.app);
    emptyCookie = await signedIn(await makePerson("A. Analyst", "analyst"));
  },
});
let emptyCookie = "";

const ask = (path: string): Promise<Response> => server.fetch(path, { headers: { Cookie: cookie } });

/** A page's words: markup and runs of space taken out. */
function wordsOf(html: string): string {
  return html
    .replace(/<!--[\s\S]*?-->/g, "")
    .replace(/<(script|style|head)[\s\S]*?<\/\1>/g, " ")
    .replace(/<\/?(?:sub|sup|i|b)>/g, "")
    .replace(/<[^>]+>/g, " ")
    .replaceAll("&#x27;", "'")
    .replaceAll("&amp;", "&")
    .replace(/\s+/g, " ");
}

async function read(path: string): Promise<{ status: number; html: string; words: string }> {
  const answer = await ask(path);
  const html = await answer.text();
  return { status: answer.status, html, words: wordsOf(html) };
}

/** The species of the table on a page, in order. */
const speciesOf = (html: string): string[] =>
  [...html.matchAll(/<a class="species"[^>]*data-plain="([^"]+)"/g)].map(([, key = ""]) => key);

describe("editions in an address", () => {
  test.each(["/editions/current/table?phase=g", "/editions/current/species/H2O(l)", "/editions/1/compare/current"])(
    "%s leads to the same page under the newest number",
    async (path) => {
      const answer = await ask(path);
      expect(answer.status).toBe(302);
      expect(answer.headers.get("Location")).toBe(path.replace("current", "3"));
    },
  );

  test.each(["/editions/9/table", "/editions/0/table", "/editions/x/species/H2O(l)", "/editions/1/compare/9"])(
    "%s is a page that says there is no such edition",
    async (path) => {
      const { status, words } = await read(path);
      expect(status).toBe(404);
      expect(words).toMatch(/There is no edition \d|is not an edition/);
    },
  );

  test("nobody is sent to the sign-in page and back here", async () => {
    const answer = await server.fetch("/editions/2/table?phase=g");
    expect(answer.status).toBe(302);
    expect(answer.headers.get("Location")).toBe(`/sign-in?to=${encodeURIComponent("/editions/2/table?phase=g")}`);
  });
});

describe("the table", () => {
  test("before the first edition it says what would be here", async () => {
    const answer = await empty.fetch("/editions/current/table", { headers: { Cookie: emptyCookie } });
    expect(answer.status).toBe(200);
    expect(wordsOf(await answer.text())).toContain("No edition is published yet.");
  });

  test("shows the edition's own values with their uncertainty, units in the head, and what follows in the lighter hand", async () => {
    const { status, html, words } = await read("/editions/1/table");
    expect(status).toBe(200);
    expect(words).toContain("Edition 1, published");
    // −285.830 ± 0.040 (k = 2) is printed with its standard uncertainty.
    expect(words).toMatch(/−285 ?\.830 ?\(20\)/);
    expect(words).toMatch(/−46 ?\.11/);
    expect(words).toMatch(/ΔfH° \/ kJ mol−1/);
    // O2 is not in these editions, so no ΔfG° of water follows; hydrogen's is zero by convention.
    expect(html.match(/value-derived/g)?.length).toBe(1);
  });

  test.each([
    ["", ["AgCl(cr)", "C(cr,graphite)", "CaCO3(cr,calcite)", "H2(g)", "H2O(g)", "H2O(l)", "NH3(g)", "Na+(aq)"]],
    ["?q=water", ["H2O(g)", "H2O(l)"]],
    ["?q=NH3", ["NH3(g)"]],
    ["?element=H+O", ["H2O(g)", "H2O(l)"]],
    ["?phase=aq", ["Na+(aq)"]],
    ["?property=-entropy", ["AgCl(cr)"]],
    ["?property=heatCapacity", ["H2O(l)"]],
    ["?element=H+O+N&how=only", ["H2(g)", "H2O(g)", "H2O(l)", "NH3(g)"]],
    ["?element=H+O&how=exactly&phase=l&phase=aq", ["H2O(l)"]],
    ["?kind=cation", ["Na+(aq)"]],
    ["?property=-entropy&property=enthalpyOfFormation", ["AgCl(cr)"]],
    ["?q=OH2", ["H2O(g)", "H2O(l)"]],
    ["?q=water&sort=-key", ["H2O(l)", "H2O(g)"]],
    ["?phase=g&sort=entropy", ["H2(g)", "H2O(g)", "NH3(g)"]],
    ["?phase=g&sort=-entropy", ["NH3(g)", "H2O(g)", "H2(g)"]],
  ])("filters and order live in the address: %s", async (query, keys) => {
    expect(speciesOf((await read(`/editions/3/table${query}`)).html)).toEqual(keys);
  });

  test("a sorted head says so, and the button asks for the other direction", async () => {
    const { html } = await read("/editions/3/table?sort=entropy");
    expect(html).toContain('aria-sort="ascending"');
    expect(html).toMatch(/<button[^>]*value="-entropy"/);
  });

  test("what cannot be read is said, and the rest of the filter holds", async () => {
    const { status, html, words } = await read("/editions/3/table?element=Zz&phase=aq&sort=nonsense&page=99999999999");
    expect(status).toBe(200);
    expect(words).toContain("“Zz” is no element symbol");
    expect(speciesOf(html)).toEqual(["Na+(aq)"]);
  });

  test("nothing found: a sentence and the way back", async () => {
    expect((await read("/editions/3/table?q=unobtainium")).words).toContain("No species of edition 3 is like that.");
  });

  test("an older edition says which one stands now, and a withdrawn one says so and why", async () => {
    const { words } = await read("/editions/2/table");
    expect(words).toContain("edition 3 stands");
    expect(words).toContain("The ammonia value was read from the wrong column.");
    expect((await read("/editions/3/table")).words).toContain("the newest edition");
  });

  test("columns are chosen in the address", async () => {
    const { html } = await read("/editions/3/table?column=entropy");
    expect(html.match(/aria-sort/g)?.length).toBe(3);
  });

  test("the caution stands under it", async () => {
    expect((await read("/editions/3/table")).words).toContain("calorimetry and a process-safety review");
  });
});

describe("a species", () => {
  test.each([
    ["H2O(liq)", "H2O(l)"],
    ["OH2(l)", "H2O(l)"],
    ["CaCO3(cr)", "CaCO3(cr,calcite)"],
  ])("%s is sent on to %s in the same edition, for good", async (asked, key) => {
    const answer = await ask(`/editions/3/species/${encodeURIComponent(asked)}`);
    expect([answer.status, answer.headers.get("Location")]).toEqual([
      308,
      `/editions/3/species/${encodeURIComponent(key)}`,
    ]);
  });

  test("an old key is the right one in the edition that had it", async () => {
    expect((await read(`/editions/1/species/${encodeURIComponent("CaCO3(cr)")}`)).status).toBe(200);
  });

  test("unknown: says what comes near", async () => {
    const { status, words } = await read("/editions/3/species/H2O(cr)");
    expect(status).toBe(404);
    expect(words).toContain("It has H2O(g), H2O(l)");
  });

  test("shows values with source and edition, what the sheet said, other phases, and history up to its edition only", async () => {
    const water = await read("/editions/3/species/H2O(l)");
    expect(water.words).toContain("water · CAS 7732-18-5 · 18.015 g mol−1 · also as H2O (g)");
    expect(water.words).toMatch(/given as 17\.995 cal .* \(× 4\.184\)/);
    const ammonia = await read("/editions/1/species/NH3(g)");
    expect(ammonia.words).toMatch(/−46 ?\.11/);
    expect(ammonia.words).not.toMatch(/−45 ?\.94/);
    const later = await read("/editions/2/species/NH3(g)");
    expect(later.words).toContain("changed");
    expect(later.words).toMatch(/\+0 ?\.17/);
    expect(later.words).toContain("S. Steward; accepted by R. Reviewer");
  });

  test("a withdrawn value is gone from its table, and its history says why", async () => {
    const { words } = await read("/editions/3/species/AgCl(cr)");
    expect(words).toContain("withdrawn");
    expect(words).toContain("Not ours to print.");
  });
});

describe("a comparison", () => {
  test("tells what changed, by how much, and texts word by word", async () => {
    const { status, html, words } = await read("/editions/1/compare/3");
    expect(status).toBe(200);
    expect(words).toContain("From edition 1 to edition 3");
    expect(words).toContain("2 values changed, 1 came, 0 went; 11 are the same. In 1 only the printed digits differ.");
    expect(words).toMatch(/\+0 ?\.17/);
    expect(html).toMatch(/<del>[^<]*<\/del>|<ins>[^<]*<\/ins>/);
    expect(words).toContain("called otherwise");
    expect(words).toContain("cited otherwise");
  });

  test("of neighbours is headed by what the later one changed; turned round it is the mirror image", async () => {
    expect((await read("/editions/1/compare/2")).words).toContain("What edition 2 changed");
    expect((await read("/editions/3/compare/2")).words).toContain("1 value changed, 1 came, 0 went");
    expect((await read("/editions/2/compare/3")).words).toContain("1 value changed, 0 came, 1 went");
  });

  test("of an edition with itself is empty", async () => {
    expect((await read("/editions/2/compare/2")).words).toContain("An edition and itself are the same.");
  });
});

describe("the download", () => {
  test("is the file of the edition, for a signed-in person", async () => {
    const answer = await ask("/editions/2/table.csv");
    expect(answer.headers.get("Content-Disposition")).toContain("tablewright-edition-2.csv");
    expect(answer.headers.get("Content-Type")).toContain("text/csv");
    expect((await answer.text()).split("\r\n")[0]).toMatch(/^edition,id,species,/);
    expect((await server.fetch("/editions/2/table.csv")).status).toBe(302);
    expect((await ask("/editions/9/table.csv")).status).toBe(404);
  });
});

describe("what is shown, as a file", () => {
  test("holds the species of the filter in its order, says edition and filter in its name, and names its description", async () => {
    const answer = await ask("/editions/3/table/shown.csv?phase=g&sort=-entropy&column=entropy");
    expect(answer.headers.get("Content-Disposition")).toContain("tablewright-edition-3-g-by-entropy.csv");
    const lines = (await answer.text()).trim().split("\r\n");
    expect(lines.map((line) => line.split(",")[1])).toEqual(["species", "NH3(g)", "H2O(g)", "H2(g)"]);
    const described = /<([^>]+)>; rel="describedby"/.exec(answer.headers.get("Link") ?? "")?.[1] ?? "";
    const description = JSON.parse(await (await ask(described)).text()) as Record<string, unknown>;
    expect(description["dc:title"]).toContain("edition 3: species in phase g, by S°, descending");
    expect(description).toMatchObject({ tableSchema: { columns: lines[0]?.split(",").map((name) => ({ name })) } });
  });

  test("as JSON it is the same, and a ΔfG° that only follows says so", async () => {
    const file = JSON.parse(await (await ask("/editions/1/table/shown.json")).text()) as {
      edition: number;
      species: { key: string; values: Record<string, { origin: string }> }[];
    };
    expect(file.edition).toBe(1);
    const page = await read("/editions/1/table");
    expect(file.species.map((one) => one.key)).toEqual(speciesOf(page.html));
    const origins = file.species.flatMap((one) => Object.values(one.values).map((value) => value.origin));
    expect(origins.filter((origin) => origin === "follows")).toHaveLength(1);
  });

  test("nobody is sent to sign in; another file is not there", async () => {
    expect((await server.fetch("/editions/3/table/shown.csv")).status).toBe(302);
    expect((await ask("/editions/3/table/shown.xls")).status).toBe(404);
  });
});

describe("the find box", () => {
  const offers = async (q: string): Promise<{ kind: string; to: string; text: string; note: string }[]> => {
    const answer = await ask(`/resources/find.data?q=${encodeURIComponent(q)}`);
    expect(answer.status).toBe(200);
    const plain = await ask(`/resources/find?q=${encodeURIComponent(q)}`);
    return ((await plain.json()) as { suggestions: { kind: string; to: string; text: string; note: string }[] })
      .suggestions;
  };

  test.each([
    ["OH2(l)", "H2O(l)"],
    ["7732-18-5", "H2O(g)"],
    ["H3N", "NH3(g)"],
    ["Na +1 (aq)", "Na+(aq)"],
  ])("%s offers %s first", async (typed, key) => {
    expect((await offers(typed))[0]).toMatchObject({ kind: "species", text: key });
  });

  test("offers sources, editions and revisions; a sheet only to those who may see sheets", async () => {
    expect((await offers("Wagman")).map((one) => one.kind)).toContain("source");
    expect((await offers("edition 2"))[0]).toMatchObject({ kind: "edition", to: "/editions/2" });
    expect((await offers("sheet 1")).filter((one) => one.kind === "sheet" || one.kind === "person")).toEqual([]);
  });

  test("a name written nearly so comes with the reason", async () => {
    const [first] = await offers("watter");
    expect(first).toMatchObject({ kind: "species" });
    expect(first?.note).toContain("a name written nearly so");
    expect((await read("/find?q=watter")).words).toContain("a name written nearly so");
  });
});
