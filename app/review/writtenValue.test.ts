import { describe, expect, test } from "vitest";
import type { Property } from "#app/thermo/property.ts";
import { readFigure, type WrittenFigure } from "./writtenValue.ts";

const written = (rest: Partial<WrittenFigure>): WrittenFigure => ({
  value: "−45.94",
  unit: "kJ/mol",
  uncertainty: "",
  kind: "none",
  ...rest,
});
const read = (rest: Partial<WrittenFigure>, property: Property = "enthalpyOfFormation") =>
  readFigure(written(rest), property);

describe("a figure written into a form", () => {
  test("keeps text and unit as typed, and says how the unit was spelled", () => {
    expect(read({ value: " −10.98 ", unit: "kcal mol-1" })).toEqual({
      outcome: "read",
      figure: {
        // 10.98 × 4.184 = 45.94032 (1 cal = 4.184 J exactly)
        digits: "-45.94",
        uncertainty: null,
        given: { text: "−10.98", unit: "kcal/mol", note: "unit given as kcal mol-1; × 4.184" },
      },
    });
  });

  test("asks which reading is meant, and takes the one that was chosen", () => {
    expect(read({ value: "-1,234" })).toMatchObject({
      outcome: "wrong",
      errors: { value: "“-1,234” can be read as −1.234 or as −1234. Say which it is." },
      readings: { value: ["-1.234", "-1234"] },
    });
    expect(read({ value: "-1,234", valueIs: "-1.234" })).toMatchObject({
      figure: { digits: "-1.234", given: { text: "-1,234", unit: "kJ/mol", note: "read as −1.234" } },
    });
    // The number was typed anew after the choice: asked again, never answered for.
    expect(read({ value: "-5,678", valueIs: "-1.234" })).toMatchObject({ readings: { value: ["-5.678", "-5678"] } });
  });

  test("a decimal comma with one reading is read without a question", () => {
    expect(read({ value: "−45,94" })).toMatchObject({ figure: { digits: "-45.94", given: { text: "−45,94" } } });
  });

  test("an expanded uncertainty has the coverage factor that was typed, 2 without one", () => {
    expect(read({ uncertainty: "0.35", kind: "expanded", k: "1.96" })).toMatchObject({
      figure: { uncertainty: { digits: "0.35", kind: "expanded", coverageFactor: 1.96 } },
    });
    expect(read({ uncertainty: "0,35", kind: "expanded", k: "" })).toMatchObject({
      figure: { uncertainty: { digits: "0.35", kind: "expanded", coverageFactor: 2 } },
    });
    for (const k of ["none", "0", "-2", "95"]) {
      expect(read({ uncertainty: "0.35", kind: "expanded", k })).toMatchObject({
        errors: { k: "The coverage factor k is a number such as 2 or 1.96." },
      });
    }
  });

  test("what stands after ± is of the kind that was chosen", () => {
    const after = (kind: WrittenFigure["kind"]) => read({ value: "-45.94 ± 0.35", kind, k: "2" });
    expect(after("none")).toMatchObject({ figure: { uncertainty: { kind: "unstated", coverageFactor: null } } });
    expect(after("standard")).toMatchObject({ figure: { uncertainty: { kind: "standard", coverageFactor: null } } });
    expect(after("expanded")).toMatchObject({ figure: { uncertainty: { kind: "expanded", coverageFactor: 2 } } });
  });

  test.each<[string, Partial<WrittenFigure>, Property, string, RegExp]>([
    ["no number", { value: "" }, "entropy", "value", /empty/],
    ["a range", { value: "12-14", unit: "J/(mol K)" }, "entropy", "value", /range/],
    ["no unit", { unit: "" }, "entropy", "unit", /No unit is given/],
    ["the unit of another quantity", { unit: "kJ/mol" }, "entropy", "unit", /S° is written in J\/\(mol K\)/],
    ["a unit without a mole", { unit: "kJ" }, "enthalpyOfFormation", "unit", /per mole/],
    ["an uncertainty of no kind", { uncertainty: "0.3" }, "enthalpyOfFormation", "uncertainty", /which kind/],
    ["a kind without uncertainty", { kind: "standard" }, "enthalpyOfFormation", "uncertainty", /Give the uncertainty/],
    [
      "a negative one",
      { uncertainty: "-1", kind: "standard" },
      "enthalpyOfFormation",
      "uncertainty",
      /larger than zero/,
    ],
    ["words", { uncertainty: "small", kind: "standard" }, "enthalpyOfFormation", "uncertainty", /not a number/],
  ])("%s is refused beside its field", (_what, rest, property, field, sentence) => {
    const reading = read(rest, property);
    expect(reading).toMatchObject({ outcome: "wrong", errors: { [field]: expect.stringMatching(sentence) } });
  });

  test("everything that is wrong is said at once", () => {
    expect(read({ value: "x", unit: "y", uncertainty: "z", kind: "standard" })).toMatchObject({
      errors: { value: expect.any(String), unit: expect.any(String), uncertainty: expect.any(String) },
    });
  });
});
