import { readDigits, toNumber } from "#app/thermo/digits.ts";
import { bracketForm, plusMinusForm, showDigits } from "#app/thermo/notation.ts";
import type { Uncertainty } from "#app/thermo/uncertainty.ts";

/** A value in concise notation, and the same in words for titles and readers. */
export interface Concise {
  /** "−285.830(20)": the standard uncertainty in the last digits. */
  text: string;
  /** "(−285.830 ± 0.040), k = 2": what the source gave. */
  words: string;
}

/**
 * How a value is printed. Text that is not a number (a sheet's own cell) passes as it is, so that a page never fails over
 * what it shows.
 */
export function concise(value: string, uncertainty: Uncertainty | null): Concise {
  const read = readDigits(value);
  if (!read) return { text: value, words: value };
  const stated = plusMinusForm(read, uncertainty);
  const words =
    uncertainty === null || uncertainty.kind === "exact" ? stated : `${stated}; in brackets: the standard uncertainty`;
  return { text: bracketForm(read, uncertainty), words };
}

/** A difference or another bare number with its sign: "+0.36", "−3.60", "0.00". */
export function signed(value: string): string {
  const read = readDigits(value);
  if (!read) return value;
  return toNumber(read) > 0 ? `+${read}` : showDigits(read);
}
