import { describe, expect, it } from "vitest";
import {
  closureArithmetic,
  type ClosureInput,
  type ClosureValue,
  derivedGibbsEnergy,
  type ElementEntropy,
  entropyOfFormation,
  gibbsClosure,
} from "./closure.ts";
import { digits, multiply, toNumber } from "./digits.ts";
import { readKey, type SpeciesIdentity } from "./speciesKey.ts";
import type { Uncertainty } from "./uncertainty.ts";

// Values of CODATA Key Values for Thermodynamics (Hemisphere, 1989), J/(mol K), U with k = 2.
const ELEMENTS: Readonly<Record<string, readonly [key: string, entropy: string, U: string]>> = {
  H: ["H2(g)", "130.680", "0.003"],
  O: ["O2(g)", "205.152", "0.005"],
  Na: ["Na(cr)", "51.30", "0.20"],
  Cl: ["Cl2(g)", "223.081", "0.010"],
  S: ["S(cr,rhombic)", "32.054", "0.050"],
  N: ["N2(g)", "191.609", "0.004"],
};

const expanded = (text: string): Uncertainty => ({ digits: digits(text), kind: "expanded", coverageFactor: 2 });

function elementEntropy(element: string): ElementEntropy | undefined {
  const found = ELEMENTS[element];
  if (found === undefined) return undefined;
  return { key: found[0], digits: digits(found[1]), uncertainty: expanded(found[2]), fromSheet: false };
}

const fromSheet = (element: string): ElementEntropy | undefined => {
  const found = elementEntropy(element);
  return found && { ...found, fromSheet: true };
};

function identity(key: string): SpeciesIdentity {
  const reading = readKey(key);
  if (reading.outcome !== "read") throw new Error(reading.sentence);
  return reading.value;
}

const value = (text: string, more: Partial<ClosureValue> = {}): ClosureValue => ({
  digits: digits(text),
  uncertainty: null,
  given: null,
  sourceId: "sheet",
  conventional: false,
  ...more,
});

/** Water as the NBS tables (1982) have it, closed with CODATA's element entropies. */
function water(changes: Partial<ClosureInput> = {}): ClosureInput {
  return {
    identity: identity("H2O(l)"),
    enthalpy: value("-285.830"),
    entropy: value("69.91"),
    gibbs: value("-237.129"),
    elementEntropy,
    ...changes,
  };
}

describe("entropy of formation", () => {
  // Worked by hand.
  it.each([
    ["H2O(l)", "69.95", 69.95 - 130.68 - 205.152 / 2, 0],
    ["Na+(aq)", "58.45", 72.49, 130.68 / 2],
    ["Cl-(aq)", "56.60", -120.2805, -130.68 / 2],
    ["SO4-2(aq)", "18.50", 18.5 - 32.054 - 2 * 205.152 - 130.68, -130.68],
    ["OH-(aq)", "-10.90", -10.9 - 65.34 - 102.576 - 65.34, -65.34],
    ["H+(aq)", "0", 0, 65.34],
    ["O2(g)", "205.152", 0, 0],
  ])("%s with S° = %s: %d J/(mol K)", (key, entropy, expected, chargeTerm) => {
    const formed = entropyOfFormation(identity(key), digits(entropy), elementEntropy);
    if (formed.outcome === "notMade") throw new Error(formed.sentence);
    expect(formed.value).toBeCloseTo(expected, 9);
    expect(formed.chargeTerm).toBeCloseTo(chargeTerm, 9);
  });

  it("counts hydrogen once: ν − z for a solute", () => {
    const formed = entropyOfFormation(identity("NH4+(aq)"), digits("111.17"), elementEntropy);
    expect(formed.outcome === "made" && formed.parts.find(({ element }) => element === "H")).toMatchObject({
      count: 4,
      netCount: 3,
      entropy: 65.34,
    });
  });

  it("divides by the atoms of the form that is listed", () => {
    const perMolecule = (element: string): ElementEntropy | undefined =>
      element === "S"
        ? { key: "S8(cr,rhombic)", digits: digits("256.432"), uncertainty: null, fromSheet: false }
        : elementEntropy(element);
    const formed = entropyOfFormation(identity("H2S(g)"), digits("205.81"), perMolecule);
    expect(formed.outcome === "made" && formed.value).toBeCloseTo(205.81 - 130.68 - 32.054, 9);
  });

  it("is not made without an element's entropy, and names it", () => {
    expect(entropyOfFormation(identity("NiO(cr)"), digits("38"), elementEntropy)).toEqual({
      outcome: "notMade",
      missing: ["Ni(cr)"],
      sentence: "S° of Ni(cr) is not in the table.",
    });
    expect(entropyOfFormation(identity("NiBr2(cr)"), digits("38"), elementEntropy)).toMatchObject({
      sentence: "S° of Ni(cr), Br2(l) are not in the table.",
    });
  });

  it("needs hydrogen for an ion that holds none", () => {
    const withoutHydrogen = (element: string) => (element === "H" ? undefined : elementEntropy(element));
    expect(entropyOfFormation(identity("Na+(aq)"), digits("58.45"), withoutHydrogen)).toMatchObject({
      missing: ["H2(g)"],
    });
  });

  it("is not made for ions outside water", () => {
    expect(entropyOfFormation(identity("Na+(g)"), digits("148"), elementEntropy)).toMatchObject({
      outcome: "notMade",
      sentence: expect.stringContaining("convention"),
    });
  });
});

describe("the tolerance of a closure", () => {
  it("counts half a unit of every printed place, doubled", () => {
    // d = 0.0005 + 0.0005 + 0.29815 (0.005 + 2 × 0.00025 + 1 × 0.00025) kJ/mol
    expect(gibbsClosure(water()).parts?.rounding).toBeCloseTo(0.001 + 0.29815 * 0.00575, 12);
  });

  it("allows for the uncertainty of the elements and for intermediate rounding", () => {
    const { parts, tolerance } = gibbsClosure(water());
    expect(parts?.elements).toBeCloseTo(0.29815 * (2 * 0.0015 + 0.0025), 12);
    expect(parts?.allowance).toBeCloseTo(0.05 * Math.sqrt(4), 12);
    expect(tolerance).toBeCloseTo(2 * 0.002714 + 0.1 + 0.00164, 4);
  });

  it("leaves the elements out when the sheet brings its own", () => {
    expect(gibbsClosure(water({ elementEntropy: fromSheet })).parts?.elements).toBe(0);
  });

  it("takes the half unit in the source's own unit", () => {
    const enthalpy = value("-285.830", { given: { text: "-68.315", unit: "kcal/mol" } });
    const gain =
      (gibbsClosure(water({ enthalpy })).parts?.rounding ?? 0) - (gibbsClosure(water()).parts?.rounding ?? 0);
    expect(gain).toBeCloseTo(0.0005 * 4.184 - 0.0005, 12);
  });

  it("reads the source's digits however they were written", () => {
    const inJoules = value("-285.830", { given: { text: "−285 830", unit: "J/mol" } });
    expect(gibbsClosure(water({ enthalpy: inJoules })).parts?.rounding).toBeCloseTo(0.001 + 0.29815 * 0.00575, 12);
    const withComma = value("-285.830", { given: { text: "-285,830", unit: "kJ/mol" } });
    expect(gibbsClosure(water({ enthalpy: withComma })).parts?.rounding).toBeCloseTo(0.001 + 0.29815 * 0.00575, 12);
  });

  it("gives a zero by convention no half unit", () => {
    const zero = { enthalpy: value("0"), entropy: value("205.152"), gibbs: value("0") };
    const { parts, verdict } = gibbsClosure({ ...water(zero), identity: identity("O2(g)") });
    expect(parts?.rounding).toBeCloseTo(0.29815 * (0.0005 + 2 * 0.00025), 12);
    expect(verdict).toBe("closes");
  });

  it("lets values of different sources differ within twice their combined uncertainty", () => {
    const enthalpy = value("-285.830", { sourceId: "other", uncertainty: expanded("2.0") });
    const { parts, tolerance } = gibbsClosure(water({ enthalpy }));
    expect(parts?.combinedUncertainty).toBeGreaterThan(1);
    expect(tolerance).toBeCloseTo(2 * (parts?.combinedUncertainty ?? 0), 12);
    expect(gibbsClosure(water({ enthalpy: { ...enthalpy, sourceId: "sheet" } })).parts?.combinedUncertainty).toBeNull();
  });

  it("squares the hydrogen of an ion once, as ν − z", () => {
    const ammonium: ClosureInput = {
      identity: identity("NH4+(aq)"),
      enthalpy: value("-132.51", { sourceId: "other" }),
      entropy: value("113.4"),
      gibbs: value("-79.31"),
      elementEntropy,
    };
    expect(gibbsClosure(ammonium).parts?.combinedUncertainty).toBeCloseTo(0.29815 * Math.hypot(0.001, 3 * 0.00075), 12);
  });
});

describe("the verdict of a closure", () => {
  const verdictAt = (shift: number, more: Partial<ClosureInput> = {}) => {
    const gibbs = value((-237.129 + shift).toFixed(3));
    return gibbsClosure(water({ gibbs, ...more })).verdict;
  };

  it("closes for the NBS values of water", () => {
    const { residual, sentence } = gibbsClosure(water());
    expect(residual).toBeCloseTo(-237.129 - (-285.83 - 0.29815 * (69.91 - 233.256)), 9);
    expect(sentence).toMatch(/^ΔfG° of H2O\(l\), −237\.129 kJ\/mol, follows from its ΔfH° and S°/);
  });

  it("asks to look beyond the tolerance, and blocks beyond 3 kJ/mol when five tolerances are less", () => {
    expect([0.09, 0.12, 2.9, 3.1, -2.9, -3.1].map((shift) => verdictAt(shift))).toEqual([
      "closes",
      "look",
      "look",
      "block",
      "look",
      "block",
    ]);
  });

  it("blocks beyond five tolerances when those are more", () => {
    const entropy = value("70"); // half a unit is 0.5 J/(mol K): d = 0.15, t = 0.4
    const coarse = (shift: number) =>
      gibbsClosure(water({ entropy, gibbs: value((-237 + shift).toFixed(0)), enthalpy: value("-286") }));
    const { tolerance = null, blockAbove = null } = coarse(0);
    expect(blockAbove).toBeCloseTo(5 * (tolerance ?? 0), 12);
    expect(blockAbove).toBeGreaterThan(3);
    expect([coarse(0), coarse(8), coarse(20)].map(({ verdict }) => verdict)).toEqual(["closes", "look", "block"]);
  });

  it("is a look where the source itself relaxed the constraint", () => {
    expect(verdictAt(30, { constraintRelaxed: true })).toBe("look");
    expect(gibbsClosure(water({ gibbs: value("-200.000"), constraintRelaxed: true })).sentence).toContain(
      "The source says that it relaxed this constraint.",
    );
  });

  it("closes at the tolerance itself", () => {
    const tolerance = gibbsClosure(water()).tolerance ?? 0;
    const residual = gibbsClosure(water()).residual ?? 0;
    expect(Math.abs(residual)).toBeLessThan(tolerance);
    // One whole place beyond it does not.
    expect(verdictAt(Math.ceil((tolerance - residual) * 1000 + 1) / 1000)).toBe("look");
  });

  it.each([
    ["sign of ΔfH° lost", { enthalpy: value("285.830") }],
    ["S° of the gas for the liquid", { entropy: value("188.835") }],
    ["joules filed as kilojoules", { gibbs: value("-237129") }],
    ["the 1 atm chart of another phase", { gibbs: value("-228.572") }],
  ])("blocks: %s", (_, slip) => {
    expect(gibbsClosure(water(slip)).verdict).toBe("block");
  });

  it("is never passed when it cannot be made", () => {
    const closure = gibbsClosure({ ...water(), identity: identity("NiO(cr)") });
    expect(closure).toMatchObject({ verdict: "notMade", residual: null, tolerance: null, missing: ["Ni(cr)"] });
    expect(closureArithmetic(closure)).toEqual(["S° of Ni(cr) is not in the table."]);
  });

  it("sees an ion whose H+ convention was left out: 19.48 kJ/mol a charge", () => {
    const withoutConvention = gibbsClosure({
      identity: identity("Na+(aq)"),
      enthalpy: value("-240.34"),
      entropy: value("58.45"),
      gibbs: value((-240.34 - 0.29815 * (58.45 - 51.3)).toFixed(2)),
      elementEntropy,
    });
    expect(withoutConvention.residual).toBeCloseTo(19.48, 1);
    expect(withoutConvention.verdict).toBe("block");
  });
});

describe("the printed arithmetic", () => {
  it("of a molecule", () => {
    expect(closureArithmetic(gibbsClosure(water()))).toEqual([
      "ΔfS° = 69.91 − (2 H × 65.340 + 1 O × 102.576) = −163.35 J/(mol K)",
      "ΔfH° − T ΔfS° = −285.830 − 298.15 × (−0.16335) = −237.128 kJ/mol",
      "r = −237.129 − (−237.128) = 0.00 kJ/mol",
      "t = 2d + c + e = 2 × 0.0027 + 0.1000 + 0.0016 = 0.107 kJ/mol (one source)",
      "closes up to 0.11, blocks above 3.00 kJ/mol",
    ]);
  });

  it("of an anion: z is negative", () => {
    const chloride = gibbsClosure({
      identity: identity("Cl-(aq)"),
      enthalpy: value("-167.080"),
      entropy: value("56.60"),
      gibbs: value("-131.22"),
      elementEntropy,
    });
    expect(closureArithmetic(chloride)[0]).toBe(
      "ΔfS° = 56.60 − (1 Cl × 111.5405) + (−1/2) × 130.680 (H2) = −120.28 J/(mol K)",
    );
  });

  it("of an ion, with the H+ convention, from two sources", () => {
    const sodium = gibbsClosure({
      identity: identity("Na+(aq)"),
      enthalpy: value("-240.34", { sourceId: "codata", uncertainty: expanded("0.06") }),
      entropy: value("58.45", { sourceId: "codata", uncertainty: expanded("0.15") }),
      gibbs: value("-261.905"),
      elementEntropy,
    });
    expect(closureArithmetic(sodium).slice(0, 4)).toEqual([
      "ΔfS° = 58.45 − (1 Na × 51.30) + 1/2 × 130.680 (H2) = 72.49 J/(mol K)",
      "ΔfH° − T ΔfS° = −240.34 − 298.15 × 0.07249 = −261.953 kJ/mol",
      "r = −261.905 − (−261.953) = +0.05 kJ/mol",
      expect.stringMatching(/^t = the larger of 2d \+ c \+ e = .* and 2u = 2 × .* \(different sources\)$/),
    ]);
  });
});

describe("a derived ΔfG°", () => {
  it("carries the uncertainty of ΔfH°, S° and the elements", () => {
    const derived = derivedGibbsEnergy(
      identity("H2O(l)"),
      { digits: digits("-285.830"), uncertainty: expanded("0.040") },
      { digits: digits("69.95"), uncertainty: expanded("0.03") },
      elementEntropy,
    );
    expect(derived.outcome === "made" && derived.value).toBeCloseTo(-237.14, 2);
    // Published with the same rows as −237.140 ± 0.041 (OECD/NEA auxiliary data, from memory): U = 2u.
    expect(derived.outcome === "made" && 2 * (derived.standardUncertainty ?? 0)).toBeCloseTo(0.041, 3);
  });

  it("has none where one is missing", () => {
    const derived = derivedGibbsEnergy(
      identity("H2O(l)"),
      { digits: digits("-285.830"), uncertainty: null },
      { digits: digits("69.95"), uncertainty: expanded("0.03") },
      elementEntropy,
    );
    expect(derived).toMatchObject({ outcome: "made", standardUncertainty: null });
  });

  it("closes exactly when it is put beside its own inputs", () => {
    const inputs = water();
    const derived = derivedGibbsEnergy(inputs.identity, inputs.enthalpy, inputs.entropy, elementEntropy);
    if (derived.outcome === "notMade") throw new Error(derived.sentence);
    const gibbs = value(derived.value.toFixed(3));
    expect(Math.abs(gibbsClosure(water({ gibbs })).residual ?? 1)).toBeLessThan(0.001);
    expect(toNumber(multiply(gibbs.digits, "1"))).toBeCloseTo(derived.value, 3);
  });
});
