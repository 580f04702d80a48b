import { type ReadNumber, type NumberOptions, readNumber, spellNumber } from "./number.ts";
import { ambiguous, isTooLong, quote, read, type Reading, refused } from "./reading.ts";
import { markedText } from "./typography.ts";
import { readUnit, type Unit } from "./unit.ts";

/** A number with the unit that stands in the same cell. */
export interface ReadQuantity {
  number: ReadNumber;
  unit: Unit;
}

/** As long as any number and any unit. */
const LONGEST_CELL = 140;

/** What may stand behind the unit and belongs to the number: `(−285.830 ± 0.040) kJ/mol, k = 2`. */
const COVERAGE = /[\s,;]*\(?\s*(?:k\s*=\s*\d|[12]\s?(?:σ|sigma|s\.?d\.?)|95\s?%)\s*\)?$/i;

/**
 * Reads a number with its unit from one cell: `-285.83 ± 0.04 kJ/mol`, `69.95 J/(mol K)`, `16.7 e.u.`. For cells of a
 * column that names no unit; a text without a unit is refused, so that no unit is ever taken for granted.
 */
export function readQuantity(text: string, options: NumberOptions = {}): Reading<ReadQuantity> {
  const marked = isTooLong(text) ? text : markedText(text).trim();
  if (marked.length > LONGEST_CELL) return refused(`${quote(text)} is too long for a number with its unit.`);
  const coverage = COVERAGE.exec(marked)?.[0] ?? "";
  const plain = withoutFirstUnit(marked.slice(0, marked.length - coverage.length));
  let unreadUnit: string | undefined;
  for (const start of unitStarts(plain)) {
    const unit = readUnit(plain.slice(start));
    if (unit.outcome === "refused") {
      unreadUnit ??= unit.sentence;
      continue;
    }
    const number = readNumber(plain.slice(0, start).trim() + coverage, options);
    if (number.outcome === "refused") return number;
    const numbers = number.outcome === "read" ? [number.value] : number.candidates;
    const units = unit.outcome === "read" ? [unit.value] : unit.candidates;
    const both = numbers.flatMap((one) => units.map((other): ReadQuantity => ({ number: one, unit: other })));
    if (number.outcome === "read" && unit.outcome === "read") {
      return read({ number: number.value, unit: unit.value }, [...number.notes, ...unit.notes]);
    }
    const sentences = [number, unit].flatMap((one) => (one.outcome === "ambiguous" ? [one.sentence] : []));
    return ambiguous(both, sentences.join(" "));
  }
  const bare = readNumber(text, options);
  if (bare.outcome === "refused") return unreadUnit === undefined ? bare : refused(unreadUnit);
  return refused(`${quote(text.trim())} has no unit. Write it behind the number, as in 69.95 J/(mol K).`);
}

/** The plain spelling that `readQuantity` reads as just this. */
export function spellQuantity({ number, unit }: ReadQuantity): string {
  return `${spellNumber(number)} ${unit}`;
}

/** `-285.83 kJ/mol ± 0.04 kJ/mol` names its unit twice; the second one stays. */
function withoutFirstUnit(plain: string): string {
  const [, value = "", first = "", spread = "", second = ""] =
    /^([\d\s.,+-]+?)\s*([A-Za-z][^±]*?)\s*((?:±|\+\/-)\s*[\d.,]+)\s*([A-Za-z].*)$/.exec(plain) ?? [];
  return first !== "" && first === second ? `${value} ${spread} ${second}` : plain;
}

/** Where a unit may begin: behind the digits or a closing bracket, at a letter or an opening bracket. */
function unitStarts(plain: string): number[] {
  return [...plain.matchAll(/(?<=[\d.)\]}]\s*)[A-Za-z([/]/g)].map((match) => match.index);
}
