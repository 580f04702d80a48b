import type { SheetState } from "./states.ts";
import type { Additions } from "./match.ts";
import type { CellProblem, Repair } from "./readRows.ts";

/** A sheet in the list of sheets. */
export interface ListedSheet {
  id: number;
  name: string;
  state: SheetState;
  receivedAt: Date;
  by: string;
  rowsTotal: number;
  rowsDone: number;
  refused: number;
  revisionId: number | null;
}

/** A cell of a row that was refused. */
export interface ShownCell {
  column: number;
  /** As it reads now, with its newest repair. */
  text: string;
  /** As uploaded, when it was mended. */
  original: string | null;
  wrong: boolean;
}

/** A refused row as the page shows it. */
export interface RefusedRow {
  number: number;
  cells: ShownCell[];
  problems: readonly CellProblem[];
  /** The answer to "which species is this?", where it was given. */
  answer: string | null;
  leftOut: boolean;
}

/** A row that was read, in short. */
export interface ReadRowLine {
  number: number;
  key: string;
  isNew: boolean;
  /** What the row adds to what the table calls the species. */
  adds: Additions | null;
  sourceKey: string | null;
  /** `note` is the conversion that was applied. */
  values: { property: string; digits: string; given: string; unit: string; note: string | null }[];
}

/** A repair with what the form that makes it has to send. */
export interface OfferedRepair extends Repair {
  was: string;
}

/** "18 kB", "3.2 MB". */
export function sizeInWords(bytes: number): string {
  if (bytes < 1000) return `${bytes} bytes`;
  if (bytes < 1_000_000) return `${Math.round(bytes / 1000)} kB`;
  return `${(bytes / 1_000_000).toFixed(1)} MB`;
}

/** The delimiter as a word. */
export const delimiterWords = { ",": "commas", ";": "semicolons", "\t": "tabs" } as const;
