import { describe, expect, it } from "vitest";
import { digits } from "./digits.ts";
import type { Property } from "./property.ts";
import { readKey, type SpeciesIdentity } from "./speciesKey.ts";
import { entropyStepToBar, GAS_ENTROPY_STEP, gasFormed, gibbsStepToBar, printedAtBar } from "./standardState.ts";

function identity(key: string): SpeciesIdentity {
  const reading = readKey(key);
  if (reading.outcome !== "read") throw new Error(reading.sentence);
  return reading.value;
}

describe("from 1 atm to 1 bar", () => {
  it("a gas gains R ln 1.01325 = 0.1094 J/(mol K)", () => {
    expect(GAS_ENTROPY_STEP).toBeCloseTo(0.1094, 4);
    expect(entropyStepToBar(identity("O2(g)"))).toBe(GAS_ENTROPY_STEP);
    expect(entropyStepToBar(identity("H2O(l)"))).toBe(0);
    expect(entropyStepToBar(identity("Na+(aq)"))).toBe(0);
  });

  // Δν counted by hand; the elements form with the gas they are.
  it.each([
    ["H2O(l)", -1.5],
    ["H2O(g)", -0.5],
    ["O2(g)", 0],
    ["CO2(g)", 0],
    ["NH3(g)", -1],
    ["HgO(cr)", -0.5],
    ["HBr(g)", 0.5],
    ["He(g)", 0],
    ["Na+(aq)", 0.5],
    ["Cl-(aq)", -1],
    ["H+(aq)", 0],
    ["SO4-2(aq)", -3],
    ["CdSO4·8/3H2O(cr)", -(10 / 3 + 8 / 3)],
  ])("%s forms with %d mol of gas", (key, expected) => {
    expect(gasFormed(identity(key))).toBeCloseTo(expected, 12);
  });

  it("ΔfG° of liquid water goes from −237.178 to −237.129 kJ/mol", () => {
    // NBS Technical Note 270-3 (1 atm) and the NBS tables of 1982 (1 bar).
    expect(-237.178 + (gibbsStepToBar(identity("H2O(l)")) ?? 0)).toBeCloseTo(-237.129, 3);
  });

  it("is not known for an element without a reference state", () => {
    expect(gibbsStepToBar(identity("HAt(g)"))).toBeUndefined();
  });
});

describe("a printed value from 1 atm to 1 bar", () => {
  const at = (property: Property, value: string, key: string) => printedAtBar(property, digits(value), identity(key));

  // H2O(l) and HBr(g): NBS Technical Note 270-3 (1 atm) and the NBS tables of 1982 (1 bar), from memory. The rest is
  // arithmetic with R ln 1.01325 = 0.1094 J/(mol K).
  it.each<[Property, string, string, string, string]>([
    ["gibbsEnergyOfFormation", "H2O(l)", "-237.178", "-237.129", "1 atm to 1 bar: + 0.0489"],
    ["entropy", "O2(g)", "205.028", "205.137", "1 atm to 1 bar: + 0.1094"],
    ["entropy", "O2(g)", "205", "205", "1 atm to 1 bar: + 0.1094, less than the last place printed"],
    ["entropy", "H2O(l)", "69.91", "69.91", "1 atm to 1 bar: no change"],
    ["enthalpyOfFormation", "H2O(g)", "-241.818", "-241.818", "1 atm to 1 bar: no change"],
    ["heatCapacity", "O2(g)", "29.355", "29.355", "1 atm to 1 bar: no change"],
    ["gibbsEnergyOfFormation", "HBr(g)", "-53.43", "-53.45", "1 atm to 1 bar: − 0.0163"],
  ])("%s of %s: %s becomes %s", (property, key, printed, expected, note) => {
    expect(at(property, printed, key)).toEqual({ digits: expected, note });
  });

  it("is refused for ΔfG° where an element has no reference state", () => {
    expect(at("gibbsEnergyOfFormation", "-1.0", "HAt(g)")).toBeUndefined();
  });
});
