/**
 * An exact count of atoms. Formulas need thirds (`CdSO4·8/3H2O`) and decimals (`Fe0.947O`); two spellings of one
 * formula must compare equal, which binary fractions cannot promise.
 */
export interface Fraction {
  readonly numerator: bigint;
  /** Positive, and without a common factor with the numerator. */
  readonly denominator: bigint;
}

export const ZERO: Fraction = { numerator: 0n, denominator: 1n };
export const ONE: Fraction = { numerator: 1n, denominator: 1n };

/** Reads `5`, `0.947` or `8/3`; undefined for anything else and for a zero denominator. */
export function readFraction(text: string): Fraction | undefined {
  const ratio = /^(\d{1,9})\/(\d{1,9})$/.exec(text);
  if (ratio !== null) {
    const denominator = BigInt(ratio[2] ?? "1");
    return denominator === 0n ? undefined : reduce(BigInt(ratio[1] ?? "0"), denominator);
  }
  const decimal = /^(\d{1,9})(?:\.(\d{1,9}))?$/.exec(text);
  if (decimal === null) return undefined;
  const behindPoint = decimal[2] ?? "";
  return reduce(BigInt((decimal[1] ?? "") + behindPoint), 10n ** BigInt(behindPoint.length));
}

/** a + b. */
export function sumOf(a: Fraction, b: Fraction): Fraction {
  return reduce(a.numerator * b.denominator + b.numerator * a.denominator, a.denominator * b.denominator);
}

/** a · b. */
export function productOf(a: Fraction, b: Fraction): Fraction {
  return reduce(a.numerator * b.numerator, a.denominator * b.denominator);
}

export function isOne(value: Fraction): boolean {
  return value.numerator === value.denominator;
}

/** The nearest binary double. */
export function fractionToNumber(value: Fraction): number {
  return Number(value.numerator) / Number(value.denominator);
}

/** One spelling for each number: `5`, `0.947`; `8/3` where the decimals would not end. */
export function spellFraction(value: Fraction): string {
  const { numerator, denominator } = value;
  if (denominator === 1n) return numerator.toString();
  const scale = decimalPlaces(denominator);
  if (scale === undefined) return `${numerator}/${denominator}`;
  const digits = ((numerator * 10n ** BigInt(scale)) / denominator).toString().padStart(scale + 1, "0");
  return `${digits.slice(0, -scale)}.${digits.slice(-scale)}`;
}

/** How many decimals 1/denominator has; undefined when they never end (a prime factor other than 2 and 5). */
function decimalPlaces(denominator: bigint): number | undefined {
  let rest = denominator;
  let twos = 0;
  let fives = 0;
  for (; rest % 2n === 0n; rest /= 2n) twos += 1;
  for (; rest % 5n === 0n; rest /= 5n) fives += 1;
  return rest === 1n ? Math.max(twos, fives) : undefined;
}

function reduce(numerator: bigint, denominator: bigint): Fraction {
  let a = numerator;
  let b = denominator;
  while (b !== 0n) [a, b] = [b, a % b];
  return { numerator: numerator / a, denominator: denominator / a };
}
