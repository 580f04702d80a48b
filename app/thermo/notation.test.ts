import { describe, expect, it } from "vitest";
import { digits } from "./digits.ts";
import { bracketForm, plusMinusForm, showDigits, showNumber, showTerm } from "./notation.ts";
import type { Uncertainty } from "./uncertainty.ts";

const expanded = (text: string, coverageFactor: number | null = 2): Uncertainty => ({
  digits: digits(text),
  kind: "expanded",
  coverageFactor,
});
const standard = (text: string): Uncertainty => ({ digits: digits(text), kind: "standard", coverageFactor: null });
const unstated = (text: string): Uncertainty => ({ digits: digits(text), kind: "unstated", coverageFactor: null });
const exact: Uncertainty = { digits: digits("0"), kind: "exact", coverageFactor: null };

describe("printing a value with its uncertainty", () => {
  it.each<[value: string, uncertainty: Uncertainty | null, printed: string, reason: string]>([
    ["-285.830", expanded("0.040"), "−285.830(20)", "CODATA's water: U is divided by k"],
    ["130.680", expanded("0.003"), "130.680(2)", "no digit is added to the value"],
    ["-325", expanded("10"), "−325(5)", "whole units"],
    ["353.2", expanded("40"), "353(20)", "the value is rounded to the same place"],
    ["1234", standard("150"), "1230(150)", "tens"],
    ["0.92", standard("1.25"), "0.9(12)", "beyond the point"],
    ["12.345", standard("0.0996"), "12.34(10)", "a carried nine does not make three digits"],
    ["-0.1712", standard("0.0029"), "−0.1712(29)", "the GUM's example H.3"],
    ["253.4", standard("0.002"), "253.4, u = 0.002", "too small to show"],
    ["0", exact, "0", "exact"],
    ["69.95", null, "69.95", "none stated"],
    ["12.3", unstated("0.4"), "12.3(2)", "of unstated kind, k = 2 assumed"],
  ])("%s: %j is %s (%s)", (value, uncertainty, printed) => {
    expect(bracketForm(digits(value), uncertainty)).toBe(printed);
  });

  it.each<[value: string, uncertainty: Uncertainty | null, printed: string]>([
    ["-285.830", expanded("0.040"), "(−285.830 ± 0.040), k = 2"],
    ["12.3", standard("0.4"), "(12.3 ± 0.4), k = 1"],
    ["12.3", unstated("0.4"), "(12.3 ± 0.4), k not stated, 2 assumed"],
    ["0", exact, "0, exact"],
    ["12.3", null, "12.3, no uncertainty stated"],
  ])("%s: %j is %s", (value, uncertainty, printed) => {
    expect(plusMinusForm(digits(value), uncertainty)).toBe(printed);
  });

  it("prints numbers with a true minus", () => {
    expect([showDigits(digits("-285.830")), showNumber(-237.1403, 2), showNumber(-0.001, 2)]).toEqual([
      "−285.830",
      "−237.14",
      "0.00",
    ]);
    expect([showTerm(65.34, 2), showTerm(-51.3, 2)]).toEqual(["+ 65.34", "− 51.30"]);
  });
});
