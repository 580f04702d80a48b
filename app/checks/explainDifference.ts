import { add, compare, halfUnit, isZero, subtract, toNumber } from "#app/thermo/digits.ts";
import { showDigits } from "#app/thermo/notation.ts";
import { explanationSentence, ranked } from "./ranking.ts";
import { slipNumber, slipWords, VALUE_SLIP_FREQUENCY, valueSlips } from "./slips.ts";
import type { Suggestion, ViewedValue } from "./types.ts";

/**
 * The single slips that lead from what stands to this value: undone, they give the standing value again to its printed
 * digits. A value that was truly measured anew hits one of them only by chance, so nothing wider counts.
 */
export function explainDifference(value: ViewedValue, standing: ViewedValue, isSolute: boolean): Suggestion[] {
  if (isZero(standing.digits)) return [];
  const mayBeNegative = value.property !== "entropy" || isSolute;
  const open = toNumber(add(halfUnit(value.digits), halfUnit(standing.digits)));
  const explanations = valueSlips(value, mayBeNegative)
    .filter((slip) => Math.abs(toNumber(subtract(slip.becomes, standing.digits))) <= open)
    .map((item) => ({ item, score: Math.log(VALUE_SLIP_FREQUENCY[item.code]) }));
  return ranked(explanations).map(({ item, rank }, index) => ({
    property: value.property,
    becomes: item.becomes,
    slip: item.code,
    sentence: explanationSentence(
      slipWords(item.code, value.property),
      compare(item.becomes, standing.digits) === 0
        ? `${slipNumber(item, value.property).replace(/,$/, "")} is what stands`
        : `${slipNumber(item, value.property)} agrees with what stands, ${showDigits(standing.digits)}`,
      rank,
      index,
    ),
    also: [],
    rank,
    before: null,
    after: null,
  }));
}
