import { describe, expect, it } from "vitest";
import { GAS_CONSTANT } from "./constants.ts";
import { electronicEntropy, sackurTetrode } from "./thirdLaw.ts";

describe("translational entropy", () => {
  it("of a mass of 1 g/mol at 1 K and 1 bar is R times −1.1517 (Sackur–Tetrode constant, CODATA)", () => {
    // The constant is for 1 u; 1 g/mol is 1 u to nine digits.
    expect(sackurTetrode(1, { temperature: 1, pressure: 100_000 }) / GAS_CONSTANT).toBeCloseTo(-1.151_707_5, 6);
  });

  it("grows by 3/2 R ln of the mass and 5/2 R ln of the temperature, and falls by R ln of the pressure", () => {
    const start = sackurTetrode(20);
    expect(sackurTetrode(40) - start).toBeCloseTo(1.5 * GAS_CONSTANT * Math.log(2), 9);
    expect(sackurTetrode(20, { temperature: 596.3 }) - start).toBeCloseTo(2.5 * GAS_CONSTANT * Math.log(2), 9);
    expect(sackurTetrode(20, { pressure: 101_325 }) - start).toBeCloseTo(-GAS_CONSTANT * Math.log(1.01325), 9);
  });
});

describe("electronic entropy", () => {
  it("of one level is R ln g", () => {
    expect(electronicEntropy([{ degeneracy: 1, wavenumber: 0 }])).toBe(0);
    expect(electronicEntropy([{ degeneracy: 4, wavenumber: 0 }])).toBeCloseTo(GAS_CONSTANT * Math.log(4), 12);
  });

  it("comes to R ln of all states when it is hot, and of the ground level when it is cold", () => {
    const levels = [
      { degeneracy: 1, wavenumber: 0 },
      { degeneracy: 3, wavenumber: 16.4 },
    ];
    expect(electronicEntropy(levels, 1e6)).toBeCloseTo(GAS_CONSTANT * Math.log(4), 6);
    expect(electronicEntropy(levels, 0.1)).toBeCloseTo(0, 6);
  });

  it("needs a ground level", () => {
    expect(() => electronicEntropy([])).toThrow(RangeError);
  });
});
