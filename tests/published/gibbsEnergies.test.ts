import { describe, expect, it } from "vitest";
import { closureArithmetic, derivedGibbsEnergy, gibbsClosure } from "#app/thermo/closure.ts";
import { codata, elementEntropyFrom, nbs, rowOf, valueOf } from "./publishedTables.ts";

describe("ΔfG° derived from the CODATA key values", () => {
  // Published as CODATA-based auxiliary data with the OECD/NEA Chemical Thermodynamics reviews (citation from memory).
  // They follow from the same rows, so this tests our arithmetic, not the table.
  it.each([
    ["H2O(l)", -237.14],
    ["OH-(aq)", -157.22],
    ["Na+(aq)", -261.95],
    ["Cl-(aq)", -131.22],
    ["CO2(g)", -394.37],
    ["NH3(g)", -16.41],
    ["SO4-2(aq)", -744.0],
  ])("%s: %d kJ/mol", (key, published) => {
    const row = rowOf(codata, key);
    const derived = derivedGibbsEnergy(
      row.identity,
      valueOf(row, "enthalpyOfFormation"),
      valueOf(row, "entropy"),
      elementEntropyFrom(codata),
    );
    if (derived.outcome === "notMade") throw new Error(derived.sentence);
    expect(Math.abs(derived.value - published)).toBeLessThanOrEqual(0.01);
  });

  it("can be derived for every row, and is zero for the elements and H+(aq)", () => {
    const zero = [];
    for (const row of codata) {
      const derived = derivedGibbsEnergy(
        row.identity,
        valueOf(row, "enthalpyOfFormation"),
        valueOf(row, "entropy"),
        elementEntropyFrom(codata),
      );
      if (derived.outcome === "notMade") throw new Error(derived.sentence);
      expect(derived.standardUncertainty).not.toBeNull();
      if (Math.abs(derived.value) < 1e-9) zero.push(row.key);
    }
    expect(zero).toHaveLength(codata.filter((row) => valueOf(row, "enthalpyOfFormation").conventional).length);
    expect(zero).toContain("H+(aq)");
    expect(zero).toContain("C(cr,graphite)");
  });
});

describe("Gibbs closure of the NBS tables (J. Phys. Chem. Ref. Data 11, Suppl. 2, 1982)", () => {
  // Element entropies are those of CODATA where it has them. Which rows close, and the four residuals, were computed
  // apart from this program when the excerpt was made.
  const elementEntropy = elementEntropyFrom(codata, nbs);
  const closures = nbs.flatMap((row) => {
    const { enthalpyOfFormation: enthalpy, entropy, gibbsEnergyOfFormation: gibbs } = row.values;
    if (enthalpy === undefined || entropy === undefined || gibbs === undefined) return [];
    const constraintRelaxed = /constraint has been relaxed/.test(row.description);
    const closure = gibbsClosure({
      identity: row.identity,
      enthalpy,
      entropy,
      gibbs,
      elementEntropy,
      constraintRelaxed,
    });
    return [{ key: row.key, closure, constraintRelaxed }];
  });
  const made = closures.filter(({ closure }) => closure.verdict !== "notMade");

  it("can be made for 83 rows", () => {
    expect(made).toHaveLength(83);
  });

  it("blocks none of them", () => {
    expect(made.filter(({ closure }) => closure.verdict === "block").map(({ key }) => key)).toEqual([]);
  });

  it("asks to look at exactly four", () => {
    const looks = made.filter(({ closure }) => closure.verdict === "look");
    expect(looks.map(({ key, closure }) => [key, Number(closure.residual?.toFixed(2))])).toEqual([
      ["N2H4(l)", -0.2],
      ["Na2CO3(cr)", 2.43],
      ["NaHCO3(cr)", 1.9],
      ["KCl(cr)", -0.31],
    ]);
  });

  it("knows which two the compilers relaxed", () => {
    expect(made.filter(({ constraintRelaxed }) => constraintRelaxed).map(({ key }) => key)).toEqual([
      "Na2CO3(cr)",
      "NaHCO3(cr)",
    ]);
  });

  it("prints its arithmetic", () => {
    const potassiumChloride = made.find(({ key }) => key === "KCl(cr)");
    expect(potassiumChloride && closureArithmetic(potassiumChloride.closure)).toEqual([
      "ΔfS° = 82.59 − (1 K × 64.68 + 1 Cl × 111.5405) = −93.63 J/(mol K)",
      "ΔfH° − T ΔfS° = −436.747 − 298.15 × (−0.09363) = −408.831 kJ/mol",
      "r = −409.14 − (−408.831) = −0.31 kJ/mol",
      "t = 2d + c + e = 2 × 0.0086 + 0.0866 + 0.0611 = 0.165 kJ/mol (one source)",
      "closes up to 0.16, blocks above 3.00 kJ/mol",
    ]);
  });
});
