import { describe, expect, test } from "vitest";
import { propertyOf, readHead } from "./head.ts";

describe("heads of values, in the spellings sheets use", () => {
  test.each([
    ["enthalpyOfFormation_kJ_mol", "enthalpyOfFormation", "kJ/mol"],
    ["gibbsEnergyOfFormation_kJ_mol", "gibbsEnergyOfFormation", "kJ/mol"],
    ["entropy_J_molK", "entropy", "J/(mol K)"],
    ["heatCapacity_J_molK", "heatCapacity", "J/(mol K)"],
    ["enthalpyIncrement_kJ_mol", "enthalpyIncrement", "kJ/mol"],
    ["dHf (kcal)", "enthalpyOfFormation", "kcal/mol"],
    ["ΔfH° / kJ mol⁻¹", "enthalpyOfFormation", "kJ/mol"],
    ["∆fH⦵ (kJ·mol−1)", "enthalpyOfFormation", "kJ/mol"],
    ["DfH", "enthalpyOfFormation", null],
    ["Hf", "enthalpyOfFormation", null],
    ["delta Hf, kcal/mol", "enthalpyOfFormation", "kcal/mol"],
    ["Standard enthalpy of formation [kJ/mol]", "enthalpyOfFormation", "kJ/mol"],
    ["heat of formation in kcal/mol", "enthalpyOfFormation", "kcal/mol"],
    ["ΔfG° (kJ/mol)", "gibbsEnergyOfFormation", "kJ/mol"],
    ["Gf", "gibbsEnergyOfFormation", null],
    ["Gibbs energy of formation", "gibbsEnergyOfFormation", null],
    ["S", "entropy", null],
    ["S°", "entropy", null],
    ["S° / (J K⁻¹ mol⁻¹)", "entropy", "J/(mol K)"],
    ["S° (J/(mol K))", "entropy", "J/(mol K)"],
    ["S298 (e.u.)", "entropy", "cal/(mol K)"],
    ["S (cal)", "entropy", "cal/(mol K)"],
    ["Cp", "heatCapacity", null],
    ["Cp° J/(mol K)", "heatCapacity", "J/(mol K)"],
    ["H°(298.15 K)−H°(0) / kJ mol-1", "enthalpyIncrement", "kJ/mol"],
    ["H298-H0 (kJ/mol)", "enthalpyIncrement", "kJ/mol"],
  ])("%s is %s in %s", (head, property, unit) => {
    expect(readHead(head)).toMatchObject({ means: "value", property, unit });
  });
});

describe("heads of uncertainties", () => {
  test.each([
    ["U", null, "expanded"],
    ["u", null, "standard"],
    ["±", null, null],
    ["uncertainty", null, null],
    ["u(ΔfH°)", "enthalpyOfFormation", "standard"],
    ["U(S°) / J/(mol K)", "entropy", "expanded"],
    ["dHf unc", "enthalpyOfFormation", null],
    ["ΔfG° ±", "gibbsEnergyOfFormation", null],
    ["u_S", "entropy", "standard"],
  ])("%s belongs to %s, kind %s", (head, property, uncertaintyKind) => {
    expect(readHead(head)).toMatchObject({ means: "uncertainty", property, uncertaintyKind });
  });
});

describe("temperature and pressure in a head", () => {
  test.each([
    ["ΔfH°(0 K) kJ/mol", "0"],
    ["ΔHf°0 (kcal/mol)", "0"],
    ["ΔfH°₀ / kJ mol-1", "0"],
    ["ΔfH⁰ kJ/mol", null],
    ["ΔfH°(0)", "0"],
    ["dHf_0K", "0"],
    ["ΔfH°(298.15 K)", "298.15"],
    ["S° at 25 °C", "298.15"],
    ["Cp (500 K)", "500"],
    ["ΔfH°", null],
  ])("%s: %s", (head, temperature) => {
    expect(readHead(head)).toMatchObject({ means: "value", temperature });
  });

  test("1 atm and 1 bar are told apart", () => {
    expect(readHead("S (1 atm) cal/(mol K)")).toMatchObject({ property: "entropy", pressure: "101325" });
    expect(readHead("S° (100 kPa)")).toMatchObject({ property: "entropy", pressure: "100000" });
  });
});

test.each([
  ["formula", "formula"],
  ["Compound", "formula"],
  ["State", "phase"],
  ["form", "label"],
  ["description", "description"],
  ["CAS No.", "cas"],
  ["M (g/mol)", "molarMass"],
  ["Remarks", "remark"],
  ["property", "propertyName"],
  ["value", "anyValue"],
  ["unit", "unitName"],
  ["Stoff", null],
  ["", null],
  ["__proto__", null],
  ["constructor", null],
  ["toString", null],
])("the head %j means %s", (head, means) => {
  expect(readHead(head).means).toBe(means);
});

test.each([
  ["ΔfH°", "enthalpyOfFormation"],
  ["S°(298.15 K)", "entropy"],
  ["heat capacity", "heatCapacity"],
  ["H°(T)−H°(0)", "enthalpyIncrement"],
  ["density", null],
])("a long sheet's %j is %s", (text, property) => {
  expect(propertyOf(text)).toBe(property);
});

test("a text that is longer than any head names nothing, and takes no time to say so", () => {
  const begun = performance.now();
  for (const text of ["x".repeat(1_000_000), `dHf (kJ/mol)${" ".repeat(500_000)}`]) {
    expect(readHead(text)).toMatchObject({ means: null });
  }
  expect(performance.now() - begun).toBeLessThan(1000);
});
