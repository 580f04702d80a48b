import { comparableDoi, isDoi } from "#app/sources/doi.ts";

/*
 * What somebody typed into the find box, read every way it can be meant. Pure.
 */

/** Numbers that the text may be. `named` when it says which kind, "edition 2", and not just "2". */
export interface FoundNumbers {
  edition: number | null;
  revision: number | null;
  sheet: number | null;
  named: boolean;
}

const NUMBER = /^(?:(edition|ed\.?|revision|rev\.?|sheet)\s*(?:no\.?|number|#)?\s*|#\s*)?(\d{1,9})$/i;

/** Reads "edition 2", "revision 14", "rev. 14", "sheet 3", "#14" or just a number, which may be any of them. */
export function readNumbers(text: string): FoundNumbers {
  const [, word, digits] = NUMBER.exec(text.trim()) ?? [];
  const number = digits === undefined || Number(digits) === 0 ? null : Number(digits);
  const kind = word?.toLowerCase().charAt(0);
  const as = (letter: string): number | null => (kind === undefined || kind === letter ? number : null);
  return { edition: as("e"), revision: as("r"), sheet: as("s"), named: number !== null && kind !== undefined };
}

/** A DOI in the form in which DOIs are compared, from any way of writing it: "https://doi.org/10.1063/1.555845". */
export function readDoi(text: string): string | null {
  const doi = comparableDoi(text);
  return isDoi(doi) ? doi : null;
}
