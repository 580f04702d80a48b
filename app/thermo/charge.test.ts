import { describe, expect, it } from "vitest";
import { enclosingBracket, spellCharge, splitCharge } from "./charge.ts";

describe("setting the charge apart", () => {
  it.each([
    ["SO4-2", "SO4", -2],
    ["SO4^{2-}", "SO4", -2],
    ["Na+", "Na", 1],
    ["Na", "Na", 0],
    ["CuSO4·5H2O", "CuSO4·5H2O", 0],
    ["K2.5-", "K2.5", -1],
    ["X8/3+", "X8/3", 1],
  ])("%s: %s with %i", (text, body, charge) => {
    expect(splitCharge(text)).toMatchObject({ readings: [{ body, charge }] });
  });

  it("gives both readings of a plain digit before a bare sign, the charge first", () => {
    expect(splitCharge("Hg2+")).toMatchObject({
      readings: [
        { body: "Hg", charge: 2 },
        { body: "Hg2", charge: 1 },
      ],
    });
  });
});

describe("spelling a charge", () => {
  it.each([
    ["SO4", -2, "-2"],
    ["Fe", 3, "+3"],
    ["Na", 1, "+"],
    ["NO3", -1, "-"],
    ["H2O", 0, ""],
    ["I3", -1, "-1"],
    ["O2", -1, "-1"],
    ["Hg2", 1, "+1"],
    ["VO2", 1, "+1"],
    ["Fe3", 1, "+1"],
    ["SO42", -1, "-1"],
  ])("%s with %i ends in %j", (body, charge, spelled) => {
    expect(spellCharge(body, charge)).toBe(spelled);
  });
});

describe("the bracket around a whole formula", () => {
  it.each([
    ["[Fe(CN)6]", "["],
    ["(SO4)", "("],
    ["(NH4)2(SO4)", undefined],
    ["K4[Fe(CN)6]", undefined],
    ["(open", undefined],
    ["", undefined],
  ])("%s: %s", (text, bracket) => {
    expect(enclosingBracket(text)).toBe(bracket);
  });
});
