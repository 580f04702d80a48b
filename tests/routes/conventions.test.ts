import { describe, expect, test } from "vitest";
import { checks } from "#app/checks/registry.ts";
import { UNITS } from "#app/thermo/unit.ts";
import { useServer } from "#tests/support/server.ts";

/** The conventions as the built service serves them to somebody who is not signed in. */
const server = useServer();

async function textAt(address: string): Promise<string> {
  const response = await server.fetch(address);
  expect(response.status, address).toBe(200);
  const html = await response.text();
  const main = /<main[^>]*>([\s\S]*)<\/main>/.exec(html)?.[1] ?? "";
  return main
    .replace(/<[^>]+>/g, " ")
    .replaceAll("&lt;", "<")
    .replaceAll("&gt;", ">")
    .replaceAll("&#x27;", "'")
    .replaceAll("&amp;", "&")
    .replace(/\s+/g, " ");
}

describe("without signing in", () => {
  test("units carry the factors the readers convert by", async () => {
    const text = await textAt("/conventions/units");
    expect(text).toContain("4.1868 kJ mol"); // the International Table calorie, by definition
    expect(text).toContain("96.4853321233100184 kJ mol"); // e N_A, SI 2019
    expect(text.match(/\b1 (?:k?J|k?cal|m?eV) /g)?.length).toBeGreaterThanOrEqual(UNITS.length);
    expect(text).toContain("is per mass. Multiply by the molar mass");
  });

  test("symbols carry every quantity, and the constants", async () => {
    const text = await textAt("/conventions/symbols");
    for (const code of [
      "enthalpyOfFormation",
      "entropy",
      "gibbsEnergyOfFormation",
      "heatCapacity",
      "enthalpyIncrement",
    ]) {
      expect(text).toContain(code);
    }
    expect(text).toContain("8.314462618"); // CODATA 2018
    expect(text).toContain("96485.33212"); // CODATA 2018
  });

  test("states carry the reference states and the step from 1 atm", async () => {
    const text = await textAt("/conventions/states");
    expect(text).toMatch(/P \(cr, white\) phosphorus/);
    expect(text).toContain("+0.1094"); // R ln 1.01325 in J/(mol K)
    expect(text).toContain("+0.0489"); // H2O(l): −237.178 at 1 atm is −237.129 at 1 bar
  });

  test("uncertainties carry the bracket form of each kind", async () => {
    expect(await textAt("/conventions/uncertainty")).toMatch(/k not stated, 2 assumed 0\.020 −285\.830\(20\)/);
  });

  test("spellings carry what is read, asked and refused, as text", async () => {
    const text = await textAt("/conventions/spellings");
    expect(text).toContain("SO<sub>4</sub><sup>2&minus;</sup>");
    expect(text).toContain("asked: Hg+2 or Hg2+1");
    expect(text).toContain("is a range.");
  });

  test("every check has its page", async () => {
    const list = await textAt("/conventions/checks");
    for (const { code, source } of checks) {
      const text = await textAt(`/conventions/checks/${code}`);
      expect(text).toContain("The rule");
      expect(source.length, code).toBeGreaterThan(10);
    }
    expect(list.match(/Gibbs closure/g)?.length).toBe(1);
  });
});
