import { beforeAll, describe, expect, test } from "vitest";
import { useDatabase as workOn } from "#app/db/database.server.ts";
import { countChanges, pairValues } from "#app/editions/compare.ts";
import { editionDigest } from "#app/editions/digest.ts";
import {
  countSpeciesAsOf,
  findDetailsAsOf,
  findEdition,
  findEditions,
  findNewestEdition,
  findSourceDetailsAsOf,
  findSpeciesPageAsOf,
  findValuesAsOf,
  findValuesThatCame,
  findValuesThatWent,
  type ValueAsOf,
} from "#app/editions/editions.queries.server.ts";
import { EVERY_SPECIES, readSearch, type SpeciesFilter } from "#app/editions/search.ts";
import { csvFormat } from "#app/editions/tableFile.ts";
import { tableFilePortions } from "#app/editions/tableFile.server.ts";
import { useDatabase } from "#tests/support/database.ts";
import { publishThreeEditions } from "#tests/support/editions.ts";

/*
 * Three editions, published in the legal way: the second changes, adds and renames; the third withdraws a value, mends a
 * citation and withdraws edition 2.
 */
const database = useDatabase();

beforeAll(async () => {
  await publishThreeEditions(database.app);
});

const keysOf = (rows: readonly { key: string }[]) => [...new Set(rows.map((row) => row.key))];
const valueOf = (rows: readonly ValueAsOf[], key: string, property: string) =>
  rows.find((row) => row.key === key && row.property === property);

describe("reading as of an edition", () => {
  test("before the first edition the table is empty", async () => {
    expect(await findValuesAsOf(0, {}, database.app)).toEqual([]);
    expect(await findDetailsAsOf(0, {}, database.app)).toEqual([]);
    expect(await findSourceDetailsAsOf(0, {}, database.app)).toEqual([]);
  });

  test("digits and uncertainty come back as they went in", async () => {
    const first = await findValuesAsOf(1, {}, database.app);
    expect(valueOf(first, "H2O(l)", "enthalpyOfFormation")).toMatchObject({
      digits: "-285.830",
      uncertainty: { digits: "0.040", kind: "expanded", coverageFactor: 2 },
      temperature: "298.15",
      standardPressure: "100000",
      since: 1,
    });
  });

  test("each edition keeps the value it had", async () => {
    const digitsIn = async (n: number) =>
      valueOf(await findValuesAsOf(n, {}, database.app), "NH3(g)", "enthalpyOfFormation")?.digits;
    expect([await digitsIn(1), await digitsIn(2), await digitsIn(3)]).toEqual(["-46.11", "-45.94", "-45.94"]);
  });

  test("a value withdrawn in edition 3 still stands in edition 2", async () => {
    expect(valueOf(await findValuesAsOf(2, {}, database.app), "AgCl(cr)", "entropy")?.digits).toBe("96.25");
    expect(valueOf(await findValuesAsOf(3, {}, database.app), "AgCl(cr)", "entropy")).toBeUndefined();
  });

  test("a species renamed in edition 2 has its old key in edition 1 and keeps its id", async () => {
    const [before] = await findDetailsAsOf(1, { keys: ["CaCO3(cr)"] }, database.app);
    const [after] = await findDetailsAsOf(2, { keys: ["CaCO3(cr,calcite)"] }, database.app);
    expect(after?.speciesId).toBe(before?.speciesId);
    expect(await findDetailsAsOf(2, { keys: ["CaCO3(cr)"] }, database.app)).toEqual([]);
  });

  test("values come in the order of the UTF-8 bytes of key, then property", async () => {
    const order = (await findValuesAsOf(2, {}, database.app)).map((row) => `${row.key} ${row.property}`);
    expect(order).toEqual([...order].sort((a, b) => Buffer.compare(Buffer.from(a), Buffer.from(b))));
  });

  test("filters ask for what they name and for nothing when they name nothing", async () => {
    const [steam] = await findDetailsAsOf(3, { cas: ["7732-18-5"], hill: ["H2O"] }, database.app);
    const speciesIds = [steam?.speciesId ?? ""];
    expect(keysOf(await findValuesAsOf(3, { speciesIds, properties: ["entropy"] }, database.app))).toEqual(["H2O(g)"]);
    expect(await findValuesAsOf(3, { speciesIds: [] }, database.app)).toEqual([]);
    expect(keysOf(await findValuesAsOf(3, { sourceIds: ["src_calderpoint9"] }, database.app))).toEqual(["NH3(g)"]);
  });
});

test("a download read in portions is the whole, in order, whatever their size", async () => {
  workOn(database.app);
  const edition = await findEdition(2, database.app);
  const read = async (size: number) => {
    const portions: Buffer[] = [];
    for await (const portion of edition ? tableFilePortions(edition, csvFormat, size) : []) portions.push(portion);
    return Buffer.concat(portions).toString("utf8");
  };
  const whole = await read(1_000);
  expect(await read(1)).toBe(whole);
  expect(await read(3)).toBe(whole);
  expect(whole.trimEnd().split("\r\n").length - 1).toBe((await findValuesAsOf(2, {}, database.app)).length);
});

describe("editions", () => {
  test("the newest is the highest number, and a withdrawn one names its successor and why", async () => {
    expect((await findNewestEdition(database.app))?.number).toBe(3);
    expect((await findEditions(database.app)).map((edition) => edition.number)).toEqual([3, 2, 1]);
    expect(await findEdition(2, database.app)).toMatchObject({
      withdrawnBy: 3,
      withdrawnBecause: "The ammonia value was read from the wrong column.",
      withdraws: null,
    });
    expect(await findEdition(3, database.app)).toMatchObject({ withdraws: 2, withdrawnBy: null, came: 0, went: 1 });
    expect(await findEdition(4, database.app)).toBeUndefined();
  });

  test("digests computed outside the database are those it sealed with", async () => {
    for (const edition of await findEditions(database.app)) {
      const n = edition.number;
      const computed = editionDigest({
        values: (await findValuesAsOf(n, {}, database.app)).map((row) => ({ ...row, hash: row.rowHash })),
        species: (await findDetailsAsOf(n, {}, database.app)).map((row) => ({ ...row, hash: row.rowHash })),
        sources: (await findSourceDetailsAsOf(n, {}, database.app)).map((row) => ({
          id: row.sourceId,
          hash: row.rowHash,
        })),
        previousDigest: edition.previousDigest,
        number: n,
        licence: edition.licence,
      });
      expect(computed.toString("hex"), `edition ${n}`).toBe(edition.digest.toString("hex"));
    }
  });
});

describe("net comparison", () => {
  test.each([
    [1, 2],
    [2, 3],
    [1, 3],
  ])("of %i with %i from what moved is that of the whole tables", async (a, b) => {
    const moved = pairValues(
      await findValuesThatWent(a, b, database.app),
      await findValuesThatCame(a, b, database.app),
    );
    const whole = pairValues(await findValuesAsOf(a, {}, database.app), await findValuesAsOf(b, {}, database.app));
    expect(moved).toEqual(whole);
    expect(whole.length).toBeGreaterThan(0);
  });

  test("the counts an edition was sealed with are those of its comparison with the one before", async () => {
    const moved = pairValues(
      await findValuesThatWent(1, 2, database.app),
      await findValuesThatCame(1, 2, database.app),
    );
    const { came, changed, went } = (await findEdition(2, database.app)) ?? {};
    expect(countChanges(moved)).toEqual({ came, changed, went });
  });
});

describe("browsing", () => {
  const upwards = { by: "key", direction: "ascending" } as const;
  const found = async (filter: Partial<SpeciesFilter>, n = 3) =>
    keysOf(await findSpeciesPageAsOf(n, { ...EVERY_SPECIES, ...filter }, { order: upwards, limit: 100 }, database.app));

  test.each([
    ["water", ["H2O(g)", "H2O(l)"]],
    ["H2O", ["H2O(g)", "H2O(l)"]],
    ["OH2(l)", ["H2O(l)"]],
    ["7732-18-5", ["H2O(g)", "H2O(l)"]],
    ["Na+", ["Na+(aq)"]],
    ["Na+ (aq)", ["Na+(aq)"]],
    ["spirits of hartshorn", ["NH3(g)"]],
    ["AgCl", ["AgCl(cr)"]],
    ["calcite", ["CaCO3(cr,calcite)"]],
    ["no such thing", []],
    ["100%", []],
    ["_", []],
  ])("a search for %s finds %j", async (text, keys) => {
    expect(await found({ search: readSearch(text) })).toEqual(keys);
  });

  test("a search looks in the edition that is read, by the names it has there", async () => {
    expect(await found({ search: readSearch("calcite") }, 1)).toEqual([]);
  });

  test("elements must all be there, phases may be any", async () => {
    expect(await found({ elements: ["H", "O"] })).toEqual(["H2O(g)", "H2O(l)"]);
    expect(await found({ elements: ["H"], phases: ["g"] })).toEqual(["H2(g)", "H2O(g)", "NH3(g)"]);
    expect(await found({ phases: ["l", "aq"] })).toEqual(["H2O(l)", "Na+(aq)"]);
  });

  test("properties present and missing", async () => {
    expect(await found({ lacks: ["entropy"] })).toEqual(["AgCl(cr)"]);
    expect(await found({ holds: ["heatCapacity"] })).toEqual(["H2O(l)"]);
  });

  test("sorted by a value, what has none stands last both ways; counts agree with the list", async () => {
    for (const direction of ["ascending", "descending"] as const) {
      const rows = await findSpeciesPageAsOf(
        3,
        EVERY_SPECIES,
        { order: { by: "entropy", direction }, limit: 100 },
        database.app,
      );
      expect(rows.at(-1)?.key).toBe("AgCl(cr)");
      expect(rows[0]?.key).toBe(direction === "ascending" ? "C(cr,graphite)" : "NH3(g)");
      expect(await countSpeciesAsOf(3, EVERY_SPECIES, database.app)).toBe(rows.length);
    }
  });

  test("pages behind a key are the whole list", async () => {
    const keys: string[] = [];
    for (let after: string | null = null; ; after = keys.at(-1) ?? null) {
      const page = await findSpeciesPageAsOf(3, EVERY_SPECIES, { order: upwards, limit: 2, after }, database.app);
      if (page.length === 0) break;
      keys.push(...page.map((row) => row.key));
    }
    expect(keys).toEqual(await found({}));
  });
});
