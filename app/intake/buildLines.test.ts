import { describe, expect, test } from "vitest";
import { digits } from "#app/thermo/digits.ts";
import { readKey } from "#app/thermo/speciesKey.ts";
import { type BuildFrame, buildLines, type SettledRow, type ValueBase } from "./buildLines.ts";
import type { SheetSettings } from "./plan.ts";

const settings: SheetSettings = {
  temperature: "298.15",
  standardPressure: "100000",
  basis: "molality",
  uncertaintyKind: "expanded",
  decimalComma: false,
  solidIs: "cr",
  method: "solution calorimetry",
};

const frame: BuildFrame = {
  settings,
  source: { id: "src_standing", isNew: null },
  sourcesByKey: new Map(),
  details: [],
  bases: [],
  unnamed: [],
  speciesId: (key) => `sp_new_${key}`,
};

function row(number: number, key: string, value: string, knownAs?: string): SettledRow {
  const reading = readKey(key);
  if (reading.outcome !== "read") throw new Error(key);
  const { formula, phase, label } = reading.value;
  return {
    number,
    reading: {
      species: { formula, phase, label: label ?? null, name: number === 2 ? null : "a name", cas: null },
      values: [
        {
          property: "entropy",
          digits: digits(value),
          uncertainty: { digits: digits("0.1"), kind: "expanded", coverageFactor: 2 },
          given: { text: value, unit: "J/(mol K)", note: null },
          column: 3,
        },
      ],
      remark: null,
      notes: [],
      match: knownAs
        ? { kind: "known", speciesId: knownAs, key, note: null }
        : { kind: "new", key, label: label ?? null },
    },
  };
}

const base: ValueBase = {
  speciesId: "sp_water",
  property: "entropy",
  digits: digits("69.95"),
  uncertainty: { digits: digits("0.1"), kind: "expanded", coverageFactor: 2 },
  sourceId: "src_standing",
  remark: null,
  row: "17",
  version: null,
};

describe("lines of a sheet", () => {
  test("a species new to the table gets one detail line, however many rows it has, with the first name given", () => {
    const second = row(3, "KBr(cr)", "95.9");
    const built = buildLines(
      [
        row(2, "KBr(cr)", "95.9"),
        {
          ...second,
          reading: {
            ...second.reading,
            values: second.reading.values.map((one) => ({ ...one, property: "heatCapacity" as const })),
          },
        },
      ],
      frame,
    );
    expect(built.lines.map((line) => [line.kind, line.property, line.rowNumber])).toEqual([
      ["detail", null, 2],
      ["value", "entropy", 2],
      ["value", "heatCapacity", 3],
    ]);
    expect(built.lines[0]?.content).toMatchObject({ key: "KBr(cr)", printed: "KBr", name: "a name" });
    expect(built.newSpecies).toEqual([
      { id: "sp_new_KBr(cr)", hill: "BrK", composition: { K: 1, Br: 1 }, charge: 0, phase: "cr" },
    ]);
    expect(built).toMatchObject({ newValues: 2, changedValues: 0, same: 0 });
  });

  test("a value against what stands, and none where it says the same", () => {
    const bases = [base];
    const changed = buildLines([row(2, "H2O(l)", "69.9", "sp_water")], { ...frame, bases });
    expect(changed.lines).toMatchObject([{ kind: "value", againstRow: "17", againstVersion: null }]);
    expect(changed).toMatchObject({ newValues: 0, changedValues: 1, same: 0 });
    expect(buildLines([row(2, "H2O(l)", "69.95", "sp_water")], { ...frame, bases })).toMatchObject({
      lines: [],
      same: 1,
    });
  });

  test.each<[string, Partial<ValueBase>]>([
    // 69.950 is not 69.95.
    ["digits", { digits: digits("69.950") }],
    ["uncertainty", { uncertainty: null }],
    ["source", { sourceId: "src_other" }],
    ["remark", { remark: "constraint relaxed" }],
  ])("another %s is a change", (_what, change) => {
    const built = buildLines([row(2, "H2O(l)", "69.95", "sp_water")], { ...frame, bases: [{ ...base, ...change }] });
    expect(built.changedValues).toBe(1);
  });

  test("a waiting line comes before what stands", () => {
    const waiting: ValueBase = { ...base, digits: digits("70.0"), row: null, version: "99" };
    for (const bases of [
      [base, waiting],
      [waiting, base],
    ]) {
      const built = buildLines([row(2, "H2O(l)", "69.95", "sp_water")], { ...frame, bases });
      expect(built.lines).toMatchObject([{ againstRow: null, againstVersion: "99" }]);
    }
  });

  test("a new source comes first; what holds for the whole sheet stands in every value", () => {
    const built = buildLines([row(2, "Na+(aq)", "58.45", "sp_sodium"), row(3, "H2O(l)", "69.9", "sp_water")], {
      ...frame,
      source: {
        id: "src_new",
        isNew: { kind: "source", citation: { title: "Notebook" }, doi: null, sourceKind: "measurement", notice: null },
      },
    });
    expect(built.lines[0]).toMatchObject({ kind: "source", sourceId: "src_new", speciesId: null });
    expect(built.lines.slice(1).map((line) => line.content)).toMatchObject([
      {
        basis: "molality",
        method: "solution calorimetry",
        sourceId: "src_new",
        temperature: "298.15",
        standardPressure: "100000",
      },
      // A basis is a solute's only.
      { basis: null },
    ]);
  });

  test("a species that another open revision proposes is named here too, with the same id and words", () => {
    const built = buildLines([row(2, "LiF(cr)", "35.65", "sp_lif")], {
      ...frame,
      unnamed: [
        {
          speciesId: "sp_lif",
          key: "LiF(cr)",
          printed: "LiF",
          label: null,
          name: "lithium fluoride",
          cas: null,
          synonyms: [],
        },
      ],
    });
    expect(built.newSpecies).toEqual([]);
    expect(built.lines).toMatchObject([
      { kind: "detail", speciesId: "sp_lif", content: { name: "lithium fluoride" } },
      { kind: "value", speciesId: "sp_lif" },
    ]);
  });
});
