import { places, readDigits, roundTo, toNumber, type Digits } from "#app/thermo/digits.ts";
import { standardUncertainty, type Uncertainty } from "#app/thermo/uncertainty.ts";

/** A value in concise notation, and the same in words for titles and readers. */
export interface Concise {
  /** "-285.830(20)", plain hyphen. */
  text: string;
  words: string;
}

/**
 * Concise notation: the standard uncertainty in the last digits, at most two significant digits of it, the value rounded
 * to the same place (GUM, JCGM 100:2008, 7.2.2 and 7.2.6).
 */
export function concise(value: string, uncertainty: Uncertainty | null): Concise {
  const read = readDigits(value);
  if (!read) return { text: value, words: value };
  const standard = standardUncertainty(uncertainty);
  const said = saidUncertainty(uncertainty);
  if (standard === null || standard === 0) return { text: read, words: `${spoken(read)}${said}` };
  // Two significant digits of the uncertainty; never more decimals than the value carries.
  const wanted = 1 - Math.floor(Math.log10(standard));
  const decimals = Math.max(0, Math.min(wanted, places(read)));
  const last = Math.max(1, Math.round(standard * 10 ** decimals));
  return { text: `${roundTo(read, decimals)}(${last})`, words: `${spoken(read)}${said}` };
}

function spoken(value: Digits): string {
  return value.replace("-", "−");
}

function saidUncertainty(uncertainty: Uncertainty | null): string {
  if (!uncertainty) return ", no uncertainty stated";
  if (uncertainty.kind === "exact") return ", exact by convention";
  const standard = standardUncertainty(uncertainty) ?? 0;
  const shown = String(Number(standard.toPrecision(2)));
  const stated =
    uncertainty.kind === "standard"
      ? ""
      : uncertainty.kind === "expanded"
        ? ` (stated: ± ${uncertainty.digits}, k = ${uncertainty.coverageFactor ?? "not said"})`
        : ` (stated: ± ${uncertainty.digits} of unsaid kind, taken as k = 2)`;
  return `, standard uncertainty ${shown}${stated}`;
}

/** The number of a value, for drawings only; never stored and never printed. */
export function drawn(value: string): number {
  const read = readDigits(value);
  return read ? toNumber(read) : Number.NaN;
}
