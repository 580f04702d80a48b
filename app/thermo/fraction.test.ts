import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { fractionToNumber, isOne, ONE, productOf, readFraction, spellFraction, sumOf, ZERO } from "./fraction.ts";

const anyFraction = fc
  .tuple(fc.integer({ min: 0, max: 9999 }), fc.integer({ min: 1, max: 999 }))
  .map(([numerator, denominator]) => readFraction(`${numerator}/${denominator}`) ?? ZERO);

describe("counts", () => {
  it.each([
    ["5", "5"],
    ["8/3", "8/3"],
    ["16/6", "8/3"],
    ["1/2", "0.5"],
    ["0.5", "0.5"],
    ["0.9470", "0.947"],
    ["2.0", "2"],
    ["4/2", "2"],
  ])("%s is spelled %s", (text, spelled) => {
    const value = readFraction(text);
    expect(value && spellFraction(value)).toBe(spelled);
  });

  it.each(["", "1/0", "-1", "1.", ".5", "1e3", "1/2/3", "9999999999"])("refuses %j", (text) => {
    expect(readFraction(text)).toBeUndefined();
  });

  it("are read back from their spelling", () => {
    fc.assert(
      fc.property(anyFraction, (value) => {
        fc.pre(/^\d{1,9}(?:\.\d{1,9})?$|\//.test(spellFraction(value)));
        expect(readFraction(spellFraction(value))).toEqual(value);
      }),
    );
  });

  it("add and multiply exactly: thirds of a water make whole ones", () => {
    const third = readFraction("1/3") ?? ZERO;
    expect(sumOf(sumOf(third, third), third)).toEqual(ONE);
    expect(isOne(productOf(third, readFraction("3") ?? ZERO))).toBe(true);
    expect(fractionToNumber(third)).toBe(1 / 3);
  });

  it("a · (b + c) = a·b + a·c", () => {
    fc.assert(
      fc.property(anyFraction, anyFraction, anyFraction, (a, b, c) => {
        expect(productOf(a, sumOf(b, c))).toEqual(sumOf(productOf(a, b), productOf(a, c)));
      }),
    );
  });
});
