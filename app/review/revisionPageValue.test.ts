import { describe, expect, test } from "vitest";
import { digits } from "#app/thermo/digits.ts";
import { isLikeUnit, UNITS } from "#app/thermo/unit.ts";
import type { ValueContent } from "./content.ts";
import { readWritten, takeSuggestion, unitsFor, type WrittenValue, writtenFrom } from "./revisionPageValue.ts";

const before: ValueContent = {
  kind: "value",
  digits: digits("-49.54"),
  uncertainty: { digits: digits("0.35"), kind: "expanded", coverageFactor: 2 },
  temperature: digits("298.15"),
  standardPressure: digits("100000"),
  basis: null,
  origin: "stated",
  method: "bomb calorimetry",
  given: { text: "-49.54", unit: "kJ/mol", note: null },
  remark: null,
  sourceId: "src_one",
};

const written = (rest: Partial<WrittenValue>): WrittenValue => ({
  value: "−45.94",
  unit: "kJ/mol",
  uncertainty: "0.35",
  kind: "expanded",
  ...rest,
});
const read = (rest: Partial<WrittenValue>) => readWritten(written(rest), "enthalpyOfFormation", before);

describe("a value written by hand", () => {
  test("keeps its digits, and everything else of the line", () => {
    expect(read({ value: "−45.940" })).toEqual({
      outcome: "read",
      content: { ...before, digits: "-45.940", given: { text: "−45.940", unit: "kJ/mol", note: null } },
    });
  });

  test("is converted from kilocalories by 4.184, its uncertainty too", () => {
    // −68.315 kcal/mol is −285.830 kJ/mol (1 cal = 4.184 J exactly).
    const reading = read({ value: "-68.315", unit: "kcal/mol", uncertainty: "0.010", kind: "standard" });
    expect(reading).toMatchObject({
      content: {
        digits: "-285.830",
        uncertainty: { digits: "0.042", kind: "standard", coverageFactor: null },
        given: { text: "-68.315", unit: "kcal/mol", note: "× 4.184" },
      },
    });
  });

  test("may carry its uncertainty in brackets, which then counts", () => {
    expect(read({ value: "-45.94(18)", uncertainty: "9", kind: "expanded" })).toMatchObject({
      content: { digits: "-45.94", uncertainty: { digits: "0.18", kind: "standard", coverageFactor: null } },
    });
  });

  test("may have none, or be exact by convention", () => {
    expect(read({ uncertainty: "", kind: "none" })).toMatchObject({ content: { uncertainty: null } });
    expect(read({ value: "0", uncertainty: "", kind: "exact" })).toMatchObject({
      content: { uncertainty: { digits: "0", kind: "exact", coverageFactor: null } },
    });
  });

  test.each([
    ["no number", { value: "about 46" }, "value"],
    ["a range", { value: "45 - 46" }, "value"],
    ["two readings", { value: "1,234" }, "value"],
    ["a unit of another kind", { unit: "J/(mol K)" as const }, "unit"],
    ["no uncertainty where a kind is chosen", { uncertainty: "", kind: "standard" as const }, "uncertainty"],
    ["an uncertainty where none is chosen", { kind: "none" as const }, "uncertainty"],
    ["a negative uncertainty", { uncertainty: "-0.35" }, "uncertainty"],
    ["an uncertainty of zero", { uncertainty: "0.00" }, "uncertainty"],
  ])("%s is refused at its field", (_what, rest, field) => {
    const reading = read(rest);
    if (reading.outcome !== "wrong") throw new Error("it was read");
    expect(Object.keys(reading.errors)).toEqual([field]);
    expect(reading.errors[field as "value"]).toMatch(/\.$/);
  });

  test("fills the form with what the line says, so that sending it unchanged changes nothing", () => {
    const again = readWritten(writtenFrom(before, "enthalpyOfFormation"), "enthalpyOfFormation", before);
    expect(again).toMatchObject({ content: { digits: before.digits, uncertainty: before.uncertainty } });
  });

  test("is offered in the units of its kind, the table's own first", () => {
    expect(unitsFor("entropy")).toEqual(UNITS.filter((unit) => isLikeUnit(unit, "J/(mol K)")));
    expect(unitsFor("entropy")[0]).toBe("J/(mol K)");
    expect(unitsFor("enthalpyOfFormation")[0]).toBe("kJ/mol");
  });
});

describe("a suggestion taken", () => {
  test("changes the digits and says in its note what was repaired", () => {
    const taken = takeSuggestion(before, "-45.94", "digits-exchanged");
    expect(taken?.note).toBe("Two digits exchanged: −49.54 becomes −45.94.");
    expect(taken?.content).toEqual({ ...before, digits: "-45.94", given: { ...before.given, note: taken?.note } });
  });

  test("that is no number is not taken", () => {
    expect(takeSuggestion(before, "NH4(g)", "charge-wrong")).toBeNull();
  });
});
