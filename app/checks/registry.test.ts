import { existsSync, readdirSync, readFileSync } from "node:fs";
import Papa from "papaparse";
import { describe, expect, it } from "vitest";
import { codata, nbs } from "#tests/published/publishedTables.ts";
import { published, type Row, viewOf } from "#tests/support/view.ts";
import { examine } from "./examine.ts";
import { checkOf, checks } from "./registry.ts";
import { SEVERITIES } from "./types.ts";

const standing = published([...codata, ...nbs]);

describe("The registry", () => {
  it("holds every check under the name of its file", () => {
    for (const check of checks) {
      expect(existsSync(new URL(`./${check.code}.ts`, import.meta.url)), check.code).toBe(true);
      expect(checkOf(check.code)).toBe(check);
    }
    expect(new Set(checks.map((check) => check.code)).size).toBe(checks.length);
  });

  it("says for every check what it asks, by which rule and from where", () => {
    for (const check of checks) {
      for (const text of [check.title, check.appliesTo, check.source, check.example.given, check.example.sentence]) {
        expect(text.trim().length, check.code).toBeGreaterThan(10);
      }
      expect(check.formula.length, check.code).toBeGreaterThan(0);
      expect(check.explanation.length, check.code).toBeGreaterThan(0);
      expect(check.severities, check.code).toEqual(SEVERITIES.filter((one) => check.severities.includes(one)));
      expect(Number.isInteger(check.version) && check.version > 0, check.code).toBe(true);
    }
  });

  it("writes true minus signs and no raised or lowered digits", () => {
    const texts = checks.flatMap((check) => [
      check.title,
      check.appliesTo,
      check.source,
      check.example.given,
      check.example.sentence,
      ...check.formula,
      ...check.explanation,
    ]);
    for (const text of texts) {
      // E_n is defined with squares, which the pages typeset.
      expect(text.replace(/(?<=\))²/g, "")).not.toMatch(/[⁰¹²³⁴-⁹₀-₉]/u);
      expect(text).not.toMatch(/(?<![A-Za-z0-9+)])-\d/);
    }
  });

  it("knows no check by another name", () => {
    expect(checkOf("no-such-check")).toBeUndefined();
    expect(checkOf("constructor")).toBeUndefined();
  });
});

describe("The sheets in fixtures/checks", () => {
  const folder = new URL("../../fixtures/checks/", import.meta.url);

  it("are one for each check", () => {
    const sheets = readdirSync(folder).filter((name) => name.endsWith(".csv"));
    expect(sheets.sort()).toEqual(checks.map((check) => `${check.code}.csv`).sort());
  });

  it.each(checks.map((check) => check.code))("provoke just the check they are named after: %s", (code) => {
    const rows = sheetRows(readFileSync(new URL(`${code}.csv`, folder), "utf8")).map((row): Row =>
      code === "weaker-source" ? { ...row, sourceKind: "estimate" } : row,
    );
    const findings = examine(viewOf(rows, standing));
    expect(new Set(findings.map((finding) => finding.check))).toEqual(new Set([code]));
    for (const finding of findings) expect(checkOf(code)?.severities).toContain(finding.severity);
  });
});

/** Rows of a sheet with the columns formula, phase, form, CAS, then three values with U. */
function sheetRows(text: string): Row[] {
  return Papa.parse<string[]>(text.trim())
    .data.slice(1)
    .map(([formula = "", phase = "", form = "", cas = "", ...cells]) => {
      const cell = (index: number): string | undefined => {
        const [value = "", uncertainty = ""] = cells.slice(2 * index, 2 * index + 2);
        if (value === "") return undefined;
        return uncertainty === "" ? value : `${value} ± ${uncertainty}`;
      };
      const values = { enthalpyOfFormation: cell(0), entropy: cell(1), gibbsEnergyOfFormation: cell(2) };
      return {
        key: `${formula}(${form === "" ? phase : `${phase},${form}`})`,
        ...(cas === "" ? {} : { cas }),
        values: Object.fromEntries(Object.entries(values).filter(([, value]) => value !== undefined)),
      };
    });
}
