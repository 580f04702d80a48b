import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { digits, digitsOf, places } from "./digits.ts";
import { bracketForm, plusMinusForm, showDigits } from "./notation.ts";
import { type NumberOptions, readNumber, spellNumber } from "./number.ts";

describe("numbers that are read", () => {
  it.each([
    ["-285.830", "-285.830", "as printed"],
    ["−285.830", "-285.830", "a typographic minus"],
    ["–285.830", "-285.830", "an en dash where a minus is meant"],
    [" 69.95 ", "69.95", "spaces around it"],
    ["+4.5", "4.5", "a plus sign"],
    ["- 4.5", "-4.5", "a space behind the sign"],
    ["−1\u2009675.7", "-1675.7", "a thin space between thousands"],
    ["1 675.7", "1675.7", "a plain space between thousands"],
    ["1'675.7", "1675.7", "an apostrophe between thousands"],
    ["1,675.7", "1675.7", "a comma between thousands, since the point is the decimal mark"],
    ["1.675,7", "1675.7", "the other way round"],
    ["12,34", "12.34", "only a decimal comma can stand before two digits"],
    ["0,123", "0.123", "nobody writes thousands after a zero"],
    ["0.123 456", "0.123456", "decimals set apart in threes"],
    ["280.", "280", "a closing point"],
    [".5", "0.5", "no digit before the point"],
    ["1.20e2", "120", "an exponent"],
    ["1.2E-03", "0.0012", "a spreadsheet's exponent"],
    ["1.2×10−3", "0.0012", "an exponent written out"],
    ["1.2 x 10^-3", "0.0012", "with a letter x"],
    ["1.2 × 10<sup>3</sup>", "1200", "with markup"],
    ["1.2×10⁻³", "0.0012", "with raised characters"],
    ["１２．５", "12.5", "full-width digits"],
  ])("%s is %s: %s", (text, expected) => {
    expect(readNumber(text)).toMatchObject({ outcome: "read", value: { digits: expected } });
  });

  it("takes the comma as the sheet writes it", () => {
    expect(readNumber("-285,830", { decimalComma: true })).toMatchObject({ value: { digits: "-285.830" } });
    expect(readNumber("1.675,7", { decimalComma: true })).toMatchObject({ value: { digits: "1675.7" } });
    expect(readNumber("12.34", { decimalComma: true })).toMatchObject({ outcome: "read", value: { digits: "12.34" } });
  });

  it.each([
    ["12.3(4)", "12.3", "0.4"],
    ["-285.830(20)", "-285.830", "0.020"],
    ["0.9(12)", "0.9", "1.2"],
    ["1234(56)", "1234", "56"],
    ["0.92(1.25)", "0.92", "1.25"],
    ["1.23(4)e2", "123", "4"],
    ["1.23(4) × 10^-2", "0.0123", "0.0004"],
  ])("%s is %s with standard uncertainty %s", (text, value, uncertainty) => {
    expect(readNumber(text)).toMatchObject({
      outcome: "read",
      value: { digits: value, uncertainty: { digits: uncertainty, kind: "standard" } },
    });
  });

  it.each([
    ["12.3 ± 0.4", "12.3", "0.4"],
    ["-12.3+/-0.40", "-12.3", "0.40"],
    ["(12.3 ± 0.4)", "12.3", "0.4"],
    ["(1.23 ± 0.04)e2", "123", "4"],
  ])("%s is %s with ± %s of a kind nobody stated", (text, value, uncertainty) => {
    expect(readNumber(text)).toMatchObject({
      outcome: "read",
      value: { digits: value, uncertainty: { digits: uncertainty, kind: "unstated" } },
    });
  });

  it("says when an exponent makes up digits", () => {
    expect(readNumber("1.2e3")).toMatchObject({ notes: [expect.stringContaining("more digits than were given")] });
  });

  it("reads every printed decimal as itself", () => {
    const printed = fc.tuple(fc.constantFrom("", "-"), fc.nat(99_999), fc.integer({ min: 0, max: 6 }), fc.nat(999_999));
    fc.assert(
      fc.property(printed, ([sign, whole, scale, fraction]) => {
        const text = `${sign}${whole}${scale === 0 ? "" : `.${String(fraction).padStart(6, "0").slice(0, scale)}`}`;
        const reading = readNumber(text);
        return reading.outcome === "read" && reading.value.digits === text.replace(/^-(?=[0.]*$)/, "");
      }),
    );
  });
});

describe("what the table prints is read back", () => {
  const value = fc
    .tuple(fc.constantFrom("", "-"), fc.nat(9_999), fc.integer({ min: 0, max: 5 }), fc.nat(99_999))
    .map(([sign, whole, scale, fraction]) =>
      digits(`${sign}${whole}${scale === 0 ? "" : `.${String(fraction).padStart(5, "0").slice(0, scale)}`}`),
    );
  const uncertainty = fc
    .tuple(fc.integer({ min: 1, max: 99 }), fc.integer({ min: 0, max: 5 }))
    .map(([size, scale]) => digitsOf(size / 10 ** scale, scale));

  it("a number with a typographic minus keeps its digits", () => {
    fc.assert(
      fc.property(value, (one) => {
        expect(readNumber(showDigits(one))).toMatchObject({ value: { digits: one } });
      }),
    );
  });

  it("the bracket form has the standard uncertainty and the digits it prints", () => {
    fc.assert(
      fc.property(value, uncertainty, (one, spread) => {
        const printed = bracketForm(one, { digits: spread, kind: "standard", coverageFactor: null });
        const reading = readNumber(printed);
        expect(reading).toMatchObject({ outcome: "read", value: { uncertainty: { kind: "standard" } } });
        const shown = reading.outcome === "read" ? reading.value : undefined;
        expect(Math.abs(Number(shown?.digits) - Number(one))).toBeLessThanOrEqual(Number(spread));
        // Brackets hold at most two digits, rounded to the value's own last place.
        const rounding = Math.max(0.05 * Number(spread), 0.5 * 10 ** -places(one)) * (1 + 1e-9);
        expect(Math.abs(Number(shown?.uncertainty?.digits) - Number(spread))).toBeLessThanOrEqual(rounding);
      }),
    );
  });

  it("the form with ± has value, uncertainty and kind as they were", () => {
    const kinds = fc.constantFrom(["standard", null], ["expanded", 2], ["unstated", null]) as fc.Arbitrary<
      ["standard" | "expanded" | "unstated", number | null]
    >;
    fc.assert(
      fc.property(value, uncertainty, kinds, (one, spread, [kind, coverageFactor]) => {
        const printed = plusMinusForm(one, { digits: spread, kind, coverageFactor });
        expect(readNumber(printed)).toMatchObject({ value: { digits: one, uncertainty: { digits: spread, kind } } });
        const spelled = { digits: one, uncertainty: { digits: spread, kind } };
        expect(readNumber(spellNumber(spelled))).toMatchObject({ outcome: "read", value: spelled });
      }),
    );
  });
});

describe("numbers with two readings", () => {
  it.each<[text: string, options: NumberOptions, expected: string[], reason: string]>([
    ["-285,830", {}, ["-285.830", "-285830"], "a decimal comma or thousands"],
    ["1.675", { decimalComma: true }, ["1.675", "1675"], "in a sheet that writes decimal commas"],
  ])("%s: %s", (text, options, expected) => {
    const reading = readNumber(text, options);
    expect(reading).toMatchObject({ outcome: "ambiguous", sentence: expect.stringContaining("comma or a point") });
    expect(reading.outcome === "ambiguous" && reading.candidates.map((one) => one.digits)).toEqual(expected);
  });
});

describe("cells that are refused", () => {
  it.each([
    ["", "empty"],
    ["   ", "empty"],
    ["-", "no value is given"],
    ["n/a", "is not a number"],
    ["NaN", "no value is given"],
    ["12–13", "range"],
    ["12.1 to 12.4", "range"],
    ["<0.5", "bound or an estimate"],
    ["~12", "bound or an estimate"],
    ["2½", "is a fraction"],
    ["12₃", "is not a number"],
    ["-285.83 kJ/mol", "holds a unit"],
    ["12..3", "is not a number"],
    ["1,23,4", "is not a number"],
    ["12.3 ± 0.4e-3", "uncertainty that cannot be read"],
    ["1e999999", "is not a number"],
    ["1e99", "exponent beyond"],
    ["Infinity", "is not a number"],
    ["0x1F", "is not a number"],
    ["twelve", "is not a number"],
    ["12 3", "is not a number"],
    ["=1+1", "is not a number"],
    ["9".repeat(90), "too long"],
  ])("%j: %s", (text, sentence) => {
    expect(readNumber(text)).toMatchObject({ outcome: "refused", sentence: expect.stringContaining(sentence) });
  });

  it("never throws, whatever is typed", () => {
    fc.assert(
      fc.property(fc.string({ unit: "binary", maxLength: 60 }), (text) =>
        ["read", "ambiguous", "refused"].includes(readNumber(text).outcome),
      ),
    );
  });
});
