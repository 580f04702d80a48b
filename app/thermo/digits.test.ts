import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  absolute,
  add,
  compare,
  type Digits,
  digits,
  digitsOf,
  halfUnit,
  isZero,
  multiply,
  negate,
  padTo,
  places,
  readDigits,
  roundTo,
  scaleBy,
  subtract,
  toNumber,
} from "./digits.ts";

const anyDigits = fc
  .tuple(fc.boolean(), fc.bigInt({ min: 0n, max: 10n ** 24n }), fc.integer({ min: 0, max: 12 }))
  .map(([negative, amount, scale]) => {
    const text = amount.toString().padStart(scale + 1, "0");
    const point = text.length - scale;
    return digits(`${negative ? "-" : ""}${text.slice(0, point)}${scale > 0 ? `.${text.slice(point)}` : ""}`);
  });

describe("reading digits", () => {
  it.each([
    ["-285.830", "-285.830", "the last zero is a measured digit"],
    ["205.10", "205.10", "and is not 205.1"],
    ["+4.5", "4.5", "a plus sign says nothing"],
    ["007.50", "7.50", "leading zeros say nothing"],
    [".5", "0.5", "a digit before the point"],
    ["-.5", "-0.5", "also behind a sign"],
    ["280.", "280", "a closing point says that the units are known"],
    ["-0.00", "0.00", "there is no negative zero"],
    ["000", "0", "one zero is enough"],
  ])("%s is %s: %s", (text, expected) => {
    expect(readDigits(text)).toBe(expected);
  });

  it.each([
    "",
    "-",
    ".",
    "1e3",
    "1,5",
    "1 000",
    "−5",
    "0x10",
    "NaN",
    "Infinity",
    "1.2.3",
    "5\n",
    " 5",
    "٣",
    "1".repeat(101),
  ])("refuses %j", (text) => {
    expect(readDigits(text)).toBeUndefined();
  });

  it("throws for a literal that is not a numeral", () => {
    expect(() => digits("abc")).toThrow(RangeError);
  });

  it("spells digits so that they read as themselves", () => {
    fc.assert(fc.property(anyDigits, (value) => readDigits(value) === value));
  });
});

describe("laws of arithmetic", () => {
  const equal = (a: Digits, b: Digits): boolean => a === b;

  it("addition commutes: a + b = b + a", () => {
    fc.assert(fc.property(anyDigits, anyDigits, (a, b) => equal(add(a, b), add(b, a))));
  });
  it("addition associates: (a + b) + c = a + (b + c)", () => {
    fc.assert(fc.property(anyDigits, anyDigits, anyDigits, (a, b, c) => equal(add(add(a, b), c), add(a, add(b, c)))));
  });
  it("zero changes nothing: a + 0 = a", () => {
    fc.assert(fc.property(anyDigits, (a) => equal(add(a, digits("0")), a)));
  });
  it("subtraction undoes addition: (a + b) − b = a", () => {
    fc.assert(fc.property(anyDigits, anyDigits, (a, b) => compare(subtract(add(a, b), b), a) === 0));
  });
  it("a − b = a + (−b)", () => {
    fc.assert(fc.property(anyDigits, anyDigits, (a, b) => equal(subtract(a, b), add(a, negate(b)))));
  });
  it("multiplication commutes: a · b = b · a", () => {
    fc.assert(fc.property(anyDigits, anyDigits, (a, b) => equal(multiply(a, b), multiply(b, a))));
  });
  it("multiplication distributes: a · (b + c) = a·b + a·c", () => {
    fc.assert(
      fc.property(anyDigits, anyDigits, anyDigits, (a, b, c) =>
        equal(multiply(a, add(b, c)), add(multiply(a, b), multiply(a, c))),
      ),
    );
  });
  it("order agrees with the sign of the difference", () => {
    fc.assert(fc.property(anyDigits, anyDigits, (a, b) => compare(a, b) === compare(subtract(a, b), digits("0"))));
  });
  it("a + (−a) is zero with the digits of a", () => {
    fc.assert(fc.property(anyDigits, (a) => isZero(add(a, negate(a))) && places(add(a, negate(a))) === places(a)));
  });
  it("|a| is a or −a, and never negative", () => {
    fc.assert(
      fc.property(anyDigits, (a) => [a, negate(a)].includes(absolute(a)) && compare(absolute(a), digits("0")) >= 0),
    );
  });
});

describe("digits and places", () => {
  it("counts the digits behind the point", () => {
    expect([places(digits("205.10")), places(digits("-5")), places(digits("0.0001"))]).toEqual([2, 0, 4]);
  });

  it.each([
    ["2.5", 0, "2", "half goes to the even neighbour"],
    ["3.5", 0, "4", "which may lie above"],
    ["-2.5", 0, "-2", "on both sides of zero"],
    ["2.51", 0, "3", "more than half goes up"],
    ["-285.8295", 3, "-285.830", "a carried nine keeps its place"],
    ["-0.004", 2, "0.00", "no negative zero"],
    ["1.2", 3, "1.2", "rounding never adds digits"],
    ["1250", -2, "1200", "hundreds, half to even"],
    ["353.2", -1, "350", "tens"],
  ])("%s to place %i is %s: %s", (value, place, expected) => {
    expect(roundTo(digits(value), place)).toBe(expected);
  });

  it("rounding moves a number by at most half a unit of the new place", () => {
    fc.assert(
      fc.property(anyDigits, fc.integer({ min: 0, max: 12 }), (value, place) => {
        const rounded = roundTo(value, place);
        return compare(absolute(subtract(value, rounded)), halfUnit(rounded)) <= 0;
      }),
    );
  });

  it("half a unit of the last place", () => {
    expect([halfUnit(digits("-285.830")), halfUnit(digits("280")), halfUnit(digits("0.0"))]).toEqual([
      "0.0005",
      "0.5",
      "0.05",
    ]);
  });

  it("writes zeros only when asked to", () => {
    expect([padTo(digits("1.2"), 3), padTo(digits("1.234"), 2)]).toEqual(["1.200", "1.234"]);
  });

  it("gives a computed number the digits it deserves", () => {
    expect([digitsOf(-237.14032, 2), digitsOf(0.125, 2), digitsOf(-0.001, 2)]).toEqual(["-237.14", "0.12", "0.00"]);
    expect(() => digitsOf(Number.NaN, 2)).toThrow(RangeError);
  });

  it("becomes the nearest double", () => {
    expect(toNumber(digits("-285.830"))).toBe(-285.83);
  });
});

describe("the product with an exact ratio", () => {
  it.each([
    ["-68.315", 523n, 125n, 3, "-285.830", "4.184 is 523/125"],
    ["-285.830", 125n, 523n, 4, "-68.3150", "and back; digits are added where they are asked for"],
    ["1", 1n, 3n, 5, "0.33333", "a quotient without an end"],
    ["2.5", 1n, 1n, 0, "2", "half to even, down"],
    ["3.5", 1n, 1n, 0, "4", "half to even, up"],
    ["-0.4", 1n, 1n, 0, "0", "no negative zero"],
  ])("%s · %d/%d to %d places is %s: %s", (value, n, d, place, expected) => {
    expect(scaleBy(digits(value), { n, d }, place)).toBe(expected);
  });
});
