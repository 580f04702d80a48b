import { describe, expect, it } from "vitest";
import { foundBy } from "#tests/support/view.ts";
import { entropyPositive } from "./entropy-positive.ts";

describe("Entropy above zero", () => {
  it("passes positive values", () => {
    const values = { entropy: "69.95", heatCapacity: "75.291", enthalpyIncrement: "13.273" };
    expect(foundBy(entropyPositive, [{ key: "H2O(l)", values }])).toEqual([]);
  });

  it("blocks a negative entropy and suggests it without the sign", () => {
    const [finding] = foundBy(entropyPositive, [{ key: "H2O(l)", values: { entropy: "-69.95" } }]);
    expect(finding).toMatchObject({
      severity: "block",
      property: "entropy",
      sentence: entropyPositive.example.sentence,
      suggestions: [{ property: "entropy", becomes: "69.95", slip: "sign-lost" }],
    });
  });

  it("blocks heat capacities and enthalpy increments at or below zero", () => {
    const values = { heatCapacity: "-75.3", enthalpyIncrement: "0" };
    const findings = foundBy(entropyPositive, [{ key: "H2O(l)", values }]);
    expect(findings.map(({ severity, property }) => [severity, property])).toEqual([
      ["block", "heatCapacity"],
      ["block", "enthalpyIncrement"],
    ]);
  });

  it("knows that the entropy of an element is not one of its zeros", () => {
    const [finding] = foundBy(entropyPositive, [{ key: "O2(g)", values: { entropy: "0" } }]);
    expect(finding?.sentence).toContain("Only ΔfH° and ΔfG° of an element are zero.");
  });

  it("asks whether another zero stands for a missing value", () => {
    const [finding] = foundBy(entropyPositive, [{ key: "H2O(l)", values: { entropy: "0.0" } }]);
    expect(finding?.sentence).toContain("If a missing value was typed as 0");
  });

  it("does not apply to solutes, charged or not", () => {
    expect(
      foundBy(entropyPositive, [{ key: "SO4-2(aq)", values: { entropy: "-18.5", heatCapacity: "-293" } }]),
    ).toEqual([]);
    expect(foundBy(entropyPositive, [{ key: "CaSO4(aq)", values: { entropy: "-33.1" } }])).toEqual([]);
  });
});
