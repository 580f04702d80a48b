import { describe, expect, it } from "vitest";
import { digits } from "#app/thermo/digits.ts";
import type { ViewedValue } from "./types.ts";
import { foundBy } from "#tests/support/view.ts";
import { uncertaintyMissing } from "./uncertainty-missing.ts";

describe("No uncertainty stated", () => {
  it("passes values with an uncertainty and zeros by convention", () => {
    const rows = [
      { key: "H2O(l)", values: { entropy: "69.95 ± 0.03" } },
      { key: "O2(g)", values: { enthalpyOfFormation: "0" } },
    ];
    expect(foundBy(uncertaintyMissing, rows)).toEqual([]);
  });

  it("makes one remark for a species, however many values it has", () => {
    const values = { enthalpyOfFormation: "-74.81", entropy: "186.264", gibbsEnergyOfFormation: "-50.72" };
    expect(foundBy(uncertaintyMissing, [{ key: "CH4(g)", values }])).toMatchObject([
      { severity: "remark", property: "enthalpyOfFormation", sentence: uncertaintyMissing.example.sentence },
    ]);
  });

  it("remarks that the kind of an uncertainty had to be assumed", () => {
    const value: ViewedValue = {
      property: "entropy",
      digits: digits("186.26"),
      uncertainty: { digits: digits("0.10"), kind: "unstated", coverageFactor: null },
      given: null,
      sourceId: "the sheet",
      sourceKind: "measurement",
      conventional: false,
      lineRef: null,
    };
    const [finding] = foundBy(uncertaintyMissing, [{ key: "CH4(g)", values: { entropy: value } }]);
    expect(finding?.sentence).toBe(
      "The source does not say what kind of uncertainty stands after ± for S° of CH4(g); it is counted as expanded with k = 2.",
    );
  });

  it("does not apply to values that stand", () => {
    const standing = [{ key: "CH4(g)", values: { entropy: "186.264" } }];
    const proposed = [{ key: "CH4(g)", values: { enthalpyOfFormation: "-74.60 ± 0.30" } }];
    expect(foundBy(uncertaintyMissing, proposed, standing)).toEqual([]);
  });
});
