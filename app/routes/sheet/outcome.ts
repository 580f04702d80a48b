import type { FieldError } from "#app/http/errors.ts";

/** What came of mending a cell. */
export interface RepairOutcome {
  ok: boolean;
  sentence: string;
}

/** What came of a form of the page that could not be done; what was typed comes back, so that nothing is lost. */
export interface SheetOutcome {
  intent: string;
  sentence: string;
  errors: FieldError[];
  typed: Readonly<Record<string, string>>;
}
