import { type Digits, digits, isZero, negate, places, readDigits } from "./digits.ts";
import { ambiguous, isTooLong, quote, read, type Reading, refused } from "./reading.ts";
import { markedText } from "./typography.ts";

/** A number as a cell holds it, with the uncertainty when it stands in the same cell. */
export interface ReadNumber {
  digits: Digits;
  /**
   * In the unit of the number: `standard` in brackets, `12.3(4)`, or with k = 1 said; `expanded` with k = 2, 2σ or 95 %
   * said; `unstated` after a bare plus-minus sign, `12.3 ± 0.4`.
   */
  uncertainty?: { digits: Digits; kind: "standard" | "expanded" | "unstated" };
}

export interface NumberOptions {
  /** Set when the sheet is known to write `12,3` for twelve and three tenths. */
  decimalComma?: boolean;
}

/** Powers of ten beyond these are slips or attacks, never thermochemistry. */
const LARGEST_EXPONENT = 30;
const LONGEST_CELL = 80;

/** Cells that people fill in where there is no number. */
const ABSENT =
  /^(?:|[-–—]+|\.{2,}|…|n\.?\s?[adr]\.?|n\/[ad]|nan|nil|none|null|tbd|missing|unknown|not (?:available|known|determined)|\?+|#n\/a)$/i;

/**
 * Reads a number as a cell of a sheet holds it, and keeps every printed digit.
 *
 * Read: typographic minus signs, thousands set apart by spaces, apostrophes, commas or points, a decimal comma or a
 * raised point, exponents (`1.2e-3`, `1.2×10^-3`, `1.2D-03`), and an uncertainty in brackets or after ±. By the IUPAC and
 * GUM habit brackets carry the standard uncertainty in the last digits: `-285.830(20)` is −285.830 with u = 0.020.
 * A footnote mark is taken off where it can be nothing else (`205.152*`, `205.152 a`), and the note says so.
 *
 * Two readings: `1,234` (a decimal comma or thousands) unless `decimalComma` settles it, `205.15¹` (a mark or a digit),
 * `(12.3)` (an estimate or a negative number), a soft hyphen in front (a minus sign or nothing).
 * Refused: empty cells, ranges, bounds, estimates, numbers with a unit (see `readQuantity`), dates.
 */
export function readNumber(text: string, options: NumberOptions = {}): Reading<ReadNumber> {
  if (isTooLong(text)) return refused(`${quote(text)} is too long for a number.`);
  const shown = text.trim();
  const plain = markedText(text)
    .trim()
    .replace(/^\^\{([+-])\}/, "$1");
  if (ABSENT.test(plain)) {
    return refused(plain === "" ? "The cell is empty." : `${quote(shown)} is not a number: no value is given.`);
  }
  if (plain.length > LONGEST_CELL) return refused(`${quote(plain)} is too long for a number.`);

  const flattened = /^([+-]?\s?\d+)·(10)(\d{1,2})$/.exec(plain);
  if (flattened !== null) {
    const [, whole = "", ten = "", power = ""] = flattened;
    const readings = [`${whole}.${ten}${power}`, `${whole}e${power}`].map((one) => readBare(one, one, options));
    return ambiguous(
      readings.flatMap((reading) => (reading.outcome === "read" ? [reading.value] : [])),
      `${quote(shown)} may have a raised point before its decimals or stand for a power of ten. ` +
        `Write ${whole}.${ten}${power} or ${whole}e${power}.`,
    );
  }
  const asItStands = readBare(plain, shown, options);
  if (/^(?:\u00ad|&shy;)/i.test(shown) && asItStands.outcome === "read" && !asItStands.value.digits.startsWith("-")) {
    return ambiguous(
      [negative(asItStands.value), asItStands.value],
      `${quote(plain)} begins with a soft hyphen, which may have been a minus sign. Write −${plain} or ${plain}.`,
    );
  }
  if (asItStands.outcome !== "refused") return asItStands;
  return readMarked(plain, shown, options) ?? refused(whyNotANumber(plain, shown));
}

/** The plain spelling that `readNumber` reads as just this: `-285.830(20)`, `12.3 ± 0.4`, `12.3 ± 0.4 (k = 2)`. */
export function spellNumber({ digits: value, uncertainty }: ReadNumber): string {
  if (uncertainty === undefined) return value;
  if (uncertainty.kind === "standard" && places(uncertainty.digits) === places(value)) {
    return `${value}(${uncertainty.digits.replace(".", "").replace(/^0+(?=\d)/, "")})`;
  }
  const said = { standard: " (k = 1)", expanded: " (k = 2)", unstated: "" }[uncertainty.kind];
  return `${value} ± ${uncertainty.digits}${said}`;
}

/** A number without footnote marks; refused without a reason where it is none. */
function readBare(plain: string, shown: string, options: NumberOptions): Reading<ReadNumber> {
  const parts = takeApart(plain);
  if (parts === undefined) return refused("");
  const value = readNumeral(parts.numeral, options);
  if (value.outcome === "refused") return refused("");
  if (Math.abs(parts.exponent) > LARGEST_EXPONENT) return refused("");
  const spread = parts.spread === undefined ? undefined : readSpread(parts.spread, options);
  if (spread === null) return refused("");

  const build = (numeral: Digits): ReadNumber => {
    const result: ReadNumber = { digits: shift(numeral, parts.exponent) };
    if (spread !== undefined) {
      result.uncertainty = {
        digits: shift(spread.inLastPlaces ? shift(spread.digits, -places(numeral)) : spread.digits, spread.exponent),
        kind: spread.kind,
      };
    }
    return result;
  };
  if (value.outcome === "ambiguous") {
    return ambiguous(
      value.candidates.map(build),
      `${quote(shown)} can be read as ${value.candidates.map((one) => one.replace("-", "−")).join(" or as ")}. ` +
        "Say whether the sheet writes a comma or a point before the decimals.",
    );
  }
  const notes = [...value.notes, ...parts.notes];
  if (parts.exponent > places(value.value)) {
    notes.push(`${quote(shown)} written out has more digits than were given.`);
  }
  return read(build(value.value), notes);
}

const MARK_SIGNS = "[*†‡§¶‖#]{1,3}";
/** Letters that people use as marks; e may be a cut exponent, g, h, k and l a unit or a phase. */
const MARK_LETTERS = "[a-df](?:\\s?,\\s?[a-f])*";
const TRAILING_MARK = new RegExp(
  String.raw`^(.*[\d.)])\s?(?:\^\{\s*([*†‡§¶‖#]{1,3}|\(?[a-z](?:\s?,\s?[a-z]){0,2}\)?)\s*\}|\^?(${MARK_SIGNS}|${MARK_LETTERS})\)?|[([](${MARK_SIGNS}|${MARK_LETTERS}|e)[)\]])$`,
);
const LEADING_MARK = /^([*†‡§¶‖]{1,3})\s*(?=[+-]?\s?[\d.,])/;

/** A number that something is written around: a footnote mark, brackets. Undefined where the rest is no number either. */
function readMarked(plain: string, shown: string, options: NumberOptions): Reading<ReadNumber> | undefined {
  const quoted = /^'\s*([+-]?[\d.,].*)$/.exec(plain);
  if (quoted !== null) return numberIn(quoted[1] ?? "", shown, options, "The apostrophe that marks text is taken off.");

  const trailing = TRAILING_MARK.exec(plain);
  const mark = trailing?.[2] ?? trailing?.[3] ?? trailing?.[4] ?? LEADING_MARK.exec(plain)?.[1];
  if (mark !== undefined) {
    const rest = trailing?.[1] ?? plain.replace(LEADING_MARK, "");
    return numberIn(rest, shown, options, `Footnote mark ${mark} taken off.`);
  }

  const raised = /^(.*[\d)])\s?\^(?:\{\s*(\d{1,2})\s*\}|(\d))$/.exec(plain);
  if (raised !== null && !/(?:^|\D)10$/.test(raised[1] ?? "")) {
    const [, rest = "", braced, digit = braced ?? ""] = raised;
    const unmarked = readBare(rest, shown, options);
    const asDigit = readBare(rest + digit, shown, options);
    if (unmarked.outcome !== "read") return undefined;
    if (asDigit.outcome !== "read") return numberIn(rest, shown, options, `Footnote mark ${digit} taken off.`);
    return ambiguous(
      [unmarked.value, asDigit.value],
      `${quote(shown)} ends in a raised ${digit}, which may be a footnote mark or a digit. ` +
        `Write ${unmarked.value.digits} or ${asDigit.value.digits}.`,
    );
  }
  const reference = /^(.*\d)\s?\[(\d{1,3})\]$/.exec(plain);
  if (reference !== null) {
    const [, rest = "", number = ""] = reference;
    const readings = [readBare(rest, shown, options), readBare(`${rest}(${number})`, shown, options)];
    const values = readings.flatMap((reading) => (reading.outcome === "read" ? [reading.value] : []));
    if (values.length !== 2) return undefined;
    return ambiguous(
      values,
      `${quote(shown)} ends in [${number}], which may name a reference or be the uncertainty. ` +
        `Write ${rest}, or ${rest}(${number}) for a standard uncertainty in the last digits.`,
    );
  }
  const square = /^\[(.*)\]$/.exec(plain);
  if (square !== null) {
    return numberIn(square[1] ?? "", shown, options, "By handbook habit square brackets mean an estimate.");
  }
  const round = /^\((.*)\)$/.exec(plain);
  if (round !== null) {
    const inner = readBare((round[1] ?? "").trim(), shown, options);
    if (inner.outcome !== "read") return undefined;
    if (/^\s*[+-]/.test(round[1] ?? "") || isZero(inner.value.digits)) {
      return read(inner.value, [...inner.notes, "By handbook habit brackets around a number mean an estimate."]);
    }
    return ambiguous(
      [inner.value, negative(inner.value)],
      `${quote(shown)} stands in brackets, which may mean an estimate or a negative number. ` +
        `Write ${inner.value.digits} or −${inner.value.digits}.`,
    );
  }
  return undefined;
}

function numberIn(rest: string, shown: string, options: NumberOptions, note: string): Reading<ReadNumber> | undefined {
  const inner = readBare(rest.trim(), shown, options);
  if (inner.outcome === "refused") return undefined;
  return inner.outcome === "read" ? read(inner.value, [...inner.notes, note]) : inner;
}

function negative(value: ReadNumber): ReadNumber {
  return { ...value, digits: negate(value.digits) };
}

interface NumberParts {
  numeral: string;
  exponent: number;
  spread?: SpreadText;
  notes: string[];
}

interface SpreadText {
  text: string;
  form: "brackets" | "plusMinus";
  exponent: number;
  kind: "standard" | "expanded" | "unstated";
}

const EXPONENT = String.raw`(?:\s*(?:[ed]\s?|\s?[x×*·]\s?10\s?(?:\^|\*\*)?\s?)[{(]?\s?([+-]?\s?\d{1,4})\s?[})]?)?`;
const NUMERAL = String.raw`([+-]?\s?[\d][\d\s.,'’‘ʼ′]*|[+-]?\s?[.,]\d+)`;
const SIGN_OF_SPREAD = String.raw`(?:±|\+\s?\/\s?-|\+-)`;
const IN_BRACKETS = new RegExp(
  String.raw`^${NUMERAL}(?:(\s?)\(\s?(${SIGN_OF_SPREAD}\s?)?(\d[\d.,]*|[.,]\d+)\s?\))?${EXPONENT}$`,
  "i",
);
const PLUS_MINUS = new RegExp(
  String.raw`^([([])?\s?${NUMERAL}${EXPONENT}\s?${SIGN_OF_SPREAD}\s?([\d.,]+)${EXPONENT}\s?([)\]])?${EXPONENT}$`,
  "i",
);
/** What may say, behind a ±, how wide it is. */
const COVERAGE =
  /[\s,;]*\(?\s*(?:k\s*=\s*([12])|(k not stated)(?:,\s2\sassumed)?|([12])\s?(?:σ|sigma|s\.?\s?d\.?|std\.?)|(95)\s?%(?:\s*(?:c\.?i\.?|conf(?:idence)?\.?(?:\s+(?:level|interval))?))?)\s*\)?$/i;

function takeApart(given: string): NumberParts | undefined {
  const notes: string[] = [];
  // `253.4, u = 0.002`: how the table prints an uncertainty too small for brackets.
  const spelled = given.replace(/^(.*\d),?\s*\bu\s*=\s*([\d.,]+)$/, "$1 ± $2 (k = 1)");
  const plain = spelled.replace(
    /^([+-]?\s?\d+)·(?!10\d)(\d+)(?=$|\s?[(±])/,
    (_whole, whole: string, fraction: string) => {
      notes.push("The raised point is read as a decimal point.");
      return `${whole}.${fraction}`;
    },
  );
  const bracketed = IN_BRACKETS.exec(plain);
  const level = /[x×*·]\s?(10(\d{1,2}))$/.exec(plain);
  if (level !== null) notes.push(`${level[1]} is read as 10 to the power of ${level[2]}.`);
  if (bracketed !== null) {
    const exponent = exponentOf(bracketed[5]);
    const parts: NumberParts = { numeral: (bracketed[1] ?? "").trim(), exponent, notes };
    if (bracketed[4] !== undefined) {
      const signed = bracketed[3] !== undefined;
      parts.spread = {
        text: bracketed[4],
        form: signed ? "plusMinus" : "brackets",
        exponent,
        kind: signed ? "unstated" : "standard",
      };
      // A space may set the uncertainty apart, or a note's number.
      if (!signed && (bracketed[2] !== "" || /\s$/.test(bracketed[1] ?? ""))) {
        notes.push(`(${bracketed[4]}) is read as the standard uncertainty in the last digits.`);
      }
    }
    return parts;
  }
  const coverage = COVERAGE.exec(plain);
  const stated = PLUS_MINUS.exec(coverage === null ? plain : plain.slice(0, coverage.index));
  if (stated === null || (stated[1] === undefined) !== (stated[6] === undefined)) return undefined;
  const enclosed = stated[1] !== undefined;
  const [own, ofSpread, ofBoth] = [stated[3], stated[5], stated[7]];
  // "12.3 ± 0.4e-3" does not say whether the exponent belongs to both numbers; behind the brackets it does.
  if (ofBoth !== undefined && !enclosed) return undefined;
  if ((own === undefined) !== (ofSpread === undefined) || (ofBoth !== undefined && own !== undefined)) return undefined;
  return {
    numeral: (stated[2] ?? "").trim(),
    exponent: exponentOf(own ?? ofBoth),
    spread: {
      text: stated[4] ?? "",
      form: "plusMinus",
      exponent: exponentOf(ofSpread ?? ofBoth),
      kind: kindSaid(coverage),
    },
    notes,
  };
}

function kindSaid(coverage: RegExpExecArray | null): "standard" | "expanded" | "unstated" {
  if (coverage === null || coverage[2] !== undefined) return "unstated";
  return (coverage[1] ?? coverage[3]) === "1" ? "standard" : "expanded";
}

function exponentOf(text: string | undefined): number {
  return text === undefined ? 0 : Number(text.replace(/\s/g, ""));
}

/** A numeral without exponent: sorts out what its points, commas, spaces and apostrophes do. */
function readNumeral(numeral: string, options: NumberOptions): Reading<Digits> {
  const sign = /^[+-]/.exec(numeral)?.[0] ?? "";
  const body = numeral.slice(sign.length).trim();
  const spaced = /^\d{1,3}(?:[\s'’‘ʼ′]\d{3})+(?=$|[.,])/.exec(body)?.[0];
  const grouped = groupedDecimals(spaced === undefined ? body : spaced.replace(/\D/g, "") + body.slice(spaced.length));
  if (grouped === undefined || /[\s'’‘ʼ′]/.test(grouped)) return refused("");

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
  kind: "standard" | "expanded" | "unstated";
  inLastPlaces: boolean;
  exponent: number;
}

/** @returns null when the uncertainty is not a number */
function readSpread(spread: SpreadText, options: NumberOptions): Spread | null {
  const reading = readNumeral(spread.text, options);
  if (reading.outcome !== "read") return null;
  const { kind, exponent } = spread;
  const inLastPlaces = spread.form === "brackets" && places(reading.value) === 0;
  return { digits: reading.value, kind, exponent, inLastPlaces };
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

const NUMBER = String.raw`[+-]?\s?\d[\d.,]*`;

/** Texts that are recognisably something else than one number, each with what to do. The first that fits is said. */
const NOT_A_NUMBER: readonly (readonly [pattern: RegExp, why: string])[] = [
  [
    /^(?:[<>≤≥~≈≲≳≪≫∼]|=[<>])|^(?:ca|circa|about|approx(?:imately)?|est(?:imated|imate)?|c|less|more|greater|at (?:least|most)|up to|max|min|nearly)\b/i,
    "is a bound or an estimate, not a value. Give one number, or leave the cell empty.",
  ],
  [
    /\d\s*[([]?\s*(?:est(?:\.|imated|imate)?|approx(?:\.|imate|imately)?|calc(?:\.|ulated)?|\?)\s*[)\]]?$|^[<>]/i,
    "says that the number is an estimate or in doubt. Say so in the remarks, and leave only the number here.",
  ],
  [
    new RegExp(String.raw`^${NUMBER}\s?(?:-|\.{3}|\s\.\.\s|÷|~|to|bis|and)\s?${NUMBER}$|^(?:between|from)\b`, "i"),
    "is a range. Give one number with its uncertainty, for example 12.3 ± 0.4.",
  ],
  [
    /^\d{1,2}[-./\s]?(?:jan|feb|mar|apr|may|jun|jul|aug|sep|oct|nov|dec)|^(?:jan|feb|mar|apr|may|jun|jul|aug|sep|oct|nov|dec)[a-z]*[-./\s]?\d|^\d{4}-\d{1,2}-\d{1,2}|^\d{1,2}[./]\d{1,2}[./]\d{2,4}$/i,
    "looks like a date, as a spreadsheet makes of some numbers. Write the number again, in a cell of text.",
  ],
  [
    /^#+$|^#(?:REF|DIV|VALUE|NAME|NUM|NULL)/i,
    "is an error of a spreadsheet or a cell too narrow. Write the number again.",
  ],
  [
    /�|Ã|â[ˆ€]|Â/,
    "holds characters that were lost when the text was saved. Was a minus sign there? Write the number again.",
  ],
  [/^[+-]?[\d.,]*[OoIl][\d.,OoIl]*$/, "holds a letter O, I or l. Was the digit 0 or 1 meant?"],
  [new RegExp(String.raw`^${NUMBER}\s?-$`), "ends in a minus sign. Write it in front of the number."],
  [/^[+-]\s?[+-]/, "begins with two signs. Write one."],
  [new RegExp(String.raw`^(?:${NUMBER}\s)?\d+/\d+$`), "is a fraction, not a number in decimals."],
  [new RegExp(String.raw`^${NUMBER}\s?[;/|]\s?${NUMBER}$|^${NUMBER},\s${NUMBER}$`), "holds two numbers. Give one."],
  [/±|\+\/-/, "has an uncertainty that cannot be read. Write it as in 12.3 ± 0.4 or 12.3(4)."],
  [
    /_\{\d+\}$/,
    "is not a number: a digit of it is lowered, which older tables do with a doubtful one. Write it level or leave it off.",
  ],
  [/^10\s?\^/, "is a power of ten without a number in front. Write it as in 1e3."],
  [/%$/, "is a percentage. Give the number in the unit of its column."],
  [
    /^[+-]?[\d.,\s]+(?:\([\d.,]+\)\s?)?(?:k?J|k?cal|m?eV|e\.?\s?u|gibbs|[kK]\b|°)/i,
    "holds a unit. Name the unit in the column head and leave only the number here.",
  ],
  [
    /^[+-]?[\d.,\s]+(?:\^\{.*\}|[a-z]{1,3}\)?)$/i,
    "ends in a footnote mark or a cut exponent. Put the note in the remarks and leave only the number here.",
  ],
  [/^[([].*[)\]]$/, "stands in brackets, which may mean an estimate or a negative number. Write the number plainly."],
];

/** Says what kind of text stands where a number should. */
function whyNotANumber(plain: string, shown: string): string {
  const parts = takeApart(plain);
  if (parts !== undefined && Math.abs(parts.exponent) > LARGEST_EXPONENT) {
    return `${quote(shown)} has an exponent beyond ±${LARGEST_EXPONENT}: no table value is that large or small.`;
  }
  const known = NOT_A_NUMBER.find(([pattern]) => pattern.test(plain));
  return known ? `${quote(shown)} ${known[1]}` : `${quote(shown)} is not a number.`;
}
