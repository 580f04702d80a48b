import { Fraction } from "fraction.js";

/**
 * Exact ratios, by the `fraction.js` package: counts of atoms (`CdSO4·8/3H2O`, `Fe0.947O`) and factors between units.
 * Two spellings of one formula must compare equal and a conversion must come back, which binary fractions cannot promise.
 */
export { Fraction };

export const ZERO = new Fraction(0);
export const ONE = new Fraction(1);

/** Reads a count as formulas print it: `5`, `0.947` or `8/3`; undefined for anything else and for a zero denominator. */
export function readFraction(text: string): Fraction | undefined {
  if (!/^\d{1,9}(?:\.\d{1,9}|\/0*[1-9]\d{0,8})?$/.test(text)) return undefined;
  return new Fraction(text);
}

/** a + b. */
export function sumOf(a: Fraction, b: Fraction): Fraction {
  return a.add(b);
}

/** a · b. */
export function productOf(a: Fraction, b: Fraction): Fraction {
  return a.mul(b);
}

export function isOne(value: Fraction): boolean {
  return value.equals(ONE);
}

export function isNone(value: Fraction): boolean {
  return value.equals(ZERO);
}

/** The nearest binary double. */
export function fractionToNumber(value: Fraction): number {
  return value.valueOf();
}

/** One spelling for each number: `5`, `0.947`; `8/3` where the decimals would not end. */
export function spellFraction(value: Fraction): string {
  return decimalOf(value) ?? value.toFraction();
}

/** The number in decimals, or undefined where they never end (a prime factor other than 2 and 5 below the bar). */
export function decimalOf(value: Fraction): string | undefined {
  let rest = value.d;
  let twos = 0;
  let fives = 0;
  for (; rest % 2n === 0n; rest /= 2n) twos += 1;
  for (; rest % 5n === 0n; rest /= 5n) fives += 1;
  return rest === 1n ? value.toString(Math.max(twos, fives, 1)) : undefined;
}
