import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { readPurely } from "#tests/support/readPurely.ts";

/*
 * The sheets in fixtures/ read the whole pure way, as their guessed plans have them: bytes, columns, rows, species. The
 * table is empty here; tests/database/intake.test.ts reads the same sheets against editions.
 */

function readFixture(name: string) {
  const { guess, errors, final } = readPurely(
    readFileSync(new URL(`../../fixtures/${name}`, import.meta.url)),
    { uncertaintyKind: "expanded" },
    { missingUnit: "cal/(mol K)" },
  );
  return { plan: guess.plan, errors, final };
}

const of = (final: ReturnType<typeof readFixture>["final"], outcome: string) =>
  [...final].filter(([, row]) => row.outcome === outcome).map(([number]) => number);
const keyIn = (row: unknown) => (row as { reading?: { match?: { key?: string } } } | undefined)?.reading?.match?.key;

describe.each([
  ["codata-key-values.csv", 151],
  ["nbs-1982-excerpt.csv", 83],
  ["nbs-1982-heat-capacities.csv", 129],
  ["calder-point-calorimetry.csv", 12],
  ["calder-point-names.csv", 232],
])("%s", (name, rows) => {
  test("is planned without a question left and read in every row", () => {
    const { errors, final } = readFixture(name);
    expect(errors).toEqual([]);
    expect(of(final, "read")).toHaveLength(rows);
    expect(final.size).toBe(rows);
  });
});

test("two published tables name the species they share alike", () => {
  const keys = (name: string) => new Set([...readFixture(name).final.values()].map(keyIn));
  const codata = keys("codata-key-values.csv");
  const shared = [...keys("nbs-1982-excerpt.csv")].filter((key) => codata.has(key));
  expect(shared).toEqual(["Br(g)", "CaO(cr)"]);
  expect([...keys("nbs-1982-heat-capacities.csv")].filter((key) => !codata.has(key))).toEqual([]);
});

test("calder-point-messy.csv: titles and blanks are skipped, each slip of spelling is refused at its cell", () => {
  const { final, errors } = readFixture("calder-point-messy.csv");
  expect(errors).toEqual([]);
  expect(of(final, "skipped")).toEqual([1, 2, 3, 5, 9, 15, 16, 17, 25]);
  const refused = of(final, "refused").map((number) => {
    const row = final.get(number);
    return [number, row?.outcome === "refused" ? row.problems[0]?.column : null];
  });
  expect(refused).toEqual([
    [8, 3], // a CAS number whose check digit is wrong; the footnote mark beside it is taken off
    [10, 4], // CaO(cr) twice
    [14, 6], // a negative entropy
    [18, 0], // SO42-
    [21, 4],
    [22, null], // a decimal comma between commas makes a cell too many
    [24, 2], // C(cr) without its form
  ]);
  // What only the table can tell: joules for kilojoules and exchanged digits are read, and found by the examination.
  expect(final.get(11)).toMatchObject({ reading: { values: [{}, { property: "entropy", digits: "0.04366" }] } });
  expect(final.get(13)).toMatchObject({ reading: { values: [{ digits: "-1657.7" }, {}] } });
  expect(final.get(6)).toMatchObject({
    reading: { values: [{ uncertainty: { digits: "0.04", kind: "expanded" } }, {}] },
  });
  expect(final.get(7)).toMatchObject({
    reading: { values: [{ uncertainty: { digits: "0.35", kind: "standard" } }, {}] },
  });
});

test("calder-point-long.csv: quantity and unit are read row by row", () => {
  const { plan, final, errors } = readFixture("calder-point-long.csv");
  expect(errors).toEqual([]);
  expect(plan.map((column) => column.means)).toEqual([
    "key",
    "propertyName",
    "anyValue",
    "unitName",
    "anyUncertainty",
    "remark",
  ]);
  expect(of(final, "refused")).toEqual([10, 11]);
  expect(of(final, "read").map((number) => keyIn(final.get(number)))).toEqual([
    "NH3(g)",
    "NH3(g)",
    "NH3(g)",
    "SO4-2(aq)",
    "CaCO3(cr,calcite)",
    "CaCO3(cr,aragonite)",
    "H2O(l)",
    "KBr(cr)",
    "Fe+3(aq)",
  ]);
  expect(final.get(5)).toMatchObject({
    reading: { values: [{ digits: "-909.2", given: { text: "-217.3", unit: "kcal/mol", note: "× 4.184" } }] },
  });
});

test("calder-point-names.csv names every species of the two published tables once", () => {
  const keys = (name: string) => new Set([...readFixture(name).final.values()].map(keyIn));
  const named = [...readFixture("calder-point-names.csv").final.values()].map(keyIn);
  expect(new Set(named).size).toBe(named.length);
  expect([...named].sort()).toEqual(
    [...new Set([...keys("codata-key-values.csv"), ...keys("nbs-1982-excerpt.csv")])].sort(),
  );
});
