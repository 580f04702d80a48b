import { describe, expect, test } from "vitest";
import { decodeSheet, type DecodedSheet } from "./decode.ts";
import {
  checkPlan,
  type ColumnPlan,
  firstValues,
  hasBareSolid,
  hillsOf,
  NO_CONTEXT,
  type PlanContext,
  planColumns,
  type SheetSettings,
} from "./plan.ts";

function sheetOf(text: string): DecodedSheet {
  const decoding = decodeSheet(new TextEncoder().encode(text));
  if (decoding.outcome === "refused") throw new Error(decoding.sentence);
  return decoding.sheet;
}

const planOf = (text: string, context: PlanContext = NO_CONTEXT): ColumnPlan =>
  planColumns(sheetOf(text), context).plan;
const shortly = (plan: ColumnPlan) =>
  plan.map((column) => [column.head, column.means, column.property ?? column.unit ?? null]);

const said: SheetSettings = {
  temperature: "298.15",
  standardPressure: "100000",
  basis: null,
  uncertaintyKind: "expanded",
  decimalComma: false,
  solidIs: "cr",
  method: null,
};

/** ΔfH° and S° of NH3(g), ZnO(cr), CaO(cr) from the CODATA and NBS tables in fixtures/. */
const edition7: PlanContext = {
  edition: 7,
  standing: new Map([
    [
      "H3N|0|g",
      [
        { property: "enthalpyOfFormation", value: -45.94 },
        { property: "entropy", value: 192.77 },
      ],
    ],
    [
      "OZn|0|cr",
      [
        { property: "enthalpyOfFormation", value: -350.46 },
        { property: "entropy", value: 43.65 },
      ],
    ],
    [
      "CaO|0|cr",
      [
        { property: "enthalpyOfFormation", value: -634.92 },
        { property: "entropy", value: 38.1 },
      ],
    ],
  ]),
};

describe("what the columns hold", () => {
  test("a head that repeats belongs to the column before it", () => {
    expect(
      shortly(
        planOf("formula,phase,form,enthalpyOfFormation_kJ_mol,U,entropy_J_molK,U\nAg,g,,284.9,0.8,172.997,0.004\n"),
      ),
    ).toEqual([
      ["formula", "formula", null],
      ["phase", "phase", null],
      ["form", "label", null],
      ["enthalpyOfFormation_kJ_mol", "value", "enthalpyOfFormation"],
      ["U", "uncertainty", "enthalpyOfFormation"],
      ["entropy_J_molK", "value", "entropy"],
      ["U", "uncertainty", "entropy"],
    ]);
  });

  test("heads that mean nothing are told by their cells", () => {
    const plan = planOf("Stoff;Zust.;Nr.;dHf (kcal)\nNH3;g;7664-41-7;-10,98\nZnO;cr;1314-13-2;-83,76\n");
    expect(shortly(plan)).toEqual([
      ["Stoff", "formula", null],
      ["Zust.", "phase", null],
      ["Nr.", "cas", null],
      ["dHf (kcal)", "value", "enthalpyOfFormation"],
    ]);
    expect(plan.map((column) => column.because).slice(0, 2)).toEqual([
      "every cell reads as a formula",
      "values from the list of phases",
    ]);
  });

  test("formulas with their phase are keys, whatever the head says", () => {
    expect(planOf("species,S (J/mol/K)\nH2O(l),69.95\nNa+(aq),58.45\n")[0]).toMatchObject({ means: "key" });
  });

  test("a long sheet", () => {
    expect(
      shortly(
        planOf(
          "species,property,value,unit,uncertainty,note\nH2O(l),S°,69.95,J/(mol K),0.03,\nH2O(l),ΔfH°,-285.83,kJ/mol,0.04,x\n",
        ),
      ),
    ).toEqual([
      ["species", "key", null],
      ["property", "propertyName", null],
      ["value", "anyValue", null],
      ["unit", "unitName", null],
      ["uncertainty", "anyUncertainty", null],
      ["note", "remark", null],
    ]);
  });

  test("values at another temperature are left out by name, with their uncertainty", () => {
    const plan = planOf(
      "formula,phase,ΔfH°(0 K) kJ/mol,u,ΔfH°(298.15 K) kJ/mol,S (500 K)\nCO,g,-113.8,0.2,-110.53,212.8\n",
    );
    expect(plan.map((column) => column.means)).toEqual(["formula", "phase", "ignore", "ignore", "value", "ignore"]);
    expect(plan[2]?.because).toBe("ΔfH° at 0 K: the table is kept at 298.15 K, so this column is left out");
    expect(plan[5]?.because).toContain("S° at 500 K");
    expect(plan.some((column) => column.asks)).toBe(false);
  });

  test("a second column for one quantity asks", () => {
    const plan = planOf("formula,phase,S (J/mol/K),S (cal/mol/K)\nH2O,l,69.95,16.72\n");
    expect(plan[3]).toMatchObject({ means: "ignore", asks: true, because: "another column already is S°" });
  });

  test("numbers under a head that names nothing ask", () => {
    expect(planOf("formula,phase,run 3,S (J/mol/K)\nH2O,l,1.5,69.95\n")[2]).toMatchObject({
      means: "ignore",
      asks: true,
    });
  });
});

describe("units", () => {
  const mock = "Stoff;Zust.;dHf (kcal);S\nNH3;g;-10,98;46,07\nZnO;cr;-83,76;10,43\nCaO;cr;-151,75;9,11\n";

  test("agreement with the edition is said, and a missing unit is suggested from it", () => {
    expect(planOf(mock, edition7).slice(2)).toMatchObject([
      { unit: "kcal/mol", asks: false, because: "head; per mole is assumed; agrees with edition 7 to 1 % in kcal/mol" },
      {
        unit: "cal/(mol K)",
        asks: true,
        because: "no unit in the head; agrees with edition 7 to 1 % in cal/(mol K), not in another unit",
      },
    ]);
  });

  test("without anything to compare with, a unit is never assumed", () => {
    expect(planOf(mock)[3]).toMatchObject({ unit: null, asks: true });
  });

  test("a head that the values contradict asks", () => {
    const plan = planOf(mock.replace("(kcal)", "(kJ/mol)"), edition7);
    expect(plan[2]).toMatchObject({
      unit: "kJ/mol",
      asks: true,
      because: "the head says kJ/mol, but the values agree with edition 7 to 1 % in kcal/mol",
    });
  });

  test("one agreeing value is too few to go by", () => {
    expect(planOf("formula;phase;S\nNH3;g;46,07\n", edition7)[2]).toMatchObject({ unit: null });
  });
});

test("what the sheet says of itself is filled in, to be confirmed", () => {
  const guess = planColumns(
    sheetOf("Values at 298.15 K and 1 atm\nformula,phase,S (cal/mol/K)\nCO,g,47.2\n"),
    NO_CONTEXT,
  );
  expect(guess.notices).toEqual([
    "The sheet speaks of 1 atm: its values are brought to 1 bar (100 kPa), each with the step beside it.",
    "The sheet speaks of 298.15 K (25 °C).",
  ]);
  expect(guess.settings).toMatchObject({ temperature: "298.15", standardPressure: "101325" });
});

test("hills, first values and bare solids of a sheet", () => {
  const sheet = sheetOf("formula,phase,S (J/mol/K)\nH2O,l,69.95\nNaCl,s,72.1\nCO,g,197.66\nCO2,g,213.8\n");
  expect(hillsOf(sheet, planColumns(sheet, NO_CONTEXT).plan)).toEqual(["H2O", "ClNa", "CO", "CO2"]);
  expect(firstValues(sheet)).toEqual([
    ["H2O", "NaCl", "CO"],
    ["l", "s", "g"],
    ["69.95", "72.1", "197.66"],
  ]);
  expect(hasBareSolid(sheet)).toBe(true);
  expect(hasBareSolid(sheetOf("species,S (J/mol/K)\nNaCl(s),72.1\n"))).toBe(true);
  expect(hasBareSolid(sheetOf("formula,phase,S (J/mol/K)\nNaCl,cr,72.1\n"))).toBe(false);
});

describe("what stops a plan", () => {
  const plan = planOf("formula,phase,dHf (kJ/mol),u,S (J/mol/K)\nH2O,l,-285.83,0.04,69.95\n");
  const pointers = (columns: ColumnPlan, settings: SheetSettings = said): string[] =>
    checkPlan(columns, settings).map((error) => error.pointer);
  const changed = (index: number, change: Partial<ColumnPlan[number]>): ColumnPlan =>
    plan.map((column, at) => (at === index ? { ...column, ...change } : column));

  test("nothing, when it is whole", () => {
    expect(checkPlan(plan, said)).toEqual([]);
  });

  test.each<[string, ColumnPlan, string]>([
    ["no formula", changed(0, { means: "ignore" }), "/columns"],
    ["no phase", changed(1, { means: "ignore" }), "/columns"],
    ["two formulas", changed(1, { means: "formula" }), "/columns/1"],
    ["a formula and a key", changed(1, { means: "key" }), "/columns/1"],
    ["a value without unit", changed(4, { unit: null }), "/columns/4"],
    ["an entropy in kJ/mol", changed(4, { unit: "kJ/mol" }), "/columns/4"],
    ["two enthalpies", changed(4, { property: "enthalpyOfFormation", unit: "kJ/mol" }), "/columns/4"],
    ["a value of nothing", changed(4, { property: null }), "/columns/4"],
    ["an uncertainty of a column that is not read", changed(2, { means: "ignore", property: null }), "/columns/3"],
    ["values of different quantities, none named", changed(4, { means: "anyValue", property: null }), "/columns"],
  ])("%s", (_what, columns, pointer) => {
    expect(pointers(columns)).toContain(pointer);
  });

  test.each<[string, Partial<SheetSettings>, string]>([
    ["no temperature", { temperature: null }, "/settings/temperature"],
    ["no pressure", { standardPressure: null }, "/settings/standardPressure"],
    ["uncertainties of a kind not said", { uncertaintyKind: null }, "/settings/uncertaintyKind"],
  ])("%s", (_what, change, pointer) => {
    expect(pointers(plan, { ...said, ...change })).toEqual([pointer]);
  });

  test("the kind of uncertainties is not asked where there are none", () => {
    expect(pointers(changed(3, { means: "ignore", property: null }), { ...said, uncertaintyKind: null })).toEqual([]);
  });
});
