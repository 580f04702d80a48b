import type { Digits } from "#app/thermo/digits.ts";
import { showDigits, showNumber } from "#app/thermo/notation.ts";
import { type Property, propertyInfo } from "#app/thermo/property.ts";
import { expandedUncertainty } from "#app/thermo/uncertainty.ts";
import type { ViewedValue } from "./types.ts";

/*
 * How numbers and names read in the sentences of findings: plain text, a true minus sign, a space before the unit.
 */

/** A computed number with its sign, as differences and residuals are printed: `+3.60`. */
export function shownSigned(value: number, decimals: number): string {
  const text = showNumber(value, decimals);
  return text.startsWith("−") || !/[1-9]/.test(text) ? text : `+${text}`;
}

/** In brackets when negative, as a factor or a term is written: `0.45`, `(−0.45)`. */
export function shownTerm(text: string): string {
  return text.startsWith("−") ? `(${text})` : text;
}

/** `ΔfH°`. */
export function symbolOf(property: Property): string {
  return propertyInfo[property].symbol;
}

/** `kJ/mol` or `J/(mol K)`. */
export function unitOf(property: Property): string {
  return propertyInfo[property].unit;
}

/** `−285.830 kJ/mol`. */
export function shownValue(value: Pick<ViewedValue, "digits" | "property">): string {
  return `${showDigits(value.digits)} ${unitOf(value.property)}`;
}

/** `−45.94 ± 0.35` with the expanded uncertainty (k = 2); the number alone where none is stated or it is zero. */
export function shownWithUncertainty(value: Pick<ViewedValue, "digits" | "uncertainty">): string {
  const expanded = expandedUncertainty(value.uncertainty);
  if (expanded === null || expanded === 0 || value.uncertainty === null) return showDigits(value.digits);
  // The source's own digits where they are the expanded ones already, so that 0.040 keeps its last zero.
  const ownIsExpanded =
    value.uncertainty.kind === "unstated" ||
    (value.uncertainty.kind === "expanded" && (value.uncertainty.coverageFactor ?? 2) === 2);
  return `${showDigits(value.digits)} ± ${ownIsExpanded ? value.uncertainty.digits : trimmed(expanded)}`;
}

/** Enough digits to say a number, no tail: 0.4000000001 is 0.4. */
export function trimmed(value: number): string {
  const place = Math.max(0, 3 - Math.floor(Math.log10(Math.abs(value) || 1)));
  return showNumber(value, place)
    .replace(/(\.\d*?)0+$/, "$1")
    .replace(/\.$/, "");
}

/** `ΔfH°, S° and ΔfG°`. */
export function listed(words: readonly string[], last = "and"): string {
  if (words.length <= 1) return words.join("");
  return `${words.slice(0, -1).join(", ")} ${last} ${words.at(-1) ?? ""}`;
}

/** Digits from the first that is not zero: 3 for `0.0699`, 6 for `285.830`. */
export function significantDigits(value: Digits): number {
  return value.replace(/[-.]/g, "").replace(/^0+/, "").length;
}
