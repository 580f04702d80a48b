import { z } from "zod";
import { authorsOf, type Citation, dayRead, text, yearOf } from "./citation.ts";
import { bareDoi, isDoi } from "./doi.ts";
import { SOURCE_FIELDS, type SourceField, SOURCE_KIND_OPTIONS, WORK_TYPES, WORKS } from "./sourceFields.ts";

/*
 * A source as a person describes it: the one definition of the form, whether it is filled in beside a sheet, on the page
 * that adds a source, or on the page that mends one. It is kept as CSL-JSON.
 */

const line = z.string().trim().max(500);
const short = z.string().trim().max(100);

/** Only what a browser can open and what runs nothing. */
function isWebAddress(address: string): boolean {
  return URL.canParse(address) && /^https?:$/.test(new URL(address).protocol);
}

/** A day of the calendar, "2026-03-12". */
function isDay(day: string): boolean {
  return !Number.isNaN(Date.parse(`${day}T00:00:00Z`)) && new Date(`${day}T00:00:00Z`).toISOString().startsWith(day);
}

/**
 * A source that is new to the table, or an old one as it shall be cited. The fields without which sheets described their
 * sources at first may be left out altogether; an empty text says the same.
 */
export const newSource = z
  .strictObject({
    work: z.enum(WORKS, "Choose one of the list.").optional(),
    title: line.min(1, "Give the title, or what the notebook is called."),
    /** One author a line, family name first; a line without a comma is an organisation. */
    authors: z.string().trim().max(2000),
    year: z
      .string()
      .trim()
      .regex(/^(?:\d{4})?$/, "Give the year with four digits, or leave it empty."),
    /** The journal, the series, or the book that a chapter stands in. */
    container: line,
    volume: short.optional(),
    issue: short.optional(),
    pages: short.optional(),
    publisher: line,
    /** Where the publisher sits. */
    place: line.optional(),
    doi: z
      .string()
      .max(500)
      .transform(bareDoi)
      .refine((doi) => doi === "" || isDoi(doi), "A DOI begins with 10., as in 10.1063/1.555845."),
    url: z
      .string()
      .trim()
      .max(1000)
      .refine((url) => url === "" || isWebAddress(url), "Give the whole address, beginning with https://.")
      .optional(),
    /** The day on which the page was read, "2026-03-12". */
    accessed: z
      .string()
      .trim()
      .refine((day) => day === "" || isDay(day), "Give the day as year, month and day: 2026-03-12.")
      .optional(),
    sourceKind: z.enum(
      SOURCE_KIND_OPTIONS.map(([kind]) => kind),
      "Say how the values came about.",
    ),
    /** What a reader should know of the source, such as that its numbers are invented. */
    note: z.string().trim().max(1000),
    /** A retraction, a correction or another warning, shown beside every value that leans on the source. */
    notice: z.string().trim().max(1000).optional(),
  })
  .superRefine((source, context) => {
    const lacks = (path: keyof NewSource, message: string): void => {
      context.addIssue({ code: "custom", path: [path], message });
    };
    if (source.work === "article" && source.container === "") lacks("container", "Name the journal.");
    if (source.work === "chapter" && source.container === "")
      lacks("container", "Name the book the chapter stands in.");
    if (source.work === "webpage" && !source.url && source.doi === "") lacks("url", "Give the address of the page.");
    if (source.accessed && !source.url) lacks("url", "Give the address that was read on that day.");
  });

export type NewSource = z.infer<typeof newSource>;

/** A source as a line of a revision holds it. */
export interface DescribedSource {
  citation: Record<string, unknown>;
  doi: string | null;
  sourceKind: NewSource["sourceKind"];
  notice: string | null;
}

/**
 * What the form says as a line keeps it. `before` is the citation that is being mended: what the form has no field for is
 * kept from it, and authors too where nobody changed them, since a name may hold more than the form shows.
 */
export function describedSource(source: NewSource, before: Citation = {}): DescribedSource {
  const { doi, sourceKind } = source;
  return { citation: cslOf(source, before), doi: doi === "" ? null : doi, sourceKind, notice: source.notice || null };
}

/** Members of a citation that the form writes. */
const WRITTEN = new Set([
  ...["type", "title", "author", "issued", "container-title", "volume", "issue", "page", "publisher"],
  ...["publisher-place", "DOI", "URL", "accessed", "note"],
]);

/** The citation as CSL-JSON: authors with family and given names, what is empty left out. */
export function cslOf(source: NewSource, before: Citation = {}): Record<string, unknown> {
  const untouched = source.authors === authorLines(before) ? before["author"] : undefined;
  const author = untouched ?? readAuthors(source.authors);
  const day = source.accessed ? source.accessed.split("-").map(Number) : null;
  const said = {
    title: source.title,
    author: Array.isArray(author) && author.length > 0 ? author : "",
    issued: source.year === "" ? "" : { "date-parts": [[Number(source.year)]] },
    "container-title": source.container,
    volume: source.volume,
    issue: source.issue,
    page: source.pages,
    publisher: source.publisher,
    "publisher-place": source.place,
    DOI: source.doi,
    URL: source.url,
    accessed: day ? { "date-parts": [day] } : "",
    note: source.note,
  };
  return {
    ...Object.fromEntries(Object.entries(before).filter(([name]) => !WRITTEN.has(name))),
    type: typeOf(source, before),
    ...Object.fromEntries(Object.entries(said).filter(([, value]) => value !== undefined && value !== "")),
  };
}

/** A kind of work that the form does not know stays what it was, unless another is chosen. */
function typeOf({ work, container, publisher }: NewSource, before: Citation): string {
  if (work) return WORK_TYPES[work];
  const known = text(before["type"]);
  if (known !== "") return known;
  return container !== "" ? "article-journal" : publisher !== "" ? "book" : "report";
}

function readAuthors(lines: string): unknown[] {
  return lines
    .split(/\n|;/)
    .map((name) => name.trim())
    .filter((name) => name !== "")
    .map((name) => {
      const [family = "", ...given] = name.split(",").map((part) => part.trim());
      return given.length > 0 ? { family, given: given.join(", ") } : { literal: name };
    });
}

function authorLines(citation: Citation): string {
  return authorsOf(citation)
    .map(({ family, given }) => (given ? `${family}, ${given}` : family))
    .join("\n");
}

/** What stands in each field for a source that is there already. */
export function typedSource({ citation, doi, sourceKind, notice }: DescribedSource): Record<SourceField, string> {
  const type = text(citation["type"]);
  return {
    work: WORKS.find((work) => WORK_TYPES[work] === type) ?? "",
    title: text(citation["title"]),
    authors: authorLines(citation),
    year: yearOf(citation),
    container: text(citation["container-title"]),
    volume: text(citation["volume"]),
    issue: text(citation["issue"]),
    pages: text(citation["page"]),
    publisher: text(citation["publisher"]),
    place: text(citation["publisher-place"]),
    doi: doi ?? "",
    url: text(citation["URL"]),
    accessed: dayRead(citation),
    sourceKind,
    note: text(citation["note"]),
    notice: notice ?? "",
  };
}

/** What was typed into the fields of a form, and what is wrong with it, field by field. */
export type ReadSource =
  { ok: true; source: NewSource } | { ok: false; errors: { field: SourceField; detail: string }[] };

/** Reads the fields as they were sent: every one as text, an empty one saying nothing. */
export function readSourceForm(typed: (field: SourceField) => string): ReadSource {
  const texts = Object.fromEntries(SOURCE_FIELDS.map((name) => [name, typed(name)]));
  const read = newSource.safeParse({ ...texts, work: texts["work"] === "" ? undefined : texts["work"] });
  if (read.success) return { ok: true, source: read.data };
  return {
    ok: false,
    errors: read.error.issues.map((issue) => ({
      field: SOURCE_FIELDS.find((name) => name === issue.path[0]) ?? "title",
      detail: issue.code === "too_big" ? "This is longer than the record takes. Shorten it." : issue.message,
    })),
  };
}
