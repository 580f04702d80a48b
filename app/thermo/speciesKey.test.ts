import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { PHASES } from "./phase.ts";
import { formatKey, isSameSpecies, isSolute, readKey, type SpeciesIdentity } from "./speciesKey.ts";

function readAs(text: string): SpeciesIdentity {
  const reading = readKey(text);
  if (reading.outcome !== "read") throw new Error(`${text}: ${reading.sentence}`);
  return reading.value;
}

describe("keys", () => {
  it.each([
    ["H2O(l)", "H2O(l)", "as printed"],
    ["H2O (l)", "H2O(l)", "a space before the phase"],
    ["H2O(liq)", "H2O(l)", "a longer word for the phase"],
    ["H2O[g]", "H2O(g)", "square brackets"],
    ["H2O, l", "H2O(l)", "behind a comma"],
    ["H2O gas", "H2O(g)", "behind a space"],
    ["H₂O(l)", "H2O(l)", "lowered characters"],
    ["C(cr,graphite)", "C(cr,graphite)", "a form"],
    ["C(c, Graphite)", "C(cr,graphite)", "its variants"],
    ["SiO2(cr,alpha quartz)", "SiO2(cr,alpha-quartz)", "no space in a key"],
    ["Mn(cr,α)", "Mn(cr,alpha)", "no Greek letter in a key"],
    ["C2H6O(g,dimethyl ether)", "C2H6O(g,dimethyl-ether)", "an isomer"],
    ["C5H12(g,2,2-dimethylpropane)", "C5H12(g,2,2-dimethylpropane)", "a comma inside a name"],
    ["Fe+3(aq)", "Fe+3(aq)", "an ion"],
    ["Fe3+(aq)", "Fe+3(aq)", "an ion with its number first"],
    ["SO4 2- (aq)", "SO4-2(aq)", "an ion with a space"],
    ["SO4(2-)(aq)", "SO4-2(aq)", "an ion with its charge in brackets"],
    ["SO<sub>4</sub><sup>2−</sup>(aq)", "SO4-2(aq)", "markup"],
    ["Na+(ao)", "Na+(aq)", "a handbook's code"],
    ["CuSO4.5H2O(cr)", "CuSO4·5H2O(cr)", "a hydrate"],
    ["CdSO4·8/3H2O(cr)", "CdSO4·8/3H2O(cr)", "thirds"],
    ["Mg(OH)2(cr)", "Mg(OH)2(cr)", "a bracket of its own"],
  ])("%s is %s: %s", (text, key) => {
    expect(formatKey(readAs(text))).toBe(key);
    expect(formatKey(readAs(key))).toBe(key);
  });

  it("asks when the formula has two readings, whatever the phase", () => {
    const reading = readKey("Hg2+(aq)");
    expect(reading.outcome === "ambiguous" && reading.candidates.map(formatKey)).toEqual(["Hg+2(aq)", "Hg2+1(aq)"]);
  });

  it.each([
    ["", "No species"],
    ["H2O", "names no phase"],
    ["SO4(2-)", "names no phase"],
    ["Mg(OH)2", "names no phase"],
    ["H2O(x)", "is not a phase"],
    ["Water(l)", "cannot be read as a formula"],
    ["NaCl(ai)", "sum of ions"],
    ["HCl(aq,100 H2O)", "finite concentration"],
  ])("refuses %j: %s", (text, sentence) => {
    expect(readKey(text)).toMatchObject({ outcome: "refused", sentence: expect.stringContaining(sentence) });
  });

  it("never throws, whatever is typed", () => {
    const typed = fc.string({ unit: fc.constantFrom(..."HOCFe()[],+-23 laqgcr·"), maxLength: 24 });
    fc.assert(fc.property(typed, (text) => ["read", "ambiguous", "refused"].includes(readKey(text).outcome)));
  });

  it("what is printed as a key reads back as itself", () => {
    const label = fc.constantFrom("", ",graphite", ",alpha", ",II", ",form-2", ",2,2-dimethylpropane");
    const formula = fc.constantFrom(
      "H2O",
      "C",
      "SO4-2",
      "Fe+3",
      "Hg2+2",
      "O2-1",
      "CdSO4·8/3H2O",
      "Fe0.947O",
      "K23/10Al",
      "D2O",
    );
    fc.assert(
      fc.property(formula, fc.constantFrom(...PHASES), label, (printed, phase, form) => {
        const key = `${printed}(${phase}${form})`;
        expect(formatKey(readAs(key))).toBe(key);
      }),
    );
  });

  it("carries what was taken for granted", () => {
    expect(readKey("Fe3+(aq)")).toMatchObject({ notes: [expect.stringContaining("+3")] });
    expect(readKey("C(cr2)")).toMatchObject({ notes: [expect.stringContaining("crystal form 2")] });
  });
});

describe("one species or two", () => {
  it.each([
    ["NaCl(cr)", "ClNa(cr)", true, "the order of the elements is the source's"],
    ["C2H5OH(l)", "C2H6O(l)", true, "so is the grouping"],
    ["CaSO4·1/2H2O(cr)", "CaSO4·0.5H2O(cr)", true, "counts are exact"],
    ["H2O(l)", "H2O(g)", false, "the phase differs"],
    ["Fe+2(aq)", "Fe+3(aq)", false, "the charge differs"],
    ["C(cr,graphite)", "C(cr,diamond)", false, "the form differs"],
    ["C2H6O(g)", "C2H6O(g,dimethyl-ether)", false, "an isomer with a label is not the one without"],
    ["H2O(l)", "D2O(l)", false, "deuterium is not hydrogen"],
  ])("%s and %s: %s, %s", (a, b, same) => {
    expect(isSameSpecies(readAs(a), readAs(b))).toBe(same);
  });

  it("knows a solute", () => {
    expect([isSolute(readAs("Na+(aq)")), isSolute(readAs("NaCl(cr)"))]).toEqual([true, false]);
  });
});
