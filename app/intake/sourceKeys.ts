import { authorsOf, type Citation, shortCitation, text, yearOf } from "#app/sources/citation.ts";
import { bareDoi } from "#app/sources/doi.ts";
import { isComment, isUnitsRow } from "./cells.ts";
import type { DecodedSheet } from "./decode.ts";

/** More different keys than this are no list of sources but a text. */
export const KEYS_AT_MOST = 60;
const LONGEST_KEY = 100;

/** The different texts of each column in the order they come, where they are few and short enough to be keys. */
export function keysOfColumns(sheet: DecodedSheet): string[][] {
  const keys = sheet.heads.map(() => new Set<string>());
  for (const row of sheet.rows) {
    if (row.number < sheet.headRow || isComment(row.cells) || isUnitsRow(row.cells)) continue;
    if (row.cells.filter((cell) => cell.trim() !== "").length < 2) continue;
    for (const [index, seen] of keys.entries()) {
      const cell = row.cells[index]?.trim() ?? "";
      if (cell !== "" && cell !== sheet.heads[index] && seen.size <= KEYS_AT_MOST) seen.add(cell);
    }
  }
  return keys.map((seen) =>
    seen.size > KEYS_AT_MOST || [...seen].some((key) => key.length > LONGEST_KEY) ? [] : [...seen],
  );
}

/** A source that a key may stand for. */
export interface KeyedSource {
  readonly sourceId: string;
  readonly citation: Citation;
  readonly doi: string | null;
}

/**
 * The known source that a key seems to stand for: by its DOI, its own citation key, its short citation, first author and
 * year, or because every word of the key occurs in one source only. Null when none or several could be meant; the steward
 * confirms it.
 */
export function guessSource(key: string, sources: readonly KeyedSource[]): string | null {
  const only = (fits: (source: KeyedSource) => boolean): string | null => {
    const found = sources.filter(fits);
    return found.length === 1 ? (found[0]?.sourceId ?? null) : null;
  };
  const doi = bareDoi(key).toLowerCase();
  const plain = lettersOf(key);
  if (plain === "") return null;
  return (
    only((one) => one.doi?.toLowerCase() === doi) ??
    only((one) => namesOf(one.citation).some((name) => lettersOf(name) === plain)) ??
    only((one) => {
      const words = wordsOf(
        [
          text(one.citation["title"]),
          ...authorsOf(one.citation).map((author) => author.family),
          yearOf(one.citation),
        ].join(" "),
      );
      return wordsOf(key).every((word) => words.includes(word));
    })
  );
}

/** What a source could be called in a column of keys. */
function namesOf(citation: Citation): string[] {
  const year = yearOf(citation);
  const first = authorsOf(citation)[0]?.family ?? "";
  return [
    text(citation["id"]),
    text(citation["citation-key"]),
    text(citation["title"]),
    shortCitation(citation),
    ...(first !== "" && year !== "" ? [`${first}${year}`, `${first}${year.slice(2)}`] : []),
  ].filter((name) => name !== "");
}

const lettersOf = (words: string): string => words.toLowerCase().replace(/[^\p{L}\p{N}]/gu, "");

const wordsOf = (words: string): string[] => words.toLowerCase().match(/[\p{L}\p{N}]+/gu) ?? [];
