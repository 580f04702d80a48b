import { describe, expect, test } from "vitest";
import { readIdentity, type WrittenIdentity } from "./identityForm.ts";

const read = (rest: Partial<WrittenIdentity>) => readIdentity({ formula: "", phase: "", label: "", ...rest });

describe("a species as a person types it", () => {
  test.each<[string, Partial<WrittenIdentity>, string]>([
    ["formula and phase", { formula: "H2O", phase: "liquid" }, "H2O(l)"],
    ["a whole key", { formula: "Fe3+ (aq)" }, "Fe+3(aq)"],
    ["a key with its label", { formula: "C2H6O(g,dimethyl-ether)" }, "C2H6O(g,dimethyl-ether)"],
    ["a label of its own", { formula: "C2H6O", phase: "g", label: "Dimethyl ether" }, "C2H6O(g,dimethyl-ether)"],
    ["a form named with the phase", { formula: "SiO2", phase: "c,alpha" }, "SiO2(cr,alpha)"],
    ["a hydrate", { formula: "CuSO4.5H2O", phase: "cr" }, "CuSO4·5H2O(cr)"],
    ["the reference form of an element", { formula: "C", phase: "cr", label: "graphite" }, "C(cr,graphite)"],
    ["one of two readings", { formula: "SO42-", phase: "aq", formulaIs: "SO4-2" }, "SO4-2(aq)"],
  ])("%s", (_what, written, key) => {
    expect(read(written)).toMatchObject({ outcome: "read", key });
  });

  test.each<[string, Partial<WrittenIdentity>, string, RegExp]>([
    ["nothing", {}, "formula", /Write the formula/],
    ["no phase", { formula: "H2O" }, "phase", /Write the phase/],
    ["a phase that is none", { formula: "H2O", phase: "plasma" }, "phase", /plasma/],
    ["no element of this name", { formula: "Xq2", phase: "g" }, "formula", /Xq/],
    ["an ion in a crystal", { formula: "Na+", phase: "cr" }, "phase", /carries a charge/],
    ["an element without its form", { formula: "C", phase: "cr" }, "label", /only graphite/],
    ["two forms", { formula: "SiO2", phase: "c,alpha", label: "beta" }, "label", /names the form alpha/],
    ["a further form that nobody named", { formula: "SiO2", phase: "cr2" }, "label", /Name the form/],
    ["a label with a bracket", { formula: "C2H6O", phase: "g", label: "a(b)" }, "label", /letters, digits and hyphens/],
  ])("%s is refused beside its field", (_what, written, field, sentence) => {
    expect(read(written)).toMatchObject({ outcome: "wrong", errors: { [field]: expect.stringMatching(sentence) } });
  });

  test("a formula with two readings is asked about with both", () => {
    const reading = read({ formula: "Hg2+", phase: "aq" });
    expect(reading).toMatchObject({ outcome: "wrong", readings: ["Hg+2", "Hg2+1"] });
    expect(read({ formula: "Hg2+", phase: "aq", formulaIs: "Hg2+1" })).toMatchObject({ key: "Hg2+1(aq)" });
    // What fits none of the readings answers nothing.
    expect(read({ formula: "Hg2+", phase: "aq", formulaIs: "Fe+3" })).toMatchObject({ outcome: "wrong" });
  });
});
