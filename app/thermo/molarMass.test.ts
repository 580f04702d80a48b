import { describe, expect, it } from "vitest";
import { atomicWeight } from "./atomicWeights.ts";
import { readFormula } from "./formula.ts";
import { molarMass } from "./molarMass.ts";

function massOf(text: string): number | undefined {
  const reading = readFormula(text);
  if (reading.outcome !== "read") throw new Error(reading.sentence);
  return molarMass(reading.value);
}

describe("standard atomic weights", () => {
  // IUPAC abridged values (five digits, 2021), from memory; lead's conventional value is good to 1.1 only.
  it.each([
    ["H", 1.008, 0.0002],
    ["C", 12.011, 0.002],
    ["N", 14.007, 0.001],
    ["O", 15.999, 0.001],
    ["Na", 22.99, 0.001],
    ["S", 32.06, 0.02],
    ["Cl", 35.45, 0.01],
    ["Fe", 55.845, 0.002],
    ["Cu", 63.546, 0.003],
    ["Ag", 107.87, 0.01],
    ["I", 126.9, 0.01],
    ["Hg", 200.59, 0.01],
    ["Pb", 207.2, 1.1],
    ["U", 238.03, 0.01],
    ["D", 2.0141, 0.0001],
    ["T", 3.016, 0.0001],
  ])("%s: %d g/mol", (element, expected, tolerance) => {
    expect(Math.abs((atomicWeight(element) ?? 0) - expected)).toBeLessThanOrEqual(tolerance);
  });

  it("are missing for elements without a stable isotope", () => {
    expect(["Tc", "Pm", "Po", "Xx"].map(atomicWeight)).toEqual([undefined, undefined, undefined, undefined]);
  });
});

describe("molar mass", () => {
  // Sums of the abridged weights.
  it.each([
    ["H2O", 18.015, 0.002],
    ["D2O", 20.028, 0.002],
    ["CuSO4·5H2O", 249.68, 0.03],
    ["CdSO4·8/3H2O", 256.52, 0.03],
    ["SO4-2", 96.06, 0.02],
    ["Fe0.947O", 68.88, 0.02],
  ])("%s: %d g/mol", (text, expected, tolerance) => {
    expect(Math.abs((massOf(text) ?? 0) - expected)).toBeLessThanOrEqual(tolerance);
  });

  it("is not known when an element has no weight", () => {
    expect(massOf("TcO2")).toBeUndefined();
  });
});
