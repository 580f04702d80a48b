import { describe, expect, test } from "vitest";
import { plusKept, readSearch, splitKeys } from "./search.ts";

describe("readSearch", () => {
  test("nothing typed is no search", () => {
    expect(readSearch("   ")).toBeNull();
  });

  test.each(["SO4-2", "SO4 2-", "SO4^2-", "SO₄²⁻"])("%s is the sulfate ion", (text) => {
    expect(readSearch(text)?.formulas).toEqual([{ hill: "O4S", charge: -2 }]);
  });

  test("a formula without a charge finds every charge", () => {
    expect(readSearch("SO4")?.formulas).toEqual([{ hill: "O4S", charge: null }]);
  });

  test("a text with two readings keeps both", () => {
    expect(readSearch("O2-")?.formulas.length).toBe(2);
  });

  test("a key is read as the species it names", () => {
    const [identity] = readSearch("C(c,graphite)")?.identities ?? [];
    expect(identity).toMatchObject({ phase: "cr", label: "graphite" });
  });

  test("water's CAS number is one, and one with a wrong check digit is not", () => {
    expect(readSearch("7732-18-5")?.cas).toBe("7732-18-5");
    expect(readSearch("7732-18-4")?.cas).toBeNull();
  });

  test("a word is only a text", () => {
    expect(readSearch(" carbon dioxide ")).toMatchObject({
      text: "carbon dioxide",
      formulas: [],
      identities: [],
      cas: null,
    });
  });
});

describe("lists of keys in an address", () => {
  test("commas inside brackets belong to the key", () => {
    expect(splitKeys("H2O(l),C(cr,graphite),[Fe(CN)6]-3(aq)")).toEqual(["H2O(l)", "C(cr,graphite)", "[Fe(CN)6]-3(aq)"]);
  });

  test("a plus sign that form encoding made a space comes back", () => {
    expect(plusKept("Na (aq)")).toBe("Na+(aq)");
    expect(splitKeys("Na (aq),Fe 3(aq)")).toEqual(["Na+(aq)", "Fe+3(aq)"]);
  });

  test("empty entries are nothing", () => {
    expect(splitKeys(",H2O(l),,")).toEqual(["H2O(l)"]);
  });
});
