import { describe, expect, test } from "vitest";
import { digits } from "#app/thermo/digits.ts";
import { valueChange } from "./compare.ts";
import { drawnDifferences, shownChange, wordRuns } from "./comparePage.ts";
import type { ValueAsOf } from "./editions.queries.server.ts";

function value(key: string, printed: string, expanded: string | null): ValueAsOf {
  return {
    rowId: "1",
    speciesId: `sp_${key}`,
    key,
    property: "enthalpyOfFormation",
    digits: digits(printed),
    uncertainty: expanded === null ? null : { digits: digits(expanded), kind: "expanded", coverageFactor: 2 },
    temperature: digits("298.15"),
    standardPressure: digits("100000"),
    basis: null,
    origin: "stated",
    method: null,
    remark: null,
    givenText: printed,
    givenUnit: "kJ/mol",
    givenNote: null,
    sourceId: "src_one",
    lineVersionId: "1",
    rowHash: Buffer.alloc(32),
    since: 1,
  };
}

const change = (key: string, before: string, after: string, expanded: string | null) =>
  valueChange(value(key, before, expanded), value(key, after, expanded))!;

describe("a change as the table prints it", () => {
  test("with its per cent to two digits and its E_n", () => {
    expect(shownChange(change("CaO(cr)", "-634.92", "-635.09", "0.90"))).toMatchObject({
      difference: "-0.17",
      relative: "−0.027",
      normalizedError: "0.13",
      beyond: false,
      remark: "",
    });
  });

  test("beyond both uncertainties it says so", () => {
    expect(shownChange(change("Al+3(aq)", "-538.4", "-531.0", "1.0")).beyond).toBe(true);
  });

  test("where only digits differ there is no per cent and no E_n to print", () => {
    expect(shownChange(change("H2(g)", "130.680", "130.68", "0.003"))).toMatchObject({
      relative: null,
      normalizedError: null,
      remark: "digits only",
    });
  });
});

test("differences are drawn with the weightiest first and those in digits alone left out", () => {
  const [drawn, ...others] = drawnDifferences([
    change("A(g)", "1.0", "1.1", "1.0"),
    change("B(g)", "1.0", "1.5", "0.1"),
    change("C(g)", "1.0", "9.0", null),
    change("D(g)", "1.0", "1.00", null),
  ]);
  expect(others).toEqual([]);
  expect(drawn?.differences.map(({ key, printed }) => [key, printed])).toEqual([
    ["B(g)", "+0.5"],
    ["A(g)", "+0.1"],
    ["C(g)", "+8.0"],
  ]);
  expect(drawn?.differences[0]?.expanded).toBeCloseTo(Math.hypot(0.1, 0.1), 12);
});

test("texts are compared word by word", () => {
  expect(wordRuns({ field: "note", before: "As remembered.", after: "As remembered, compared." })).toEqual([
    { kind: "same", text: "As remembered" },
    { kind: "came", text: ", compared" },
    { kind: "same", text: "." },
  ]);
});
