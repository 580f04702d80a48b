import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { FARADAY_CONSTANT } from "./constants.ts";
import { absolute, compare, digits, halfUnit, subtract } from "./digits.ts";
import {
  addQuantities,
  conversionFactor,
  convert,
  convertQuantity,
  exactDecimalFactor,
  isLikeUnit,
  quantity,
  readUnit,
  subtractQuantities,
  UNITS,
} from "./unit.ts";

describe("reading a unit", () => {
  it.each([
    ["kJ/mol", "kJ/mol"],
    ["kJ mol-1", "kJ/mol"],
    ["kJ mol^-1", "kJ/mol"],
    ["kJ·mol⁻¹", "kJ/mol"],
    ["kJ mol<sup>−1</sup>", "kJ/mol"],
    ["kJ per mol", "kJ/mol"],
    ["kJ/mole", "kJ/mol"],
    ["KJ/MOL", "kJ/mol"],
    ["kJ*mol^{-1}", "kJ/mol"],
    ["J/mol", "J/mol"],
    ["J mol−1", "J/mol"],
    ["kcal/mol", "kcal/mol"],
    ["kcal(th)/mol", "kcal/mol"],
    ["kcal_th mol-1", "kcal/mol"],
    ["cal/mol", "cal/mol"],
    ["J/(mol K)", "J/(mol K)"],
    ["J/(mol·K)", "J/(mol K)"],
    ["J/(K mol)", "J/(mol K)"],
    ["J/mol/K", "J/(mol K)"],
    ["J/mol·K", "J/(mol K)"],
    ["J/mol-K", "J/(mol K)"],
    ["J/molK", "J/(mol K)"],
    ["J mol-1 K-1", "J/(mol K)"],
    ["J K-1 mol-1", "J/(mol K)"],
    ["J·K⁻¹·mol⁻¹", "J/(mol K)"],
    ["J.K-1.mol-1", "J/(mol K)"],
    ["J/K/mol", "J/(mol K)"],
    ["J/deg mol", "J/(mol K)"],
    ["kJ/(mol K)", "kJ/(mol K)"],
    ["cal/(mol K)", "cal/(mol K)"],
    ["cal/mol·K", "cal/(mol K)"],
    ["cal/mol/deg", "cal/(mol K)"],
    ["cal/(mol °K)", "cal/(mol K)"],
    ["kcal/(mol K)", "kcal/(mol K)"],
    ["e.u.", "cal/(mol K)"],
    ["eu", "cal/(mol K)"],
    ["gibbs/mol", "cal/(mol K)"],
    ["gibbs mol-1", "cal/(mol K)"],
  ])("%s is %s", (text, expected) => {
    expect(readUnit(text)).toMatchObject({ outcome: "read", value: expected });
  });

  it("says what an entropy unit is", () => {
    expect(readUnit("e.u.")).toMatchObject({ notes: [expect.stringContaining("4.184 J")] });
  });

  it("asks which calorie Cal is", () => {
    expect(readUnit("Cal/mol")).toMatchObject({ outcome: "ambiguous", candidates: ["cal/mol", "kcal/mol"] });
  });

  it.each([
    ["", "No unit"],
    ["kJ", "per mole"],
    ["J/K", "per mole"],
    ["kJ/g", "per mass"],
    ["kJ/kmol", "1 kJ/kmol is 1 J/mol"],
    ["MJ/mol", "capitals get lost"],
    ["eV/mol", "per particle, not per mole"],
    ["eV/atom", "may count each atom"],
    ["cm-1", "wavenumber"],
    ["kJ mol", "not a unit this table reads"],
    ["J/(mol K2)", "not a unit this table reads"],
    ["cal(15 °C)/mol", "neither the thermochemical calorie"],
    ["kJ//mol", "not a unit this table reads"],
  ])("%j is refused: %s", (text, sentence) => {
    expect(readUnit(text)).toMatchObject({ outcome: "refused", sentence: expect.stringContaining(sentence) });
  });

  it("never throws, whatever is typed", () => {
    fc.assert(
      fc.property(fc.string({ unit: "binary", maxLength: 40 }), (text) => readUnit(text).outcome !== undefined),
    );
  });
});

describe("converting", () => {
  it.each([
    ["-68.315", "kcal/mol", "kJ/mol", "-285.830", "× 4.184"],
    ["16.71", "cal/(mol K)", "J/(mol K)", "69.91", "× 4.184"],
    ["-285830", "J/mol", "kJ/mol", "-285.830", "÷ 1000"],
    ["-285.830", "kJ/mol", "J/mol", "-285830", "× 1000"],
    ["0.06995", "kJ/(mol K)", "J/(mol K)", "69.95", "× 1000"],
    ["-68315", "cal/mol", "kJ/mol", "-285.830", "× 0.004184"],
    ["205.10", "J/(mol K)", "J/(mol K)", "205.10", null],
    ["-68.269", "kcal(IT)/mol", "kJ/mol", "-285.829", "× 4.1868"],
    ["-2.96242", "eV", "kJ/mol", "-285.8301", "× 96.48533212"],
    ["-285.8301", "kJ/mol", "eV", "-2.962420", "÷ 96.48533212"],
    ["2.1258", "meV/K", "J/(mol K)", "205.109", "× 96.48533212"],
    ["1.0000", "kcal(IT)/mol", "kcal/mol", "1.0007", "× 4.1868 ÷ 4.184"],
    ["1.00", "kJ/mol", "cal/mol", "239", "× 1000 ÷ 4.184"],
  ] as const)("%s %s is %s: %s (%s)", (value, from, to, expected, note) => {
    expect(convert(digits(value), from, to)).toEqual({ digits: expected, note });
  });

  it("takes an electronvolt per particle for F in J/mol, exactly (SI 2019)", () => {
    expect(exactDecimalFactor("eV", "J/mol")).toBe("96485.3321233100184"); // 1.602176634 × 6.02214076 × 10 000
    expect(conversionFactor("eV", "J/mol")).toBeCloseTo(FARADAY_CONSTANT, 8);
    expect(exactDecimalFactor("J/mol", "eV")).toBeUndefined();
  });

  it("refuses unlike quantities", () => {
    expect(() => convert(digits("1"), "kJ/mol", "J/(mol K)")).toThrow(RangeError);
  });

  it("comes back with the digits it left with", () => {
    const value = fc
      .tuple(fc.integer({ min: -9_999_999, max: 9_999_999 }), fc.integer({ min: 0, max: 5 }))
      .map(([amount, scale]) => {
        const text = String(Math.abs(amount)).padStart(scale + 1, "0");
        return digits(
          `${amount < 0 ? "-" : ""}${text.slice(0, text.length - scale)}${scale ? `.${text.slice(-scale)}` : ""}`,
        );
      });
    fc.assert(
      fc.property(value, fc.constantFrom(...UNITS), fc.constantFrom(...UNITS), (start, from, to) => {
        fc.pre(isLikeUnit(from, to));
        const there = convert(start, from, to).digits;
        // The way back rounds too, one place further, so the two calories may come out just between two neighbours.
        const off = absolute(subtract(convert(there, to, from).digits, start));
        return compare(off, halfUnit(start)) <= 0;
      }),
    );
  });
});

describe("quantities", () => {
  it("add and subtract in their common unit", () => {
    const a = quantity(digits("-285.830"), "kJ/mol");
    const b = quantity(digits("0.5"), "kJ/mol");
    expect(addQuantities(a, b)).toEqual({ digits: "-285.330", unit: "kJ/mol" });
    expect(subtractQuantities(a, b)).toEqual({ digits: "-286.330", unit: "kJ/mol" });
    expect(convertQuantity(a, "J/mol")).toEqual({ digits: "-285830", unit: "J/mol" });
  });
});
