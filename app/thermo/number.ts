import { type Digits, digits, places, readDigits } from "./digits.ts";
import { ambiguous, isTooLong, quote, read, type Reading, refused } from "./reading.ts";
import { markedText } from "./typography.ts";

/** A number as a cell holds it, with the uncertainty when it stands in the same cell. */
export interface ReadNumber {
  digits: Digits;
  /** `standard` in brackets, `12.3(4)`; `unstated` after a plus-minus sign, `12.3 ± 0.4`. In the unit of the number. */
  uncertainty?: { digits: Digits; kind: "standard" | "unstated" };
}

export interface NumberOptions {
  /** Set when the sheet is known to write `12,3` for twelve and three tenths. */
  decimalComma?: boolean;
}

/** Powers of ten beyond these are slips or attacks, never thermochemistry. */
const LARGEST_EXPONENT = 30;
const LONGEST_CELL = 80;

/** Cells that people fill in where there is no number. */
const ABSENT = /^(?:|[-–—]+|\.{2,}|…|n\.?\s?[ad]\.?|nan|none|null|\?+|#n\/a)$/i;

/**
 * Reads a number as a cell of a sheet holds it, and keeps every printed digit.
 *
 * Read: typographic minus signs, thousands set apart by spaces, apostrophes, commas or points, a decimal comma,
 * exponents (`1.2e-3`, `1.2×10^-3`), and an uncertainty in brackets or after ±. By the IUPAC and GUM habit brackets
 * carry the standard uncertainty in the last digits: `-285.830(20)` is −285.830 with u = 0.020.
 *
 * Two readings: `1,234` (a decimal comma or thousands), unless `decimalComma` settles it.
 * Refused: empty cells, ranges, bounds, numbers with a unit or a footnote mark (`205.15¹` is not 205.151), numbers
 * wholly in brackets.
 */
export function readNumber(text: string, options: NumberOptions = {}): Reading<ReadNumber> {
  if (isTooLong(text)) return refused(`${quote(text)} is too long for a number.`);
  const plain = markedText(text).trim();
  if (ABSENT.test(plain)) {
    return refused(plain === "" ? "The cell is empty." : `${quote(text.trim())} is not a number: no value is given.`);
  }
  if (plain.length > LONGEST_CELL) return refused(`${quote(plain)} is too long for a number.`);

  const parts = takeApart(plain);
  if (parts === undefined) return refused(whyNotANumber(plain, text.trim()));

  const value = readNumeral(parts.numeral, options);
  if (value.outcome === "refused") return refused(whyNotANumber(plain, text.trim()));
  if (Math.abs(parts.exponent) > LARGEST_EXPONENT) {
    return refused(
      `${quote(text.trim())} has an exponent beyond ±${LARGEST_EXPONENT}: no table value is that large or small.`,
    );
  }
  const spread = parts.spread === undefined ? undefined : readSpread(parts.spread, options);
  if (spread === null) return refused(`The uncertainty in ${quote(text.trim())} cannot be read.`);

  const build = (numeral: Digits): ReadNumber => {
    const result: ReadNumber = { digits: shift(numeral, parts.exponent) };
    if (spread !== undefined) {
      result.uncertainty = {
        digits: shift(spread.inLastPlaces ? shift(spread.digits, -places(numeral)) : spread.digits, parts.exponent),
        kind: spread.kind,
      };
    }
    return result;
  };
  if (value.outcome === "ambiguous") {
    return ambiguous(
      value.candidates.map(build),
      `${quote(text.trim())} can be read as ${value.candidates.map((one) => one.replace("-", "−")).join(" or as ")}. ` +
        "Say whether the sheet writes a comma or a point before the decimals.",
    );
  }
  const notes = [...value.notes];
  if (parts.exponent > places(value.value)) {
    notes.push(`${quote(text.trim())} written out has more digits than were given.`);
  }
  return read(build(value.value), notes);
}

interface NumberParts {
  numeral: string;
  exponent: number;
  spread?: { text: string; form: "brackets" | "plusMinus" };
}

const EXPONENT = String.raw`(?:\s*(?:e|\s[x×*·]\s?10\s?\^?|[x×*·]\s?10\s?\^?)\s?\{?([+-]?\d{1,4})\}?)?`;
const NUMERAL = String.raw`([+-]?\s?[\d][\d\s.,'’]*|[+-]?\s?[.,]\d+)`;
const IN_BRACKETS = new RegExp(String.raw`^${NUMERAL}(?:\s?\((\d[\d.,]*)\))?${EXPONENT}$`, "i");
const PLUS_MINUS = new RegExp(String.raw`^(\()?${NUMERAL}\s?(?:±|\+\/-|\+-)\s?([\d.,]+)(\))?${EXPONENT}$`, "i");

function takeApart(plain: string): NumberParts | undefined {
  const bracketed = IN_BRACKETS.exec(plain);
  if (bracketed !== null) {
    const parts: NumberParts = { numeral: (bracketed[1] ?? "").trim(), exponent: Number(bracketed[3] ?? "0") };
    if (bracketed[2] !== undefined) parts.spread = { text: bracketed[2], form: "brackets" };
    return parts;
  }
  const stated = PLUS_MINUS.exec(plain);
  if (stated === null || (stated[1] === undefined) !== (stated[4] === undefined)) return undefined;
  // "12.3 ± 0.4e-3" does not say whether the exponent belongs to both numbers.
  if (stated[5] !== undefined && stated[1] === undefined) return undefined;
  return {
    numeral: (stated[2] ?? "").trim(),
    exponent: Number(stated[5] ?? "0"),
    spread: { text: stated[3] ?? "", form: "plusMinus" },
  };
}

/** A numeral without exponent: sorts out what its points, commas, spaces and apostrophes do. */
function readNumeral(numeral: string, options: NumberOptions): Reading<Digits> {
  const sign = /^[+-]/.exec(numeral)?.[0] ?? "";
  const body = numeral.slice(sign.length).trim();
  const spaced = /^\d{1,3}(?:[\s'’]\d{3})+(?=$|[.,])/.exec(body)?.[0];
  const grouped = groupedDecimals(spaced === undefined ? body : spaced.replace(/\D/g, "") + body.slice(spaced.length));
  if (grouped === undefined || /[\s'’]/.test(grouped)) return refused("");

  const marks = grouped.replace(/\d/g, "");
  const asDecimalPoint = (text: string): Reading<Digits> => accept(sign + text);
  if (marks === "") return asDecimalPoint(grouped);
  if (marks === "." || marks === ",") {
    const decimalMark = options.decimalComma ? "," : ".";
    const thousands = /^[1-9]\d{0,2}[.,]\d{3}$/.test(grouped) && spaced === undefined;
    if (marks === decimalMark) return asDecimalPoint(grouped.replace(",", "."));
    if (thousands) {
      return bothReadings(sign + grouped.replace(marks, "."), sign + grouped.replace(marks, ""));
    }
    const reading = asDecimalPoint(grouped.replace(",", "."));
    if (reading.outcome !== "read") return reading;
    return read(reading.value, [
      marks === "," ? "The comma is read as a decimal comma." : "The point is read as a decimal point.",
    ]);
  }
  // Two kinds of mark: the last one is the decimal mark, and the other must set apart thousands.
  if (/^\d{1,3}(?:,\d{3})+(?:\.\d*)?$/.test(grouped)) return asDecimalPoint(grouped.replaceAll(",", ""));
  if (/^\d{1,3}(?:\.\d{3})+(?:,\d*)?$/.test(grouped)) {
    return asDecimalPoint(grouped.replaceAll(".", "").replace(",", "."));
  }
  return refused("");
}

/** `0.123 456` sets decimals apart in threes; returns the numeral without those spaces. */
function groupedDecimals(body: string): string | undefined {
  if (!/\s/.test(body)) return body;
  return /^\d*[.,]\d{3}(?:\s\d{3})*(?:\s\d{1,3})$/.test(body) ? body.replace(/\s/g, "") : undefined;
}

function accept(text: string): Reading<Digits> {
  const value = readDigits(text);
  return value === undefined ? refused("") : read(value);
}

function bothReadings(asDecimal: string, asThousands: string): Reading<Digits> {
  const candidates = [asDecimal, asThousands].map(readDigits).filter((one) => one !== undefined);
  return candidates.length === 2 ? ambiguous(candidates, "") : refused("");
}

interface Spread {
  digits: Digits;
  kind: "standard" | "unstated";
  inLastPlaces: boolean;
}

/** @returns null when the uncertainty is not a number */
function readSpread(spread: { text: string; form: "brackets" | "plusMinus" }, options: NumberOptions): Spread | null {
  const reading = readNumeral(spread.text, options);
  if (reading.outcome !== "read") return null;
  if (spread.form === "plusMinus") return { digits: reading.value, kind: "unstated", inLastPlaces: false };
  return { digits: reading.value, kind: "standard", inLastPlaces: places(reading.value) === 0 };
}

/** Moves the decimal point: exact, on the text, so that no digit is lost or made up behind the point. */
function shift(value: Digits, exponent: number): Digits {
  if (exponent === 0) return value;
  const sign = value.startsWith("-") ? "-" : "";
  const [whole = "", fraction = ""] = value.replace("-", "").split(".");
  const point = whole.length + exponent;
  const all = whole + fraction;
  if (point <= 0) return digits(`${sign}0.${"0".repeat(-point)}${all}`);
  if (point >= all.length) return digits(`${sign}${all}${"0".repeat(point - all.length)}`);
  return digits(`${sign}${all.slice(0, point)}.${all.slice(point)}`);
}

/** Says what kind of text stands where a number should. */
function whyNotANumber(plain: string, shown: string): string {
  if (/^[<>≤≥~≈]|^(?:ca|about|approx)\b/i.test(plain)) {
    return `${quote(shown)} is a bound or an estimate, not a value. Give one number, or leave the cell empty.`;
  }
  if (/^\(.*\)$/.test(plain)) {
    return `${quote(shown)} stands in brackets, which may mean an estimate or a negative number. Write the number plainly.`;
  }
  if (/^[+-]?[\d.,]+\s?(?:-|…|to)\s?[+-]?[\d.,]+$/i.test(plain)) {
    return `${quote(shown)} is a range. Give one number with its uncertainty, for example 12.3 ± 0.4.`;
  }
  if (/^[+-]?[\d.,\s]+(?:\^\{.*\}|[*†‡§#a-d]{1,3})$/i.test(plain)) {
    return `${quote(shown)} ends in a footnote mark. Put the note in the remarks and leave only the number here.`;
  }
  if (/^[+-]?[\d.,\s]+\s?(?:k?J|k?cal|e\.?u)/i.test(plain)) {
    return `${quote(shown)} holds a unit. Name the unit in the column head and leave only the number here.`;
  }
  return `${quote(shown)} is not a number.`;
}
