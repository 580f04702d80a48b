import { describe, expect, it } from "vitest";
import { isProperty, PROPERTIES, propertyInfo } from "./property.ts";
import { readUnit } from "./unit.ts";

describe("properties of the table", () => {
  it("have an entry each, under their own code, in a unit that can be read", () => {
    expect([...PROPERTIES].sort()).toEqual(Object.keys(propertyInfo).sort());
    for (const property of PROPERTIES) {
      expect(propertyInfo[property].code).toBe(property);
      expect(readUnit(propertyInfo[property].unit)).toMatchObject({
        outcome: "read",
        value: propertyInfo[property].unit,
      });
    }
  });

  it("keep energies in kJ/mol and entropies in J/(mol K)", () => {
    expect(PROPERTIES.map((property) => propertyInfo[property].unit)).toEqual([
      "kJ/mol",
      "J/(mol K)",
      "kJ/mol",
      "J/(mol K)",
      "kJ/mol",
    ]);
  });

  it("are named by a code from outside only if they exist", () => {
    expect([isProperty("entropy"), isProperty("Entropy"), isProperty("toString")]).toEqual([true, false, false]);
  });
});
