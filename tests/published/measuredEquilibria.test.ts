import { describe, expect, it } from "vitest";
import { toNumber } from "#app/thermo/digits.ts";
import {
  electron,
  equilibriumConstant,
  type Estimate,
  gibbsFromEnthalpyAndEntropy,
  log10K,
  type ReactionSpecies,
  type ReactionTerm,
  reactionSum,
  standardPotential,
} from "#app/thermo/equilibrium.ts";
import { standardUncertainty } from "#app/thermo/uncertainty.ts";
import { codata, type PublishedRow, rowOf, valueOf } from "./publishedTables.ts";

/**
 * The CODATA rows against measurements that had no part in writing them down here: the whole way from the table to an
 * answer. All at 298.15 K and 100 kPa, per mole of reaction as written.
 */
describe("equilibria measured by themselves", () => {
  it("water's vapour pressure at 25 °C: 3.17 kPa (steam tables: 3.169)", () => {
    const pressure = equilibriumConstant(gibbsOf({ "H2O(l)": -1, "H2O(g)": 1 })) * 100;
    expect(Math.abs(pressure - 3.17)).toBeLessThanOrEqual(0.03);
  });

  it("the ion product of water: pKw 13.995 (common practice)", () => {
    const pK = -log10K(gibbsOf({ "H2O(l)": -1, "H+(aq)": 1, "OH-(aq)": 1 }));
    expect(Math.abs(pK - 13.995)).toBeLessThanOrEqual(0.015);
  });

  it("the solubility product of silver chloride: pKsp 9.75 (common practice)", () => {
    const pK = -log10K(gibbsOf({ "AgCl(cr)": -1, "Ag+(aq)": 1, "Cl-(aq)": 1 }));
    expect(Math.abs(pK - 9.75)).toBeLessThanOrEqual(0.03);
  });

  it("the silver/silver chloride electrode: 0.2222 V (common practice)", () => {
    const potential = standardPotential(gibbsOf({ "AgCl(cr)": -1, "e-": -1, "Ag(cr)": 1, "Cl-(aq)": 1 }), 1);
    expect(Math.abs(potential - 0.2222)).toBeLessThanOrEqual(0.001);
  });

  // Measured acid constants as reference works give them, from memory; CODATA used some of them.
  it.each([
    ["carbonic acid, first", { "CO2(aq)": -1, "H2O(l)": -1, "HCO3-(aq)": 1, "H+(aq)": 1 }, 6.35, 0.03],
    ["carbonic acid, second", { "HCO3-(aq)": -1, "CO3-2(aq)": 1, "H+(aq)": 1 }, 10.33, 0.03],
    ["ammonium", { "NH4+(aq)": -1, "NH3(g)": 1, "H+(aq)": 1 }, 11.03, 0.1],
    ["dihydrogen phosphate", { "H2PO4-(aq)": -1, "HPO4-2(aq)": 1, "H+(aq)": 1 }, 7.2, 0.05],
    ["hydrogen sulfate", { "HSO4-(aq)": -1, "SO4-2(aq)": 1, "H+(aq)": 1 }, 1.98, 0.05],
    ["hydrogen sulfide", { "H2S(aq)": -1, "HS-(aq)": 1, "H+(aq)": 1 }, 6.99, 0.1],
  ])("acid constant of %s", (_, reaction, pK, tolerance) => {
    expect(Math.abs(-log10K(gibbsOf(reaction)) - pK)).toBeLessThanOrEqual(tolerance);
  });

  // Standard potentials against the hydrogen electrode as reference works give them, from memory.
  it.each([
    ["zinc", { "Zn+2(aq)": -1, "e-": -2, "Zn(cr)": 1 }, 2, -0.763, 0.002],
    ["cadmium", { "Cd+2(aq)": -1, "e-": -2, "Cd(cr)": 1 }, 2, -0.403, 0.002],
    ["lead", { "Pb+2(aq)": -1, "e-": -2, "Pb(cr)": 1 }, 2, -0.126, 0.002],
    ["copper", { "Cu+2(aq)": -1, "e-": -2, "Cu(cr)": 1 }, 2, 0.34, 0.004],
    ["silver", { "Ag+(aq)": -1, "e-": -1, "Ag(cr)": 1 }, 1, 0.7991, 0.001],
    ["calomel", { "Hg2Cl2(cr)": -1, "e-": -2, "Hg(l)": 2, "Cl-(aq)": 2 }, 2, 0.2682, 0.001],
    ["mercury(I) sulfate", { "Hg2SO4(cr)": -1, "e-": -2, "Hg(l)": 2, "SO4-2(aq)": 1 }, 2, 0.6125, 0.003],
    ["chlorine", { "Cl2(g)": -1, "e-": -2, "Cl-(aq)": 2 }, 2, 1.358, 0.002],
    ["bromine", { "Br2(l)": -1, "e-": -2, "Br-(aq)": 2 }, 2, 1.066, 0.012],
    ["iodine", { "I2(cr)": -1, "e-": -2, "I-(aq)": 2 }, 2, 0.5355, 0.001],
    ["oxygen in acid", { "O2(g)": -1, "H+(aq)": -4, "e-": -4, "H2O(l)": 2 }, 4, 1.229, 0.001],
  ])("potential of %s", (_, reaction, electrons, potential, tolerance) => {
    expect(Math.abs(standardPotential(gibbsOf(reaction), electrons) - potential)).toBeLessThanOrEqual(tolerance);
  });

  it("the synthesis of ammonia: log10 K 5.77 for N2 + 3 H2 = 2 NH3 (from memory)", () => {
    expect(Math.abs(log10K(gibbsOf({ "N2(g)": -1, "H2(g)": -3, "NH3(g)": 2 })) - 5.77)).toBeLessThanOrEqual(0.1);
  });

  it("heat of combustion of graphite and of neutralisation, in kJ/mol (from memory: −393.5 and −55.8)", () => {
    expect(enthalpyOf({ "C(cr,graphite)": -1, "O2(g)": -1, "CO2(g)": 1 })).toBeCloseTo(-393.51, 2);
    expect(Math.abs(enthalpyOf({ "H+(aq)": -1, "OH-(aq)": -1, "H2O(l)": 1 }) + 55.82)).toBeLessThanOrEqual(0.05);
  });
});

function gibbsOf(reaction: Readonly<Record<string, number>>): number {
  const sum = gibbsFromEnthalpyAndEntropy(termsOf(reaction));
  if (sum.outcome === "missing") throw new Error(`missing: ${sum.keys.join(", ")}`);
  expect(sum.standardUncertainty).toBeGreaterThan(0);
  return sum.value;
}

function enthalpyOf(reaction: Readonly<Record<string, number>>): number {
  const sum = reactionSum(termsOf(reaction), "enthalpy");
  if (sum.outcome === "missing") throw new Error(`missing: ${sum.keys.join(", ")}`);
  return sum.value;
}

function termsOf(reaction: Readonly<Record<string, number>>): ReactionTerm[] {
  return Object.entries(reaction).map(([key, coefficient]) => ({
    coefficient,
    species: key === "e-" ? electron(estimate(rowOf(codata, "H2(g)"), "entropy")) : speciesOf(rowOf(codata, key)),
  }));
}

function speciesOf(row: PublishedRow): ReactionSpecies {
  return { key: row.key, enthalpy: estimate(row, "enthalpyOfFormation"), entropy: estimate(row, "entropy") };
}

function estimate(row: PublishedRow, property: "enthalpyOfFormation" | "entropy"): Estimate {
  const { digits, uncertainty } = valueOf(row, property);
  return { value: toNumber(digits), standardUncertainty: standardUncertainty(uncertainty) };
}
