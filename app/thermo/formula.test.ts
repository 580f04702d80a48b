import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { elementSymbols } from "./elements.ts";
import { atomCount, type Formula, readFormula, soleElement } from "./formula.ts";

function readAs(text: string): Formula {
  const reading = readFormula(text);
  if (reading.outcome !== "read") throw new Error(`${text}: ${reading.sentence}`);
  return reading.value;
}

describe("spellings with one reading", () => {
  it.each<[text: string, printed: string, charge: number, hill: string, reason: string]>([
    // Plain formulas
    ["H2O", "H2O", 0, "H2O", "the plain case"],
    ["  H2O ", "H2O", 0, "H2O", "spaces around it"],
    ["H₂O", "H2O", 0, "H2O", "lowered characters"],
    ["H<sub>2</sub>O", "H2O", 0, "H2O", "markup"],
    ["H_2O", "H2O", 0, "H2O", "a lowered mark"],
    ["H_{2}O", "H2O", 0, "H2O", "a lowered mark with braces"],
    ["Ｈ２Ｏ", "H2O", 0, "H2O", "full-width letters"],
    ["Na1Cl1", "NaCl", 0, "ClNa", "a subscript 1 says nothing"],
    ["NaCl", "NaCl", 0, "ClNa", "the source's order is printed, Hill's compared"],
    ["ClNa", "ClNa", 0, "ClNa", "the other order is the same composition"],
    ["CO", "CO", 0, "CO", "carbon and oxygen"],
    ["Co", "Co", 0, "Co", "cobalt"],
    ["CH3COOH", "CH3COOH", 0, "C2H4O2", "elements may come more than once"],
    ["C2H5OH", "C2H5OH", 0, "C2H6O", "with carbon: C, H, then the alphabet"],
    ["C60", "C60", 0, "C60", "two digits"],
    ["CCl4", "CCl4", 0, "CCl4", "no hydrogen"],
    ["HCl", "HCl", 0, "ClH", "without carbon the alphabet alone"],
    ["Th", "Th", 0, "Th", "thorium, not tritium and h"],
    // Brackets
    ["Mg(OH)2", "Mg(OH)2", 0, "H2MgO2", "a bracket with a count"],
    ["(NH4)2SO4", "(NH4)2SO4", 0, "H8N2O4S", "a bracket in front"],
    ["K4[Fe(CN)6]", "K4[Fe(CN)6]", 0, "C6FeK4N6", "nested brackets"],
    [
      "Ca<sub>10</sub>(PO<sub>4</sub>)<sub>6</sub>(OH)<sub>2</sub>",
      "Ca10(PO4)6(OH)2",
      0,
      "Ca10H2O26P6",
      "markup behind brackets",
    ],
    // Hydrates
    ["C59H118O", "C59H118O", 0, "C59H118O", "a long chain, and no mass number"],
    ["CuSO4·5H2O", "CuSO4·5H2O", 0, "CuH10O9S", "the hydrate's dot"],
    ["CuSO4.5H2O", "CuSO4·5H2O", 0, "CuH10O9S", "a full stop for the dot"],
    ["CuSO4*5H2O", "CuSO4·5H2O", 0, "CuH10O9S", "an asterisk for the dot"],
    ["CuSO4•5H2O", "CuSO4·5H2O", 0, "CuH10O9S", "a bullet for the dot"],
    ["CuSO4 · 5 H2O", "CuSO4·5H2O", 0, "CuH10O9S", "spaces around the dot"],
    ["CuSO4&middot;5H2O", "CuSO4·5H2O", 0, "CuH10O9S", "the dot as a named character"],
    ["CuSO₄·5H₂O", "CuSO4·5H2O", 0, "CuH10O9S", "lowered characters"],
    ["Na2CO3.10H2O", "Na2CO3·10H2O", 0, "CH20Na2O13", "ten waters"],
    ["MgCl2.H2O", "MgCl2·H2O", 0, "Cl2H2MgO", "one water needs no number"],
    ["CdSO4·8/3H2O", "CdSO4·8/3H2O", 0, "CdH16/3O20/3S", "thirds of a water"],
    ["CdSO4.8/3H2O", "CdSO4·8/3H2O", 0, "CdH16/3O20/3S", "thirds behind a full stop"],
    ["3CdSO4·8H2O", "3CdSO4·8H2O", 0, "Cd3H16O20S3", "a count in front of the first part"],
    ["CaSO4·0.5H2O", "CaSO4·0.5H2O", 0, "CaHO4.5S", "half a water"],
    ["CaSO4·1/2H2O", "CaSO4·0.5H2O", 0, "CaHO4.5S", "the same as a ratio"],
    ["CaSO4·½H2O", "CaSO4·0.5H2O", 0, "CaHO4.5S", "the same as one character"],
    ["CaSO4.0.5H2O", "CaSO4·0.5H2O", 0, "CaHO4.5S", "a full stop for the dot and one in the number"],
    ["Na2SO4·10D2O", "Na2SO4·10D2O", 0, "D20Na2O14S", "heavy water"],
    ["2CaO·SiO2", "2CaO·SiO2", 0, "Ca2O4Si", "oxides side by side"],
    // Compounds that are not stoichiometric
    ["Fe0.947O", "Fe0.947O", 0, "Fe0.947O", "wüstite"],
    ["UO2.25", "UO2.25", 0, "O2.25U", "a decimal at the end"],
    ["Cu1.8S", "Cu1.8S", 0, "Cu1.8S", "nobody prints a subscript 1, so the point is decimal"],
    ["UO<sub>2.667</sub>", "UO2.667", 0, "O2.667U", "a lowered decimal"],
    // Isotopes
    ["D2O", "D2O", 0, "D2O", "deuterium is an element of its own"],
    ["T2", "T2", 0, "T2", "tritium too"],
    ["HDO", "HDO", 0, "DHO", "beside light hydrogen"],
    ["²H₂O", "D2O", 0, "D2O", "deuterium by its mass number"],
    ["[2H]2O", "D2O", 0, "D2O", "in square brackets"],
    // One charge, many spellings
    ["SO4-2", "SO4-2", -2, "O4S", "sign, then number"],
    ["SO4^2-", "SO4-2", -2, "O4S", "raised with a mark"],
    ["SO4^{2-}", "SO4-2", -2, "O4S", "raised in braces"],
    ["SO4^-2", "SO4-2", -2, "O4S", "raised, sign first"],
    ["SO4 2-", "SO4-2", -2, "O4S", "a space sets the charge apart"],
    ["SO4 -2", "SO4-2", -2, "O4S", "so it does here"],
    ["SO4=", "SO4-2", -2, "O4S", "an old sign for two charges"],
    ["SO4--", "SO4-2", -2, "O4S", "two signs"],
    ["SO4(2-)", "SO4-2", -2, "O4S", "in brackets"],
    ["SO4(-2)", "SO4-2", -2, "O4S", "in brackets, sign first"],
    ["SO4{2-}", "SO4-2", -2, "O4S", "in braces"],
    ["[SO4]2-", "SO4-2", -2, "O4S", "square brackets around the ion"],
    ["SO₄²⁻", "SO4-2", -2, "O4S", "raised and lowered characters"],
    ["SO<sub>4</sub><sup>2-</sup>", "SO4-2", -2, "O4S", "markup"],
    ["SO<sub>4</sub><sup>2&minus;</sup>", "SO4-2", -2, "O4S", "markup with a named minus"],
    ["SO_4^{2−}", "SO4-2", -2, "O4S", "a typographic minus"],
    ["SO<sub>4</sub>2-", "SO4-2", -2, "O4S", "the 4 is lowered, so the 2 is the charge"],
    ["Fe+3", "Fe+3", 3, "Fe", "sign, then number"],
    ["Fe3+", "Fe+3", 3, "Fe", "three iron atoms with one charge are no ion"],
    ["Fe^{3+}", "Fe+3", 3, "Fe", "raised"],
    ["Fe(3+)", "Fe+3", 3, "Fe", "in brackets"],
    ["Fe+++", "Fe+3", 3, "Fe", "three signs"],
    ["Fe 3+", "Fe+3", 3, "Fe", "a space"],
    ["Ca2+", "Ca+2", 2, "Ca", "an everyday ion"],
    ["Na+", "Na+", 1, "Na", "one charge"],
    ["Na+1", "Na+", 1, "Na", "its number says nothing"],
    ["Na1+", "Na+", 1, "Na", "in either place"],
    ["Na⁺", "Na+", 1, "Na", "raised"],
    ["Cl−", "Cl-", -1, "Cl", "a typographic minus"],
    ["Cl–", "Cl-", -1, "Cl", "an en dash"],
    ["NO3-", "NO3-", -1, "NO3", "NO with three charges is no ion"],
    ["NH4+", "NH4+", 1, "H4N", "NH with four charges is no ion"],
    ["HCO3⁻", "HCO3-", -1, "CHO3", "raised"],
    ["Al(OH)4-", "Al(OH)4-", -1, "AlH4O4", "no anion ends in one group with four charges"],
    ["H2+", "H2+", 1, "H2", "hydrogen has no second electron to lose"],
    ["C6H12+", "C6H12+", 1, "C6H12", "nobody prints a subscript 1"],
    ["Hg2+2", "Hg2+2", 2, "Hg2", "mercury(I)"],
    ["Hg2 2+", "Hg2+2", 2, "Hg2", "mercury(I) with a space"],
    ["Hg₂²⁺", "Hg2+2", 2, "Hg2", "mercury(I) raised and lowered"],
    ["Hg++", "Hg+2", 2, "Hg", "mercury(II)"],
    ["O₂-", "O2-1", -1, "O2", "the 2 is lowered, so it counts atoms; the key says so with its 1"],
    ["I3-1", "I3-1", -1, "I3", "triiodide, as the key prints it"],
    ["UO2+2", "UO2+2", 2, "O2U", "uranyl"],
    ["[Fe(CN)6]4-", "Fe(CN)6-4", -4, "C6FeN6", "square brackets around the ion"],
    ["[Fe(CN)6]-4", "Fe(CN)6-4", -4, "C6FeN6", "sign first"],
    ["[Co(NH3)6]+3", "Co(NH3)6+3", 3, "CoH18N6", "a complex cation"],
    ["Cr2O7^2-", "Cr2O7-2", -2, "Cr2O7", "dichromate"],
  ])("%s is %s, charge %i, %s: %s", (text, printed, charge, hill) => {
    expect(readAs(text)).toMatchObject({ printed, charge, hill });
  });

  it("notes a digit that was taken for the charge", () => {
    expect(readFormula("Fe3+")).toMatchObject({ notes: ["The 3 before the sign is read as the charge, +3."] });
    expect(readFormula("Fe+3")).toMatchObject({ notes: [] });
  });
});

describe("spellings with two readings", () => {
  it.each<[text: string, candidates: string[], reason: string]>([
    ["Hg2+", ["Hg+2", "Hg2+1"], "mercury(II), or two mercury atoms"],
    ["O2-", ["O-2", "O2-1"], "oxide or superoxide"],
    ["S2-", ["S-2", "S2-1"], "sulfide or disulfide"],
    ["N3-", ["N-3", "N3-1"], "nitride or azide"],
    ["I3-", ["I-3", "I3-1"], "triiodide is meant, but not by its spelling"],
    ["SO42-", ["SO4-2", "SO42-1"], "sulfate is meant, but not by its spelling"],
    ["SO42−", ["SO4-2", "SO42-1"], "with a typographic minus too"],
    ["CO32-", ["CO3-2", "CO32-1"], "carbonate"],
    ["PO43-", ["PO4-3", "PO43-1"], "phosphate"],
    ["Cr2O72-", ["Cr2O7-2", "Cr2O72-1"], "dichromate"],
    ["Hg22+", ["Hg2+2", "Hg22+1"], "mercury(I)"],
    ["VO2+", ["VO+2", "VO2+1"], "both are ions of vanadium"],
    ["UO2+", ["UO+2", "UO2+1"], "the pentavalent uranyl is an ion"],
    ["AlF2+", ["AlF+2", "AlF2+1"], "both are complexes"],
    ["Fe(OH)2+", ["Fe(OH)+2", "Fe(OH)2+1"], "both are hydrolysis products"],
    ["(SO4)2-", ["SO4-2", "(SO4)2-1"], "round brackets count as well as enclose"],
    ["Ag2+", ["Ag+2", "Ag2+1"], "silver has both"],
    ["K2.3Al", ["K23/10Al", "K2·3Al"], "a decimal or a dot"],
  ])("%s: %j (%s)", (text, candidates) => {
    const reading = readFormula(text);
    expect(reading.outcome === "ambiguous" && reading.candidates.map(({ printed }) => printed)).toEqual(candidates);
    for (const spelling of candidates) expect(readFormula(spelling)).toMatchObject({ outcome: "read" });
  });

  it("says how to write either", () => {
    expect(readFormula("Hg2+")).toMatchObject({
      sentence: "“Hg2+” has two readings: Hg with charge +2, or Hg2 with charge +1. Write Hg+2 or Hg2+1.",
    });
  });
});

describe("texts that are refused", () => {
  it.each<[text: string, sentence: string, reason: string]>([
    ["", "No formula", "nothing there"],
    ["   ", "No formula", "only spaces"],
    ["h2o", "Was H meant?", "small letters"],
    ["NACL", "“A” is not the symbol of an element. Was Na meant?", "capitals"],
    ["FE2O3", "Was Fe meant?", "capitals"],
    ["Xx2O", "“Xx” is not the symbol of an element", "no such element"],
    ["EtOH", "is not the symbol of an element", "a group's abbreviation"],
    ["C02", "Was the letter O meant?", "a zero for the letter O"],
    ["NaC1", "Was the letter l meant, as in NaCl?", "a one for the letter l"],
    ["MgC12", "as in MgCl2?", "a one for the letter l"],
    ["C1-", "as in Cl-?", "a one for the letter l"],
    ["KC1O3", "as in KClO3?", "a one for the letter l"],
    ["C1O4-", "as in ClO4-?", "a one for the letter l"],
    ["CuC12·2H2O", "as in CuCl2·2H2O?", "a one for the letter l"],
    ["H2O(l)", "Give the phase apart", "a key, not a formula"],
    ["Fe(III)", "oxidation state", "Roman numerals are no charge"],
    ["e-", "electron", "not a species"],
    ["2H2O", "coefficient", "belongs to an equation"],
    ["½O2", "coefficient", "belongs to an equation"],
    ["CuSO4-5H2O", "hyphen", "a hyphen is no dot"],
    ["CuSO4 5H2O", "space", "a space is no dot"],
    ["CuSO4·2½H2O", "space", "two and a half, never 21/2"],
    ["CuSO4·xH2O", "amount of water open", "how much water?"],
    ["CuSO4·nH2O", "amount of water open", "how much water?"],
    ["Mg(OH2", "not closed", "a bracket is missing"],
    ["MgOH)2", "closes nothing", "a bracket too many"],
    ["Mg()2", "bracket is empty", "nothing in it"],
    ["CuSO4·", "a part of it is empty", "nothing behind the dot"],
    ["H0", "begins with a zero", "no atoms"],
    ["H2O0.0", "no count of atoms", "no atoms"],
    ["¹³CO2", "no isotope but D and T", "carbon-13"],
    ["Fe+0", "charge of zero", "neutral needs no charge"],
    ["Fe+22", "more than any ion carries", "a slip"],
    ["SO4+-", "cannot be read", "both signs"],
    ["SO4^2", "cannot be read", "a raised number without a sign"],
    ["H2O?", "has no place in a formula", "a doubt"],
    ["H2O,l", "has no place in a formula", "a phase"],
    ["water", "Was W meant?", "a name"],
    ["H999999999", "more than", "a slip"],
    ["(".repeat(20) + "H" + ")".repeat(20), "nested too deeply", "an attack"],
    ["H".repeat(300), "too long", "a paste accident"],
  ])("%j: %s (%s)", (text, sentence) => {
    expect(readFormula(text)).toMatchObject({ outcome: "refused", sentence: expect.stringContaining(sentence) });
  });

  it("never throws, whatever is typed", () => {
    const typed = fc.oneof(
      fc.string({ unit: "binary", maxLength: 40 }),
      fc.string({ unit: fc.constantFrom(..."HOCuSFe()[]{}0123456789.·*/^_+-<sub> ²₂⁻"), maxLength: 30 }),
    );
    fc.assert(fc.property(typed, (text) => ["read", "ambiguous", "refused"].includes(readFormula(text).outcome)));
  });
});

describe("what holds for every formula", () => {
  const symbols = elementSymbols();
  const count = fc.oneof(
    fc.constant(""),
    fc.integer({ min: 2, max: 40 }).map(String),
    fc.constantFrom("0.947", "2.25", "8/3", "0.5", "1.8"),
  );
  const atom = fc.tuple(fc.constantFrom(...symbols), count).map(([symbol, number]) => symbol + number);
  const group = fc.array(atom, { minLength: 1, maxLength: 4 }).map((atoms) => atoms.join(""));
  const body = fc.oneof(
    group,
    fc.tuple(group, group, count).map(([first, inner, number]) => `${first}(${inner})${number}`),
    fc.tuple(group, fc.constantFrom("", "2", "0.5", "8/3")).map(([first, number]) => `${first}·${number}H2O`),
  );
  const charge = fc.constantFrom("", "+", "-", "+1", "-1", "+2", "-2", "+3", "-4");
  const text = fc.tuple(body, charge).map(([start, end]) => start + end);

  it("what is printed reads back as itself", () => {
    fc.assert(
      fc.property(text, (spelling) => {
        const first = readFormula(spelling);
        const formulas =
          first.outcome === "read" ? [first.value] : first.outcome === "ambiguous" ? first.candidates : [];
        for (const formula of formulas)
          expect(readFormula(formula.printed)).toMatchObject({ outcome: "read", value: formula });
      }),
      { numRuns: 1000 },
    );
  });

  it("two readings differ in what they say", () => {
    fc.assert(
      fc.property(text, (spelling) => {
        const reading = readFormula(spelling);
        if (reading.outcome !== "ambiguous") return true;
        return (
          new Set(reading.candidates.map(({ hill, charge: z }) => `${hill} ${z}`)).size === reading.candidates.length
        );
      }),
    );
  });

  it("the order of the parts does not change the Hill formula", () => {
    const pieces = fc.array(fc.constantFrom("H2", "O", "C3", "Na", "Fe0.947", "S8/3"), { minLength: 2, maxLength: 6 });
    fc.assert(
      fc.property(pieces, (atoms) => readAs(atoms.join("")).hill === readAs([...atoms].reverse().join("")).hill),
    );
  });
});

describe("counting atoms", () => {
  it("counts fractions too", () => {
    expect(atomCount(readAs("CuSO4·5H2O"))).toBe(21);
    expect(atomCount(readAs("Fe0.947O"))).toBeCloseTo(1.947, 12);
    expect(readAs("CdSO4·8/3H2O").composition).toEqual({ Cd: 1, S: 1, O: 20 / 3, H: 16 / 3 });
  });

  it("finds the one element of an element", () => {
    expect([soleElement(readAs("P4")), soleElement(readAs("H2O"))]).toEqual(["P", undefined]);
  });
});
