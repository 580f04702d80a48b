import { describe, expect, it } from "vitest";
import { foundBy } from "#tests/support/view.ts";
import { uncertaintyDigits } from "./uncertainty-digits.ts";

const found = (cell: string) => foundBy(uncertaintyDigits, [{ key: "H2O(l)", values: { enthalpyOfFormation: cell } }]);

describe("Digits of value and uncertainty", () => {
  it.each(["-285.830 ± 0.040", "-285.83 ± 0.04", "-285.8 ± 0.4", "-286 ± 10", "-285.8 ± 1.5", "-285.830 ± 0.4"])(
    "passes %s",
    (cell) => {
      expect(found(cell)).toEqual([]);
    },
  );

  it("remarks on digits far beyond the uncertainty", () => {
    expect(found("-285.83041 ± 0.4")).toMatchObject([
      { severity: "remark", sentence: uncertaintyDigits.example.sentence, property: "enthalpyOfFormation" },
    ]);
  });

  it("remarks on an uncertainty printed finer than its value", () => {
    expect(found("-285.8 ± 0.04")[0]?.sentence).toBe(
      "ΔfH° of H2O(l), −285.8, is printed to fewer decimals than its uncertainty, 0.04 kJ/mol.",
    );
  });

  it("remarks on more than two significant digits in the uncertainty, once for the value", () => {
    const findings = found("-285.83 ± 0.0412");
    expect(findings).toHaveLength(1);
    expect(findings[0]?.sentence).toContain("three significant digits");
    expect(findings[0]?.sentence).toContain("fewer decimals");
  });

  it("blocks a negative uncertainty and asks to look at one of zero", () => {
    expect(found("-285.83 ± -0.04")).toMatchObject([{ severity: "block" }]);
    expect(found("-285.83 ± 0.00")).toMatchObject([{ severity: "look" }]);
  });

  it("does not apply without an uncertainty and to zeros by convention", () => {
    expect(found("-285.83041")).toEqual([]);
    expect(foundBy(uncertaintyDigits, [{ key: "O2(g)", values: { enthalpyOfFormation: "0" } }])).toEqual([]);
  });
});
