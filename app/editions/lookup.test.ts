import { describe, expect, test } from "vitest";
import { readKey } from "#app/thermo/speciesKey.ts";
import type { Phase } from "#app/thermo/phase.ts";
import { type NamedSpecies, readAsked, settler } from "./lookup.ts";

function species(key: string, rest: Partial<NamedSpecies> = {}): NamedSpecies {
  const reading = readKey(key);
  if (reading.outcome !== "read") throw new Error(`${key} is no key`);
  const { formula, phase, label } = reading.value;
  const { printed, composition, charge, hill } = formula;
  const identity = { printed, composition, charge, hill, phase, label: label ?? null };
  return { speciesId: `sp_${key}`, key, name: "", cas: null, synonyms: [], ...identity, ...rest };
}

// CAS numbers of water, carbon, ethanol and dimethyl ether: common practice.
const table = [
  species("H2O(l)", { name: "water", cas: "7732-18-5", synonyms: ["Oxidane"] }),
  species("H2O(g)", { name: "water", cas: "7732-18-5" }),
  species("C(cr,graphite)", { name: "graphite", cas: "7782-42-5" }),
  species("C(cr,diamond)", { name: "diamond" }),
  species("CaCO3(cr,calcite)", { name: "calcium carbonate, calcite" }),
  species("SO4-2(aq)", { name: "sulfate ion" }),
  species("Hg2+2(aq)"),
  species("Hg+2(aq)"),
  species("C2H6O(l,ethanol)", { name: "ethanol", cas: "64-17-5" }),
  species("C2H6O(g,dimethyl-ether)", { name: "Dimethyl ether", cas: "115-10-6" }),
  species("NH3(g,ammonia)", { name: "ammonia" }),
  species("CdSO4·8/3H2O(cr)", { name: "cadmium sulfate hydrate" }),
  species("TiN(cr)", { name: "titanium nitride" }),
  species("Sn(cr,white)", { name: "tin" }),
];
const formerKeys = new Map([
  ["NH3(g)", ["sp_NH3(g,ammonia)"]],
  ["C2H6O(l)", ["sp_C2H6O(l,ethanol)", "sp_C2H6O(g,dimethyl-ether)"]],
]);
const settle = (asked: string, phase: Phase | null = null) =>
  settler(3, { species: table, formerKeys }, phase)(readAsked(asked));

describe("what an item of a question comes to", () => {
  test.each<[asked: string, phase: Phase | null, key: string, because: string]>([
    ["H2O(l)", null, "H2O(l)", "the key itself"],
    ["  H2O(l) ", null, "H2O(l)", "spaces around it are nobody's meaning"],
    ["H2O(liq)", null, "H2O(l)", "a usual spelling of the phase"],
    ["H2O, l", null, "H2O(l)", "the phase behind a comma"],
    ["OH2(l)", null, "H2O(l)", "the atoms in another order"],
    ["SO4 2-(aq)", null, "SO4-2(aq)", "another spelling of the charge"],
    ["SO₄²⁻(aq)", null, "SO4-2(aq)", "typeset"],
    ["Hg2+2(aq)", null, "Hg2+2(aq)", "a canonical key never has two readings"],
    ["CdSO4*8/3H2O(cr)", null, "CdSO4·8/3H2O(cr)", "another dot"],
    ["oxidane", null, "H2O(l)", "a synonym, whatever its case"],
    ["ETHANOL", null, "C2H6O(l,ethanol)", "a name, whatever its case"],
    ["dimethyl  ether", null, "C2H6O(g,dimethyl-ether)", "spaces between words count once"],
    ["64-17-5", null, "C2H6O(l,ethanol)", "a CAS number of one species"],
    ["7732-18-5", "l", "H2O(l)", "a CAS number of several, told apart by the phase"],
    ["water", "g", "H2O(g)", "a name of several, told apart by the phase"],
    ["H2O", "g", "H2O(g)", "a formula, told apart by the phase"],
    ["tin", null, "Sn(cr,white)", "a name in small letters is no formula of other elements"],
    ["NH3(g)", null, "NH3(g,ammonia)", "the key it had in an earlier edition"],
  ])("%s with phase %s is %s: %s", (asked, phase, key) => {
    expect(settle(asked, phase)).toMatchObject({ outcome: "found", species: { key } });
  });

  test.each<[asked: string, phase: Phase | null, keys: string[], says: string]>([
    ["water", null, ["H2O(g)", "H2O(l)"], "with a phase"],
    ["7732-18-5", null, ["H2O(g)", "H2O(l)"], "with a phase"],
    ["H2O", null, ["H2O(g)", "H2O(l)"], "with a phase"],
    ["C", "cr", ["C(cr,diamond)", "C(cr,graphite)"], "by key"],
    ["C(cr)", null, ["C(cr,diamond)", "C(cr,graphite)"], "names no form"],
    ["CaCO3(cr)", null, ["CaCO3(cr,calcite)"], "names no form"],
    // The trade always asks about these, even where only one of the two stands in the table.
    ["Hg2+(aq)", null, ["Hg+2(aq)"], "by key"],
    ["C2H6O(l)", null, ["C2H6O(g,dimethyl-ether)", "C2H6O(l,ethanol)"], "was the key"],
  ])("%s with phase %s is asked back: %j", (asked, phase, keys, says) => {
    const settled = settle(asked, phase);
    expect(settled).toMatchObject({ outcome: "ambiguous", sentence: expect.stringContaining(says) as string });
    expect(settled.outcome === "ambiguous" && settled.candidates.map((one) => one.key)).toEqual(
      expect.arrayContaining(keys),
    );
  });

  test.each<[asked: string, phase: Phase | null, says: string]>([
    ["", null, "empty"],
    ["   ", null, "empty"],
    ["no such thing", null, "no species"],
    ["XeF6(g)", null, "no species"],
    ["7732-18-4", null, "call for 5"],
    ["50-00-0", null, "no species"],
    ["H2O(cr)", null, "H2O(g), H2O(l)"],
    ["SO4(aq)", null, "SO4-2(aq)"],
    ["H2O(l)", "g", "the phase asked for is g"],
    ["ethanol", "g", "not in the phase asked for"],
    ["__proto__", null, "no species"],
  ])("%j with phase %s is unknown, and says why", (asked, phase, says) => {
    expect(settle(asked, phase)).toMatchObject({
      outcome: "unknown",
      sentence: expect.stringContaining(says) as string,
    });
  });
});
