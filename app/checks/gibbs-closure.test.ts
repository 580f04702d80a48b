import { describe, expect, it } from "vitest";
import { codata } from "#tests/published/publishedTables.ts";
import { foundBy, published, type Row } from "#tests/support/view.ts";
import { gibbsClosureCheck } from "./gibbs-closure.ts";

// Element entropies and the values of NH3(g), H2O(l) and Na+(aq): CODATA Key Values (1989); ΔfG° as in tests/published.
const elements = published(codata.filter(({ key }) => !["NH3(g)", "H2O(l)", "Na+(aq)"].includes(key)));
const ammonia = { enthalpyOfFormation: "-45.94 ± 0.35", entropy: "192.77 ± 0.05", gibbsEnergyOfFormation: "-16.41" };

const closureOf = (row: Row, standing: readonly Row[] = elements) => foundBy(gibbsClosureCheck, [row], standing);

describe("Gibbs closure", () => {
  it("passes values that belong together", () => {
    expect(closureOf({ key: "NH3(g)", values: ammonia })).toEqual([]);
  });

  it("blocks values that do not, prints its arithmetic and names the slip", () => {
    const [finding, ...others] = closureOf({
      key: "NH3(g)",
      values: { ...ammonia, enthalpyOfFormation: "-49.54 ± 0.30" },
    });
    expect(others).toEqual([]);
    expect(finding).toMatchObject({
      severity: "block",
      property: "enthalpyOfFormation",
      lineRef: "line 1",
      sentence: gibbsClosureCheck.example.sentence,
      data: { residual: "3.597", tolerance: "0.137", enthalpyOfFormation: "-49.54" },
    });
    expect(finding?.sentence).toBe("Gibbs closure is off by +3.60 kJ/mol, tolerance 0.14.");
    expect(finding?.arithmetic.slice(0, 3)).toEqual([
      "ΔfS° = 192.77 − (1 N × 95.8045 + 3 H × 65.340) = −99.05 J/(mol K)",
      "ΔfH° − T ΔfS° = −49.54 − 298.15 × (−0.09905) = −20.007 kJ/mol",
      "r = −16.41 − (−20.007) = +3.60 kJ/mol",
    ]);
    expect(finding?.suggestions).toEqual([
      {
        property: "enthalpyOfFormation",
        becomes: "-45.94",
        slip: "digits-exchanged",
        sentence: "Two digits of ΔfH° exchanged would explain it: −45.94 leaves 0.00.",
        also: [],
        rank: 1,
        before: "3.60",
        after: "0.00",
      },
    ]);
  });

  it("only asks to look where the residual is small", () => {
    const [finding] = closureOf({ key: "NH3(g)", values: { ...ammonia, gibbsEnergyOfFormation: "-16.74" } });
    expect(finding?.severity).toBe("look");
  });

  it("only asks to look where the source relaxed the constraint, and suggests nothing", () => {
    const notice = "G-H-S constraint has been relaxed; see Introduction";
    const [finding] = closureOf({ key: "NH3(g)", notice, values: { ...ammonia, enthalpyOfFormation: "-49.54" } });
    expect(finding).toMatchObject({ severity: "look", suggestions: [] });
    expect(finding?.sentence).toContain("The source says that it relaxed the constraint.");
  });

  it("allows the uncertainties of values from several sources", () => {
    const standing: Row[] = [...elements, { key: "NH3(g)", source: "a handbook", values: ammonia }];
    const proposed: Row = { key: "NH3(g)", source: "a cell", values: { gibbsEnergyOfFormation: "-16.10 ± 0.30" } };
    expect(closureOf(proposed, standing)).toEqual([]);
    const alone: Row = {
      key: "NH3(g)",
      source: "a cell",
      values: { ...ammonia, gibbsEnergyOfFormation: "-16.10 ± 0.30" },
    };
    expect(closureOf(alone)).toHaveLength(1);
  });

  it("says which value, put back to what stands, would make it close", () => {
    const standing: Row[] = [...elements, { key: "NH3(g)", values: ammonia }];
    const [finding] = closureOf({ key: "NH3(g)", values: { enthalpyOfFormation: "-49.54" } }, standing);
    expect(finding?.property).toBe("enthalpyOfFormation");
    expect(finding?.arithmetic.at(-1)).toBe("With the ΔfH° that stands, −45.94, it closes (0.00).");
  });

  it("says that it was not made, and why, where an element's entropy is missing", () => {
    const withoutNitrogen = elements.filter(({ key }) => key !== "N2(g)");
    const [finding] = closureOf({ key: "NH3(g)", values: ammonia }, withoutNitrogen);
    expect(finding).toMatchObject({
      severity: "remark",
      sentence: "Gibbs closure of NH3(g) is not made: S° of N2(g) is not in the table.",
      data: { missing: "N2(g)" },
    });
  });

  it("is not made for an ion in the gas", () => {
    const values = { enthalpyOfFormation: "609.36", entropy: "147.95", gibbsEnergyOfFormation: "573.99" };
    const [finding] = closureOf({ key: "Na+(g)", values });
    expect(finding?.severity).toBe("remark");
    expect(finding?.sentence).toContain("Na+(g)");
  });

  it("closes ions in water by the convention for H+(aq)", () => {
    const sodium = { enthalpyOfFormation: "-240.34", entropy: "58.45", gibbsEnergyOfFormation: "-261.95" };
    expect(closureOf({ key: "Na+(aq)", values: sodium })).toEqual([]);
  });

  it("takes the sheet's own element rows first", () => {
    const [withTable] = closureOf({ key: "NH3(g)", values: { ...ammonia, gibbsEnergyOfFormation: "-15.66" } });
    expect(withTable?.severity).toBe("look");
    const ownNitrogen: Row = {
      key: "N2(g)",
      values: { enthalpyOfFormation: "0", entropy: "196.64", gibbsEnergyOfFormation: "0" },
    };
    const own = foundBy(
      gibbsClosureCheck,
      [ownNitrogen, { key: "NH3(g)", values: { ...ammonia, gibbsEnergyOfFormation: "-15.66" } }],
      elements,
    );
    expect(own).toEqual([]);
  });

  it("does not apply where one of the three values is missing", () => {
    expect(closureOf({ key: "NH3(g)", values: { enthalpyOfFormation: "-4594", entropy: "192.77" } })).toEqual([]);
  });
});
