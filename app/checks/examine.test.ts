import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { codata, nbs } from "#tests/published/publishedTables.ts";
import { published, type Row, viewOf } from "#tests/support/view.ts";
import { examine } from "./examine.ts";
import { entropyPositive } from "./entropy-positive.ts";
import { checks } from "./registry.ts";
import type { Check } from "./types.ts";

const standing = published([...codata, ...nbs]);
const water: Row = { key: "H2O(l)", values: { enthalpyOfFormation: "285.8", entropy: "-69.95" } };

describe("The examination", () => {
  it("turns a check that breaks down into a block, and goes on", () => {
    const broken: Check = {
      ...entropyPositive,
      code: "broken",
      title: "Broken",
      run: () => {
        throw new RangeError("no such element");
      },
    };
    const findings = examine(viewOf([water]), [broken, entropyPositive]);
    expect(findings.map(({ check, severity }) => [check, severity])).toEqual([
      ["broken", "block"],
      ["entropy-positive", "block"],
    ]);
    expect(findings[0]).toMatchObject({
      property: null,
      sentence:
        "The check “Broken” could not be made on H2O(l), so it has not been passed. Tell the administrator; the values may be right.",
      arithmetic: ["What stopped it: no such element"],
    });
  });

  it("files every finding under its species, check and line", () => {
    for (const finding of examine(viewOf([water], standing))) {
      expect(finding).toMatchObject({ species: "H2O(l)", speciesId: "species of H2O(l)", lineRef: "line 1" });
      expect(checks.map(({ code }) => code)).toContain(finding.check);
    }
  });

  it("says the same every time, species in the order of the proposal", () => {
    const rows: Row[] = [water, { key: "NH3(g)", values: { enthalpyOfFormation: "-49.54 ± 0.30", entropy: "192.8" } }];
    const once = examine(viewOf(rows, standing));
    expect(examine(viewOf(rows, standing))).toEqual(once);
    expect([...new Set(once.map(({ species }) => species))]).toEqual(["H2O(l)", "NH3(g)"]);
  });

  it("finds nothing in an empty proposal", () => {
    expect(examine(viewOf([], standing))).toEqual([]);
  });

  it("never breaks down and only uses the severities a check announces, whatever the numbers are", () => {
    const numeral = fc
      .tuple(fc.boolean(), fc.nat(1_000_000), fc.integer({ min: 0, max: 4 }))
      .map(([negative, number, count]) => {
        const text = String(number).padStart(count + 1, "0");
        const point = text.length - count;
        return `${negative ? "-" : ""}${text.slice(0, point)}${count > 0 ? `.${text.slice(point)}` : ""}`;
      });
    const cell = fc
      .tuple(numeral, fc.option(numeral))
      .map(([value, uncertainty]) => (uncertainty === null ? value : `${value} ± ${uncertainty}`));
    const key = fc.constantFrom(
      "H2O(l)",
      "NH3(g)",
      "Na+(aq)",
      "H+(aq)",
      "O2(g)",
      "C(cr,diamond)",
      "H3O+(aq)",
      "Na+(g)",
      "U3O8(cr)",
    );
    const values = fc.record(
      {
        enthalpyOfFormation: cell,
        entropy: cell,
        gibbsEnergyOfFormation: cell,
        heatCapacity: cell,
        enthalpyIncrement: cell,
      },
      { requiredKeys: [] },
    );
    fc.assert(
      fc.property(fc.array(fc.record({ key, values }), { maxLength: 4 }), (rows) => {
        for (const finding of examine(viewOf(rows as Row[], standing))) {
          const check = checks.find(({ code }) => code === finding.check);
          expect(finding.sentence).not.toContain("could not be made");
          expect(check?.severities).toContain(finding.severity);
          expect(finding.sentence).not.toMatch(/NaN|undefined|Infinity/);
          expect(finding.arithmetic.join(" ")).not.toMatch(/NaN|undefined|Infinity/);
          expect(finding.suggestions.length).toBeLessThanOrEqual(3);
        }
      }),
      { numRuns: 60 },
    );
  });
});
