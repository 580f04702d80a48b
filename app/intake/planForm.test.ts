import { describe, expect, test } from "vitest";
import type { ColumnPlan } from "./plan.ts";
import { MEANING_OPTIONS, meaningValue } from "./planChoices.ts";
import { readPlanForm } from "./planForm.ts";

const planned: ColumnPlan = [
  { head: "formula", means: "formula", property: null, unit: null, because: "head", asks: false },
  { head: "phase", means: "phase", property: null, unit: null, because: "head", asks: false },
  { head: "S", means: "value", property: "entropy", unit: null, because: "no unit", asks: true },
];

const filled: Record<string, string> = {
  "means.0": "formula",
  "means.1": "phase",
  "means.2": "value:entropy",
  "unit.2": "cal/(mol K)",
  temperature: "298.15",
  standardPressure: "100000",
  uncertaintyKind: "",
  basis: "",
  decimalComma: "on",
  method: "",
  source: "src_known",
};

function read(changes: Record<string, string> = {}) {
  const form = new FormData();
  for (const [name, value] of Object.entries({ ...filled, ...changes })) form.set(name, value);
  return readPlanForm(form, planned);
}

const pointersOf = (changes: Record<string, string>): string[] => {
  const result = read(changes);
  return result.ok ? [] : result.errors.map((error) => error.pointer);
};

describe("the form of a plan", () => {
  test("comes back as the plan that was confirmed", () => {
    expect(read()).toMatchObject({
      ok: true,
      columns: [
        { means: "formula" },
        { means: "phase" },
        { means: "value", property: "entropy", unit: "cal/(mol K)", because: "no unit", asks: false },
      ],
      settings: { decimalComma: true, solidIs: "cr", basis: null, method: null },
      source: { kind: "known", sourceId: "src_known" },
    });
  });

  test("a choice of another meaning is remembered as chosen by hand", () => {
    const result = read({ "means.2": "value:heatCapacity" });
    expect(result).toMatchObject({
      ok: true,
      columns: [{}, {}, { property: "heatCapacity", because: "chosen by hand" }],
    });
  });

  test("everything that is missing is told at once", () => {
    expect(pointersOf({ "unit.2": "", temperature: "", standardPressure: "", source: "" })).toEqual([
      "/columns/2",
      "/settings/temperature",
      "/settings/standardPressure",
      "/source",
    ]);
  });

  test.each([
    ["a meaning that is none", { "means.0": "__proto__" }, "/columns/0"],
    ["a value of no quantity", { "means.2": "value:density" }, "/columns/2"],
    ["a temperature that is none of the list", { temperature: "300" }, "/settings/temperature"],
    ["a method too long", { method: "x".repeat(501) }, "/settings/method"],
    ["a new source without title", { source: "new", "source.sourceKind": "measurement" }, "/source/title"],
    ["a new source of no kind", { source: "new", "source.title": "T" }, "/source/sourceKind"],
    [
      "a year in words",
      { source: "new", "source.title": "T", "source.year": "last", "source.sourceKind": "estimate" },
      "/source/year",
    ],
    [
      "a DOI that is none",
      { source: "new", "source.title": "T", "source.doi": "x", "source.sourceKind": "estimate" },
      "/source/doi",
    ],
  ])("%s", (_what, changes, pointer) => {
    expect(pointersOf(changes)).toContain(pointer);
  });

  test("every choice of a column reads back as itself", () => {
    for (const [value] of MEANING_OPTIONS) {
      const result = read({ "means.2": value, "unit.2": "" });
      const column = result.ok ? result.columns[2] : undefined;
      if (column) expect(meaningValue(column)).toBe(value);
      else expect(pointersOf({ "means.2": value, "unit.2": "" }).length).toBeGreaterThan(0);
    }
  });
});
