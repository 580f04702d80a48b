import { describe, expect, it } from "vitest";
import { atomicWeight } from "#app/thermo/atomicWeights.ts";
import { toNumber } from "#app/thermo/digits.ts";
import { atomCount, soleElement } from "#app/thermo/formula.ts";
import { electronicEntropy, sackurTetrode } from "#app/thermo/thirdLaw.ts";
import { codata, valueOf } from "./publishedTables.ts";

const weightOf = (element: string): number => {
  const weight = atomicWeight(element);
  if (weight === undefined) throw new Error(`${element} has no atomic weight`);
  return weight;
};

describe("S° of the noble gases by Sackur and Tetrode", () => {
  // CODATA Key Values for Thermodynamics (Hemisphere, 1989), J/(mol K).
  it.each([
    ["He", 126.153],
    ["Ne", 146.328],
    ["Ar", 154.846],
    ["Kr", 164.085],
    ["Xe", 169.685],
  ])("%s: %d", (element, published) => {
    expect(Math.abs(sackurTetrode(weightOf(element)) - published)).toBeLessThanOrEqual(0.01);
  });
});

describe("S° of the gas atoms with their electronic term", () => {
  /**
   * Degeneracy and energy in cm⁻¹ of the levels that count at 298 K, from published atomic energy levels (National
   * Institute of Standards and Technology), from memory. A wrong one would show: the entropies are CODATA's.
   */
  const LEVELS: Readonly<Record<string, readonly (readonly [degeneracy: number, wavenumber: number])[]>> = {
    H: [[2, 0]],
    He: [[1, 0]],
    Li: [[2, 0]],
    Be: [[1, 0]],
    B: [
      [2, 0],
      [4, 15.29],
    ],
    C: [
      [1, 0],
      [3, 16.42],
      [5, 43.41],
    ],
    N: [[4, 0]],
    O: [
      [5, 0],
      [3, 158.27],
      [1, 226.98],
    ],
    F: [
      [4, 0],
      [2, 404.14],
    ],
    Ne: [[1, 0]],
    Na: [[2, 0]],
    Mg: [[1, 0]],
    Al: [
      [2, 0],
      [4, 112.06],
    ],
    Si: [
      [1, 0],
      [3, 77.12],
      [5, 223.16],
    ],
    P: [[4, 0]],
    S: [
      [5, 0],
      [3, 396.06],
      [1, 573.64],
    ],
    Cl: [
      [4, 0],
      [2, 882.35],
    ],
    Ar: [[1, 0]],
    K: [[2, 0]],
    Ca: [[1, 0]],
    Ti: [
      [5, 0],
      [7, 170.13],
      [9, 386.87],
    ],
    Cu: [[2, 0]],
    Zn: [[1, 0]],
    Ge: [
      [1, 0],
      [3, 557.13],
      [5, 1409.96],
    ],
    Br: [
      [4, 0],
      [2, 3685.24],
    ],
    Kr: [[1, 0]],
    Rb: [[2, 0]],
    Ag: [[2, 0]],
    Cd: [[1, 0]],
    Sn: [
      [1, 0],
      [3, 1691.81],
      [5, 3427.67],
    ],
    I: [
      [4, 0],
      [2, 7602.98],
    ],
    Xe: [[1, 0]],
    Cs: [[2, 0]],
    Hg: [[1, 0]],
    Pb: [[1, 0]],
    Th: [
      [5, 0],
      [1, 2558.06],
      [7, 2869.26],
    ],
    U: [
      [13, 0],
      [11, 620.32],
    ],
  };

  const atoms = codata.filter(({ identity }) => identity.phase === "g" && atomCount(identity.formula) === 1);

  it("covers every gas atom of the table", () => {
    expect(atoms.map(({ identity }) => soleElement(identity.formula)).sort()).toEqual(Object.keys(LEVELS).sort());
  });

  it.each(atoms.map((row) => [row.key, row] as const))("%s", (_, row) => {
    const element = soleElement(row.identity.formula) ?? "";
    const levels = (LEVELS[element] ?? []).map(([degeneracy, wavenumber]) => ({ degeneracy, wavenumber }));
    const computed = sackurTetrode(weightOf(element)) + electronicEntropy(levels);
    expect(Math.abs(computed - toNumber(valueOf(row, "entropy").digits))).toBeLessThanOrEqual(0.008);
  });
});
