import { describe, expect, it } from "vitest";
import { codata } from "#tests/published/publishedTables.ts";
import { foundBy, published, type Row } from "#tests/support/view.ts";
import { gibbsClosureCheck } from "./gibbs-closure.ts";

// CODATA Key Values (1989); ΔfG° follows from them.
const elements = published(codata.filter(({ key }) => !["NH3(g)", "H2O(l)", "Na+(aq)", "Cl-(aq)"].includes(key)));
const GOOD = {
  "H2O(l)": { enthalpyOfFormation: "-285.830", entropy: "69.95", gibbsEnergyOfFormation: "-237.140" },
  "NH3(g)": { enthalpyOfFormation: "-45.94", entropy: "192.77", gibbsEnergyOfFormation: "-16.41" },
  "Na+(aq)": { enthalpyOfFormation: "-240.34", entropy: "58.45", gibbsEnergyOfFormation: "-261.95" },
};

function explained(
  key: keyof typeof GOOD,
  values: Row["values"],
  row: Partial<Row> = {},
  standing: readonly Row[] = elements,
) {
  const [finding] = foundBy(gibbsClosureCheck, [{ key, values: { ...GOOD[key], ...values }, ...row }], standing);
  return finding?.suggestions ?? [];
}
const sentences = (...of: Parameters<typeof explained>) => explained(...of).map(({ sentence }) => sentence);

describe("The slip that explains a failing closure", () => {
  it.each<[slip: string, key: keyof typeof GOOD, values: Row["values"], sentence: string]>([
    [
      "a sign lost",
      "NH3(g)",
      { enthalpyOfFormation: "45.94" },
      "The sign of ΔfH° lost would explain it: −45.94 leaves 0.00.",
    ],
    [
      "two digits exchanged",
      "H2O(l)",
      { enthalpyOfFormation: "-258.830" },
      "Two digits of ΔfH° exchanged would explain it: −285.830 leaves 0.00.",
    ],
    [
      "one digit misread",
      "NH3(g)",
      { entropy: "197.77" },
      "One digit of S° misread would explain it: 192.77 leaves 0.00.",
    ],
    [
      "a decimal point moved",
      "H2O(l)",
      { entropy: "6.995" },
      "The decimal point of S° moved would explain it: 69.95 leaves 0.00.",
    ],
    [
      "joules for kilojoules",
      "H2O(l)",
      { enthalpyOfFormation: "-285830" },
      "ΔfH° in joules taken as kilojoules, or a decimal comma taken for a thousands mark, would explain it: −285.830 leaves 0.00.",
    ],
    [
      "calories for joules",
      "H2O(l)",
      { entropy: "16.72" },
      "S° in calories taken as joules would explain it: 16.72 cal/(mol K), which is 69.96 J/(mol K), leaves 0.00.",
    ],
    ["ΔfS° filed as S°", "NH3(g)", { entropy: "-99.05" }, "ΔfS° filed as S° would explain it: S° 192.77 leaves 0.00."],
    [
      "T in degrees Celsius",
      "H2O(l)",
      { gibbsEnergyOfFormation: "-281.747" },
      "T in degrees Celsius in TΔfS° would explain it: ΔfG° −237.140 leaves 0.00.",
    ],
    [
      "ΔfH° and ΔfG° exchanged",
      "H2O(l)",
      { enthalpyOfFormation: "-237.140", gibbsEnergyOfFormation: "-285.830" },
      "ΔfH° and ΔfG° exchanged would explain it: ΔfH° −285.830 with ΔfG° −237.140 leaves 0.00.",
    ],
    [
      "S° and Cp° exchanged",
      "H2O(l)",
      { entropy: "75.29", heatCapacity: "69.95" },
      "S° and Cp° exchanged would explain it: S° 69.95 with Cp° 75.29 leaves 0.00.",
    ],
  ])("%s", (_slip, key, values, sentence) => {
    expect(sentences(key, values)[0]).toBe(sentence);
  });

  it("changes both values where two were exchanged", () => {
    const [suggestion] = explained("H2O(l)", { enthalpyOfFormation: "-237.140", gibbsEnergyOfFormation: "-285.830" });
    expect(suggestion).toMatchObject({
      property: "enthalpyOfFormation",
      becomes: "-285.830",
      also: [{ property: "gibbsEnergyOfFormation", becomes: "-237.140" }],
    });
  });

  it("names a wrong charge by what the formula would be", () => {
    const standing = elements;
    const [finding] = foundBy(gibbsClosureCheck, [{ key: "Na+2(aq)", values: GOOD["Na+(aq)"] }], standing);
    expect(finding?.suggestions[0]).toMatchObject({
      property: null,
      becomes: "Na+",
      slip: "charge-wrong",
      sentence: "A charge of +2 written for +1 would explain it: Na+ leaves 0.00.",
    });
  });

  it("names hydrogen atoms missing from the formula", () => {
    const [finding] = foundBy(gibbsClosureCheck, [{ key: "NH2(g)", values: GOOD["NH3(g)"] }], elements);
    expect(finding?.suggestions[0]).toMatchObject({
      slip: "hydrogen-count-wrong",
      becomes: "H3N",
      sentence: "One hydrogen atom missing in the formula would explain it: H3N leaves 0.00.",
    });
  });

  it("shows equal explanations as equal: a closure cannot tell S° from ΔfG° when the H+ convention was left out", () => {
    const suggestions = explained("Na+(aq)", { gibbsEnergyOfFormation: "-242.47" });
    expect(suggestions.slice(0, 2).map(({ slip, property, rank }) => [slip, property, rank])).toEqual([
      ["hydrogen-convention-left-out", "entropy", 1],
      ["hydrogen-convention-left-out", "gibbsEnergyOfFormation", 1],
    ]);
    expect(suggestions[1]?.sentence).toContain("would explain it equally well");
  });

  it("prefers the explanation that leads back to what stands", () => {
    const misread = { gibbsEnergyOfFormation: "-18.41" };
    const alone = explained("NH3(g)", misread);
    expect(new Set(alone.filter(({ rank }) => rank === 1).map(({ property }) => property))).toEqual(
      new Set(["enthalpyOfFormation", "gibbsEnergyOfFormation"]),
    );
    const standing: Row[] = [...elements, { key: "NH3(g)", values: GOOD["NH3(g)"] }];
    expect(explained("NH3(g)", misread, {}, standing).map(({ property, becomes }) => [property, becomes])).toEqual([
      ["gibbsEnergyOfFormation", "-16.41"],
    ]);
  });

  it("repairs proposed values only", () => {
    const standing: Row[] = [...elements, { key: "NH3(g)", values: GOOD["NH3(g)"] }];
    const [finding] = foundBy(gibbsClosureCheck, [{ key: "NH3(g)", values: { entropy: "197.77" } }], standing);
    expect(finding?.suggestions.map(({ property }) => property)).toEqual(["entropy"]);
  });

  it("undoes the slip in the digits of the source, and repairs to its precision", () => {
    const [suggestion] = explained("H2O(l)", { enthalpyOfFormation: "-63.815 kcal/mol" });
    expect(suggestion).toMatchObject({ slip: "digits-exchanged", becomes: "-285.830" });
    expect(suggestion?.sentence).toBe(
      "Two digits of ΔfH° exchanged would explain it: −68.315 kcal/mol, which is −285.830 kJ/mol, leaves 0.00.",
    );
  });

  it("never suggests an entropy below that of translation alone", () => {
    const suggestions = explained("NH3(g)", { enthalpyOfFormation: "11.4" });
    for (const { property, becomes } of suggestions) {
      // Sackur–Tetrode for 17 g/mol at 1 bar: 144 J/(mol K).
      if (property === "entropy") expect(Number(becomes)).toBeGreaterThan(143);
    }
  });

  it("suggests at most three", () => {
    for (let tenth = 0; tenth < 200; tenth += 1) {
      const values = { gibbsEnergyOfFormation: (-20 + tenth / 10).toFixed(2) };
      expect(explained("NH3(g)", values).length).toBeLessThanOrEqual(3);
    }
  });
});
