import { describe, expect, it } from "vitest";
import { codata, nbs } from "#tests/published/publishedTables.ts";
import { foundBy, published, type Row } from "#tests/support/view.ts";
import { unitSlip } from "./unit-slip.ts";

// CODATA Key Values (1989) and the NBS tables (1982) as what stands.
const standing = published([...codata, ...nbs]);
const found = (key: string, values: Row["values"], against: readonly Row[] = standing) =>
  foundBy(unitSlip, [{ key, values }], against);

describe("Filed in another unit", () => {
  it("passes a value near the standing one", () => {
    expect(found("H2O(l)", { enthalpyOfFormation: "-285.8", entropy: "70.0" })).toEqual([]);
  });

  it("blocks calories filed as joules and suggests the value in joules", () => {
    const [finding] = found("H2O(l)", { entropy: "16.72" });
    expect(finding).toMatchObject({
      severity: "block",
      sentence: `${unitSlip.example.sentence} Compare the unit with the source.`,
      suggestions: [{ slip: "calories-as-joules", becomes: "69.96" }],
    });
  });

  it("names both explanations of a factor of 1000", () => {
    const [finding] = found("H2O(l)", { enthalpyOfFormation: "-285830" });
    expect(finding?.sentence).toContain("is 1000 times what stands, −285.830");
    expect(finding?.suggestions[0]?.sentence).toBe(
      "ΔfH° in joules taken as kilojoules, or a decimal comma taken for a thousands mark, would explain it: −285.830 kJ/mol.",
    );
  });

  it("sees a thousandth and a factor taken twice", () => {
    expect(found("H2O(l)", { entropy: "0.06995" })[0]?.suggestions[0]?.slip).toBe("thousandfold");
    expect(found("H2O(l)", { enthalpyOfFormation: "-1195.9" })[0]?.suggestions[0]?.slip).toBe("joules-as-calories");
  });

  it("only asks to look where the numbers have few digits", () => {
    // HI(g) 26.50 in CODATA; two digits leave room for chance.
    expect(found("HI(g)", { enthalpyOfFormation: "6.3" })[0]?.severity).toBe("look");
  });

  it("asks to look at a number no substance has, where nothing stands", () => {
    const [small] = found("SiH4(g)", { entropy: "0.2046" });
    expect(small).toMatchObject({ severity: "look", suggestions: [{ slip: "thousandfold", becomes: "204.6" }] });
    const [large] = found("SiH4(g)", { enthalpyOfFormation: "34300" });
    expect(large).toMatchObject({ severity: "look", suggestions: [{ slip: "thousandth" }] });
    expect(large?.sentence).toBe(
      "ΔfH° of SiH4(g), 34300 kJ/mol, is far above what a substance of 5 atoms can have. Compare the unit with the source.",
    );
  });

  it("leaves values of published tables alone, where nothing stands", () => {
    expect(foundBy(unitSlip, standing)).toEqual([]);
  });

  it("does not apply to zeros and to values that stand", () => {
    expect(found("O2(g)", { enthalpyOfFormation: "0" })).toEqual([]);
    expect(found("H2O(l)", { heatCapacity: "75.3" }, [{ key: "H2O(l)", values: { entropy: "0.07" } }])).toEqual([]);
  });
});
