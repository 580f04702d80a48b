import { describe, expect, test } from "vitest";
import { decodeSheet } from "./decode.ts";
import { NO_CONTEXT, planColumns, type SheetSettings } from "./plan.ts";
import { isAbsent } from "./cells.ts";
import { type CellProblem, readRows, type RowOutcome, type RowReading } from "./readRows.ts";

/** Reads a sheet as its guessed plan has it, at 298.15 K, uncertainties expanded. */
function readAll(text: string, settings: Partial<SheetSettings> = {}): Map<number, RowOutcome> {
  const decoding = decodeSheet(new TextEncoder().encode(text));
  if (decoding.outcome === "refused") throw new Error(decoding.sentence);
  const { sheet } = decoding;
  const guess = planColumns(sheet, NO_CONTEXT);
  const outcomes = readRows(
    sheet.rows.map((row) => ({ ...row, answer: null })),
    {
      heads: sheet.heads,
      headRow: sheet.headRow,
      plan: guess.plan,
      settings: {
        ...guess.settings,
        temperature: "298.15",
        standardPressure: "100000",
        uncertaintyKind: "expanded",
        ...settings,
      },
    },
  );
  return new Map(sheet.rows.map((row, index) => [row.number, outcomes[index] as RowOutcome]));
}

function readRow(text: string, settings: Partial<SheetSettings> = {}): RowReading {
  const outcome = readAll(text, settings).get(2);
  if (outcome?.outcome !== "read") throw new Error(JSON.stringify(outcome));
  return outcome.reading;
}

function problemsOf(text: string, settings: Partial<SheetSettings> = {}): readonly CellProblem[] {
  const outcome = readAll(text, settings).get(2);
  if (outcome?.outcome !== "refused") throw new Error(JSON.stringify(outcome));
  return outcome.problems;
}

const HEADS = "formula,phase,form,dHf (kJ/mol),u(dHf),S (J/mol/K)";

describe("a row that can be read", () => {
  test("keeps its digits and the text of its cells, and converts by the exact factor", () => {
    const reading = readRow("formula;phase;dHf (kcal);S (cal)\nNH3;g;-10,980;46,07\n");
    expect(reading.values).toEqual([
      {
        property: "enthalpyOfFormation",
        digits: "-45.940",
        uncertainty: null,
        given: { text: "-10,980", unit: "kcal/mol", note: "× 4.184" },
        column: 2,
      },
      {
        property: "entropy",
        digits: "192.76",
        uncertainty: null,
        given: { text: "46,07", unit: "cal/(mol K)", note: "× 4.184" },
        column: 3,
      },
    ]);
  });

  test("an empty or dashed cell is no value, and never a zero", () => {
    expect(readRow(`${HEADS}\nH2O,l,,-285.830,0.040,–\n`).values.map((value) => value.property)).toEqual([
      "enthalpyOfFormation",
    ]);
    expect(["", "-", "–", "n/a", "n.d.", "…", " "].map(isAbsent)).toEqual(Array(7).fill(true));
    expect(["0", "0.0", "?", "none", "-1"].map(isAbsent)).toEqual(Array(5).fill(false));
  });

  test.each([
    [
      "a column of its own, as the steward said",
      "-45.94,0.35",
      "expanded",
      { digits: "0.35", kind: "expanded", coverageFactor: 2 },
    ],
    ["said to be standard", "-45.94,0.35", "standard", { digits: "0.35", kind: "standard", coverageFactor: null }],
    [
      "brackets are always standard",
      "-45.94(35),",
      "expanded",
      { digits: "0.35", kind: "standard", coverageFactor: null },
    ],
    ["± in the cell", "-45.94 ± 0.35,", "unstated", { digits: "0.35", kind: "unstated", coverageFactor: null }],
    ["± in its own column", "-45.94,± 0.35", "expanded", { digits: "0.35", kind: "expanded", coverageFactor: 2 }],
    ["none", "-45.94,", "expanded", null],
  ] as const)("uncertainty: %s", (_what, cells, uncertaintyKind, uncertainty) => {
    expect(readRow(`${HEADS}\nNH3,g,,${cells},\n`, { uncertaintyKind }).values[0]?.uncertainty).toEqual(uncertainty);
  });

  test("a zero by convention is exact, with or without a zero in the uncertainty's column", () => {
    for (const cells of ["0,0", "0,", "0.0,0.0"]) {
      expect(readRow(`${HEADS}\nN2,g,,${cells},191.609\n`).values[0]?.uncertainty).toEqual({
        digits: "0",
        kind: "exact",
        coverageFactor: null,
      });
    }
  });

  test("a solute may have a negative or a zero entropy", () => {
    expect(readRow("formula,phase,S (J/mol/K)\nMg+2,aq,-137\n").values[0]?.digits).toBe("-137");
    expect(readRow("formula,phase,S (J/mol/K)\nH+,aq,0\n").values[0]?.uncertainty?.kind).toBe("exact");
  });

  test.each([
    ["cr", "cr"],
    ["s", "s"],
  ] as const)("a bare s is what the steward said: %s", (solidIs, phase) => {
    expect(readRow("formula,phase,S (J/mol/K)\nNaCl,s,72.13\n", { solidIs }).species.phase).toBe(phase);
  });

  test("a description is sorted into form, name and remark", () => {
    const heads = "formula,phase,description,S (J/mol/K)";
    expect(readRow(`${heads}\nC,cr2,diamond,2.377\n`).species).toMatchObject({
      phase: "cr",
      label: "diamond",
      name: null,
    });
    expect(readRow(`${heads}\nNH4NO3,cr,ammonium nitrate,151.08\n`).species).toMatchObject({
      label: null,
      name: "ammonium nitrate",
    });
    expect(readRow(`${heads}\nNa2CO3,cr,G-H-S constraint has been relaxed,134.98\n`).remark).toBe(
      "G-H-S constraint has been relaxed",
    );
  });

  test("a long sheet says quantity and unit row by row", () => {
    const rows = readAll(
      "species\tproperty\tvalue\tunit\tuncertainty\nNH3(g)\tΔfH°\t-10.98\tkcal mol⁻¹\t0.08\nNH3(g)\theat capacity\t35.06\tJ/mol/K\t\n",
    );
    expect([...rows.values()].map((row) => (row.outcome === "read" ? row.reading.values[0] : row))).toMatchObject([
      { property: "enthalpyOfFormation", digits: "-45.94", uncertainty: { digits: "0.33" } },
      { property: "heatCapacity", digits: "35.06", uncertainty: null },
    ]);
  });
});

describe("a row that is refused says at which cell, and how to mend it", () => {
  test.each<[string, string, number | null, RegExp, string[]]>([
    ["a formula with two readings", "SO42-,aq,,-909.3,0.4,", 0, /two readings/, ["SO4-2", "SO42-1"]],
    ["no formula", "Wasser,l,,-285.8,,", 0, /./, []],
    ["an unknown phase", "H2O,q,,-285.8,,", 1, /not a phase/, []],
    ["a sum of ions", "NaCl,ai,,-407.3,,", 1, /sum of ions/, []],
    ["an ion in a crystal", "Na+,cr,,-240.3,,", 1, /kept in water/, ["aq"]],
    ["a further form that nobody names", "C,cr2,,1.9,,", 2, /Name the form/, []],
    [
      "a negative entropy",
      "H2O,l,,-285.83,0.04,-69.95",
      5,
      /cannot be negative. Did the sign come from the ΔfH° column/,
      ["69.95"],
    ],
    ["a zero entropy", "H2O,l,,-285.83,0.04,0", 5, /missing value typed as 0/, [""]],
    ["a raised digit", "H2O,l,,-285.83¹,0.04,", 3, /footnote mark or a digit/, ["-285.83", "-285.831"]],
    ["a number with two readings", 'H2O,l,,"-1,285",0.04,', 3, /can be read as/, ["-1.285", "-1285"]],
    ["a text where a number should be", "H2O,l,,see below,,", 3, /not a number/, []],
    ["a range", "H2O,l,,285-286,,", 3, /range/, []],
    ["a negative uncertainty", "H2O,l,,-285.83,-0.04,", 4, /never negative/, ["0.04"]],
    ["an uncertainty of zero", "H2O,l,,-285.83,0,", 4, /by convention/, [""]],
    ["two uncertainties that differ", "H2O,l,,-285.83 ± 0.05,0.04,", 4, /Leave one/, []],
    ["an uncertainty without its value", "H2O,l,,,0.04,69.95", 3, /Was the value lost/, []],
    [
      "a unit that is not the column's",
      "H2O,l,,-68.315 kcal/mol,,",
      3,
      /in kcal\/mol, its column in kJ\/mol/,
      ["-285.830"],
    ],
    ["a cell lost before the values", "H2O,l,-285.83,0.04,69.95", null, /has 5 cells where the heads name 6/, []],
    ["every value lost", "H2O,l,", null, /has 3 cells where the heads name 6/, []],
    ["a cell too many", "H2O,l,,-285.83,0.04,69.95,1", null, /has 7 cells where the heads name 6/, []],
  ])("%s", (_what, row, column, sentence, repairs) => {
    const [problem] = problemsOf(`${HEADS}\n${row}\n`);
    expect(problem).toMatchObject({ column, sentence: expect.stringMatching(sentence) });
    expect(problem?.repairs.map((repair) => repair.text)).toEqual(repairs);
  });

  test("every wrong cell of a row is told at once", () => {
    const problems = problemsOf(`${HEADS}\nSO42-,aq,,twelve,0.4,18.5?\n`);
    expect(problems.map((problem) => problem.column)).toEqual([0, 3, 5]);
  });

  test("a CAS number whose check digit is wrong", () => {
    expect(problemsOf("formula,phase,CAS,S (J/mol/K)\nH2O,l,7732-18-6,69.95\n")).toMatchObject([
      { column: 2, sentence: expect.stringContaining("call for 5"), repairs: [{ text: "" }] },
    ]);
  });

  test("in a long sheet: an unknown quantity, and a unit of another kind", () => {
    const heads = "species,property,value,unit";
    expect(problemsOf(`${heads}\nKBr(cr),density,2.74,g/cm3\n`)[0]).toMatchObject({ column: 1 });
    expect(problemsOf(`${heads}\nKBr(cr),S°,95.8,kJ/mol\n`)[0]).toMatchObject({
      column: 3,
      sentence: expect.stringContaining("S° is not measured in kJ/mol"),
    });
  });
});

test("rows that hold no values are skipped, each with its reason", () => {
  const rows = readAll(
    `Spring values\n${HEADS}\nOxides,,,,,\n,,,,,\nCaO,cr,,-635.1,0.9,38.2\n${HEADS}\n* after drying,,,,,\nMgO,cr,,,,\n`,
  );
  expect(
    [...rows].map(([number, row]) => [number, row.outcome === "skipped" ? row.problems[0]?.sentence : row.outcome]),
  ).toEqual([
    [1, "a title above the heads"],
    [3, "a title or a note: one cell, no values"],
    [4, "a blank row"],
    [5, "read"],
    [6, "the heads again"],
    [7, "a title or a note: one cell, no values"],
    [8, "a species without values in the columns that are read"],
  ]);
});

test("heads that are names of the language's own do no harm", () => {
  const rows = readAll("__proto__,constructor,formula,phase,S (J/mol/K)\nx,y,H2O,l,69.95\n");
  expect(rows.get(2)?.outcome).toBe("read");
});
