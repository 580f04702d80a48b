import { describe, expect, test } from "vitest";
import { digits } from "#app/thermo/digits.ts";
import { readKey, type SpeciesIdentity } from "#app/thermo/speciesKey.ts";
import { elementEntropies, followingGibbsEnergy, referenceHills } from "./follows.ts";

function identity(key: string): SpeciesIdentity {
  const reading = readKey(key);
  if (reading.outcome !== "read") throw new Error(reading.sentence);
  return reading.value;
}

const stated = (printed: string) => ({ digits: digits(printed), uncertainty: null });

// S° of the elements: CODATA Key Values (1989).
const entropies = elementEntropies(
  [
    ["H2(g)", "130.680"],
    ["O2(g)", "205.152"],
    ["O3(g)", "238.93"],
    ["S(cr,rhombic)", "32.054"],
    ["C(cr,graphite)", "5.74"],
  ].map(([key = "", printed = ""]) => {
    const { formula, phase, label } = identity(key);
    const { printed: written, composition, charge, hill } = formula;
    return { key, printed: written, composition, charge, hill, phase, label: label ?? null, entropy: stated(printed) };
  }),
);

describe("ΔfG° that follows from ΔfH° and S°", () => {
  // ΔfH° and S° of the CODATA Key Values; ΔfG° as published beside them in CODATA-based auxiliary data.
  test.each([
    ["H2O(l)", "-285.830", "69.95", "-237.14"],
    ["OH-(aq)", "-230.015", "-10.90", "-157.22"],
    ["CO2(g)", "-393.51", "213.785", "-394.37"],
    ["SO4-2(aq)", "-909.34", "18.50", "-744.00"],
  ])("%s: %s and %s give %s kJ/mol", (key, enthalpy, entropy, gibbs) => {
    expect(followingGibbsEnergy(identity(key), stated(enthalpy), stated(entropy), entropies)).toBe(gibbs);
  });

  test("it claims no more decimals than both numbers have", () => {
    expect(followingGibbsEnergy(identity("H2O(l)"), stated("-285.8"), stated("69.95"), entropies)).toBe("-237.1");
  });

  test("reference elements and the hydrogen ion are zero by convention", () => {
    expect(followingGibbsEnergy(identity("H2(g)"), stated("0"), stated("130.680"), entropies)).toBe("0");
    expect(followingGibbsEnergy(identity("H+(aq)"), stated("0"), stated("0"), entropies)).toBe("0");
  });

  test("without the entropy of an element it is not made", () => {
    expect(followingGibbsEnergy(identity("NH3(g)"), stated("-45.94"), stated("192.77"), entropies)).toBeNull();
  });
});

test("only reference states lend their entropy to an element", () => {
  expect(entropies("O")?.key).toBe("O2(g)");
  expect(entropies("N")).toBeUndefined();
});

test("the formulas of the reference states are those of their molecules", () => {
  expect(referenceHills(["H", "O", "C", "Br", "Ar"])).toEqual(["H2", "O2", "C", "Br2", "Ar"]);
});
