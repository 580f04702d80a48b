import { comparableDoi, isDoi } from "#app/sources/doi.ts";

/*
 * What somebody typed into the find box, read every way it can be meant. Pure.
 */

/** Numbers that the text may be. `named` when it says which kind, "edition 2", and not just "2". */
export interface FoundNumbers {
  edition: number | null;
  revision: number | null;
  named: boolean;
}

const NUMBER = /^(?:(edition|ed\.?|revision|rev\.?)\s*(?:no\.?|number|#)?\s*|#\s*)?(\d{1,9})$/i;

/** Reads "edition 2", "revision 14", "rev. 14", "#14" or just a number, which may be either. */
export function readNumbers(text: string): FoundNumbers {
  const [, word, digits] = NUMBER.exec(text.trim()) ?? [];
  const number = digits === undefined || Number(digits) === 0 ? null : Number(digits);
  const kind = word?.toLowerCase().charAt(0);
  return {
    edition: kind === "r" ? null : number,
    revision: kind === "e" ? null : number,
    named: number !== null && kind !== undefined,
  };
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

/** A DOI in the form in which DOIs are compared, from any way of writing it: "https://doi.org/10.1063/1.555845". */
export function readDoi(text: string): string | null {
  const doi = comparableDoi(text);
  return isDoi(doi) ? doi : null;
}
