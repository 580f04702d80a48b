/*
 * The form that describes a source: its fields, their words and their choices. Apart from the reading of the form
 * (`sourceForm.ts`), so that a browser loads no more than it shows.
 */

/** What kind of work a source is, each with its type in CSL-JSON. */
export const WORK_TYPES = {
  article: "article-journal",
  book: "book",
  chapter: "chapter",
  report: "report",
  thesis: "thesis",
  dataset: "dataset",
  webpage: "webpage",
  // CSL's type for what was never printed: a notebook, a file of measurements.
  inhouse: "manuscript",
} as const;

export type Work = keyof typeof WORK_TYPES;

export const WORKS = Object.keys(WORK_TYPES) as [Work, ...Work[]];

const WORK_OPTIONS: readonly (readonly [Work, string])[] = [
  ["article", "article in a journal"],
  ["book", "book or handbook"],
  ["chapter", "chapter of a book"],
  ["report", "report"],
  ["thesis", "thesis"],
  ["dataset", "data set"],
  ["webpage", "page on the web"],
  ["inhouse", "in-house record or measurement"],
];

/** How the values of a source came about. */
export const SOURCE_KIND_OPTIONS = [
  ["measurement", "measured"],
  ["evaluation", "evaluated from measurements"],
  ["calculation", "calculated"],
  ["estimate", "estimated"],
] as const;

/** The names of the fields; each is one text. */
export type SourceField =
  | "work"
  | "title"
  | "authors"
  | "year"
  | "container"
  | "volume"
  | "issue"
  | "pages"
  | "publisher"
  | "place"
  | "doi"
  | "url"
  | "accessed"
  | "sourceKind"
  | "note"
  | "notice";

/** One field of the form as a page shows it. */
export interface ShownSourceField {
  name: SourceField;
  label: string;
  hint?: string;
  required?: true;
  /** How many quarters of a line it takes where there is room; all four without it. */
  quarters?: 1 | 2;
  /** Several lines of text; how many stand open. */
  rows?: number;
  options?: readonly (readonly [string, string])[];
}

/** The form in the order of its fields. */
export const SOURCE_FORM: readonly ShownSourceField[] = [
  { name: "work", label: "Kind of work", options: [["", "as its fields say"], ...WORK_OPTIONS] },
  {
    name: "authors",
    label: "Authors",
    hint: "One a line, family name first: Cox, J. D. A laboratory or another body stands without a comma.",
    rows: 3,
  },
  { name: "title", label: "Title", hint: "For a notebook, what it is called and its number.", required: true },
  { name: "container", label: "Journal, series or book it stands in" },
  { name: "volume", label: "Volume", quarters: 1 },
  { name: "issue", label: "Issue", quarters: 1 },
  { name: "pages", label: "Pages", quarters: 1 },
  { name: "year", label: "Year", quarters: 1 },
  { name: "publisher", label: "Publisher or laboratory", hint: "For a thesis, the university.", quarters: 2 },
  { name: "place", label: "Place of publication", quarters: 2 },
  { name: "doi", label: "DOI", hint: "As in 10.1063/1.555845; an address at doi.org is read as well." },
  { name: "url", label: "Address on the web", quarters: 2 },
  { name: "accessed", label: "Read there on", hint: "Year, month and day: 2026-03-12.", quarters: 2 },
  {
    name: "sourceKind",
    label: "How the values came about",
    options: [["", "say how they came about"], ...SOURCE_KIND_OPTIONS],
    required: true,
  },
  {
    name: "note",
    label: "Remark on the source",
    hint: "What a reader should know: an excerpt only, numbers that are provisional or invented.",
    rows: 2,
  },
  {
    name: "notice",
    label: "Notice",
    hint: "A retraction or a correction. It is shown beside every value that leans on this source.",
    rows: 2,
  },
];

/** Every field of the form, by name. */
export const SOURCE_FIELDS: readonly SourceField[] = SOURCE_FORM.map(({ name }) => name);
