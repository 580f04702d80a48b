import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { useDatabase as workOn } from "#app/db/database.server.ts";
import { makeKey } from "#app/people/apiKey.server.ts";
import { publishThreeEditions } from "#tests/support/editions.ts";
import { makePerson } from "#tests/support/people.ts";
import { useServer } from "#tests/support/server.ts";

let key = "";

const server = useServer({
  async prepare(database) {
    workOn(database.app);
    await publishThreeEditions(database.app);
    const analyst = await makePerson("A. Analyst", "analyst");
    key = (await makeKey(analyst, { name: "notebook", scopes: ["read"], days: 30 })).key;
  },
});

function send(body: BodyInit, edition: number | string = 3, headers: Record<string, string> = {}): Promise<Response> {
  return server.fetch(`/api/v1/editions/${edition}/lookup`, {
    method: "POST",
    body,
    headers: { Authorization: `Bearer ${key}`, "Content-Type": "application/json", ...headers },
  });
}
const ask = (question: unknown, edition: number | string = 3): Promise<Response> =>
  send(JSON.stringify(question), edition);

interface Entry {
  asked: string;
  outcome: string;
  sentence?: string;
  species?: { key: string; id: string; values: { property: string; digits: string }[] };
  missing?: string[];
  candidates?: { key: string }[];
}
const entriesOf = async (answer: Response): Promise<Entry[]> => ((await answer.json()) as { entries: Entry[] }).entries;

describe("a question about many species", () => {
  test("has one entry for each item, in order, found, asked back or unknown, and never a gap", async () => {
    const answer = await ask({
      species: ["Na (aq)", "H2O(liq)", "nothing", "WATER", "H2O(l)", "7732-18-5", "Na+(aq)"],
    });
    expect(answer.status).toBe(200);
    const entries = await entriesOf(answer);
    expect(entries.map(({ asked, outcome }) => [asked, outcome])).toEqual([
      // A body loses no plus sign, so this is neutral sodium, which the table does not have.
      ["Na (aq)", "unknown"],
      ["H2O(liq)", "found"],
      ["nothing", "unknown"],
      ["WATER", "ambiguous"],
      ["H2O(l)", "found"],
      ["7732-18-5", "ambiguous"],
      ["Na+(aq)", "found"],
    ]);
    expect(entries[0]?.sentence).toContain("Na+(aq)");
    expect(entries[3]?.candidates?.map((one) => one.key)).toEqual(["H2O(g)", "H2O(l)"]);
    expect(entries[1]?.species).toEqual(entries[4]?.species);
  });

  test("may narrow by phase and by property, and says which values are missing", async () => {
    const answer = await ask({ species: ["water"], phase: "l", properties: ["entropy", "enthalpyIncrement"] });
    const [entry] = await entriesOf(answer);
    expect(entry?.species?.key).toBe("H2O(l)");
    // CODATA Key Values (1989): S°(H2O, l) = 69.95 J/(mol K).
    expect(entry?.species?.values.map((value) => [value.property, value.digits])).toEqual([["entropy", "69.95"]]);
    expect(entry?.missing).toEqual(["enthalpyIncrement"]);
  });

  test("is answered as of its edition: names and keys of that edition, and former keys", async () => {
    const question = { species: ["CaCO3(cr)", "CaCO3(cr,calcite)"] };
    expect((await entriesOf(await ask(question, 1))).map((one) => one.species?.key ?? one.outcome)).toEqual([
      "CaCO3(cr)",
      "unknown",
    ]);
    expect((await entriesOf(await ask(question, 3))).map((one) => one.species?.key)).toEqual([
      "CaCO3(cr,calcite)",
      "CaCO3(cr,calcite)",
    ]);
  });

  test("under current is answered as under the newest number, which it names", async () => {
    const question = { species: ["H2O(l)", "water"] };
    const [current, numbered] = [await ask(question, "current"), await ask(question, 3)];
    expect(current.headers.get("Content-Location")).toBe("/api/v1/editions/3/lookup");
    expect(current.headers.get("Repr-Digest")).toBe(numbered.headers.get("Repr-Digest"));
    expect(await current.text()).toBe(await numbered.text());
  });

  test("may have a thousand items, and no more", async () => {
    const species = Array.from({ length: 1000 }, (_, index) => (index % 2 ? "H2O(l)" : `nothing ${index}`));
    const entries = await entriesOf(await ask({ species }));
    expect(entries.map((one) => one.asked)).toEqual(species);
    expect(entries.filter((one) => one.outcome === "found")).toHaveLength(500);
    const answer = await ask({ species: [...species, "H2O(g)"] });
    expect([answer.status, await answer.json()]).toMatchObject([422, { errors: [{ pointer: "/species" }] }]);
  });
});

describe("what cannot be a question", () => {
  test.each<[what: string, body: string | Uint8Array, status: number, pointer?: string]>([
    ["broken off", '{"species":["H2O', 400],
    ["empty", "", 400],
    ["not UTF-8", new Uint8Array([0x7b, 0xff, 0x7d]), 400],
    ["a list", "[]", 422, ""],
    ["a number", "7", 422, ""],
    ["without species", "{}", 422, "/species"],
    ["with an unknown member", '{"species":["H2O(l)"],"limit":1}', 422, ""],
    ["with no species", '{"species":[]}', 422, "/species"],
    ["with a number among the texts", '{"species":["H2O(l)",7]}', 422, "/species/1"],
    ["with NUL", '{"species":["H2O\\u0000(l)"]}', 422, "/species/0"],
    ["with half a surrogate pair", '{"species":["\\ud83d"]}', 422, "/species/0"],
    ["with a line end", '{"species":["H2O\\n(l)"]}', 422, "/species/0"],
    ["with an item of a million characters", JSON.stringify({ species: ["H".repeat(1_000_000)] }), 422, "/species/0"],
    ["with an unknown phase", '{"species":["H2O(l)"],"phase":"plasma"}', 422, "/phase"],
    ["with an unknown property", '{"species":["H2O(l)"],"properties":["colour"]}', 422, "/properties/0"],
    ["nested a hundred thousand deep", `{"species":${"[".repeat(100_000)}${"]".repeat(100_000)}}`, 422, "/species/0"],
    ["a list of half a million", JSON.stringify({ species: new Array(500_000).fill(1) }), 422, "/species"],
    ["of three megabytes", JSON.stringify({ species: ["x".repeat(3_000_000)] }), 413],
    ["with __proto__", '{"__proto__":{"species":["H2O(l)"]}}', 422, "/species"],
  ])("%s", async (_what, body, status, pointer) => {
    const answer = await send(body as BodyInit);
    expect(answer.status).toBe(status);
    const problem = (await answer.json()) as { errors?: { pointer: string }[] };
    if (pointer !== undefined) expect(problem.errors?.map((one) => one.pointer)).toContain(pointer);
  });

  test.each(["text/plain", "application/x-www-form-urlencoded", "multipart/form-data; boundary=b", "nonsense"])(
    "sent as %s",
    async (type) => {
      expect((await send('{"species":["H2O(l)"]}', 3, { "Content-Type": type })).status).toBe(415);
    },
  );

  test("an edition that is not there", async () => {
    expect((await ask({ species: ["H2O(l)"] }, 9)).status).toBe(404);
  });

  test("anything at all is answered with an entry each or refused", { timeout: 60_000 }, async () => {
    await fc.assert(
      fc.asyncProperty(fc.oneof(fc.json({ depthSize: "small" }), fc.string({ unit: "binary" })), async (body) => {
        const answer = await send(body);
        expect(answer.status).toBeGreaterThanOrEqual(400);
        expect(answer.status).toBeLessThan(500);
      }),
      { numRuns: 100 },
    );
    const item = fc.oneof(
      fc.string({ unit: "grapheme", maxLength: 40 }),
      fc.stringMatching(/^[A-Z][a-z]?[0-9]?[A-Z]?[0-9]?[+-]?[0-9]?\((g|l|aq|cr|cr,[a-z]{1,5})\)$/),
    );
    await fc.assert(
      fc.asyncProperty(fc.array(item, { minLength: 1, maxLength: 20 }), async (species) => {
        const answer = await ask({ species });
        if (species.some((one) => /\p{Cc}/u.test(one))) expect(answer.status).toBe(422);
        else expect((await entriesOf(answer)).map((one) => one.asked)).toEqual(species);
      }),
      { numRuns: 100 },
    );
  });
});
