import { fullCitation, noteOf } from "#app/sources/citation.ts";
import type { DetailAsOf, SourceAsOf } from "./editions.queries.server.ts";

/** The parts of what a species is called. */
export type DetailTexts = Pick<DetailAsOf, "key" | "printed" | "label" | "name" | "cas" | "inchikey" | "synonyms">;

/** The parts of what a species is called, as text, in the order they are compared and shown. */
export const detailFields: readonly { name: string; text: (row: DetailTexts) => string }[] = [
  { name: "key", text: (row) => row.key },
  { name: "formula", text: (row) => row.printed },
  { name: "label", text: (row) => row.label ?? "" },
  { name: "name", text: (row) => row.name },
  { name: "CAS number", text: (row) => row.cas ?? "" },
  { name: "InChIKey", text: (row) => row.inchikey ?? "" },
  { name: "other names", text: (row) => row.synonyms.join("; ") },
];

/** The parts of a source's record. */
export type SourceTexts = Pick<SourceAsOf, "citation" | "doi" | "kind" | "notice">;

/** The parts of a source, as text, in the order they are compared and shown. */
export const sourceFields: readonly { name: string; text: (row: SourceTexts) => string }[] = [
  { name: "citation", text: (row) => fullCitation(row.citation) },
  { name: "note", text: (row) => noteOf(row.citation) },
  { name: "DOI", text: (row) => row.doi ?? "" },
  { name: "kind", text: (row) => row.kind },
  { name: "notice", text: (row) => row.notice ?? "" },
];
