import { beforeAll, describe, expect, test } from "vitest";
import { useDatabase as makeApplicationUse } from "#app/db/database.server.ts";
import {
  findDetailsAsOf,
  findNewestEdition,
  findSourceDetailsAsOf,
  findValuesAsOf,
} from "#app/editions/editions.queries.server.ts";
import { paths } from "#app/paths.ts";
import type { Acting } from "#app/people/person.ts";
import { findLines, findRevision } from "#app/review/review.queries.server.ts";
import { sendToReview } from "#app/review/revise.server.ts";
import { ANY_SOURCE, expanded, type ValueRow } from "#tests/support/editions.ts";
import { makePerson, signedIn } from "#tests/support/people.ts";
import { acceptAll, propose, publishWaiting } from "#tests/support/revisions.ts";
import { useServer } from "#tests/support/server.ts";

/*
 * The forms that begin a change, as a browser without scripts sends them: what comes of them, and what stays in the
 * fields when they are refused. Values: CODATA Key Values (1989), NBS tables (1982), both from memory.
 */

let steward: Acting;
let reviewer: Acting;
const cookies = { steward: "", reviewer: "", analyst: "", administrator: "" };
type Who = keyof typeof cookies;

const codata = (key: string, property: ValueRow["property"], text: string): ValueRow => ({
  key,
  property,
  digits: text,
  uncertainty: expanded("0.04"),
});

const server = useServer({
  prepare: async (database) => {
    makeApplicationUse(database.app);
    steward = await makePerson("Ines Halvard", "steward");
    reviewer = await makePerson("Ruth Amsel", "reviewer");
    cookies.steward = await signedIn(steward);
    cookies.reviewer = await signedIn(reviewer);
    cookies.analyst = await signedIn(await makePerson("Noor Vasquez", "analyst"));
    cookies.administrator = await signedIn(await makePerson("Pell Ostrander", "administrator"));
    const first = await propose(steward, {
      sources: [{ id: ANY_SOURCE, title: "Calder Point Laboratory, in-house notes (invented)" }],
      species: [
        { key: "H2(g)" },
        { key: "O2(g)" },
        { key: "H2O(l)", name: "water", cas: "7732-18-5" },
        { key: "C2H6O(g,ethanol)", name: "ethanol", cas: "64-17-5" },
        { key: "C2H6O(g,dimethyl-ether)", name: "dimethyl ether", cas: "115-10-6" },
        { key: "Na+(aq)" },
      ],
      values: [
        codata("H2(g)", "entropy", "130.680"),
        codata("O2(g)", "entropy", "205.152"),
        codata("H2O(l)", "enthalpyOfFormation", "-285.830"),
        codata("H2O(l)", "entropy", "69.95"),
        codata("C2H6O(g,ethanol)", "enthalpyOfFormation", "-235.10"),
        codata("Na+(aq)", "entropy", "58.45"),
      ],
    });
    await acceptAll(steward, reviewer, first);
    await publishWaiting(reviewer);
  },
});

beforeAll(() => makeApplicationUse(server.database.app));

async function get(path: string, who: Who = "steward") {
  const response = await server.fetch(path, { headers: { Cookie: cookies[who] } });
  const html = await response.text();
  return { status: response.status, html, text: textOf(html) };
}

async function post(path: string, fields: Record<string, string>, who: Who = "steward") {
  const response = await server.fetch(path, {
    method: "POST",
    headers: { Cookie: cookies[who] },
    body: new URLSearchParams(fields),
  });
  const html = await response.text();
  const location = response.headers.get("Location");
  return { status: response.status, html, text: textOf(html), revision: Number(/\d+$/.exec(location ?? "")?.[0]) };
}

/** What a page says, without its markup and the data that its scripts would read. */
function textOf(html: string): string {
  return html
    .replace(/<script[\s\S]*?<\/script>/g, "")
    .replace(/<!--.*?-->/g, "")
    .replace(/<[^>]+>/g, " ")
    .replace(/&#x27;/g, "'")
    .replace(/&quot;/g, '"')
    .replace(/\s+/g, " ");
}

/** The value that a field of the page starts with; a text area's text, a box's or button's tick. */
function fieldOf(html: string, name: string): string | undefined {
  const escaped = name.replace(/\./g, "\\.");
  const tag =
    new RegExp(`<input[^>]*\\sname="${escaped}"[^>]*>`).exec(html)?.[0] ??
    new RegExp(`<textarea[^>]*\\sname="${escaped}"[^>]*>([^<]*)`).exec(html)?.[0];
  if (tag?.startsWith("<textarea")) return /<textarea[^>]*>([^<]*)/.exec(tag)?.[1];
  return tag && (/\svalue="([^"]*)"/.exec(tag)?.[1] ?? "");
}

async function seen(path: string): Promise<string> {
  return fieldOf((await get(path)).html, "seen") ?? "";
}

const linesOf = async (id: number) => findLines(id, server.database.app);
const valuesOf = (species: string, query = {}) => paths.propose({ species, what: "values", ...query });

const SENT = {
  intent: "values",
  kind: "none",
  pressure: "100000",
  source: ANY_SOURCE,
  reason: "Measured again.",
  revision: "",
  title: "Water again",
};

describe("who may begin a change", () => {
  test.each<[Who]>([["analyst"], ["reviewer"], ["administrator"]])("%s may not", async (who) => {
    expect((await get(valuesOf("H2O(l)"), who)).status).toBe(403);
    expect((await get(paths.propose(), who)).status).toBe(403);
    const before = await countRevisions();
    expect(
      (await post(valuesOf("H2O(l)"), { ...SENT, "entropy.value": "70", "entropy.unit": "J/(mol K)" }, who)).status,
    ).toBe(403);
    expect(await countRevisions()).toBe(before);
    expect((await get(paths.species(1, "H2O(l)"), who)).text).not.toContain("Propose a change");
  });

  test("a steward finds the way from the species' page", async () => {
    expect((await get(paths.species(1, "H2O(l)"))).html).toContain('href="/propose?species=H2O%28l%29"');
  });
});

async function countRevisions(): Promise<number> {
  const { n } = await server.database.app
    .selectFrom("revision")
    .select(({ fn }) => fn.countAll<string>().as("n"))
    .executeTakeFirstOrThrow();
  return Number(n);
}

describe("values", () => {
  test("are read as sheets are read, and written against what stands", async () => {
    const path = valuesOf("H2O(l)");
    const { status, revision } = await post(path, {
      ...SENT,
      seen: await seen(path),
      "enthalpyOfFormation.value": "−68,315",
      "enthalpyOfFormation.valueIs": "-68.315",
      "enthalpyOfFormation.unit": "kcal mol-1",
      "enthalpyOfFormation.uncertainty": "0.010",
      "entropy.value": "69.96 ± 0.03",
      "entropy.unit": "J/mol/K",
      kind: "expanded",
      k: "1.96",
      method: "solution calorimetry",
    });
    expect(status).toBe(303);
    const lines = await linesOf(revision);
    expect(lines.map((line) => line.content)).toMatchObject([
      {
        // 68.315 × 4.184 = 285.830 (1 cal = 4.184 J exactly)
        digits: "-285.830",
        uncertainty: { digits: "0.042", kind: "expanded", coverageFactor: 1.96 },
        given: {
          text: "−68,315",
          unit: "kcal/mol",
          note: "unit given as kcal mol-1; read as −68.315; × 4.184",
        },
        method: "solution calorimetry",
        sourceId: ANY_SOURCE,
        temperature: "298.15",
        standardPressure: "100000",
      },
      { digits: "69.96", uncertainty: { digits: "0.03", kind: "expanded" } },
    ]);
    expect(lines.every((line) => line.againstRow !== null)).toBe(true);
    expect(await findRevision(revision, server.database.app)).toMatchObject({
      title: "Water again",
      summary: "Measured again.",
      state: "draft",
      sheetId: null,
    });
    const page = await get(paths.revision(revision));
    expect(page.text).toContain("Measured again.");
  });

  test("at 1 atm are brought to 1 bar, and the record keeps the step", async () => {
    const path = valuesOf("O2(g)");
    const { revision } = await post(path, {
      ...SENT,
      title: "Oxygen from an old table",
      seen: await seen(path),
      pressure: "101325",
      "entropy.value": "205.028",
      "entropy.unit": "J/(mol K)",
    });
    expect((await linesOf(revision))[0]?.content).toMatchObject({
      // 205.028 + R ln 1.01325 = 205.137
      digits: "205.137",
      given: { text: "205.028", unit: "J/(mol K)", note: "1 atm to 1 bar: + 0.1094" },
      standardPressure: "100000",
    });
  });

  test("of a solute keep the standard state that the source said", async () => {
    const path = valuesOf("Na+(aq)");
    const { revision } = await post(path, {
      ...SENT,
      title: "Sodium ion",
      seen: await seen(path),
      basis: "molality",
      "entropy.value": "58.9",
      "entropy.unit": "J/(mol K)",
    });
    expect((await linesOf(revision))[0]?.content).toMatchObject({ basis: "molality" });
  });

  test("with a source described in the form bring its line with them", async () => {
    const path = valuesOf("H2O(l)", { property: "heatCapacity" });
    const { status, revision } = await post(path, {
      ...SENT,
      title: "Heat capacity of water",
      seen: await seen(path),
      source: "new",
      "source.title": "Notebook 41 of the calorimetry room (invented)",
      "source.sourceKind": "measurement",
      "heatCapacity.value": "75.29",
      "heatCapacity.unit": "J/(mol K)",
    });
    expect(status).toBe(303);
    const lines = await linesOf(revision);
    expect(lines.map((line) => line.kind)).toEqual(["source", "value"]);
    const [source, value] = lines;
    expect(value?.content).toMatchObject({ sourceId: source?.sourceId });
  });

  test("go into a draft that is chosen", async () => {
    const path = valuesOf("H2(g)", { property: "heatCapacity" });
    const first = await post(path, {
      ...SENT,
      title: "Hydrogen",
      seen: await seen(path),
      "heatCapacity.value": "28.836",
      "heatCapacity.unit": "J/(mol K)",
    });
    expect((await get(valuesOf("H2(g)"))).text).toContain(`revision ${first.revision}: Hydrogen`);
    const sent = {
      ...SENT,
      title: "",
      revision: String(first.revision),
      seen: await seen(path),
      "enthalpyIncrement.value": "8.467",
      "enthalpyIncrement.unit": "kJ/mol",
    };
    expect((await post(path, sent)).revision).toBe(first.revision);
    // The same place once more is refused by name, on the form, with what was typed.
    const again = await post(path, { ...sent, "enthalpyIncrement.value": "8.468" });
    expect(again.status).toBe(409);
    expect(again.text).toContain(
      `Revision ${first.revision} already has a line for H°(T)−H°(0) of H2(g): 8.467 kJ/mol. Change that line, or take it out first.`,
    );
    expect(fieldOf(again.html, "enthalpyIncrement.value")).toBe("8.468");
    expect(await linesOf(first.revision)).toHaveLength(2);
  });

  test("refused, say why beside each field and lose nothing that was typed", async () => {
    const before = await countRevisions();
    const { status, html, text } = await post(valuesOf("H2O(l)"), {
      ...SENT,
      title: "",
      source: "",
      reason: "",
      "enthalpyOfFormation.value": "-1,234",
      "enthalpyOfFormation.unit": "kJ/mol",
      "entropy.value": "sixty-nine",
      "entropy.unit": "kJ/mol",
      "heatCapacity.uncertainty": "0.3",
      method: "by <b>eye</b>",
    });
    expect(status).toBe(422);
    for (const sentence of [
      "“-1,234” can be read as −1.234 or as −1234. Say which it is.",
      "“sixty-nine” is not a number.",
      "S° is written in J/(mol K) or its like, not in kJ/mol.",
      "An uncertainty stands here without its value.",
      "Say where it comes from.",
      "Say why. The reviewer reads it beside the change.",
      "Give the new draft a title of one line and at most 200 characters.",
    ]) {
      expect(text).toContain(sentence);
    }
    expect(html).toContain('name="enthalpyOfFormation.valueIs" value="-1.234"');
    expect(fieldOf(html, "entropy.value")).toBe("sixty-nine");
    expect(fieldOf(html, "heatCapacity.uncertainty")).toBe("0.3");
    expect(fieldOf(html, "method")).toBe("by &lt;b&gt;eye&lt;/b&gt;");
    expect(await countRevisions()).toBe(before);
  });

  test("written against something that has moved since are held", async () => {
    const path = valuesOf("H2O(l)");
    const { status, text, html } = await post(path, {
      ...SENT,
      seen: "entropy:1",
      "entropy.value": "70.1",
      "entropy.unit": "J/(mol K)",
    });
    expect(status).toBe(409);
    expect(text).toContain("S° of H2O(l) was changed in the table since you opened the page.");
    expect(fieldOf(html, "entropy.value")).toBe("70.1");
  });

  test("nothing filled in is nothing to propose", async () => {
    expect((await post(valuesOf("H2O(l)"), SENT)).text).toContain("Write at least one value.");
  });
});

describe("withdrawals", () => {
  const path = paths.propose({ species: "H2O(l)", what: "withdrawal" });

  test("take out every value that is ticked, with the reason", async () => {
    const { revision } = await post(path, {
      intent: "withdrawal",
      seen: await seen(path),
      "takes.entropy": "on",
      "takes.enthalpyOfFormation": "on",
      reason: "The sample was heavy water.",
      title: "Water goes out",
    });
    const lines = await linesOf(revision);
    expect(lines.map((line) => [line.property, line.content])).toEqual([
      ["enthalpyOfFormation", { kind: "withdrawal", reason: "The sample was heavy water." }],
      ["entropy", { kind: "withdrawal", reason: "The sample was heavy water." }],
    ]);
  });

  test("without a tick or a reason are held", async () => {
    const { status, text } = await post(path, { intent: "withdrawal", title: "Water goes out" });
    expect(status).toBe(422);
    expect(text).toContain("Tick at least one value.");
    expect(text).toContain("Say why.");
  });
});

describe("what a species is called", () => {
  const path = paths.propose({ species: "H2O(l)", what: "names" });
  const sent = { intent: "names", formula: "H2O", label: "", name: "water", cas: "7732-18-5", title: "Names" };

  test("is proposed whole, with what stands in its fields", async () => {
    const { html } = await get(path);
    expect(["formula", "name", "cas"].map((name) => fieldOf(html, name))).toEqual(["H2O", "water", "7732-18-5"]);
    const { revision } = await post(path, {
      ...sent,
      seen: await seen(path),
      inchikey: "InChIKey=XLYOFNOQVPJJNP-UHFFFAOYSA-N",
      synonyms: "oxidane\r\ndihydrogen oxide\r\n\r\noxidane",
      reason: "Names of the recommendations.",
    });
    const [line] = await linesOf(revision);
    expect(line?.content).toMatchObject({
      key: "H2O(l)",
      name: "water",
      cas: "7732-18-5",
      inchikey: "XLYOFNOQVPJJNP-UHFFFAOYSA-N",
      synonyms: ["oxidane", "dihydrogen oxide"],
    });
    expect(line?.againstRow).not.toBeNull();
  });

  test.each([
    ["a mistyped CAS number", { cas: "7732-18-6" }, /ends in 6, but its other digits call for 5/],
    ["an InChIKey that is none", { inchikey: "WATER" }, /14, 10 and 1 capital letters/],
    ["another composition", { formula: "H2O2" }, /another composition or charge, and so another species/],
    ["a formula that is none", { formula: "Xq" }, /cannot be read as a formula/],
    ["a label that cannot stand in a key", { label: "a(b)" }, /letters, digits and hyphens/],
  ])("%s is refused beside its field", async (_what, rest, sentence) => {
    const { status, text } = await post(path, { ...sent, ...rest, seen: await seen(path), reason: "x" });
    expect(status).toBe(422);
    expect(text).toMatch(sentence);
  });

  test("unchanged is nothing to propose", async () => {
    const { status, text } = await post(path, { ...sent, seen: await seen(path), reason: "No reason." });
    expect(status).toBe(409);
    expect(text).toContain("Nothing would change: what H2O(l) is called stands with just this.");
  });

  test("a CAS number of a species of another formula is asked about, and proposed once that is answered", async () => {
    const form = { ...sent, seen: await seen(path), cas: "64-17-5", reason: "As on the bottle." };
    const asked = await post(path, form);
    expect(asked.status).toBe(422);
    expect(asked.text).toContain(", a species of another formula, carries the CAS number 64-17-5 already.");
    const answer = fieldOf(asked.html, "answer") ?? "";
    expect(answer).not.toBe("");
    expect((await post(path, { ...form, answer: "something else" })).status).toBe(422);
    const { revision } = await post(path, { ...form, answer });
    // The examination says it again, for the reviewer.
    expect((await get(paths.revision(revision))).text).toContain("carries the CAS number 64-17-5");
  });

  test("a key that another species holds is refused", async () => {
    const isomer = paths.propose({ species: "C2H6O(g,ethanol)", what: "names" });
    const { status, text } = await post(isomer, {
      intent: "names",
      formula: "C2H6O",
      label: "dimethyl ether",
      name: "ethanol",
      cas: "64-17-5",
      seen: await seen(isomer),
      reason: "x",
      title: "Isomers",
    });
    expect(status).toBe(409);
    expect(text).toContain("C2H6O(g,dimethyl-ether) is another species already.");
  });
});

describe("a new species", () => {
  const path = paths.propose();
  const sent = { intent: "species", phase: "", label: "", reason: "Wanted for the electrolysis line.", title: "New" };

  test("comes with its values and its name", async () => {
    const { revision } = await post(path, {
      ...sent,
      formula: "H2O2",
      phase: "liquid",
      name: "hydrogen peroxide",
      cas: "7722-84-1",
      source: ANY_SOURCE,
      "enthalpyOfFormation.value": "-187.78",
      "enthalpyOfFormation.unit": "kJ/mol",
      "entropy.value": "109.6",
      "entropy.unit": "J/(mol K)",
    });
    const lines = await linesOf(revision);
    expect(lines.map((line) => line.kind)).toEqual(["detail", "value", "value"]);
    expect(lines[0]?.content).toMatchObject({ key: "H2O2(l)", name: "hydrogen peroxide", cas: "7722-84-1" });
    expect(new Set(lines.map((line) => line.speciesId)).size).toBe(1);
    // It stands nowhere yet, and still further values may be proposed for it, in the same draft or in another.
    const more = valuesOf("H2O2(l)");
    const added = await post(more, {
      ...SENT,
      revision: String(revision),
      seen: await seen(more),
      "heatCapacity.value": "89.1",
      "heatCapacity.unit": "J/(mol K)",
    });
    expect(added.revision).toBe(revision);
    expect((await linesOf(revision)).map((line) => line.kind)).toEqual(["detail", "value", "value", "value"]);
    const apart = await post(more, {
      ...SENT,
      title: "Peroxide apart",
      seen: await seen(more),
      "gibbsEnergyOfFormation.value": "-120.35",
      "gibbsEnergyOfFormation.unit": "kJ/mol",
    });
    expect((await linesOf(apart.revision)).map((line) => line.kind)).toEqual(["detail", "value"]);
    // A second species of this key is refused, naming where the first is proposed.
    const twice = await post(path, { ...sent, formula: "H2O2(l)" });
    expect(twice.status).toBe(422);
    expect(twice.text).toContain(`H2O2(l) is proposed in revision ${revision} already.`);
  });

  test("written in two ways is asked about with both", async () => {
    const asked = await post(path, { ...sent, formula: "Hg2+", phase: "aq", name: "mercury ion" });
    expect(asked.status).toBe(422);
    expect(asked.html).toContain('name="formulaIs" value="Hg+2"');
    expect(asked.html).toContain('name="formulaIs" value="Hg2+1"');
    expect(fieldOf(asked.html, "name")).toBe("mercury ion");
    const { revision } = await post(path, { ...sent, formula: "Hg2+", phase: "aq", formulaIs: "Hg+2" });
    expect((await linesOf(revision))[0]?.content).toMatchObject({ key: "Hg+2(aq)" });
  });

  test("is shown what it may be the same as, before anything is written", async () => {
    const before = await countRevisions();
    const form = { ...sent, formula: "C2H6O", phase: "g", label: "methoxymethane", name: "dimethyl ether" };
    const asked = await post(path, form);
    expect(asked.status).toBe(422);
    expect(asked.text).toContain("2 species of the same composition, charge and phase are there already:");
    expect(asked.text).toContain("is called dimethyl ether already.");
    expect(await countRevisions()).toBe(before);
    const { status } = await post(path, { ...form, answer: fieldOf(asked.html, "answer") ?? "" });
    expect(status).toBe(303);
  });

  test("that the table has already is not proposed again", async () => {
    const { status, text } = await post(path, { ...sent, formula: "H2O", phase: "lq" });
    expect(status).toBe(422);
    expect(text).toContain("H2O(l) is in the table already. Propose its values on its own page");
  });

  test.each([
    ["nothing typed", {}, /Write the formula/],
    ["no phase", { formula: "NaCl" }, /Write the phase/],
    ["an ion in a crystal", { formula: "Na+", phase: "cr" }, /carries a charge/],
    ["an element without its form", { formula: "C", phase: "cr" }, /only graphite/],
  ])("%s is refused", async (_what, rest, sentence) => {
    const { status, text } = await post(path, { ...sent, ...rest });
    expect(status).toBe(422);
    expect(text).toMatch(sentence);
  });
});

describe("values that belong to another species", () => {
  const path = paths.propose({ species: "C2H6O(g,ethanol)", what: "other" });

  test("are withdrawn here and set there, in one revision", async () => {
    const { revision, status } = await post(path, {
      intent: "other",
      seen: await seen(path),
      "takes.enthalpyOfFormation": "on",
      formula: "C2H6O(g,dimethyl-ether)",
      phase: "",
      label: "",
      reason: "The label on the bottle was wrong.",
      title: "The other isomer",
    });
    expect(status).toBe(303);
    const [detail] = await findDetailsAsOf(1, { keys: ["C2H6O(g,dimethyl-ether)"] }, server.database.app);
    const lines = await linesOf(revision);
    expect(lines.map((line) => [line.kind, line.speciesId === detail?.speciesId])).toEqual([
      ["withdrawal", false],
      ["value", true],
    ]);
    expect(lines[1]?.content).toMatchObject({ digits: "-235.10", uncertainty: { digits: "0.04" } });
  });

  test("may bring that species into the table", async () => {
    const { revision } = await post(path, {
      intent: "other",
      seen: await seen(path),
      "takes.enthalpyOfFormation": "on",
      formula: "C2H6O",
      phase: "l",
      label: "ethanol",
      name: "ethanol",
      reason: "The value is that of the liquid.",
      title: "The liquid",
    });
    expect((await linesOf(revision)).map((line) => line.kind)).toEqual(["detail", "withdrawal", "value"]);
  });

  test("are not moved to where they stand", async () => {
    const { status, text } = await post(path, {
      intent: "other",
      seen: await seen(path),
      "takes.enthalpyOfFormation": "on",
      formula: "C2H6O(g,ethanol)",
      reason: "x",
      title: "x",
    });
    expect(status).toBe(422);
    expect(text).toContain("is this species itself");
  });
});

describe("a line written anew", () => {
  test("says what its fields say, and keeps what it said before", async () => {
    const names = paths.propose({ species: "O2(g)", what: "names" });
    const { revision } = await post(names, {
      intent: "names",
      formula: "O2",
      label: "",
      name: "dioxigen",
      seen: await seen(names),
      reason: "It has no name yet.",
      title: "A name",
    });
    const [line] = await linesOf(revision);
    const path = paths.revisionLine(revision, line?.id ?? "");
    expect((await get(paths.revision(revision))).html).toContain(`href="${path}"`);
    const { html } = await get(path);
    expect(fieldOf(html, "name")).toBe("dioxigen");
    const form = {
      version: fieldOf(html, "version") ?? "",
      formula: "O2",
      label: "",
      name: "dioxygen",
      cas: "7782-44-7",
    };
    expect((await post(path, { ...form, reason: "" })).text).toContain("Say why.");
    const wrong = await post(path, { ...form, cas: "7782-44-8", reason: "A letter was wrong." });
    expect(wrong.status).toBe(422);
    expect(fieldOf(wrong.html, "name")).toBe("dioxygen");
    expect((await post(path, { ...form, reason: "A letter was wrong." })).status).toBe(303);
    expect((await linesOf(revision))[0]).toMatchObject({
      version: 2,
      content: { name: "dioxygen", cas: "7782-44-7", key: "O2(g)" },
    });
    // The version that was edited is behind: nothing is overwritten unseen.
    expect((await post(path, { ...form, name: "oxygen", reason: "Again." })).status).toBe(409);
  });

  test("may be a source, a withdrawal or a value with its conditions", async () => {
    const path = valuesOf("H2(g)", { property: "gibbsEnergyOfFormation" });
    const { revision } = await post(path, {
      ...SENT,
      title: "Zero",
      seen: await seen(path),
      source: "new",
      "source.title": "Notebok 7 (invented)",
      "source.sourceKind": "estimate",
      "gibbsEnergyOfFormation.value": "0",
      "gibbsEnergyOfFormation.unit": "kJ/mol",
      kind: "exact",
    });
    const [source, value] = await linesOf(revision);
    const at = (id: string | undefined) => paths.revisionLine(revision, id ?? "");
    expect(fieldOf((await get(at(source?.id))).html, "source.title")).toBe("Notebok 7 (invented)");
    const mended = await post(at(source?.id), {
      version: "1",
      "source.title": "Notebook 7 (invented)",
      "source.sourceKind": "estimate",
      reason: "A letter was missing.",
    });
    expect(mended.status).toBe(303);
    const changed = await post(at(value?.id), {
      version: "1",
      "gibbsEnergyOfFormation.value": "0.00",
      "gibbsEnergyOfFormation.unit": "kJ/mol",
      kind: "exact",
      pressure: "100000",
      method: "by convention",
      source: ANY_SOURCE,
      reason: "The table's own source.",
    });
    expect(changed.status).toBe(303);
    expect((await linesOf(revision)).map((line) => line.content)).toMatchObject([
      { citation: { title: "Notebook 7 (invented)" } },
      { digits: "0.00", method: "by convention", sourceId: ANY_SOURCE },
    ]);
    await sendToReview(steward, revision, "");
    expect((await get(at(value?.id))).text).toContain("Lines are written only while their revision is a draft");
    expect((await post(at(value?.id), { version: "2", reason: "Late." })).status).toBe(422);
  });

  test.each([
    ["a line of another revision", "/revisions/1/lines/999999", 404],
    ["a line that is none", "/revisions/1/lines/one", 404],
    ["no revision", "/revisions/999999/lines/1", 404],
  ])("%s is not found", async (_what, path, status) => {
    expect((await get(path)).status).toBe(status);
  });
});

describe("addresses", () => {
  test.each([
    ["/propose?species=Zz(g)", 404],
    ["/propose?species=H2O(l)&what=everything", 400],
    ["/propose?species=H2O(l)&property=colour", 400],
    ["/propose?species=H2O(l)&revision=x", 400],
    ["/propose?other=1", 400],
    ["/propose?species=H2O(l)&revision=999999", 200],
    ["/propose?species=Na+(aq)", 200],
    ["/propose?species=H2O,%20liquid", 200],
  ])("%s answers %i", async (path, status) => {
    expect((await get(path)).status).toBe(status);
  });

  test("a form without its intent is refused, not guessed", async () => {
    expect((await post(valuesOf("H2O(l)"), {})).status).toBe(400);
    expect((await post(paths.propose(), { intent: "values" })).status).toBe(400);
  });
});

test("proposed, sent, accepted, published: the next edition shows it, and the one before is as it was", async () => {
  const before = await findValuesAsOf(1, {}, server.database.app);
  const sourcesBefore = await findSourceDetailsAsOf(1, {}, server.database.app);
  const path = valuesOf("O2(g)", { property: "heatCapacity" });
  const { revision } = await post(path, {
    ...SENT,
    title: "Heat capacity of oxygen",
    seen: await seen(path),
    "heatCapacity.value": "29.378(2)",
    "heatCapacity.unit": "J/(mol K)",
  });
  await acceptAll(steward, reviewer, revision);
  await publishWaiting(reviewer);
  const edition = (await findNewestEdition(server.database.app))?.number ?? 0;
  expect(edition).toBe(2);
  expect((await get(paths.species(edition, "O2(g)"), "analyst")).text).toMatch(/29\s*\.378/);
  expect((await get(paths.species(1, "O2(g)"), "analyst")).text).not.toMatch(/29\s*\.378/);
  expect(await findValuesAsOf(1, {}, server.database.app)).toEqual(before);
  expect(await findSourceDetailsAsOf(1, {}, server.database.app)).toEqual(sourcesBefore);
});
