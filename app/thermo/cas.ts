import { refused, type Reading } from "./reading.ts";

/** Reads a CAS Registry Number and checks its last digit. */
export function readCas(text: string): Reading<string> {
  return refused(`${text} cannot be read.`);
}
