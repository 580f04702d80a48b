import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { type Digits, digits, multiply, negate, places, roundTo } from "#app/thermo/digits.ts";
import { printedValue, valueSlips } from "./slips.ts";

/** Printed energies: up to four digits before the point, one to three behind. */
const printed = fc
  .tuple(
    fc.boolean(),
    fc.integer({ min: 1, max: 9999 }),
    fc.integer({ min: 0, max: 999 }),
    fc.integer({ min: 1, max: 3 }),
  )
  .map(([negative, whole, behind, count]) => {
    const fraction = String(behind).padStart(3, "0").slice(0, count);
    return digits(`${negative ? "-" : ""}${whole}.${fraction}`);
  });

const energy = (number: Digits) => ({ property: "enthalpyOfFormation" as const, digits: number, given: null });
const undone = (number: Digits, code: string) =>
  valueSlips(energy(number), true)
    .filter((slip) => slip.code === code)
    .map((slip) => slip.becomes);

describe("Undoing one slip gives the number back", () => {
  it("when the sign was lost", () => {
    fc.assert(
      fc.property(printed, (number) => {
        expect(undone(negate(number), "sign-lost")).toContain(number);
      }),
    );
  });

  it("when two neighbouring digits were exchanged", () => {
    fc.assert(
      fc.property(printed, fc.nat(), (number, where) => {
        const at = Array.from(number).flatMap((character, index) => (/\d/.test(character) ? [index] : []));
        const first = at[where % (at.length - 1)] ?? 0;
        const second = at[(where % (at.length - 1)) + 1] ?? 0;
        const spoilt = Array.from(number);
        [spoilt[first], spoilt[second]] = [spoilt[second] ?? "", spoilt[first] ?? ""];
        const text = spoilt.join("");
        // People do not print a zero in front of other digits.
        fc.pre(text !== number && !/^-?0\d/.test(text));
        expect(undone(digits(text), "digits-exchanged")).toContain(number);
      }),
    );
  });

  it("when one digit was misread", () => {
    fc.assert(
      fc.property(printed, fc.nat(), fc.integer({ min: 1, max: 9 }), (number, where, digit) => {
        const at = Array.from(number).flatMap((character, index) => (/\d/.test(character) ? [index] : []));
        const index = at[where % at.length] ?? 0;
        fc.pre(number[index] !== String(digit));
        const spoilt = digits(number.slice(0, index) + String(digit) + number.slice(index + 1));
        expect(undone(spoilt, "digit-misread")).toContain(number);
      }),
    );
  });

  it("when the point was moved by one place", () => {
    fc.assert(
      fc.property(printed, (number) => {
        expect(undone(multiply(number, "0.1"), "decimal-moved")).toContain(number);
        expect(undone(roundTo(multiply(number, "10"), places(number) - 1), "decimal-moved")).toContain(number);
      }),
    );
  });

  it("when kilojoules were filed as joules and the reverse, with every digit", () => {
    fc.assert(
      fc.property(printed, (number) => {
        expect(undone(multiply(number, "0.001"), "thousandfold")).toContain(number);
      }),
    );
    expect(undone(digits("-285830"), "thousandth")).toEqual(["-285.830"]);
  });
});

describe("Slips of a printed number", () => {
  it("are undone in the unit the source used, on its own digits", () => {
    const value = {
      property: "enthalpyOfFormation" as const,
      digits: digits("-267.002"),
      given: { text: "−63,815", unit: "kcal/mol" as const },
    };
    expect(printedValue(value)).toEqual({ digits: "-63.815", unit: "kcal/mol" });
    expect(valueSlips(value, true)).toContainEqual({
      code: "digits-exchanged",
      becomes: "-285.830",
      given: { text: "-68.315", unit: "kcal/mol" },
    });
  });

  it("leave an entropy of a pure substance above zero", () => {
    const slips = valueSlips({ property: "entropy", digits: digits("-69.95"), given: null }, false);
    expect(slips.every(({ becomes }) => !becomes.startsWith("-"))).toBe(true);
  });

  it("are none for a zero", () => {
    expect(valueSlips(energy(digits("0.00")), true)).toEqual([]);
  });
});
