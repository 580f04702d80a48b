import { Decimal } from "decimal.js";

declare const digitsBrand: unique symbol;

/**
 * A decimal number as it was printed: `205.10` is not `205.1`, because the last digit says how well it is known.
 *
 * Canonical spelling: an optional `-`, no `+`, no leading zeros, no exponent, a digit on both sides of the point, and
 * no negative zero (`-0.00` is `0.00`). A `Digits` comes only out of this file, so holding one proves the spelling.
 * PostgreSQL's `numeric` keeps and returns the same text.
 */
export type Digits = string & { readonly [digitsBrand]: true };

/** Wide enough that no sum or product of table values is ever rounded by the library; only `roundTo` rounds. */
const Exact = Decimal.clone({ precision: 1000, rounding: Decimal.ROUND_HALF_EVEN, toExpNeg: -1000, toExpPos: 1000 });

const PLAIN_DECIMAL = /^([+-]?)(\d+)(?:\.(\d*))?$|^([+-]?)\.(\d+)$/;

/** Beyond this a numeral is a paste accident, not a measurement. */
const LONGEST_NUMERAL = 100;

/**
 * Reads a plain decimal numeral (`-285.830`, `+4`, `.5`, `280.`) and keeps every digit behind the point.
 * Exponents, spaces, typographic signs and uncertainties belong to `readNumber`.
 *
 * @returns undefined when the text is not a plain decimal numeral of at most 100 characters
 */
export function readDigits(text: string): Digits | undefined {
  if (text.length > LONGEST_NUMERAL) return undefined;
  const match = PLAIN_DECIMAL.exec(text);
  if (match === null) return undefined;
  return canonical((match[1] ?? match[4]) === "-", match[2] ?? "0", match[3] ?? match[5] ?? "");
}

/**
 * The same for numbers written in our own source text.
 *
 * @throws RangeError when the literal is not a plain decimal numeral
 */
export function digits(text: string): Digits {
  const value = readDigits(text);
  if (value === undefined) throw new RangeError(`${JSON.stringify(text)} is not a plain decimal numeral`);
  return value;
}

/**
 * The digits of a computed number at a stated place (half-even).
 *
 * @throws RangeError for NaN and infinities
 */
export function digitsOf(value: number, places: number): Digits {
  if (!Number.isFinite(value)) throw new RangeError(`${value} has no digits`);
  return spell(new Exact(value).toDecimalPlaces(places, Decimal.ROUND_HALF_EVEN), places);
}

/** How many digits stand behind the point. */
export function places(value: Digits): number {
  const point = value.indexOf(".");
  return point === -1 ? 0 : value.length - point - 1;
}

/** The nearest binary double, for arithmetic whose answer is a number and not a table value. */
export function toNumber(value: Digits): number {
  return Number(value);
}

/**
 * Rounds half to even at a decimal place; the one rounding rule of the program.
 * A negative place rounds to tens, hundreds … Rounding never adds digits: `1.2` to three places stays `1.2`.
 */
export function roundTo(value: Digits, place: number): Digits {
  if (place >= places(value)) return value;
  const exact = new Exact(value);
  if (place >= 0) return spell(exact.toDecimalPlaces(place, Decimal.ROUND_HALF_EVEN), place);
  const step = new Exact(10).pow(-place);
  return spell(exact.div(step).toDecimalPlaces(0, Decimal.ROUND_HALF_EVEN).times(step), 0);
}

/** Writes zeros up to a place: only for lining figures up, since it claims digits that nobody measured. */
export function padTo(value: Digits, place: number): Digits {
  return place <= places(value) ? value : spell(new Exact(value), place);
}

/** a + b, exact, with the digits of the longer of the two. */
export function add(a: Digits, b: Digits): Digits {
  return spell(new Exact(a).plus(b), Math.max(places(a), places(b)));
}

/** a − b, exact, with the digits of the longer of the two. */
export function subtract(a: Digits, b: Digits): Digits {
  return spell(new Exact(a).minus(b), Math.max(places(a), places(b)));
}

/** The exact product with a plain decimal factor; it has the digits of both.
 * @throws RangeError when the factor is not a plain decimal numeral */
export function multiply(value: Digits, factor: string): Digits {
  const exactFactor = digits(factor);
  return spell(new Exact(value).times(exactFactor), places(value) + places(exactFactor));
}

/**
 * The product with an exact ratio n/d, rounded half to even at a place that is not below zero. Here digits may be added:
 * the ratio is exact, so how many stand behind the point is the caller's to say. Whole numbers all the way, since a
 * quotient need not end.
 */
export function scaleBy(value: Digits, ratio: { readonly n: bigint; readonly d: bigint }, place: number): Digits {
  const negative = value.startsWith("-");
  const above = BigInt(value.replace(/[-.]/g, "")) * ratio.n * 10n ** BigInt(place);
  const below = ratio.d * 10n ** BigInt(places(value));
  const whole = above / below;
  const rest = (above % below) * 2n;
  const up = rest > below || (rest === below && whole % 2n === 1n);
  const figures = (up ? whole + 1n : whole).toString().padStart(place + 1, "0");
  return canonical(negative, figures.slice(0, figures.length - place), place === 0 ? "" : figures.slice(-place));
}

/** −a. */
export function negate(value: Digits): Digits {
  return spell(new Exact(value).negated(), places(value));
}

/** |a|. */
export function absolute(value: Digits): Digits {
  return spell(new Exact(value).abs(), places(value));
}

/** Orders by size; `205.10` and `205.1` are equal in size though not in digits. */
export function compare(a: Digits, b: Digits): -1 | 0 | 1 {
  const order = new Exact(a).comparedTo(b);
  return order < 0 ? -1 : order > 0 ? 1 : 0;
}

/** Whether every digit is a zero. */
export function isZero(value: Digits): boolean {
  return new Exact(value).isZero();
}

/** Half a unit of the last printed place: how far the printed number may be from the one that was rounded. */
export function halfUnit(value: Digits): Digits {
  return canonical(false, "0", `${"0".repeat(places(value))}5`);
}

function spell(value: Decimal, count: number): Digits {
  const text = value.abs().toFixed(count);
  const [whole = "0", fraction = ""] = text.split(".");
  return canonical(value.isNegative(), whole, fraction);
}

function canonical(negative: boolean, whole: string, fraction: string): Digits {
  const trimmed = whole.replace(/^0+(?=\d)/, "");
  const text = fraction === "" ? trimmed : `${trimmed}.${fraction}`;
  const zero = !/[1-9]/.test(text);
  return (negative && !zero ? `-${text}` : text) as Digits;
}
