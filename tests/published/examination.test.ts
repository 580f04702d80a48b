import { describe, expect, it } from "vitest";
import { examine } from "#app/checks/examine.ts";
import type { Finding } from "#app/checks/types.ts";
import { goodRows } from "#tests/support/plantedSlips.ts";
import { published, type Row, viewOf } from "#tests/support/view.ts";
import { codata, nbs, nbsHeatCapacities } from "./publishedTables.ts";

/*
 * No false alarms: the whole examination on published tables. CODATA Key Values (1989), The NBS Tables (1982), as the
 * headers of tests/published/publishedTables.ts cite them.
 */

/** Everything but remarks, without the numbers. */
function raised(findings: readonly Finding[]): string[] {
  return findings
    .filter(({ severity }) => severity !== "remark")
    .map(({ severity, check, species, property }) => `${severity} ${check} ${species} ${property ?? ""}`.trim());
}

describe("The CODATA key values with heat capacities of the NBS tables, proposed for an empty table", () => {
  const findings = examine(viewOf(published([...codata, ...nbsHeatCapacities])));

  it("raise nothing", () => {
    expect(raised(findings)).toEqual([]);
  });

  it("get one remark for each species whose heat capacity states no uncertainty, and no other", () => {
    expect(new Set(findings.map(({ check }) => check))).toEqual(new Set(["uncertainty-missing"]));
    expect(new Set(findings.map(({ species }) => species)).size).toBe(findings.length);
  });

  it("still raise nothing with the ΔfG° that follows from them, rounded as it would be printed", () => {
    const derived = goodRows()
      .filter(({ row }) => codata.includes(row))
      .map(({ row, values }): Row => {
        const { gibbsEnergyOfFormation } = values;
        return { key: row.key, identity: row.identity, values: { gibbsEnergyOfFormation } };
      });
    expect(derived.length).toBeGreaterThan(100);
    expect(raised(examine(viewOf(derived, published(codata))))).toEqual([]);
  });
});

describe("The NBS excerpt", () => {
  it("proposed for a table with the CODATA values, raises four closures and what it does to two rows of CODATA", () => {
    const findings = examine(viewOf(published(nbs), published(codata)));
    expect(raised(findings)).toEqual([
      // Br(g) and CaO(cr) stand in CODATA with uncertainties, the NBS tables print none; S° of CaO(cr) is 39.75 there
      // and 38.1 ± 0.4 in CODATA, a real difference between the two compilations.
      "look less-precise Br(g) enthalpyOfFormation",
      "look less-precise Br(g) entropy",
      "look change-beyond-uncertainty CaO(cr) entropy",
      "look less-precise CaO(cr) enthalpyOfFormation",
      "look less-precise CaO(cr) entropy",
      "look gibbs-closure N2H4(l) gibbsEnergyOfFormation",
      // The compilers relaxed the constraint for these two.
      "look gibbs-closure Na2CO3(cr) gibbsEnergyOfFormation",
      "look gibbs-closure NaHCO3(cr) gibbsEnergyOfFormation",
      // The element entropies differ: potassium 64.18 in the NBS tables, 64.68 in CODATA.
      "look gibbs-closure KCl(cr) gibbsEnergyOfFormation",
    ]);
  });

  it("gets no slip suggested for those closures, since none happened", () => {
    const findings = examine(viewOf(published(nbs), published(codata)));
    const closures = findings.filter(({ check, severity }) => check === "gibbs-closure" && severity === "look");
    expect(closures.map(({ suggestions }) => suggestions)).toEqual([[], [], [], []]);
  });

  it("proposed for an empty table, closes only what it has the elements for and blocks nothing", () => {
    const findings = examine(viewOf(published(nbs)));
    expect(raised(findings)).toEqual([]);
    const notMade = findings.filter(({ check }) => check === "gibbs-closure");
    expect(notMade.length).toBeGreaterThan(70);
    expect(notMade.find(({ species }) => species === "CH4(g)")?.sentence).toBe(
      "Gibbs closure of CH4(g) is not made: S° of C(cr,graphite) and H2(g) is not in the table.",
    );
  });
});

it("Heat capacities of the NBS tables, proposed beside the CODATA values, raise nothing", () => {
  expect(raised(examine(viewOf(published(nbsHeatCapacities), published(codata))))).toEqual([]);
});
