import fc from "fast-check";
import { beforeAll, describe, expect, test } from "vitest";
import {
  countSpeciesAsOf,
  findNamesNear,
  findSpeciesPageAsOf,
  type SpeciesOrder,
} from "#app/editions/editions.queries.server.ts";
import {
  BARE,
  CHARGE_KINDS,
  ELEMENTS_HOW,
  EVERY_SPECIES,
  readSearch,
  type SpeciesFilter,
} from "#app/editions/search.ts";
import { compareBytes } from "#app/editions/digest.ts";
import { PHASES } from "#app/thermo/phase.ts";
import { isProperty, PROPERTIES } from "#app/thermo/property.ts";
import { type BigSpecies, type BigTable, publishBigTable } from "#tests/support/bigTable.ts";
import { useDatabase } from "#tests/support/database.ts";

/*
 * The table at its full width: 20 000 species with 60 000 made-up values. What a filter lets through, and in which order, is
 * held against the same question asked of the rows in plain words of the language.
 */

const database = useDatabase();
let table: BigTable;
beforeAll(async () => {
  table = await publishBigTable(database);
}, 300_000);

const MADE_OF = ["H", "C", "O", "N", "S", "Na", "Ca", "Cl"];

/** Whether a species is let through, written without the database. */
function letsThrough(filter: SpeciesFilter, one: BigSpecies): boolean {
  const { elements, elementsHow, phases, charge, holds, lacks, bare = [], sourceIds, search } = filter;
  const atoms = Object.keys(one.composition);
  const values = Object.values(one.values);
  const hasAll = elements.every((element) => atoms.includes(element));
  const hasNoOther = atoms.every((atom) => elements.includes(atom));
  const byElements =
    elements.length === 0 ||
    (elementsHow === "only" ? hasNoOther : elementsHow === "exactly" ? hasAll && hasNoOther : hasAll);
  const byCharge =
    !charge ||
    { neutral: one.charge === 0, ion: one.charge !== 0, cation: one.charge > 0, anion: one.charge < 0 }[charge];
  const isBare = {
    uncertainty: values.some((value) => value.uncertainty === null),
    cas: one.cas === null,
    name: one.name === "",
    stated: values.length > 0 && values.every((value) => value.origin === "derived"),
  };
  const text = search?.text.toLowerCase() ?? "";
  return (
    byElements &&
    byCharge &&
    (phases.length === 0 || phases.includes(one.phase)) &&
    holds.every((property) => one.values[property]) &&
    lacks.every((property) => !one.values[property]) &&
    bare.every((what) => isBare[what]) &&
    (!sourceIds || values.some((value) => sourceIds.includes(value.sourceId))) &&
    (!search ||
      [one.name, ...one.synonyms].some((name) => name.toLowerCase().includes(text)) ||
      one.key.toLowerCase().startsWith(text) ||
      (search.cas !== null && one.cas === search.cas) ||
      search.formulas.some(({ hill, charge: asked }) => hill === one.hill && (asked === null || asked === one.charge)))
  );
}

/** The order without the database: what lacks the thing sorted by stands last, equals stand by key. */
function inOrder(order: SpeciesOrder, species: readonly BigSpecies[]): string[] {
  const turn = order.direction === "descending" ? -1 : 1;
  const by = order.by;
  const compare = (a: BigSpecies, b: BigSpecies): number => {
    if (!isProperty(by)) return turn * compareBytes(a.key, b.key);
    const [first, second] = [a.values[by]?.digits, b.values[by]?.digits];
    if (first === undefined || second === undefined) {
      return Number(first === undefined) - Number(second === undefined) || compareBytes(a.key, b.key);
    }
    return turn * (Number(first) - Number(second)) || compareBytes(a.key, b.key);
  };
  return [...species].sort(compare).map((one) => one.key);
}

const filters: fc.Arbitrary<SpeciesFilter> = fc.record({
  search: fc
    .oneof(
      { weight: 3, arbitrary: fc.constant("") },
      fc.constantFrom("chloride", "OH2", "CaSO4", "Calder 1", "ion", "a", "100", "C2H6O", "NaCl", "%", "_", "\\"),
    )
    .map(readSearch)
    // Keys name a form or none; that reading is tried by itself.
    .filter((search) => search === null || search.identities.length === 0),
  elements: fc.subarray(MADE_OF, { maxLength: 3 }),
  elementsHow: fc.constantFrom(...ELEMENTS_HOW),
  phases: fc.subarray([...PHASES], { maxLength: 2 }),
  cas: fc.constant(null),
  charge: fc.option(fc.constantFrom(...CHARGE_KINDS)),
  holds: fc.subarray([...PROPERTIES], { maxLength: 2 }),
  lacks: fc.subarray([...PROPERTIES], { maxLength: 1 }),
  bare: fc.subarray([...BARE], { maxLength: 2 }),
  sourceIds: fc.option(fc.constantFrom(["src_madeup0001"], ["src_madeup0002", "src_madeup0003"]), { freq: 4 }),
});
const orders: fc.Arbitrary<SpeciesOrder> = fc.record({
  by: fc.constantFrom("key" as const, ...PROPERTIES),
  direction: fc.constantFrom("ascending" as const, "descending" as const),
});

describe("filter and order", { timeout: 300_000 }, () => {
  test("let through what the same question in plain words lets through, in the same order, on any page", async () => {
    await fc.assert(
      fc.asyncProperty(filters, orders, fc.nat(300), async (filter, order, offset) => {
        const expected = inOrder(
          order,
          table.species.filter((one) => letsThrough(filter, one)),
        );
        const [page, count] = await Promise.all([
          findSpeciesPageAsOf(table.edition, filter, { order, limit: 50, offset }, database.app),
          countSpeciesAsOf(table.edition, filter, database.app),
        ]);
        expect(count).toBe(expected.length);
        expect(page.map((one) => one.key)).toEqual(expected.slice(offset, offset + 50));
      }),
      { numRuns: 40, examples: [[EVERY_SPECIES, { by: "entropy", direction: "descending" }, 0]] },
    );
  });

  test("each kind of filter lets something through and something not", async () => {
    const some: Partial<SpeciesFilter>[] = [
      { elements: ["C", "H"], elementsHow: "only" },
      { elements: ["Na", "Cl"], elementsHow: "exactly" },
      { charge: "cation" },
      ...BARE.map((what) => ({ bare: [what] })),
      { sourceIds: ["src_madeup0001"] },
    ];
    for (const part of some) {
      const count = await countSpeciesAsOf(table.edition, { ...EVERY_SPECIES, ...part }, database.app);
      expect([part, count > 0 && count < table.species.length]).toEqual([part, true]);
    }
  });

  test("Hill order compares counts as numbers: C2H6 before C10H8", async () => {
    const filter = { ...EVERY_SPECIES, elements: ["C", "H"], elementsHow: "exactly" as const };
    const order = { by: "hill" as const, direction: "ascending" as const };
    const found = await findSpeciesPageAsOf(table.edition, filter, { order, limit: 5_000 }, database.app);
    const counts = found.map(({ composition }) => [composition["C"] ?? 0, composition["H"] ?? 0] as const);
    expect(counts.length).toBeGreaterThan(100);
    expect(counts).toEqual([...counts].sort(([c, h], [otherC, otherH]) => c - otherC || h - otherH));
  });

  test("a name written nearly so is found: sulphate", async () => {
    const near = await findNamesNear(table.edition, "sulphate", 5, database.app);
    expect(near.length).toBeGreaterThan(0);
    const first = table.species.find((one) => one.id === near[0]?.speciesId);
    expect(first?.name).toContain("sulfate");
  });
});

test("the made-up table is well formed", () => {
  expect(table.species).toHaveLength(20_000);
  expect(new Set(table.species.map((one) => one.key)).size).toBe(20_000);
  const values = table.species.reduce((sum, one) => sum + Object.keys(one.values).length, 0);
  expect(values).toBeGreaterThan(55_000);
  expect(table.species.filter((one) => one.cas).every((one) => readSearch(one.cas ?? "")?.cas === one.cas)).toBe(true);
});
