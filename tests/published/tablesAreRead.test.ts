import { describe, expect, it } from "vitest";
import { readFormula } from "#app/thermo/formula.ts";
import { formatKey, readKey } from "#app/thermo/speciesKey.ts";
import { codata, nbs, nbsHeatCapacities } from "./publishedTables.ts";

describe.each([
  ["CODATA Key Values (Hemisphere, 1989)", codata, 151],
  ["excerpt of the NBS tables (J. Phys. Chem. Ref. Data 11, Suppl. 2, 1982)", nbs, 83],
  ["heat capacities of the NBS tables for the CODATA species", nbsHeatCapacities, 129],
] as const)("%s", (_, table, count) => {
  it("is read whole, each formula and phase in one way", () => {
    expect(table).toHaveLength(count);
  });

  it("gives every row a key of its own", () => {
    expect(new Set(table.map((row) => row.key)).size).toBe(table.length);
  });

  it("has keys that read back as themselves", () => {
    for (const { key, identity } of table) {
      expect(readKey(key)).toEqual({ outcome: "read", value: identity, notes: [] });
      expect(formatKey(identity)).toBe(key);
      expect(key).not.toMatch(/\s/);
    }
  });

  it("has formulas that read back as themselves", () => {
    for (const { identity } of table) {
      expect(readFormula(identity.formula.printed)).toEqual({ outcome: "read", value: identity.formula, notes: [] });
    }
  });
});

describe("the two tables together", () => {
  it("call every species they share by one key", () => {
    const known = new Set(codata.map((row) => row.key));
    expect(nbsHeatCapacities.filter((row) => !known.has(row.key)).map((row) => row.key)).toEqual([]);
  });
});
