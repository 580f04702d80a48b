import { describe, expect, it } from "vitest";
import { digits } from "./digits.ts";
import {
  expandedUncertainty,
  isAssumed,
  normalizedError,
  standardUncertainty,
  type Uncertainty,
} from "./uncertainty.ts";

const expanded = (text: string, coverageFactor: number | null = 2): Uncertainty => ({
  digits: digits(text),
  kind: "expanded",
  coverageFactor,
});
const standard = (text: string): Uncertainty => ({ digits: digits(text), kind: "standard", coverageFactor: null });
const unstated = (text: string): Uncertainty => ({ digits: digits(text), kind: "unstated", coverageFactor: null });
const exact: Uncertainty = { digits: digits("0"), kind: "exact", coverageFactor: null };

describe("kinds of uncertainty", () => {
  it.each<[uncertainty: Uncertainty | null, u: number | null, U: number | null, reason: string]>([
    [standard("0.020"), 0.02, 0.04, "a standard one is u itself"],
    [expanded("0.040"), 0.02, 0.04, "an expanded one is k u"],
    [expanded("0.060", 3), 0.02, 0.04, "with its own k"],
    [unstated("0.040"), 0.02, 0.04, "of unstated kind it counts as k = 2"],
    [exact, 0, 0, "by convention there is none"],
    [null, null, null, "none stated is not zero"],
  ])("%j: u = %d, U = %d (%s)", (uncertainty, u, U) => {
    expect([standardUncertainty(uncertainty), expandedUncertainty(uncertainty)]).toEqual([u, U]);
  });

  it("knows where k was assumed", () => {
    expect([unstated("1"), expanded("1", null), expanded("1"), standard("1"), null].map(isAssumed)).toEqual([
      true,
      true,
      false,
      false,
      false,
    ]);
  });
});

describe("normalised error", () => {
  const value = (text: string, uncertainty: Uncertainty | null) => ({ digits: digits(text), uncertainty });

  it("is the distance over the joined expanded uncertainty", () => {
    expect(normalizedError(value("10.0", expanded("0.3")), value("10.5", expanded("0.4")))).toBeCloseTo(1, 12);
  });
  it("is the same from either side", () => {
    const a = value("10.0", standard("0.3"));
    const b = value("10.5", expanded("0.4"));
    expect(normalizedError(a, b)).toBe(normalizedError(b, a));
  });
  it("is not defined when one is missing or both are exact", () => {
    expect(normalizedError(value("1", null), value("2", expanded("1")))).toBeNull();
    expect(normalizedError(value("0", exact), value("1", exact))).toBeNull();
  });
});
