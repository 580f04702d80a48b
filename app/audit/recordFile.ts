import Papa from "papaparse";
import type { ChainedEntry } from "./chain.ts";

/** The two forms in which the record leaves the service. */
export const RECORD_FORMATS = ["jsonl", "csv"] as const;
export type RecordFormat = (typeof RECORD_FORMATS)[number];

export const RECORD_MEDIA: Readonly<Record<RecordFormat, string>> = {
  jsonl: "application/jsonl; charset=utf-8",
  csv: "text/csv; charset=utf-8",
};

/** An entry as the files hold it: what is hashed, its hash, and the name of who acted, which is not hashed. */
export interface ExportedEntry extends ChainedEntry {
  /** SHA-256 in hexadecimal of the RFC 8785 JSON of all members but this one and `person`. */
  hash: string;
  person: string | null;
}

const FIELDS = [
  "number",
  "at",
  "actor",
  "person",
  "apiKeyId",
  "act",
  "objectKind",
  "objectId",
  "detail",
  "requestId",
  "previousHash",
  "hash",
] as const satisfies readonly (keyof ExportedEntry)[];

/** What stands before the first entry: the names of the columns, or nothing. */
export function recordFileHead(format: RecordFormat): string {
  return format === "csv" ? `${FIELDS.join(",")}\r\n` : "";
}

/**
 * Entries as lines of a file. In CSV a text that begins like a formula of a spreadsheet is quoted off with an apostrophe;
 * JSON Lines hold every text as it is, so that hashes can be computed from them.
 */
export function recordFileLines(format: RecordFormat, entries: readonly ExportedEntry[]): string {
  if (entries.length === 0) return "";
  if (format === "jsonl") return entries.map((entry) => `${JSON.stringify(entry)}\n`).join("");
  const rows = entries.map((entry) => FIELDS.map((field) => cellOf(entry[field])));
  return `${Papa.unparse(rows, { newline: "\r\n" })}\r\n`;
}

function cellOf(value: unknown): string {
  if (value === null || value === undefined) return "";
  const text = typeof value === "object" ? JSON.stringify(value) : String(value);
  return /^[=+\-@\t\r]/.test(text) ? `'${text}` : text;
}
