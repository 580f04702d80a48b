import { describe, expect, it } from "vitest";
import { codata, nbs } from "#tests/published/publishedTables.ts";
import { foundBy, published, type Row } from "#tests/support/view.ts";
import { changeBeyondUncertainty } from "./change-beyond-uncertainty.ts";

const found = (key: string, values: Row["values"], standing: readonly Row[] = published([...codata, ...nbs])) =>
  foundBy(changeBeyondUncertainty, [{ key, values }], standing);

describe("Change beyond the uncertainties", () => {
  it("passes a change that both uncertainties allow", () => {
    // 0.36 against √(0.27² + 0.5²) = 0.57.
    expect(found("ZnO(cr)", { enthalpyOfFormation: "-350.10 ± 0.50" })).toEqual([]);
  });

  it("asks to look at a change beyond them, with E_n and the slip that would explain it", () => {
    const [finding] = found("NH3(g)", { enthalpyOfFormation: "-49.54 ± 0.30" });
    expect(finding).toMatchObject({
      severity: "look",
      property: "enthalpyOfFormation",
      sentence: changeBeyondUncertainty.example.sentence,
      // 3.60 / √(0.30² + 0.35²)
      arithmetic: ["E_n = |−49.54 − (−45.94)| / √(0.3² + 0.35²) = 7.8"],
      data: { value: "-49.54", standing: "-45.94", normalizedError: 7.81 },
    });
    expect(finding?.suggestions.map(({ sentence }) => sentence)).toEqual([
      "Two digits of ΔfH° exchanged would explain it: −45.94 is what stands.",
    ]);
  });

  it("finds a sign lost against what stands", () => {
    const [finding] = found("HF(g)", { enthalpyOfFormation: "273.30 ± 0.70" });
    expect(finding?.suggestions[0]).toMatchObject({ slip: "sign-lost", becomes: "-273.30" });
  });

  it("suggests nothing for a change that no slip explains", () => {
    const [finding] = found("NH3(g)", { enthalpyOfFormation: "-47.32 ± 0.30" });
    expect(finding?.suggestions).toEqual([]);
  });

  it("asks to look at a large change where an uncertainty is missing, and passes a small one", () => {
    const [large] = found("CaO(cr)", { entropy: "39.75" }, published(codata));
    expect(large?.sentence).toBe(
      "S° of CaO(cr) changes by +1.65 J/(mol K), and it states no uncertainty to compare with what stands. Is the new value meant?",
    );
    expect(found("CaO(cr)", { enthalpyOfFormation: "-635.09" }, published(codata))).toEqual([]);
    expect(found("CH4(g)", { enthalpyOfFormation: "-80.0 ± 0.3" })[0]?.sentence).toContain(
      "what stands has no uncertainty",
    );
    expect(found("CH4(g)", { enthalpyOfFormation: "-80.0" })[0]?.sentence).toContain("no uncertainty says");
  });

  it("leaves a change by the factor of two units to the check of units", () => {
    expect(found("H2O(l)", { entropy: "16.72 ± 0.01" })).toEqual([]);
  });

  it("does not apply to a value that is new", () => {
    expect(found("SiH4(g)", { enthalpyOfFormation: "34.3 ± 1.5" })).toEqual([]);
  });
});
