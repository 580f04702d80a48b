import { doiAddress } from "./doi.ts";

/**
 * Printing a citation that is kept as CSL-JSON (the Citation Style Language's item format). Everything in it came from
 * outside, so every field is looked at before it is used; a field of the wrong form is left out, never guessed.
 */
export type Citation = Readonly<Record<string, unknown>>;

/** A run of a printed reference: plain, in italics (the title of what stands on a shelf), or a link. */
export interface CitationPiece {
  text: string;
  italic?: true;
  href?: string;
}

/** More authors than this are not all named in the full form. */
const MOST_NAMED = 8;
/** How many are named when there are more. */
const NAMED_OF_MANY = 6;

/** A text or a number as text; anything else says nothing. */
export function text(value: unknown): string {
  return typeof value === "string" ? value.trim() : typeof value === "number" ? String(value) : "";
}

/** Whether a value is an object with members. */
export function isRecord(value: unknown): value is Record<string, unknown> {
  return typeof value === "object" && value !== null && !Array.isArray(value);
}

/** Somebody who wrote or edited a work; an organisation has no given name. */
export interface Name {
  family: string;
  given: string;
}

function names(list: unknown): Name[] {
  if (!Array.isArray(list)) return [];
  return list.filter(isRecord).flatMap((author) => {
    const literal = text(author["literal"]);
    const family = [text(author["non-dropping-particle"]), text(author["family"])].filter(Boolean).join(" ");
    if (literal) return [{ family: literal, given: "" }];
    return family ? [{ family, given: text(author["given"]) }] : [];
  });
}

/** The authors in their order. */
export function authorsOf(citation: Citation): Name[] {
  return names(citation["author"]);
}

/** The year of publication as printed, "1989"; empty when the citation names none. */
export function yearOf(citation: Citation): string {
  const issued = isRecord(citation["issued"]) ? citation["issued"] : {};
  const parts = issued["date-parts"];
  const first: unknown = Array.isArray(parts) ? parts[0] : undefined;
  const year = Array.isArray(first) ? text(first[0]) : "";
  return year || (/\d{4}/.exec(text(issued["raw"]) || text(issued["literal"]))?.[0] ?? "");
}

/** Short form for a table cell: "Cox et al., 1989", "Pitzer and Mayorga, 1973"; the title where nobody signed. */
export function shortCitation(citation: Citation): string {
  const signed = [...authorsOf(citation), ...names(citation["editor"])].map((name) => name.family);
  const who = signed.length > 2 ? `${signed[0]} et al.` : signed.join(" and ") || text(citation["title"]);
  const year = yearOf(citation);
  return year ? `${who}, ${year}` : who;
}

/**
 * The whole reference, run by run: who, title, where it appeared, publisher, place, year, and the DOI or address as a
 * link. In italics stands what could be taken from a shelf: the journal of an article, a book, a report, a thesis.
 */
export function citationPieces(citation: Citation, doi: string | null = null): CitationPiece[] {
  const parts: CitationPiece[][] = [
    plain(people(authorsOf(citation)) || edited(citation, "; ")),
    titlePart(citation),
    wherePart(citation),
    plain(pages(citation)),
    plain(publisher(citation)),
    plain(text(citation["publisher-place"])),
    plain(yearOf(citation)),
    addressPart(citation, doi),
  ];
  return parts
    .filter((part) => part.length > 0)
    .flatMap((part, index) => (index > 0 ? [{ text: ", " }, ...part] : part));
}

/**
 * The whole citation in one line of plain text, without its DOI. It stands in the downloads of an edition, whose bytes
 * never change: what it prints for a citation must stay as it is once an edition is out.
 */
export function fullCitation(citation: Citation): string {
  return plainText(citationPieces(citation));
}

/** The reference as text to be pasted elsewhere, with its DOI as an address. */
export function plainCitation(citation: Citation, doi: string | null): string {
  const line = plainText(citationPieces(citation, doi));
  return doi ? line.replace(`doi:${doi}`, doiAddress(doi)) : line;
}

function plainText(pieces: readonly CitationPiece[]): string {
  return pieces.map((piece) => piece.text).join("");
}

/** What the source record itself remarks, such as "as remembered, compared with other tables where noted". */
export function noteOf(citation: Citation): string {
  return text(citation["note"]);
}

function plain(words: string): CitationPiece[] {
  return words === "" ? [] : [{ text: words }];
}

/** Names in their order, given names first; of a long list the first ones. */
function people(list: readonly Name[]): string {
  const shown = list.length > MOST_NAMED ? list.slice(0, NAMED_OF_MANY) : list;
  const printed = shown.map(({ family, given }) => (given ? `${given} ${family}` : family)).join(", ");
  return shown.length < list.length ? `${printed}, et al.` : printed;
}

/** A work that is signed by its editors alone. */
function edited(citation: Citation, end: "; " | ""): string {
  const editors = names(citation["editor"]);
  if (editors.length === 0) return "";
  return end === "" ? `edited by ${people(editors)}` : `${people(editors)} (${editors.length > 1 ? "eds" : "ed."})`;
}

/** What CSL-JSON calls the work, where the field names one of the types printed otherwise than the rest. */
function typeOf(citation: Citation): string {
  return text(citation["type"]);
}

/** What is said of works whose form a reader must know to find them. */
const FORM_WORDS: Readonly<Record<string, string>> = {
  thesis: "thesis",
  dataset: "data set",
  manuscript: "in-house record",
};

const BOUND = new Set(["book", "report", "thesis"]);

function titlePart(citation: Citation): CitationPiece[] {
  const title = text(citation["title"]);
  if (title === "") return [];
  const type = typeOf(citation);
  // A book that stands in a series or journal is one of its numbers: then the series is what stands on the shelf.
  const italic = BOUND.has(type) && text(citation["container-title"]) === "";
  const form = text(citation["genre"]) || FORM_WORDS[type] || "";
  const number = text(citation["number"]);
  const asides = [form && number ? `${form} ${number}` : form || number, editionWords(citation)].filter(Boolean);
  return [
    italic ? { text: title, italic: true } : { text: title },
    ...asides.map((aside): CitationPiece => ({ text: `, ${aside}` })),
  ];
}

/** "2nd edition" for a number, the words as they are otherwise. */
function editionWords(citation: Citation): string {
  const edition = text(citation["edition"]);
  if (!/^\d+$/.test(edition)) return edition;
  const last = Number(edition) % 10;
  const teen = Math.trunc(Number(edition) / 10) % 10 === 1;
  const end = teen ? "th" : last === 1 ? "st" : last === 2 ? "nd" : last === 3 ? "rd" : "th";
  return `${edition}${end} edition`;
}

/** The journal, series or book it stands in, with volume and issue. */
function wherePart(citation: Citation): CitationPiece[] {
  const container = text(citation["container-title"]);
  const volume = text(citation["volume"]);
  const issue = text(citation["issue"]);
  const numbers = [volume, issue && `(${issue})`].filter(Boolean).join(" ");
  if (container === "") return plain(numbers && `volume ${numbers}`);
  const chapter = typeOf(citation) === "chapter";
  const signedByEditors = authorsOf(citation).length === 0;
  const editors = chapter && !signedByEditors ? edited(citation, "") : "";
  return [
    ...(chapter ? [{ text: "in " }] : []),
    { text: container, italic: true },
    ...plain(numbers && ` ${numbers}`),
    ...plain(editors && `, ${editors}`),
  ];
}

/** Pages as printed: from and to with a dash between. */
function pages(citation: Citation): string {
  return text(citation["page"]).replace(/(\d)\s*-{1,2}\s*(?=\w)/g, "$1–");
}

/** Left out where the publisher signed the work as its only author. */
function publisher(citation: Citation): string {
  const name = text(citation["publisher"]);
  const [first, ...others] = authorsOf(citation);
  return others.length === 0 && first?.family === name ? "" : name;
}

/** The DOI, or else the address with the day it was read. */
function addressPart(citation: Citation, doi: string | null): CitationPiece[] {
  if (doi) return [{ text: `doi:${doi}`, href: doiAddress(doi) }];
  const url = text(citation["URL"]);
  if (!/^https?:\/\//.test(url)) return [];
  const day = dayRead(citation);
  return [{ text: url, href: url }, ...plain(day && `, read on ${day}`)];
}

/** The day an address was read, "2026-03-12"; empty where the citation does not say. */
export function dayRead(citation: Citation): string {
  const accessed = isRecord(citation["accessed"]) ? citation["accessed"]["date-parts"] : undefined;
  const day: unknown = Array.isArray(accessed) ? accessed[0] : undefined;
  return Array.isArray(day) ? day.map((part) => text(part).padStart(2, "0")).join("-") : "";
}

/** Parts shorter than this must be a whole word, or nearly every text would hold them; a number as short says nothing. */
const SHORTEST_PART = 3;

/** Whether a text holds every word that was typed, in any order and any case. */
export function holdsWords(text: string, typed: string): boolean {
  const low = text.toLowerCase();
  const words = new Set(low.split(/[^\p{L}\p{N}]+/u));
  const parts = typed
    .toLowerCase()
    .split(/\s+/)
    .filter((part) => part !== "");
  return (
    parts.length > 0 &&
    parts.every((part) => (part.length < SHORTEST_PART ? !/^\d+$/.test(part) && words.has(part) : low.includes(part)))
  );
}
