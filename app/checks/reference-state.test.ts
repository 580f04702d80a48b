import { describe, expect, it } from "vitest";
import { codata } from "#tests/published/publishedTables.ts";
import { foundBy, published, type Row } from "#tests/support/view.ts";
import { referenceState } from "./reference-state.ts";

const found = (key: string, values: Row["values"], standing: readonly Row[] = []) =>
  foundBy(referenceState, [{ key, values }], standing);

describe("Zeros by convention", () => {
  it("passes reference states with exact zeros, H+(aq) and ordinary compounds", () => {
    expect(found("O2(g)", { enthalpyOfFormation: "0", entropy: "205.152", gibbsEnergyOfFormation: "0" })).toEqual([]);
    expect(found("P(cr,white)", { enthalpyOfFormation: "0", gibbsEnergyOfFormation: "0.00" })).toEqual([]);
    expect(found("H+(aq)", { enthalpyOfFormation: "0", entropy: "0", heatCapacity: "0" })).toEqual([]);
    expect(found("H2O(l)", { enthalpyOfFormation: "-285.830" })).toEqual([]);
  });

  it("blocks a reference state that is not zero", () => {
    const [finding] = found("O2(g)", { enthalpyOfFormation: "249.18" });
    expect(finding).toMatchObject({ severity: "block", property: "enthalpyOfFormation" });
    expect(finding?.sentence).toBe(
      "ΔfH° of O2(g) is zero by convention, because it is the reference state of oxygen; it is given as 249.18 kJ/mol. Does the value belong to another form or row?",
    );
  });

  it("blocks H+(aq) that is not zero, in S° too", () => {
    const [finding] = found("H+(aq)", { entropy: "65.34" });
    expect(finding?.sentence).toContain("because the values of all ions count from it");
  });

  it("blocks a zero for a form that is not the reference state", () => {
    const [finding] = found("C(cr,diamond)", { enthalpyOfFormation: "0" });
    expect(finding).toMatchObject({ severity: "block", sentence: referenceState.example.sentence });
    for (const key of ["O3(g)", "Br2(g)", "P(cr,red)", "Sn(cr,grey)", "Fe(g)"]) {
      expect(found(key, { gibbsEnergyOfFormation: "0.0" }), key).toHaveLength(1);
    }
  });

  it("says that H3O+(aq) carries the values of H2O(l), and suggests them", () => {
    const values = { enthalpyOfFormation: "0", entropy: "0", gibbsEnergyOfFormation: "0" };
    const findings = found("H3O+(aq)", values, published(codata));
    expect(findings.map(({ property, suggestions }) => [property, suggestions[0]?.becomes])).toEqual([
      ["enthalpyOfFormation", "-285.830"],
      ["entropy", "69.95"],
      // CODATA prints no ΔfG°.
      ["gibbsEnergyOfFormation", undefined],
    ]);
    expect(findings[0]?.sentence).toBe(
      "H3O+(aq) is H+(aq) written with a water molecule, so its ΔfH° is that of H2O(l), −285.830, not 0. Give that value, or file the row as H+(aq).",
    );
    expect(findings.every(({ severity }) => severity === "block")).toBe(true);
  });

  it("remarks that a zero by convention is exact", () => {
    const [finding] = found("O2(g)", { enthalpyOfFormation: "0.00 ± 0.10" });
    expect(finding).toMatchObject({ severity: "remark", property: "enthalpyOfFormation" });
  });

  it("remarks that an element of several forms names none", () => {
    const [finding] = found("C(cr)", { enthalpyOfFormation: "0" });
    expect(finding).toMatchObject({
      severity: "remark",
      sentence: "C(cr) does not name its form; it is taken as C(cr,graphite), the reference state of carbon.",
    });
    expect(found("Fe(cr)", { enthalpyOfFormation: "0" })).toEqual([]);
  });

  it("does not apply to compounds and ions with a zero", () => {
    expect(found("H2O(l)", { enthalpyOfFormation: "0" })).toEqual([]);
    expect(found("Fe+2(aq)", { enthalpyOfFormation: "0" })).toEqual([]);
  });
});
