import { describe, expect, it } from "vitest";
import { foundBy, type Row } from "#tests/support/view.ts";
import { casShared } from "./cas-shared.ts";

const found = (key: string, other: string): ReturnType<typeof foundBy> => {
  const standing: Row[] = [{ key: other, cas: "7647-14-5" }];
  return foundBy(casShared, [{ key, cas: "7647-14-5", values: { entropy: "82.59" } }], standing);
};

describe("One CAS number on two formulas", () => {
  it("passes one number on several phases", () => {
    expect(found("NaCl(cr)", "NaCl(l)")).toEqual([]);
  });

  it("passes one formula written in two orders", () => {
    expect(found("NaCl(cr)", "ClNa(l)")).toEqual([]);
  });

  it("blocks other formulas, naming the species that has the number", () => {
    const [finding] = found("KCl(cr)", "NaCl(cr)");
    expect(finding?.severity).toBe("block");
    expect(finding?.sentence).toBe(
      `${casShared.example.sentence} One of the two numbers belongs to another substance.`,
    );
  });

  it("blocks another charge", () => {
    expect(found("Cl-(aq)", "Cl(g)")[0]?.severity).toBe("block");
  });

  it("asks to look where one formula is a multiple of the other", () => {
    for (const [key, other] of [
      ["S(cr,rhombic)", "S8(cr,rhombic)"],
      ["P4O10(cr)", "P2O5(cr)"],
    ] as const) {
      expect(found(key, other)[0]?.severity, key).toBe("look");
    }
  });

  it("does not take a part of a formula for a multiple", () => {
    expect(found("CO2(g)", "C2H4O2(l)")[0]?.severity).toBe("block");
    expect(found("HCl(g)", "H2(g)")[0]?.severity).toBe("block");
  });

  it("does not apply to a number that nobody else carries", () => {
    expect(foundBy(casShared, [{ key: "NaCl(cr)", cas: "7647-14-5", values: {} }])).toEqual([]);
  });
});
