import { describe, expect, test } from "vitest";
import { readFormula } from "#app/thermo/formula.ts";
import type { Phase } from "#app/thermo/phase.ts";
import { readKey } from "#app/thermo/speciesKey.ts";
import { digits } from "#app/thermo/digits.ts";
import type { Property } from "#app/thermo/property.ts";
import { type Candidate, matchSpecies, type MatchOutcome, settleRows } from "./match.ts";
import type { RowReading, SheetFrame } from "./readRows.ts";

const frame: SheetFrame = {
  heads: ["formula", "phase", "form", "S"],
  headRow: 1,
  plan: (["formula", "phase", "label", "value"] as const).map((means) => ({
    head: means,
    means,
    property: means === "value" ? "entropy" : null,
    unit: means === "value" ? "J/(mol K)" : null,
    because: "",
    asks: false,
  })),
  settings: {
    temperature: "298.15",
    standardPressure: "100000",
    basis: null,
    uncertaintyKind: null,
    decimalComma: false,
    solidIs: "cr",
    method: null,
  },
};

interface Said {
  formula: string;
  phase: Phase;
  label?: string;
  name?: string;
  cas?: string;
  property?: Property;
}

function rowOf({ formula, phase, label, name, cas, property }: Said): RowReading {
  const reading = readFormula(formula);
  if (reading.outcome !== "read") throw new Error(formula);
  return {
    species: { formula: reading.value, phase, label: label ?? null, name: name ?? null, cas: cas ?? null },
    values: [
      {
        property: property ?? "entropy",
        digits: digits("50.1"),
        uncertainty: null,
        given: { text: "50.1", unit: "J/(mol K)", note: null },
        column: 3,
      },
    ],
    remark: null,
    notes: [],
  };
}

function candidate(key: string, more: Partial<Candidate> = {}): Candidate {
  const reading = readKey(key);
  if (reading.outcome !== "read") throw new Error(key);
  const { formula, phase, label } = reading.value;
  return {
    speciesId: `sp_of_${key}`,
    key,
    printed: formula.printed,
    hill: formula.hill,
    charge: formula.charge,
    phase,
    label: label ?? null,
    name: "",
    cas: null,
    synonyms: [],
    revisionId: null,
    ...more,
  };
}

const matchOne = (said: Said, candidates: Candidate[], answer: string | null = null): MatchOutcome => {
  const [outcome] = matchSpecies([{ number: 2, answer, reading: rowOf(said) }], candidates, frame);
  if (!outcome) throw new Error("no outcome");
  return outcome;
};

/** The key of the species a row was matched to, `new …`, or `ask` with the keys to choose from. */
function shortly(outcome: MatchOutcome): string {
  if (outcome.outcome === "read") {
    return outcome.reading.match.kind === "new" ? `new ${outcome.reading.match.key}` : outcome.reading.match.key;
  }
  return `ask ${outcome.problems.flatMap((problem) => problem.repairs.map((repair) => repair.text)).join(" ")}`;
}

const ethanol = candidate("C2H6O(g,ethanol)", { name: "ethanol", cas: "64-17-5", synonyms: ["ethyl alcohol"] });
const ether = candidate("C2H6O(g,dimethyl-ether)", { name: "dimethyl ether", cas: "115-10-6" });

describe("which species a row is", () => {
  test.each<[string, Said, Candidate[], string]>([
    ["nothing like it: new", { formula: "KBr", phase: "cr" }, [candidate("NaCl(cr)")], "new KBr(cr)"],
    ["the same formula and phase", { formula: "CaO", phase: "cr" }, [candidate("CaO(cr)")], "CaO(cr)"],
    ["another phase is another species", { formula: "H2O", phase: "g" }, [candidate("H2O(l)")], "new H2O(g)"],
    ["another charge is another species", { formula: "Fe+3", phase: "aq" }, [candidate("Fe+2(aq)")], "new Fe+3(aq)"],
    ["spelled otherwise: asked", { formula: "CH2O", phase: "g" }, [candidate("HCHO(g)")], "ask HCHO(g) new"],
    [
      "the same form",
      { formula: "C", phase: "cr", label: "graphite" },
      [candidate("C(cr,graphite)")],
      "C(cr,graphite)",
    ],
    [
      "another form",
      { formula: "C", phase: "cr", label: "diamond" },
      [candidate("C(cr,graphite)")],
      "new C(cr,diamond)",
    ],
    [
      "no form named, one known",
      { formula: "Al2O3", phase: "cr" },
      [candidate("Al2O3(cr,corundum)")],
      "Al2O3(cr,corundum)",
    ],
    [
      "no form named, two known",
      { formula: "CaCO3", phase: "cr" },
      [candidate("CaCO3(cr,calcite)"), candidate("CaCO3(cr,aragonite)")],
      "ask CaCO3(cr,calcite) CaCO3(cr,aragonite) new",
    ],
    [
      "a form named, none known",
      { formula: "Fe2O3", phase: "cr", label: "hematite" },
      [candidate("Fe2O3(cr)")],
      "ask Fe2O3(cr) new",
    ],
    ["an element without its form", { formula: "C", phase: "cr" }, [candidate("C(cr,graphite)")], "ask graphite"],
    [
      "the name tells the isomer",
      { formula: "C2H6O", phase: "g", name: "ethanol" },
      [ethanol, ether],
      "C2H6O(g,ethanol)",
    ],
    [
      "a synonym does",
      { formula: "C2H5OH", phase: "g", name: "Ethyl alcohol", label: "ethanol" },
      [ethanol, ether],
      "C2H6O(g,ethanol)",
    ],
    [
      "the CAS number tells it",
      { formula: "C2H5OH", phase: "g", cas: "64-17-5" },
      [ethanol, ether],
      "C2H6O(g,ethanol)",
    ],
    [
      "the same composition with another CAS number and name is another species",
      { formula: "C2H6O", phase: "g", cas: "115-10-6", name: "dimethyl ether" },
      [ethanol],
      "new C2H6O(g,dimethyl-ether)",
    ],
    [
      "another name with nothing else to go by is a question",
      { formula: "C2H6O", phase: "g", name: "methoxymethane" },
      [candidate("C2H6O(g)", { name: "ethanol" })],
      "ask C2H6O(g) new",
    ],
    [
      "another CAS number on the same formula and form is a question",
      { formula: "NaCl", phase: "cr", cas: "7447-40-7" },
      [candidate("NaCl(cr)", { cas: "7647-14-5" })],
      "ask NaCl(cr) new",
    ],
    [
      "an isomer that nobody names",
      { formula: "C2H6O", phase: "g" },
      [ethanol, ether],
      "ask C2H6O(g,ethanol) C2H6O(g,dimethyl-ether) new",
    ],
  ])("%s", (_what, said, candidates, expected) => {
    expect(shortly(matchOne(said, candidates))).toBe(expected);
  });

  test("the steward's answer is taken, and held against the keys", () => {
    const said: Said = { formula: "CH2O", phase: "g" };
    expect(shortly(matchOne(said, [candidate("HCHO(g)")], "HCHO(g)"))).toBe("HCHO(g)");
    expect(shortly(matchOne(said, [candidate("HCHO(g)")], "new"))).toBe("new CH2O(g)");
    expect(shortly(matchOne(said, [candidate("HCHO(g)")], "CO(g)"))).toBe("ask HCHO(g) new");
    // Another substance of the same key needs a form or a name to be told apart by.
    const same: Said = { formula: "NaCl", phase: "cr", cas: "7447-40-7" };
    expect(matchOne(same, [candidate("NaCl(cr)", { cas: "7647-14-5" })], "new")).toMatchObject({
      outcome: "refused",
      problems: [{ sentence: expect.stringContaining("Name the form or isomer") }],
    });
  });
});

describe("rows held against each other", () => {
  const settle = (said: Said[]): string[] => {
    const rows = said.map((one, index) => {
      const outcome = matchOne(one, []);
      if (outcome.outcome !== "read") throw new Error(JSON.stringify(outcome));
      return { number: index + 2, reading: outcome.reading };
    });
    return settleRows(rows, frame).map((outcome) =>
      outcome.outcome === "read"
        ? outcome.reading.match.key
        : outcome.problems.map((problem) => `among ${problem.amongRows?.join(" ") ?? "?"}`).join(", "),
    );
  };

  test("rows of one new species are one species", () => {
    expect(
      settle([
        { formula: "KBr", phase: "cr" },
        { formula: "KBr", phase: "cr", property: "heatCapacity" },
      ]),
    ).toEqual(["KBr(cr)", "KBr(cr)"]);
  });

  test("isomers with names get the labels their names give", () => {
    expect(
      settle([
        { formula: "C2H6O", phase: "g", name: "ethanol" },
        { formula: "C2H6O", phase: "g", name: "dimethyl ether", cas: "115-10-6" },
      ]),
    ).toEqual(["C2H6O(g)", "among 2"]);
    expect(
      settle([
        { formula: "C2H6O", phase: "g", name: "ethanol", cas: "64-17-5" },
        { formula: "CH3OCH3", phase: "g", name: "dimethyl ether", cas: "115-10-6" },
      ]),
    ).toEqual(["C2H6O(g,ethanol)", "CH3OCH3(g,dimethyl-ether)"]);
  });

  test("two rows that set one value are both handed back, with each other's number", () => {
    expect(
      settle([
        { formula: "KBr", phase: "cr" },
        { formula: "NaF", phase: "cr" },
        { formula: "KBr", phase: "cr" },
      ]),
    ).toEqual(["among 4", "NaF(cr)", "among 2"]);
  });
});
