import { z } from "zod";
import { type ApiOperation, operation } from "#app/http/apiContract.ts";
import { SHEET_LIMITS } from "#app/intake/decode.ts";
import { COLUMN_MEANS } from "#app/intake/meaning.ts";
import { SHEET_STATES } from "#app/intake/states.ts";
import { cursor, digitsText, limit, property, time, uncertaintyShape } from "./contract.ts";

/*
 * The writing half of the API: a program hands in a property sheet on behalf of the person whose key it holds, and follows
 * what becomes of it. What changes the table goes through people.
 */

const count = (description: string) => z.int().min(0).meta({ description });

export const sheetShape = z
  .object({
    id: z.int().positive(),
    name: z.string(),
    state: z.enum(SHEET_STATES).meta({
      description:
        "received; planned: a person must confirm on its page what the columns hold; reading; read: a person builds the revision; built; failed, with the reason.",
    }),
    failure: z.string().nullable().meta({ description: "Why the reading stopped." }),
    receivedAt: time,
    bytes: count("Size of the file."),
    sha256: z.string().meta({ description: "SHA-256 of the file in hexadecimal." }),
    columns: z
      .array(
        z.object({
          head: z.string(),
          means: z.enum(COLUMN_MEANS),
          property: property.nullable(),
          unit: z.string().nullable(),
          asks: z.boolean().meta({ description: "Whether a person should look at it." }),
        }),
      )
      .meta({ description: "What each column holds, as guessed or confirmed." }),
    plan: z
      .object({ id: z.int().positive(), savedBy: z.string(), savedAt: time })
      .nullable()
      .meta({ description: "The newest plan that was confirmed for a sheet with these heads." }),
    rows: z.object({
      total: count("Rows of the file."),
      done: count("Rows looked at so far."),
      read: count("Rows read to a species and its values."),
      refused: count("Rows that wait to be mended."),
      leftOut: count("Refused rows that were given up."),
      skipped: count("Rows that hold no values, such as titles."),
    }),
    values: count("Values read."),
    findings: z.object({
      block: count("Findings that stop."),
      look: count("Findings to look at."),
      remark: count("Remarks."),
    }),
    revision: z
      .object({ number: z.int().positive(), state: z.string(), lines: count("Lines of the revision.") })
      .nullable()
      .meta({ description: "The revision that was built from it." }),
    links: z.record(z.string(), z.url()).meta({ description: "Addresses of what belongs to it." }),
  })
  .meta({ id: "Sheet" });

const given = z.object({ text: z.string(), unit: z.string(), note: z.string().nullable() });
const columnHead = z.string().nullable().meta({ description: "Head of the column; null for the row as a whole." });

const sheetRow = z
  .object({
    row: z.int().positive().meta({ description: "Line of the file." }),
    outcome: z.enum(["read", "refused", "skipped"]),
    leftOut: z.boolean().meta({ description: "A refused row that a person gave up." }),
    cells: z.array(z.string()).meta({ description: "As uploaded." }),
    species: z.string().nullable().meta({ description: "Key of the species it was read as." }),
    isNew: z.boolean().meta({ description: "Whether that species is new to the table." }),
    values: z.array(
      z.object({
        property,
        digits: digitsText,
        uncertainty: uncertaintyShape.nullable(),
        given,
        column: columnHead,
      }),
    ),
    why: z.array(z.string()).meta({
      description: "Why it was refused or skipped; for a row that was read, what was taken for granted.",
    }),
  })
  .meta({ id: "SheetRow" });

const sheetFinding = z
  .object({
    row: z.int().positive().nullable(),
    column: columnHead,
    species: z.string().nullable(),
    property: property.nullable(),
    check: z
      .string()
      .meta({ description: "reading, or the check's name as the Conventions page has it.", example: "gibbs-closure" }),
    severity: z.enum(["block", "look", "remark"]),
    sentence: z.string(),
    arithmetic: z.array(z.string()).meta({ description: "How it was worked out, line by line." }),
    numbers: z
      .record(z.string(), z.union([z.string(), z.number(), z.null()]))
      .meta({ description: "The numbers behind it." }),
    suggestions: z.array(
      z.object({
        property: property.nullable(),
        column: columnHead,
        becomes: z.string().meta({ description: "What the cell or the value would become." }),
        sentence: z.string(),
      }),
    ),
  })
  .meta({ id: "SheetFinding" });

export type ApiSheet = z.output<typeof sheetShape>;
export type ApiSheetRow = z.output<typeof sheetRow>;
export type ApiSheetFinding = z.output<typeof sheetFinding>;

const sheetParameter = z.object({
  sheet: z.string().meta({ description: "Number of the sheet, as handing it in answered it.", example: "1" }),
});
const NONE = z.object({});
const scope = "sheets:write" as const;

export const handInSheet = operation({
  id: "handInSheet",
  group: "Sheets",
  method: "post",
  path: "/sheets",
  summary: "Hand in a property sheet",
  description: `As the file of a form (multipart/form-data, field sheet) or as the body itself (text/csv, with name). At most ${SHEET_LIMITS.bytes / 1024 / 1024} MB. Where a remembered plan fits the heads, source is named and nothing is in doubt, the rows are read at once; else the sheet is planned and a person confirms its columns. The same bytes again, while they are being worked on, are the same sheet: 200 in place of 201. It counts as the key owner's: somebody else decides its lines.`,
  parameters: NONE,
  query: z.object({
    name: z
      .string()
      .trim()
      .min(1, "Give the name of the file.")
      .max(255)
      .optional()
      .meta({
        description: "Name of the file; needed with text/csv.",
        param: { example: "calorimeter.csv" },
      }),
    plan: z
      .string()
      .regex(/^[1-9]\d{0,8}$/, "Give the number of a remembered plan.")
      .transform(Number)
      .optional()
      .meta({ description: "Number of a remembered plan; the newest for these heads when left out." }),
    source: z.string().min(1).max(100).optional().meta({ description: "Id of the source of its values." }),
  }),
  body: {
    description: "The sheet.",
    content: {
      "text/csv": { schema: z.string(), example: "Formula,Phase,dHf (kJ/mol)\nH2O,l,-285.830\n" },
      "multipart/form-data": {
        schema: z.object({ sheet: z.string().meta({ format: "binary", description: "The file." }) }),
      },
    },
  },
  answer: {
    description: "The same bytes are being worked on already, as this sheet.",
    mediaType: "application/json",
    schema: sheetShape,
    created: "The sheet was taken in.",
  },
  otherStatuses: [400, 409, 413, 415, 422],
  scope,
});

export const readSheet = operation({
  id: "readSheet",
  group: "Sheets",
  method: "get",
  path: "/sheets/{sheet}",
  summary: "How far a sheet is",
  description:
    "State, counts, findings and the revision built from it. One's own sheets only. Ask again with If-None-Match until the state is other than reading.",
  parameters: sheetParameter,
  query: NONE,
  answer: { description: "The sheet.", mediaType: "application/json", schema: sheetShape },
  otherStatuses: [304, 400, 404],
  scope,
});

export const listSheetRows = operation({
  id: "listSheetRows",
  group: "Sheets",
  method: "get",
  path: "/sheets/{sheet}/rows",
  summary: "What became of each row",
  description:
    "In the order of the file: what it was read as, or why it was refused or skipped. Every row of the file is in it, once the sheet was read.",
  parameters: sheetParameter,
  query: z.object({
    outcome: z.enum(["read", "refused", "skipped"]).optional().meta({ description: "Only rows that came to this." }),
    limit,
    cursor,
  }),
  answer: {
    description: "A page of rows.",
    mediaType: "application/json",
    schema: z.object({ sheet: z.int(), rows: z.array(sheetRow), next: z.string().nullable() }),
  },
  otherStatuses: [304, 400, 404, 422],
  headers: ["Link"],
  scope,
});

export const listSheetFindings = operation({
  id: "listSheetFindings",
  group: "Sheets",
  method: "get",
  path: "/sheets/{sheet}/findings",
  summary: "What was found wrong or odd",
  description:
    "What is wrong with its rows, in the order of the file; then, once a revision was built, what the newest examination of that revision found.",
  parameters: sheetParameter,
  query: z.object({ limit, cursor }),
  answer: {
    description: "A page of findings.",
    mediaType: "application/json",
    schema: z.object({ sheet: z.int(), findings: z.array(sheetFinding), next: z.string().nullable() }),
  },
  otherStatuses: [304, 400, 404, 422],
  headers: ["Link"],
  scope,
});

/** Every operation by which sheets are handed in and followed. */
export const sheetOperations: readonly ApiOperation[] = [handInSheet, readSheet, listSheetRows, listSheetFindings];
