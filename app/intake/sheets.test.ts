import { readdirSync, readFileSync } from "node:fs";
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { PROPERTIES } from "#app/thermo/property.ts";
import { readPurely, type PureReading } from "#tests/support/readPurely.ts";
import { decodeSheet, type Dialect } from "./decode.ts";
import type { SheetSettings } from "./plan.ts";
import { keysOfColumns } from "./sourceKeys.ts";

/*
 * The sheets in fixtures/sheets/ against the reading that stands beside each: how it was decoded, what became of every
 * row, every reason, and exact values.
 */

/** What stands in NAME.expected.json; README.md beside the sheets says what each part means. */
interface Expected extends Pick<Dialect, "encoding" | "byteOrderMark" | "delimiter" | "decimalComma"> {
  guessed?: string;
  settings: Partial<SheetSettings>;
  stated?: Partial<SheetSettings>;
  columns?: Record<string, string>;
  ignored?: Record<string, string>;
  keys?: string[];
  answered?: string[];
  namesOnly?: true;
  read: Record<string, string>;
  refused: Record<string, [head: string | null, sentence: string][]>;
  skipped: Record<string, string>;
  values: Record<
    string,
    Record<string, { digits: string; uncertainty?: string | null; text?: string; unit?: string; note?: string }>
  >;
  names?: Record<string, string>;
  synonyms?: Record<string, string[]>;
  sources?: Record<string, string>;
  notes?: Record<string, string>;
}

const folder = new URL("../../fixtures/sheets/", import.meta.url);
const files = readdirSync(folder).filter((name) => /\.(?:csv|tsv|txt)$/.test(name));

function expectedOf(file: string): Expected {
  return JSON.parse(readFileSync(new URL(file.replace(/\.\w+$/, ".expected.json"), folder), "utf8")) as Expected;
}

function readingOf(file: string, expected: Expected): PureReading {
  return readPurely(
    readFileSync(new URL(file, folder)),
    expected.settings,
    expected.answered ? { sourceKeys: new Set(expected.answered) } : {},
  );
}

/** Every row once, as read, refused or skipped. */
function accountOf({ final, sheet }: PureReading): Record<"rows" | "read" | "refused" | "skipped", number> {
  const count = (outcome: string): number => [...final.values()].filter((row) => row.outcome === outcome).length;
  return { rows: sheet.rows.length, read: count("read"), refused: count("refused"), skipped: count("skipped") };
}

test("there are at least twelve sheets, in every encoding", () => {
  expect(files.length).toBeGreaterThanOrEqual(12);
  const encodings = new Set(files.map((file) => expectedOf(file).encoding));
  expect([...encodings].sort()).toEqual(["UTF-16BE", "UTF-16LE", "UTF-8", "Windows-1252"]);
});

describe.each(files)("%s", (file) => {
  const expected = expectedOf(file);
  const reading = readingOf(file, expected);
  const { sheet, guess, errors, final } = reading;
  const rowOf = (row: string) => final.get(Number(row));
  const readAt = (row: string) => {
    const outcome = rowOf(row);
    if (outcome?.outcome !== "read") throw new Error(`row ${row} was not read: ${JSON.stringify(outcome)}`);
    return outcome.reading;
  };

  test("is decoded and planned without a question left", () => {
    const { encoding, byteOrderMark, delimiter, decimalComma } = expected;
    expect(sheet.dialect).toMatchObject({ encoding, byteOrderMark, delimiter, decimalComma });
    expect(sheet.dialect.guessed?.why ?? "").toContain(expected.guessed ?? "");
    expect(sheet.dialect.guessed === undefined).toBe(expected.guessed === undefined);
    expect(errors).toEqual([]);
    expect(guess.settings).toMatchObject(expected.stated ?? {});
    for (const [head, means] of Object.entries(expected.columns ?? {})) {
      expect(guess.plan.find((column) => column.head === head)?.means).toBe(means);
    }
    for (const [head, because] of Object.entries(expected.ignored ?? {})) {
      const column = guess.plan.find((one) => one.head === head);
      expect(["ignore", "molarMass"]).toContain(column?.means);
      expect(column?.because).toContain(because);
    }
    if (expected.keys) {
      const column = guess.plan.findIndex((one) => one.means === "sourceKey");
      expect(keysOfColumns(sheet)[column]).toEqual(expected.keys);
    }
    expect(guess.plan.some((column) => ["value", "anyValue"].includes(column.means))).toBe(!expected.namesOnly);
  });

  test("accounts for every row: read, refused with a reason or skipped with a reason", () => {
    const { rows, read, refused, skipped } = accountOf(reading);
    expect(read + refused + skipped).toBe(rows);
    const rowsOf = (outcome: string): string[] =>
      [...final].filter(([, row]) => row.outcome === outcome).map(([number]) => String(number));
    expect(rowsOf("read").sort()).toEqual(Object.keys(expected.read).sort());
    expect(rowsOf("refused").sort()).toEqual(Object.keys(expected.refused).sort());
    expect(rowsOf("skipped").sort()).toEqual(Object.keys(expected.skipped).sort());
  });

  test("reads each row as the species it is", () => {
    const keys = Object.fromEntries(Object.keys(expected.read).map((row) => [row, readAt(row).match.key]));
    expect(keys).toEqual(expected.read);
  });

  test("says why rows are refused or skipped, and at which cell", () => {
    for (const [row, problems] of Object.entries(expected.refused)) {
      const outcome = rowOf(row);
      if (outcome?.outcome !== "refused") throw new Error(`row ${row} was not refused`);
      expect(outcome.problems.map((problem) => (problem.column === null ? null : sheet.heads[problem.column]))).toEqual(
        problems.map(([head]) => head),
      );
      for (const [index, [, sentence]] of problems.entries()) {
        expect(outcome.problems[index]?.sentence).toContain(sentence);
      }
    }
    for (const [row, reason] of Object.entries(expected.skipped)) {
      expect(rowOf(row)).toMatchObject({ outcome: "skipped", problems: [{ sentence: reason }] });
    }
  });

  test("reads exact values with their units, conversions and uncertainties", () => {
    for (const [row, values] of Object.entries(expected.values)) {
      for (const [property, value] of Object.entries(values)) {
        expect(PROPERTIES).toContain(property);
        const read = readAt(row).values.find((one) => one.property === property);
        expect(read?.digits, `row ${row}, ${property}`).toBe(value.digits);
        const { uncertainty, given } = read ?? {};
        if (value.uncertainty !== undefined) {
          const said = uncertainty ? [uncertainty.digits, uncertainty.kind, uncertainty.coverageFactor] : null;
          expect(said?.filter((part) => part !== null).join(" ") ?? null).toBe(value.uncertainty);
        }
        if (value.text !== undefined) expect(given?.text).toBe(value.text);
        if (value.unit !== undefined) expect(given?.unit).toBe(value.unit);
        if (value.note !== undefined) expect(given?.note).toBe(value.note);
      }
    }
    for (const [row, name] of Object.entries(expected.names ?? {})) expect(readAt(row).species.name).toBe(name);
    for (const [row, list] of Object.entries(expected.synonyms ?? {}))
      expect(readAt(row).species.synonyms).toEqual(list);
    for (const [row, key] of Object.entries(expected.sources ?? {})) expect(readAt(row).sourceKey).toBe(key);
    for (const [row, note] of Object.entries(expected.notes ?? {})) expect(readAt(row).notes.join(" ")).toContain(note);
  });
});

describe("sheets made at random", () => {
  const cell = fc.oneof(
    fc.constantFrom(
      "",
      "H2O",
      "Na+",
      "SO42-",
      "Fe3+",
      "CaCO3",
      "l",
      "g",
      "aq",
      "cr",
      "-285.83",
      "69,95",
      "1,234",
      "#",
      "x",
    ),
    fc.string({ maxLength: 8 }),
  );
  const quoted = (text: string): string => (/[",;\t\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text);

  test("every row has one outcome and every outcome but reading a reason, whatever stands in it", () => {
    fc.assert(
      fc.property(
        fc.array(fc.array(cell, { maxLength: 8 }), { minLength: 1, maxLength: 12 }),
        fc.constantFrom(",", ";", "\t"),
        fc.constantFrom("\n", "\r\n", "\r"),
        (rows, delimiter, end) => {
          const heads = ["formula", "phase", "name", "dHf (kJ/mol)", "U", "S (J/mol/K)"];
          const lines = [heads, ["H2O", "l", "", "-285.83", "0.04", "69.95"], ...rows];
          const text = lines.map((row) => row.map(quoted).join(delimiter)).join(end);
          const bytes = new TextEncoder().encode(text);
          const decoding = decodeSheet(bytes);
          if (decoding.outcome === "refused") {
            // The sheet as a whole: also an answer, with its sentence.
            expect(decoding.sentence).toMatch(/\w/);
            return;
          }
          const reading = readPurely(bytes, { uncertaintyKind: "expanded" });
          const { rows: all, read, refused, skipped } = accountOf(reading);
          expect(read + refused + skipped).toBe(all);
          expect(new Set(reading.sheet.rows.map((row) => row.number)).size).toBe(all);
          for (const row of reading.final.values()) {
            if (row.outcome !== "read") expect(row.problems[0]?.sentence).toBeTruthy();
          }
        },
      ),
      { numRuns: 300 },
    );
  });
});
