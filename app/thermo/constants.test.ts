import { describe, expect, it } from "vitest";
import { FARADAY_CONSTANT, GAS_CONSTANT } from "./constants.ts";

describe("constants that follow from the exact ones", () => {
  // CODATA recommended values of the fundamental physical constants, 2018.
  it("R = 8.314 462 618 … J/(mol K)", () => {
    expect(GAS_CONSTANT).toBeCloseTo(8.314_462_618, 9);
  });
  it("F = 96 485.332 12 … C/mol", () => {
    expect(FARADAY_CONSTANT).toBeCloseTo(96_485.332_12, 5);
  });
});
