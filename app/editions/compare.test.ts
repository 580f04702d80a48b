import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { digits } from "#app/thermo/digits.ts";
import { PROPERTIES } from "#app/thermo/property.ts";
import {
  applyChanges,
  type ComparedValue,
  pageOfChanges,
  pairRecords,
  pairValues,
  turnRound,
  valueChange,
} from "./compare.ts";
import { compareBytes, rowHash } from "./digest.ts";

function value(over: Partial<ComparedValue> & { printed?: string } = {}): ComparedValue {
  const { printed = "-285.830", ...rest } = over;
  const made = {
    speciesId: "sp_water",
    key: "H2O(l)",
    property: "enthalpyOfFormation" as const,
    digits: digits(printed),
    uncertainty: null,
    temperature: digits("298.15"),
    standardPressure: digits("100000"),
    basis: null,
    origin: "stated",
    sourceId: "src_one",
    ...rest,
  };
  const {
    speciesId: species,
    property,
    sourceId: source,
    uncertainty,
    temperature,
    standardPressure,
    basis,
    origin,
  } = made;
  const hashed = {
    species,
    property,
    digits: made.digits,
    unit: "kJ/mol",
    uncertainty: uncertainty && { ...uncertainty, coverageFactor: String(uncertainty.coverageFactor) },
    temperature,
    standardPressure,
    basis,
    origin,
    source,
  };
  return { ...made, rowHash: rowHash(hashed) };
}

describe("one change", () => {
  test("more digits of the same number is a change of digits only", () => {
    const change = valueChange(value({ printed: "205.1" }), value({ printed: "205.10" }));
    expect(change).toMatchObject({
      what: "changed",
      aspects: ["digits"],
      digitsOnly: true,
      difference: "0.00",
      relative: 0,
    });
  });

  test("a difference keeps its digits, is relative to what stood, and is held against both uncertainties", () => {
    const before = value({
      printed: "-46.11",
      uncertainty: { digits: digits("0.45"), kind: "expanded", coverageFactor: 2 },
    });
    const after = value({
      printed: "-45.94",
      uncertainty: { digits: digits("0.35"), kind: "expanded", coverageFactor: 2 },
    });
    const change = valueChange(before, after);
    expect(change).toMatchObject({ difference: "0.17", aspects: ["value", "uncertainty"], digitsOnly: false });
    expect(change?.relative).toBeCloseTo(0.17 / 46.11, 12);
    // E_n = 0.17/√(0.45² + 0.35²)
    expect(change?.normalizedError).toBeCloseTo(0.17 / Math.hypot(0.45, 0.35), 12);
  });

  test("relative to nothing where a zero stood", () => {
    expect(valueChange(value({ printed: "0" }), value({ printed: "0.5" }))?.relative).toBeNull();
  });

  test.each([
    ["uncertainty", { uncertainty: { digits: digits("0.04"), kind: "expanded", coverageFactor: 2 } }],
    ["source", { sourceId: "src_two" }],
    ["state", { basis: "molality" }],
    ["state", { standardPressure: digits("101325") }],
    ["origin", { origin: "derived" }],
  ] as const)("%s alone differs", (aspect, over) => {
    expect(valueChange(value(), value(over))?.aspects).toEqual([aspect]);
  });
});

describe("the laws of a comparison", () => {
  const anyValue = fc
    .record({
      species: fc.constantFrom("a", "b", "c", "Ω", "Z"),
      property: fc.constantFrom(...PROPERTIES),
      printed: fc.constantFrom("1.0", "1.00", "-2.5", "0", "33.3"),
      source: fc.constantFrom("src_one", "src_two"),
    })
    .map(({ species, property, printed, source }) =>
      value({ speciesId: `sp_${species}`, key: `${species}(g)`, property, printed, sourceId: source }),
    );
  const inOrder = (values: readonly ComparedValue[]): ComparedValue[] =>
    [...values].sort((a, b) => compareBytes(a.key, b.key) || compareBytes(a.property, b.property));
  const table = fc
    .uniqueArray(anyValue, { selector: (one) => `${one.speciesId} ${one.property}`, maxLength: 20 })
    .map(inOrder);

  test("a table and itself: nothing", () => {
    fc.assert(
      fc.property(table, (a) => {
        expect(pairValues(a, a)).toEqual([]);
      }),
    );
  });

  test("from b to a is the mirror image of from a to b", () => {
    fc.assert(
      fc.property(table, table, (a, b) => {
        expect(pairValues(b, a)).toEqual(pairValues(a, b).map(turnRound));
      }),
    );
  });

  test("a with the changes is b", () => {
    fc.assert(
      fc.property(table, table, (a, b) => {
        expect(applyChanges(a, pairValues(a, b))).toEqual(b);
      }),
    );
  });

  test("changes come in the order of the bytes of key and property, and their pages are the whole", () => {
    fc.assert(
      fc.property(table, table, fc.integer({ min: 1, max: 4 }), (a, b, limit) => {
        const changes = pairValues(a, b);
        const walked = [];
        for (let place: string[] | null = null; ;) {
          const { page, more }: { page: typeof changes; more: boolean } = pageOfChanges(changes, place, limit);
          walked.push(...page);
          const last = page.at(-1);
          if (!more || !last) break;
          place = [last.key, last.property];
        }
        expect(walked).toEqual(changes);
      }),
    );
  });
});

describe("records", () => {
  const row = (id: string, name: string) => ({ id, name, rowHash: Buffer.from(name) });
  const fields = [{ name: "name", text: (one: { name: string }) => one.name }];

  test("came, went, changed with its texts; the equal ones are left out", () => {
    const before = [row("1", "water"), row("2", "nh3"), row("3", "gone")];
    const after = [row("1", "water"), row("2", "ammonia"), row("4", "new")];
    expect(pairRecords(before, after, (one) => one.id, fields).map(({ what, texts }) => [what, texts])).toEqual([
      ["changed", [{ field: "name", before: "nh3", after: "ammonia" }]],
      ["came", []],
      ["went", []],
    ]);
  });
});
