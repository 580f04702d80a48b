import { describe, expect, it } from "vitest";
import {
  electron,
  equilibriumConstant,
  gibbsFromEnthalpyAndEntropy,
  gibbsFromLog10K,
  gibbsFromPotential,
  lnK,
  log10K,
  netTerms,
  type ReactionSpecies,
  reactionSum,
  standardPotential,
} from "./equilibrium.ts";

// CODATA Key Values for Thermodynamics (Hemisphere, 1989); u = U/2.
const species = (key: string, enthalpy: number, uH: number | null, entropy: number, uS: number): ReactionSpecies => ({
  key,
  enthalpy: { value: enthalpy, standardUncertainty: uH },
  entropy: { value: entropy, standardUncertainty: uS },
});
const hydrogen = species("H2(g)", 0, 0, 130.68, 0.0015);
const oxygen = species("O2(g)", 0, 0, 205.152, 0.0025);
const water = species("H2O(l)", -285.83, 0.02, 69.95, 0.015);
const steam = species("H2O(g)", -241.826, 0.02, 188.835, 0.005);

const formation = [
  { coefficient: -2, species: hydrogen },
  { coefficient: -1, species: oxygen },
  { coefficient: 2, species: water },
];

describe("reaction sums", () => {
  it("are per mole of reaction as written", () => {
    expect(reactionSum(formation, "enthalpy")).toMatchObject({ value: -571.66, standardUncertainty: 0.04 });
    const half = formation.map(({ coefficient, species: one }) => ({ coefficient: coefficient / 2, species: one }));
    expect(reactionSum(half, "enthalpy")).toMatchObject({ value: -285.83, standardUncertainty: 0.02 });
  });

  it("net a species that stands on both sides before its uncertainty counts", () => {
    const withSpectator = [...formation, { coefficient: -5, species: water }, { coefficient: 5, species: water }];
    expect(reactionSum(withSpectator, "enthalpy")).toEqual(reactionSum(formation, "enthalpy"));
    expect(
      netTerms([
        { coefficient: 1, species: water },
        { coefficient: -1, species: water },
      ]),
    ).toEqual([]);
  });

  it("name every species that lacks the property", () => {
    expect(reactionSum(formation, "gibbs")).toEqual({ outcome: "missing", keys: ["H2(g)", "O2(g)", "H2O(l)"] });
    const bare = { coefficient: 1, species: { key: "X(cr)" } };
    expect(gibbsFromEnthalpyAndEntropy([...formation, bare])).toEqual({ outcome: "missing", keys: ["X(cr)"] });
  });

  it("state no uncertainty when one species has none", () => {
    const uncertain = species("H2O(l)", -285.83, null, 69.95, 0.015);
    const terms = [
      { coefficient: -1, species: uncertain },
      { coefficient: 1, species: steam },
    ];
    expect(reactionSum(terms, "enthalpy")).toMatchObject({ outcome: "summed", standardUncertainty: null });
    expect(gibbsFromEnthalpyAndEntropy(terms)).toMatchObject({ outcome: "summed", standardUncertainty: null });
  });

  it("join the uncertainties of ΔrH° and ΔrS°", () => {
    const boiling = [
      { coefficient: -1, species: water },
      { coefficient: 1, species: steam },
    ];
    const sum = gibbsFromEnthalpyAndEntropy(boiling);
    expect(sum.outcome === "summed" && sum.value).toBeCloseTo(44.004 - 0.29815 * 118.885, 9);
    expect(sum.outcome === "summed" && sum.standardUncertainty).toBeCloseTo(
      Math.hypot(0.02, 0.02, 0.29815 * 0.015, 0.29815 * 0.005),
      12,
    );
  });

  it("turn with temperature", () => {
    const boiling = [
      { coefficient: -1, species: water },
      { coefficient: 1, species: steam },
    ];
    const at = (temperature: number) => {
      const sum = gibbsFromEnthalpyAndEntropy(boiling, temperature);
      return sum.outcome === "summed" ? sum.value : Number.NaN;
    };
    expect(at(298.15)).toBeGreaterThan(0);
    expect(at(380)).toBeLessThan(0); // boils below, near 370 K with constant ΔrH° and ΔrS°
  });
});

describe("what follows from ΔrG°", () => {
  it("ln K and log10 K: RT ln 10 is 5.708 kJ/mol at 298.15 K", () => {
    expect(log10K(-5.708)).toBeCloseTo(1, 4);
    expect(lnK(-5.708) / log10K(-5.708)).toBeCloseTo(Math.LN10, 12);
    expect(equilibriumConstant(0)).toBe(1);
  });

  it("are undone by their inverses", () => {
    expect(gibbsFromLog10K(log10K(-123.4, 400), 400)).toBeCloseTo(-123.4, 9);
    expect(gibbsFromPotential(standardPotential(-212.6, 2), 2)).toBeCloseTo(-212.6, 9);
  });

  it("doubling the equation squares K and leaves E° alone", () => {
    expect(log10K(2 * -30)).toBeCloseTo(2 * log10K(-30), 12);
    expect(standardPotential(2 * -30, 2)).toBeCloseTo(standardPotential(-30, 1), 12);
  });

  it("a volt is 96.485 kJ/mol for one electron", () => {
    expect(standardPotential(-96.485332, 1)).toBeCloseTo(1, 7);
    expect(() => standardPotential(-1, 0)).toThrow(RangeError);
  });

  it("an electron is half a hydrogen molecule less a hydrogen ion", () => {
    expect(electron({ value: 130.68, standardUncertainty: 0.0015 })).toMatchObject({
      enthalpy: { value: 0, standardUncertainty: 0 },
      entropy: { value: 65.34, standardUncertainty: 0.00075 },
    });
    expect(electron({ value: 130.68, standardUncertainty: null }).entropy?.standardUncertainty).toBeNull();
  });
});
