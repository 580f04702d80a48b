import { describe, expect, test } from "vitest";
import { digits } from "#app/thermo/digits.ts";
import { readKey, type SpeciesIdentity } from "#app/thermo/speciesKey.ts";
import type { DetailContent, ValueContent } from "./content.ts";
import {
  answerTo,
  type Namesake,
  namesakeQuestions,
  noTrouble,
  readDetail,
  readNames,
  readValues,
  type Typed,
  typedDetail,
  typedValue,
} from "./proposal.ts";

function identity(key: string): SpeciesIdentity {
  const reading = readKey(key);
  if (reading.outcome !== "read") throw new Error(reading.sentence);
  return reading.value;
}

const typed =
  (fields: Record<string, string>): Typed =>
  (name) =>
    fields[name] ?? "";

const ethanol: DetailContent = {
  kind: "detail",
  key: "C2H6O(g,ethanol)",
  printed: "C2H6O",
  label: "ethanol",
  name: "ethanol",
  cas: "64-17-5",
  inchikey: "LFQSCWFLJHTTHZ-UHFFFAOYSA-N",
  synonyms: ["ethyl alcohol"],
};

describe("values of a form", () => {
  const value: ValueContent = {
    kind: "value",
    digits: digits("-235.10"),
    uncertainty: { digits: digits("0.40"), kind: "expanded", coverageFactor: 2 },
    temperature: digits("298.15"),
    standardPressure: digits("100000"),
    basis: null,
    origin: "stated",
    method: "combustion calorimetry",
    given: { text: "−235.10", unit: "kJ/mol", note: null },
    remark: null,
    sourceId: "src_one",
  };

  test("filled in from a line and sent back unchanged say the same", () => {
    const trouble = noTrouble();
    const [read] = readValues(typed(typedValue(value, "enthalpyOfFormation")), identity("C2H6O(g,ethanol)"), trouble);
    const { sourceId: _source, ...rest } = value;
    expect(trouble.errors).toEqual([]);
    expect(read).toEqual({ property: "enthalpyOfFormation", content: rest });
  });

  test("at 1 atm keep the uncertainty; only S° and ΔfG° take a step", () => {
    const trouble = noTrouble();
    const read = readValues(
      typed({
        "enthalpyOfFormation.value": "-393.51",
        "enthalpyOfFormation.unit": "kJ/mol",
        "entropy.value": "213.64(5)",
        "entropy.unit": "J/(mol K)",
        pressure: "101325",
      }),
      identity("CO2(g)"),
      trouble,
    );
    expect(
      read.map(({ content }) => [content.digits, content.uncertainty?.digits ?? null, content.given.note]),
    ).toEqual([
      ["-393.51", null, "1 atm to 1 bar: no change"],
      // 213.64 + R ln 1.01325 = 213.75
      ["213.75", "0.05", "1 atm to 1 bar: + 0.1094"],
    ]);
  });

  test("a solute's standard state is kept for solutes only", () => {
    const fields = { "entropy.value": "58.45", "entropy.unit": "J/(mol K)", basis: "molality" };
    const basisOf = (key: string) => readValues(typed(fields), identity(key), noTrouble())[0]?.content.basis;
    expect(basisOf("Na+(aq)")).toBe("molality");
    expect(basisOf("H2O(l)")).toBeNull();
  });

  test("ΔfG° at 1 atm of an element without a reference state is refused", () => {
    const trouble = noTrouble();
    readValues(
      typed({ "gibbsEnergyOfFormation.value": "1.0", "gibbsEnergyOfFormation.unit": "kJ/mol", pressure: "101325" }),
      identity("HAt(g)"),
      trouble,
    );
    expect(trouble.errors[0]?.detail).toContain("no reference state");
  });

  test("choices that no form offers are refused, not guessed", () => {
    const trouble = noTrouble();
    readValues(typed({ kind: "huge", pressure: "1", basis: "molarity" }), identity("H2O(l)"), trouble);
    expect(trouble.errors.map((error) => error.pointer)).toEqual(["/kind", "/pressure", "/basis"]);
  });

  test("a coverage factor of an uncertainty that has none is asked about", () => {
    const trouble = noTrouble();
    const fields = { "entropy.value": "69.95", "entropy.unit": "J/(mol K)", "entropy.uncertainty": "0.03" };
    readValues(typed({ ...fields, kind: "standard", k: "2" }), identity("H2O(l)"), trouble);
    expect(trouble.errors.map((error) => error.pointer)).toEqual(["/k"]);
  });
});

describe("what a species is called", () => {
  test("filled in from what stands and sent back unchanged says the same", () => {
    const trouble = noTrouble();
    expect(readDetail(typed(typedDetail(ethanol)), identity("C2H6O(g,ethanol)"), trouble)).toEqual(ethanol);
    expect(trouble.errors).toEqual([]);
  });

  test("a formula in another order makes another key of the same species", () => {
    const trouble = noTrouble();
    const detail = readDetail(
      typed({ ...typedDetail(ethanol), formula: "C2H5OH" }),
      identity("C2H6O(g,ethanol)"),
      trouble,
    );
    expect(trouble.errors).toEqual([]);
    expect(detail).toMatchObject({ key: "C2H5OH(g,ethanol)", printed: "C2H5OH" });
  });

  test("another charge is another species", () => {
    const trouble = noTrouble();
    readDetail(typed({ formula: "Fe+2" }), identity("Fe+3(aq)"), trouble);
    expect(trouble.errors[0]?.detail).toContain("so another species");
  });

  test("too long or too many names are refused at their fields", () => {
    const trouble = noTrouble();
    readNames(typed({ name: "a".repeat(201), synonyms: "b\n".repeat(60) + "c".repeat(201) }), trouble);
    expect(trouble.errors.map((error) => error.pointer)).toEqual(["/name", "/synonyms"]);
    const many = noTrouble();
    readNames(typed({ synonyms: Array.from({ length: 51 }, (_, index) => `name ${index}`).join("\n") }), many);
    expect(many.errors.map((error) => error.detail)).toEqual(["At most 50 synonyms."]);
  });
});

describe("questions about names", () => {
  const other = (rest: Partial<Namesake>): Namesake => ({
    key: "C2H6O(g,dimethyl-ether)",
    name: "dimethyl ether",
    hill: "C2H6O",
    charge: 0,
    phase: "g",
    cas: "115-10-6",
    inchikey: null,
    synonyms: [],
    revisionId: null,
    ...rest,
  });
  const asked = (rest: Partial<Namesake>) => namesakeQuestions(ethanol, identity("C2H6O(g,ethanol)"), [other(rest)]);

  test.each<[string, Partial<Namesake>, RegExp | null]>([
    ["an isomer with other names", {}, null],
    [
      "an isomer with the same CAS number",
      { cas: "64-17-5" },
      /another species of the same formula and phase, carries/,
    ],
    ["an isomer with the same InChIKey", { inchikey: "LFQSCWFLJHTTHZ-UHFFFAOYSA-N" }, /carries the InChIKey/],
    ["an isomer of the same name, written otherwise", { name: "Ethanol" }, /is called ethanol already/],
    ["an isomer with the name as a synonym", { synonyms: ["ETHANOL"] }, /is called ethanol already/],
    ["the liquid of the same substance", { phase: "l", name: "ethanol", cas: "64-17-5" }, null],
    [
      "another formula with the same number",
      { hill: "C2H4O", phase: "l", cas: "64-17-5" },
      /a species of another formula/,
    ],
    ["a proposal of somebody else", { cas: "64-17-5", revisionId: 12 }, /proposed in revision 12/],
  ])("%s", (_what, rest, sentence) => {
    const questions = asked(rest);
    if (sentence === null) expect(questions).toEqual([]);
    else expect(questions).toEqual([expect.stringMatching(sentence)]);
  });

  test("an answer holds for just what was asked", () => {
    const one = { matches: [], sentences: asked({ cas: "64-17-5" }) };
    const two = { matches: [], sentences: asked({ cas: "64-17-5", name: "ethanol" }) };
    expect(answerTo(one)).not.toBe(answerTo(two));
    // A browser turns line ends of a field into its own; the answer has none.
    expect(answerTo(two)).not.toContain("\n");
  });
});
