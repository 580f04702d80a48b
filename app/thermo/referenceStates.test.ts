import { describe, expect, it } from "vitest";
import { elementOf, elementSymbols } from "./elements.ts";
import { isConventionalZero, isHydrogenIon, isOxonium, isReferenceState, referenceStateOf } from "./referenceStates.ts";
import { formatKey, readKey, type SpeciesIdentity } from "./speciesKey.ts";

function identity(key: string): SpeciesIdentity {
  const reading = readKey(key);
  if (reading.outcome !== "read") throw new Error(reading.sentence);
  return reading.value;
}

describe("reference states", () => {
  // The agreed states of the CODATA and NBS tables.
  it.each([
    ["H", "H2(g)"],
    ["D", "D2(g)"],
    ["T", "T2(g)"],
    ["O", "O2(g)"],
    ["Ar", "Ar(g)"],
    ["Br", "Br2(l)"],
    ["Hg", "Hg(l)"],
    ["I", "I2(cr)"],
    ["C", "C(cr,graphite)"],
    ["S", "S(cr,rhombic)"],
    ["P", "P(cr,white)"],
    ["Sn", "Sn(cr,white)"],
    ["B", "B(cr,rhombohedral)"],
    ["As", "As(cr,grey)"],
    ["Se", "Se(cr,trigonal)"],
    ["Mn", "Mn(cr,alpha)"],
    ["Fe", "Fe(cr)"],
    ["Si", "Si(cr)"],
  ])("%s is counted from %s", (element, key) => {
    expect(referenceStateOf(element)?.key).toBe(key);
  });

  it("have keys that the key reader prints the same, and are their own reference states", () => {
    for (const symbol of elementSymbols()) {
      const state = referenceStateOf(symbol);
      if (state === undefined) continue;
      expect(formatKey(identity(state.key))).toBe(state.key);
      expect(isReferenceState(identity(state.key))).toBe(true);
      expect(identity(state.key).formula.composition).toEqual({ [symbol]: state.atoms });
    }
  });

  it("exist for every element to curium but astatine and francium", () => {
    const without = elementSymbols().filter((symbol) => {
      const element = elementOf(symbol);
      return element !== undefined && element.atomicNumber <= 96 && referenceStateOf(symbol) === undefined;
    });
    expect(without).toEqual(["At", "Fr"]);
  });

  it.each([
    ["S8(cr,rhombic)", true, "per molecule"],
    ["P4(s,white)", true, "s for cr"],
    ["C(s)", true, "a sheet that names no form means the reference one"],
    ["Mn(cr,α)", true, "a Greek letter"],
    ["Fe(cr,alpha)", true, "a metal's stable form by its letter"],
    ["Ce(cr,gamma)", true, "cerium's"],
    ["C(cr,diamond)", false, "another form"],
    ["P(cr,red)", false, "stabler, but not the agreed one"],
    ["Sn(cr,grey)", false, "another form"],
    ["Fe(cr,gamma)", false, "stable only when hot"],
    ["O3(g)", false, "another molecule"],
    ["O(g)", false, "an atom"],
    ["Br2(g)", false, "another phase"],
    ["Hg(g)", false, "another phase"],
    ["Na+(aq)", false, "an ion"],
    ["H2(aq)", false, "dissolved"],
    ["H2O(l)", false, "a compound"],
  ])("%s: %s (%s)", (key, expected) => {
    expect(isReferenceState(identity(key))).toBe(expected);
  });
});

describe("zeros by convention", () => {
  it.each([
    ["O2(g)", "enthalpyOfFormation", true],
    ["O2(g)", "gibbsEnergyOfFormation", true],
    ["O2(g)", "entropy", false],
    ["O2(g)", "heatCapacity", false],
    ["H+(aq)", "enthalpyOfFormation", true],
    ["H+(aq)", "gibbsEnergyOfFormation", true],
    ["H+(aq)", "entropy", true],
    ["H+(aq)", "heatCapacity", true],
    ["H+(aq)", "enthalpyIncrement", false],
    ["H3O+(aq)", "enthalpyOfFormation", false],
    ["H+(g)", "enthalpyOfFormation", false],
    ["D+(aq)", "enthalpyOfFormation", false],
  ] as const)("%s, %s: %s", (key, property, expected) => {
    expect(isConventionalZero(identity(key), property)).toBe(expected);
  });

  it("tells the hydrogen ion from the same ion with a water molecule", () => {
    expect(["H+(aq)", "H3O+(aq)"].map((key) => [isHydrogenIon(identity(key)), isOxonium(identity(key))])).toEqual([
      [true, false],
      [false, true],
    ]);
  });
});
