import { describe, expect, it } from "vitest";
import { foundBy } from "#tests/support/view.ts";
import { duplicate } from "./duplicate.ts";

describe("Proposed twice", () => {
  it("passes one value for each property", () => {
    const rows = [
      { key: "NH3(g)", values: { enthalpyOfFormation: "-45.94" } },
      { key: "NH3(g)", values: { entropy: "192.77" } },
    ];
    expect(foundBy(duplicate, rows)).toEqual([]);
  });

  it("blocks two values for one property and names both", () => {
    const rows = [
      { key: "NH3(g)", values: { enthalpyOfFormation: "-45.94" } },
      { key: "NH3(g)", values: { enthalpyOfFormation: "-46.11" } },
    ];
    expect(foundBy(duplicate, rows)).toMatchObject([
      { severity: "block", property: "enthalpyOfFormation", sentence: duplicate.example.sentence },
    ]);
  });

  it("asks to look where the same value comes twice", () => {
    const row = { key: "NH3(g)", values: { enthalpyOfFormation: "-45.94" } };
    expect(foundBy(duplicate, [row, row])).toMatchObject([{ severity: "look" }]);
  });

  it("does not take a value that replaces the standing one for a second one", () => {
    const standing = [{ key: "NH3(g)", values: { enthalpyOfFormation: "-46.11" } }];
    expect(foundBy(duplicate, [{ key: "NH3(g)", values: { enthalpyOfFormation: "-45.94" } }], standing)).toEqual([]);
  });

  it("blocks one substance under two keys", () => {
    const rows = [
      { key: "NaOH(cr)", values: { entropy: "64.455" } },
      { key: "HNaO(cr)", values: { entropy: "64.455" } },
    ];
    const findings = foundBy(duplicate, rows);
    expect(findings.map(({ severity, species }) => [severity, species])).toEqual([
      ["block", "NaOH(cr)"],
      ["block", "HNaO(cr)"],
    ]);
  });

  it("asks for a label where an isomer or form stands beside one without", () => {
    const standing = [{ key: "C2H6O(g,dimethyl-ether)", values: { entropy: "266.4" } }];
    expect(foundBy(duplicate, [{ key: "C2H5OH(g)", values: { entropy: "282.7" } }], standing)).toMatchObject([
      {
        severity: "look",
        sentence:
          "C2H5OH(g) stands beside C2H6O(g,dimethyl-ether) without a label of its own. Say which form or isomer it is.",
      },
    ]);
  });

  it("passes two labelled forms, other phases and other charges", () => {
    const standing = [
      { key: "C(cr,graphite)", values: { entropy: "5.74" } },
      { key: "C(g)", values: { entropy: "158.1" } },
    ];
    expect(foundBy(duplicate, [{ key: "C(cr,diamond)", values: { entropy: "2.377" } }], standing)).toEqual([]);
  });
});
