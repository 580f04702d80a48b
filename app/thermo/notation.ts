import { absolute, type Digits, digitsOf, isZero, places, roundTo, toNumber } from "./digits.ts";
import { isAssumed, standardUncertainty, type Uncertainty } from "./uncertainty.ts";

/** Numbers as they are printed for people: plain text, with the true minus sign. */

const MINUS = "−";

/** The digits with a true minus: `-285.830` is printed −285.830. */
export function showDigits(value: Digits): string {
  return value.replace("-", MINUS);
}

/** A computed number to a fixed place: −237.14. Rounds half-even; NaN and infinities have no place in a sentence. */
export function showNumber(value: number, place: number): string {
  return showDigits(digitsOf(value, place));
}

/** A number to be added to what stands before it: `+ 0.05`, `− 65.34`. */
export function showTerm(value: number, place: number): string {
  const shown = digitsOf(value, place);
  return `${shown.startsWith("-") ? MINUS : "+"} ${absolute(shown)}`;
}

/**
 * A value with its standard uncertainty in brackets, in units of the last digit: −285.830(20).
 *
 * The uncertainty keeps at most two significant digits and the value is rounded to the same place; neither gets digits
 * that were not measured. An expanded uncertainty is divided by its k first (one of unstated kind by 2, which the page
 * marks as assumed). An exact value, and one without an uncertainty, are printed bare. An uncertainty too small to show
 * at the value's last place is written out: `253.4, u = 0.002`.
 */
export function bracketForm(value: Digits, uncertainty: Uncertainty | null): string {
  const standard = standardUncertainty(uncertainty);
  if (uncertainty === null || standard === null || uncertainty.kind === "exact" || standard === 0) {
    return showDigits(value);
  }
  const place = Math.min(places(value), placeOfSecondDigit(standard));
  const shownUncertainty = roundTo(digitsOf(standard, 20), place);
  if (isZero(shownUncertainty)) return `${showDigits(value)}, u = ${shortest(standard)}`;
  const inLastDigits = shownUncertainty.replace(".", "").replace(/^0+(?=\d)/, "");
  return `${showDigits(roundTo(value, place))}(${inLastDigits})`;
}

/**
 * A value with its uncertainty as the source gave it: `(−285.830 ± 0.040), k = 2`. Says so when no k was stated.
 */
export function plusMinusForm(value: Digits, uncertainty: Uncertainty | null): string {
  if (uncertainty === null) return `${showDigits(value)}, no uncertainty stated`;
  if (uncertainty.kind === "exact") return `${showDigits(value)}, exact`;
  const factor = uncertainty.kind === "standard" ? 1 : uncertainty.coverageFactor;
  const kind = isAssumed(uncertainty) ? "k not stated, 2 assumed" : `k = ${factor}`;
  return `(${showDigits(value)} ± ${uncertainty.digits}), ${kind}`;
}

/** The decimal place of the second significant digit: 3 for 0.020, 0 for 25, −1 for 150. */
function placeOfSecondDigit(size: number): number {
  const place = 1 - Math.floor(Math.log10(size));
  // 0.0996 has its second digit at the third place, but is printed 0.10.
  return toNumber(digitsOf(size, Math.max(0, place))) >= 10 ** (2 - place) ? place - 1 : place;
}

function shortest(size: number): string {
  return digitsOf(size, Math.max(0, placeOfSecondDigit(size))).replace(/0+$/, "");
}
