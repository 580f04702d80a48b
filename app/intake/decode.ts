import iconv from "iconv-lite";
import Papa from "papaparse";
import { isComment } from "./cells.ts";
import type { Encoding } from "./encodings.ts";
import { readHead } from "./head.ts";

/**
 * The largest sheet that is taken in. The bytes stand in chunks of 1 MB in the database and the whole text is held in
 * memory while it is read, so the first number bounds that memory; the others keep a page and a cell readable.
 */
export const SHEET_LIMITS = {
  /** 10 MB. */
  bytes: 10 * 1024 * 1024,
  rows: 20_000,
  columns: 200,
  /** Characters in one cell. */
  cell: 2_000,
} as const;

export type Delimiter = "," | ";" | "\t";

/** How the bytes were written. */
export interface Dialect {
  readonly encoding: Encoding;
  readonly byteOrderMark: boolean;
  readonly delimiter: Delimiter;
  /** Numbers are written 12,5 rather than 12.5. */
  readonly decimalComma: boolean;
  /**
   * Set where the bytes do not prove their encoding: why it was taken, and what the steward can see by whether it is the
   * right one. Every sign beyond ASCII with the line where it stands first.
   */
  readonly guessed?: { readonly why: string; readonly signs: readonly { sign: string; row: number }[] };
}

export interface DecodedRow {
  /** The line of the file on which the row begins; the first line is 1. */
  readonly number: number;
  readonly cells: readonly string[];
}

export interface DecodedSheet {
  readonly dialect: Dialect;
  readonly heads: readonly string[];
  /** The line of the heads: 1 unless titles stand above them. */
  readonly headRow: number;
  /** Every other row of the file in order, titles above the heads and blank rows included. */
  readonly rows: readonly DecodedRow[];
}

export type Decoding =
  | { readonly outcome: "decoded"; readonly sheet: DecodedSheet }
  | { readonly outcome: "refused"; readonly sentence: string };

const refused = (sentence: string): Decoding => ({ outcome: "refused", sentence });

const SAVE_AS = "Save the sheet as CSV in UTF-8 and send that file.";

/**
 * From the bytes of a file to rows of cells with their line numbers. What a file is, its bytes say, not its name.
 * Nothing is repaired here: cells keep their text to the letter (line ends inside a cell become a plain line feed).
 *
 * @param chosen the encoding a person chose; left out, it is told from the bytes
 */
export function decodeSheet(bytes: Uint8Array, chosen?: Encoding): Decoding {
  if (bytes.length > SHEET_LIMITS.bytes) return refused(tooManyBytes());
  const foreign = foreignContent(bytes);
  if (foreign) return refused(`This is ${foreign}, not a table in plain text. ${SAVE_AS}`);
  const text = decodeText(bytes, chosen);
  if (text.outcome === "refused") return text;
  if (text.value.trim() === "")
    return refused("The file is empty. Send a sheet with a row of heads and rows below it.");

  const named = namedDelimiter(text.value);
  if (named === null) {
    return refused(
      "The first row names a delimiter that is not read here. Separate the columns by commas, semicolons or tabs.",
    );
  }
  const delimiter = named ?? guessDelimiter(text.value);
  if (delimiter === null) {
    return refused(
      "No row of this file is divided into columns. Separate the columns by commas, semicolons or tabs, with one row of heads.",
    );
  }
  // The line feed that ends the last row is not a row of its own.
  const parsed = parseRows(text.value.replace(/\n$/, ""), delimiter);
  if (parsed.outcome === "refused") return parsed;

  const headIndex = findHeads(parsed.rows);
  const headRow = headIndex === -1 ? undefined : parsed.rows[headIndex];
  if (!headRow) {
    return refused(
      "No row names the columns. Put heads such as formula, phase, dHf (kJ/mol) above the first row of values.",
    );
  }
  const heads = withoutTrailingBlanks(headRow.cells).map((head) => head.trim());
  const rows = parsed.rows.filter((_, index) => index !== headIndex);
  if (!rows.some((row) => row.number > headRow.number && row.cells.some((cell) => cell.trim() !== ""))) {
    return refused("The file holds heads and no rows below them. Send the sheet with its values.");
  }
  return {
    outcome: "decoded",
    sheet: {
      dialect: {
        encoding: text.encoding,
        byteOrderMark: text.byteOrderMark,
        delimiter,
        decimalComma: guessDecimalComma(rows, delimiter),
        ...(text.why === null ? {} : { guessed: { why: text.why, signs: signsBeyondAscii(parsed.rows) } }),
      },
      heads,
      headRow: headRow.number,
      rows,
    },
  };
}

/** The sentence for a file over the limit; the upload stops there without reading on. */
export function tooManyBytes(): string {
  return `The file is larger than ${SHEET_LIMITS.bytes / 1024 / 1024} MB, the largest sheet taken in. Split it and send the parts.`;
}

/** Kinds of file that are often sent by mistake, by their first bytes. */
const SIGNATURES: readonly (readonly [prefix: readonly number[], what: string])[] = [
  [[0x50, 0x4b, 0x03, 0x04], "a zip archive (spreadsheet workbooks are such archives too)"],
  [[0x50, 0x4b, 0x05, 0x06], "an empty zip archive"],
  [[0xd0, 0xcf, 0x11, 0xe0], "a spreadsheet workbook in an old binary form"],
  [[0x1f, 0x8b], "a compressed file"],
  [[0x25, 0x50, 0x44, 0x46], "a PDF document"],
  [[0x89, 0x50, 0x4e, 0x47], "a picture (PNG)"],
  [[0xff, 0xd8, 0xff], "a picture (JPEG)"],
  [[0x47, 0x49, 0x46, 0x38], "a picture (GIF)"],
  [[0x49, 0x49, 0x2a, 0x00], "a picture (TIFF)"],
  [[0x4d, 0x4d, 0x00, 0x2a], "a picture (TIFF)"],
  [[0x52, 0x49, 0x46, 0x46], "a picture or a recording (RIFF)"],
  [[0x7b, 0x5c, 0x72, 0x74, 0x66], "a word processor's document (RTF)"],
];

function foreignContent(bytes: Uint8Array): string | null {
  for (const [prefix, what] of SIGNATURES) {
    if (prefix.every((byte, index) => bytes[index] === byte)) return what;
  }
  return null;
}

type Decoded =
  | {
      outcome: "decoded";
      /** Line ends are plain line feeds, the byte order mark is taken off. */
      value: string;
      encoding: Encoding;
      byteOrderMark: boolean;
      /** Why this encoding was taken, where the bytes do not prove it. */
      why: string | null;
    }
  | { outcome: "refused"; sentence: string };

/** Byte order marks and what they prove. */
const MARKS: readonly (readonly [mark: readonly number[], encoding: Encoding])[] = [
  [[0xef, 0xbb, 0xbf], "UTF-8"],
  [[0xff, 0xfe], "UTF-16LE"],
  [[0xfe, 0xff], "UTF-16BE"],
];

/**
 * The text of the bytes: in the encoding their mark names, else in UTF-16 where every second byte is zero, else in UTF-8
 * if they are valid UTF-8, else in Windows-1252, which no byte order mark and no rule of form can prove.
 */
function decodeText(bytes: Uint8Array, chosen: Encoding | undefined): Decoded {
  const marked = MARKS.find(([mark]) => mark.every((byte, index) => bytes[index] === byte));
  const body = marked && (chosen === undefined || chosen === marked[1]) ? bytes.subarray(marked[0].length) : bytes;
  const byteOrderMark = body !== bytes;
  const encoding = chosen ?? marked?.[1] ?? guessUtf16(bytes);
  const why = chosen
    ? `chosen by hand`
    : encoding && !marked
      ? "every second byte is zero, as in no other encoding"
      : null;
  switch (encoding) {
    case "UTF-16LE":
    case "UTF-16BE":
      return decodeUtf16(body, encoding, byteOrderMark, why);
    case "Windows-1252":
      return decodeWindows1252(body, "chosen by hand");
    case "UTF-8":
    case null:
      break;
  }
  const nul = body.indexOf(0);
  if (nul !== -1) return { outcome: "refused", sentence: nulSentence(lineOf(body, nul)) };
  try {
    const value = new TextDecoder("utf-8", { fatal: true, ignoreBOM: true }).decode(body);
    return { outcome: "decoded", value: plainLineEnds(value), encoding: "UTF-8", byteOrderMark, why };
  } catch {
    const row = firstBadLine(body);
    if (chosen || byteOrderMark) {
      const told = chosen ? "" : ", although the file begins with the mark of UTF-8: it was damaged on the way";
      return { outcome: "refused", sentence: `Row ${row} is not valid UTF-8${told}. ${SAVE_AS}` };
    }
    return decodeWindows1252(body, `row ${row} is not valid UTF-8`);
  }
}

const plainLineEnds = (text: string): string => text.replace(/\r\n?/g, "\n");

const nulSentence = (row: number): string =>
  `Row ${row} holds a NUL byte, which no text file does: this is not a table in plain text, or it was damaged on the way. ${SAVE_AS}`;

function decodeUtf16(
  bytes: Uint8Array,
  encoding: "UTF-16LE" | "UTF-16BE",
  byteOrderMark: boolean,
  why: string | null,
): Decoded {
  if (bytes.length % 2 !== 0) {
    return {
      outcome: "refused",
      sentence: `The file ends in the middle of a character of ${encoding}: it was cut off on the way. Send it again.`,
    };
  }
  let value: string;
  try {
    value = new TextDecoder(encoding, { fatal: true, ignoreBOM: true }).decode(bytes);
  } catch {
    return {
      outcome: "refused",
      sentence: `These bytes are not valid ${encoding}: half of a character stands alone. ${SAVE_AS}`,
    };
  }
  const nul = value.indexOf("\0");
  if (nul !== -1) {
    return { outcome: "refused", sentence: nulSentence(plainLineEnds(value.slice(0, nul)).split("\n").length) };
  }
  return { outcome: "decoded", value: plainLineEnds(value), encoding, byteOrderMark, why };
}

/** The five bytes that Windows-1252 does not define; what stands there cannot be said. */
const UNDEFINED_IN_1252: ReadonlySet<number> = new Set([0x81, 0x8d, 0x8f, 0x90, 0x9d]);

/**
 * The package decodes, because `TextDecoder` of Node.js 20 takes windows-1252 for ISO 8859-1 and makes control characters
 * of the dashes and quotation marks at 0x80 to 0x9F. Bytes without a meaning are refused and not made up.
 */
function decodeWindows1252(bytes: Uint8Array, why: string): Decoded {
  const bad = bytes.findIndex((byte) => UNDEFINED_IN_1252.has(byte) || isControl(byte));
  if (bad !== -1) {
    const byte = (bytes[bad] ?? 0).toString(16).toUpperCase().padStart(2, "0");
    return {
      outcome: "refused",
      sentence: `The file is neither UTF-8 nor Windows-1252: row ${lineOf(bytes, bad)} holds the byte ${byte} (hexadecimal), which stands for no character. ${SAVE_AS}`,
    };
  }
  const value = iconv.decode(Buffer.from(bytes), "windows-1252", { stripBOM: false });
  return { outcome: "decoded", value: plainLineEnds(value), encoding: "Windows-1252", byteOrderMark: false, why };
}

/** Control characters that no text holds; tab, line feed, form feed and carriage return do occur. */
function isControl(byte: number): boolean {
  return byte < 0x20 && byte !== 0x09 && byte !== 0x0a && byte !== 0x0c && byte !== 0x0d;
}

/** Text in the Latin alphabet written as UTF-16 without its mark has a zero in nearly every second byte. */
function guessUtf16(bytes: Uint8Array): "UTF-16LE" | "UTF-16BE" | null {
  const sample = bytes.subarray(0, 400);
  if (sample.length < 8) return null;
  const zeros: [even: number, odd: number] = [0, 0];
  for (const [index, byte] of sample.entries()) if (byte === 0) zeros[index % 2 === 0 ? 0 : 1] += 1;
  const telling = Math.max(...zeros) > 0.35 * sample.length && Math.min(...zeros) < 0.05 * sample.length;
  if (!telling) return null;
  return zeros[0] > zeros[1] ? "UTF-16BE" : "UTF-16LE";
}

/** As many different signs are shown; a sheet in the Latin alphabet has fewer. */
const SIGNS_SHOWN = 24;

/** Every sign beyond ASCII with the row where it stands first: by these a person sees whether the encoding is right. */
function signsBeyondAscii(rows: readonly DecodedRow[]): { sign: string; row: number }[] {
  const seen = new Map<string, number>();
  for (const row of rows) {
    for (const cell of row.cells) {
      for (const sign of cell.match(/[^\0-\x7f]/gu) ?? []) if (!seen.has(sign)) seen.set(sign, row.number);
    }
    if (seen.size >= SIGNS_SHOWN) break;
  }
  return [...seen].slice(0, SIGNS_SHOWN).map(([sign, row]) => ({ sign, row }));
}

/** The delimiter that a first line `sep=;` names; undefined when there is no such line, null when it names another. */
function namedDelimiter(text: string): Delimiter | null | undefined {
  const named = /^"?sep=(.?)"?[\t ]*(?:\n|$)/i.exec(text);
  if (!named) return undefined;
  return ([",", ";", "\t"] as const).find((one) => one === named[1]) ?? null;
}

function lineOf(bytes: Uint8Array, position: number): number {
  let line = 1;
  for (let index = 0; index < position; index += 1) {
    if (bytes[index] === 0x0a || (bytes[index] === 0x0d && bytes[index + 1] !== 0x0a)) line += 1;
  }
  return line;
}

/** A line feed is never part of a longer UTF-8 sequence, so lines can be tried one by one. */
function firstBadLine(bytes: Uint8Array): number {
  const decoder = new TextDecoder("utf-8", { fatal: true });
  for (let start = 0; start < bytes.length;) {
    const feed = bytes.subarray(start).findIndex((byte) => byte === 0x0a || byte === 0x0d);
    const end = feed === -1 ? bytes.length : start + feed;
    try {
      decoder.decode(bytes.subarray(start, end));
    } catch {
      return lineOf(bytes, start);
    }
    start = end + 1;
  }
  return lineOf(bytes, bytes.length);
}

/**
 * The delimiter that divides a row into heads that mean something and most rows into one same number of columns. Between
 * equals the rarer sign wins: a comma between semicolons is a decimal comma, a semicolon between commas would have made
 * the rows uneven.
 */
function guessDelimiter(text: string): Delimiter | null {
  let best: { delimiter: Delimiter; agreeing: number } | null = null;
  for (const delimiter of ["\t", ";", ","] as const) {
    const { data } = Papa.parse<string[]>(text, { delimiter, newline: "\n", preview: 200, skipEmptyLines: "greedy" });
    const counts = new Map<number, number>();
    for (const row of data) counts.set(row.length, (counts.get(row.length) ?? 0) + 1);
    let agreeing = 0;
    for (const [columns, rows] of counts) if (columns > 1) agreeing = Math.max(agreeing, rows);
    if (agreeing > 0 && data.slice(0, TITLES_AT_MOST).some(namesColumns)) agreeing += data.length;
    if (agreeing > 0 && (best === null || agreeing > best.agreeing)) best = { delimiter, agreeing };
  }
  return best?.delimiter ?? null;
}

/** Whether at least two cells are heads that mean something. */
function namesColumns(cells: readonly string[]): boolean {
  return cells.filter((cell) => readHead(cell).means !== null).length >= 2;
}

type Parsed = { outcome: "parsed"; rows: DecodedRow[] } | { outcome: "refused"; sentence: string };

function parseRows(text: string, delimiter: Delimiter): Parsed {
  const rows: DecodedRow[] = [];
  let sentence: string | null = null;
  let line = 1;
  let read = 0;
  Papa.parse<string[]>(text, {
    delimiter,
    newline: "\n",
    step: ({ data, errors, meta }, parser) => {
      const number = line;
      // Count the lines this row took, quoted line ends included.
      for (
        let feed = text.indexOf("\n", read);
        feed !== -1 && feed < meta.cursor;
        feed = text.indexOf("\n", feed + 1)
      ) {
        line += 1;
      }
      read = meta.cursor;
      sentence = rowTrouble(number, data, errors) ?? (rows.length >= SHEET_LIMITS.rows + 1 ? tooManyRows() : null);
      if (sentence !== null) {
        parser.abort();
        return;
      }
      rows.push({ number, cells: data });
    },
  });
  if (sentence !== null) return { outcome: "refused", sentence };
  return { outcome: "parsed", rows };
}

function tooManyRows(): string {
  return `The sheet has more than ${SHEET_LIMITS.rows.toLocaleString("en")} rows, the most that is taken in at once. Split it and send the parts.`;
}

function rowTrouble(number: number, cells: readonly string[], errors: readonly Papa.ParseError[]): string | null {
  if (errors.some((error) => error.code === "MissingQuotes")) {
    return `Row ${number}: a quotation mark opens a cell and is never closed, so the rest of the file would be one cell. Close it or double it.`;
  }
  if (cells.length > SHEET_LIMITS.columns) {
    return `Row ${number} has ${cells.length} columns; at most ${SHEET_LIMITS.columns} are taken in.`;
  }
  const long = cells.findIndex((cell) => cell.length > SHEET_LIMITS.cell);
  if (long !== -1) {
    return `Row ${number}, column ${long + 1}: the cell has ${cells[long]?.length ?? 0} characters; at most ${SHEET_LIMITS.cell.toLocaleString("en")} are taken in. Is a quotation mark missing?`;
  }
  return null;
}

/** How many rows of titles may stand above the heads. */
const TITLES_AT_MOST = 30;

/**
 * The heads: the first row with two heads that mean something, else the first row of words only.
 * @returns the index in `rows`, -1 when there is none
 */
function findHeads(rows: readonly DecodedRow[]): number {
  let wordsOnly = -1;
  for (const [index, row] of rows.slice(0, TITLES_AT_MOST).entries()) {
    const filled = row.cells.filter((cell) => cell.trim() !== "");
    if (filled.length < 2 || isComment(row.cells)) continue;
    if (filled.some((cell) => /^[-−+±]?\s*\d+(?:[.,]\d+)?$/.test(cell.trim()))) break;
    if (namesColumns(filled)) return index;
    if (wordsOnly === -1) wordsOnly = index;
  }
  return wordsOnly;
}

function withoutTrailingBlanks(cells: readonly string[]): readonly string[] {
  let end = cells.length;
  while (end > 0 && cells[end - 1]?.trim() === "") end -= 1;
  return cells.slice(0, end);
}

/**
 * Counts numerals with one comma against numerals with a point. `1,206` alone could be either: it decides only where
 * nothing else does and the comma does not already separate the columns.
 */
function guessDecimalComma(rows: readonly DecodedRow[], delimiter: Delimiter): boolean {
  let commas = 0;
  let points = 0;
  let threeBehindComma = 0;
  for (const row of rows.slice(0, 2_000)) {
    for (const cell of row.cells) {
      const numeral = /^[-−+–]?\s*\d+([.,])(\d+)(?:\s*(?:±|\+\/-|\().*)?$/.exec(cell.trim());
      if (numeral?.[1] === ".") points += 1;
      else if (numeral?.[1] === "," && numeral[2]?.length === 3) threeBehindComma += 1;
      else if (numeral?.[1] === ",") commas += 1;
    }
  }
  return commas > points || (commas + points === 0 && threeBehindComma > 0 && delimiter !== ",");
}
