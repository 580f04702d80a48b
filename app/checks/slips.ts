import {
  compare,
  type Digits,
  digits,
  isZero,
  multiply,
  negate,
  places,
  readDigits,
  roundTo,
} from "#app/thermo/digits.ts";
import { showDigits } from "#app/thermo/notation.ts";
import { readNumber } from "#app/thermo/number.ts";
import { type Property, propertyInfo } from "#app/thermo/property.ts";
import { convert, type Unit } from "#app/thermo/unit.ts";
import type { ViewedValue } from "./types.ts";
import { symbolOf } from "./words.ts";

/*
 * How good numbers go bad, one slip at a time. Each slip is undone on the number as it was printed, in the unit the
 * source used, because that is where it happened: two digits exchanged in a kilocalorie column are two digits of the
 * kilocalorie value. A repaired number keeps the precision of what was printed.
 */

export type ValueSlipCode =
  | "sign-lost"
  | "digits-exchanged"
  | "digit-misread"
  | "decimal-moved"
  | "thousandfold"
  | "thousandth"
  | "calories-as-joules"
  | "joules-as-calories";

/** What a value would be, had this one slip not happened. */
export interface ValueSlip {
  readonly code: ValueSlipCode;
  /** In the table's unit. */
  readonly becomes: Digits;
  /** As the source would have printed it; null where that is the table's own unit. */
  readonly given: { readonly text: Digits; readonly unit: Unit } | null;
}

/**
 * How often a printed value suffers exactly this slip, for ranking. Rough judgement of the trade, not a measurement: what
 * counts is the order, and that a digit can be misread in dozens of ways of which each one is rare. Common practice.
 */
export const VALUE_SLIP_FREQUENCY: Readonly<Record<ValueSlipCode, number>> = {
  "sign-lost": 0.008,
  "digits-exchanged": 0.002,
  "digit-misread": 0.0002,
  "decimal-moved": 0.001,
  thousandfold: 0.005,
  thousandth: 0.005,
  "calories-as-joules": 0.005,
  "joules-as-calories": 0.002,
};

const KILO: Partial<Record<Unit, Unit>> = {
  "J/mol": "kJ/mol",
  "cal/mol": "kcal/mol",
  "J/(mol K)": "kJ/(mol K)",
  "cal/(mol K)": "kcal/(mol K)",
};

const IN_CALORIES: Partial<Record<Unit, Unit>> = {
  "kJ/mol": "kcal/mol",
  "J/mol": "cal/mol",
  "J/(mol K)": "cal/(mol K)",
  "kJ/(mol K)": "kcal/(mol K)",
};

const IN_JOULES: Partial<Record<Unit, Unit>> = {
  "kcal/mol": "kJ/mol",
  "cal/mol": "J/mol",
  "cal/(mol K)": "J/(mol K)",
  "kcal/(mol K)": "kJ/(mol K)",
};

/** The number as its source printed it, and the unit it was printed in. */
export function printedValue(value: Pick<ViewedValue, "property" | "digits" | "given">): {
  digits: Digits;
  unit: Unit;
} {
  const { unit } = propertyInfo[value.property];
  if (value.given === null) return { digits: value.digits, unit };
  const { text, unit: givenUnit } = value.given;
  const reading = readNumber(text);
  const readings =
    reading.outcome === "read" ? [reading.value] : reading.outcome === "ambiguous" ? reading.candidates : [];
  // Of two readings, the one that became the table's value; back from the value where the text tells nothing.
  const own = readings.find((one) => convert(one.digits, givenUnit, unit).digits === value.digits);
  return { digits: own?.digits ?? convert(value.digits, unit, givenUnit).digits, unit: givenUnit };
}

/**
 * Every value that one slip could have turned into this one.
 *
 * @param mayBeNegative whether the quantity can be below zero; the entropy of a pure substance cannot
 */
export function valueSlips(
  value: Pick<ViewedValue, "property" | "digits" | "given">,
  mayBeNegative: boolean,
): ValueSlip[] {
  if (isZero(value.digits)) return [];
  const canonical = propertyInfo[value.property].unit;
  const printed = printedValue(value);
  const slips: ValueSlip[] = [];
  const take = (code: ValueSlipCode, number: Digits, unit: Unit): void => {
    const becomes = convert(number, unit, canonical).digits;
    if (compare(becomes, value.digits) === 0) return;
    if (!mayBeNegative && compare(becomes, digits("0")) <= 0) return;
    slips.push({ code, becomes, given: unit === canonical ? null : { text: number, unit } });
  };
  const { digits: number, unit } = printed;

  if (mayBeNegative) take("sign-lost", negate(number), unit);
  for (const one of exchanged(number)) take("digits-exchanged", one, unit);
  for (const one of misread(number)) take("digit-misread", one, unit);
  for (const shift of [1, -1, 2, -2]) {
    const moved = movePoint(number, shift);
    if (moved !== undefined) take("decimal-moved", moved, unit);
  }

  const kilo = KILO[unit];
  if (kilo !== undefined) take("thousandfold", number, kilo);
  else take("thousandfold", scaleUp(number), unit);
  take("thousandth", multiply(number, "0.001"), unit);

  const calories = IN_CALORIES[unit];
  if (calories !== undefined) {
    take("calories-as-joules", number, calories);
    // Already joules, converted from calories a second time.
    take("joules-as-calories", convert(number, unit, calories).digits, unit);
  }
  const joules = IN_JOULES[unit];
  if (joules !== undefined) take("joules-as-calories", number, joules);
  return slips;
}

/** The slip as the start of a sentence that goes on with "would explain it". */
export function slipWords(code: ValueSlipCode, property: Property): string {
  const symbol = symbolOf(property);
  switch (code) {
    case "sign-lost":
      return `the sign of ${symbol} lost`;
    case "digits-exchanged":
      return `two digits of ${symbol} exchanged`;
    case "digit-misread":
      return `one digit of ${symbol} misread`;
    case "decimal-moved":
      return `the decimal point of ${symbol} moved`;
    case "thousandfold":
      return `${symbol} in kilojoules taken as joules, or a thousands mark taken for a decimal point,`;
    case "thousandth":
      return `${symbol} in joules taken as kilojoules, or a decimal comma taken for a thousands mark,`;
    case "calories-as-joules":
      return `${symbol} in calories taken as joules`;
    case "joules-as-calories":
      return `${symbol} in joules converted as if it were in calories`;
  }
}

/** The repaired number: in the source's unit first where that differs from the table's. */
export function slipNumber(slip: Pick<ValueSlip, "becomes" | "given">, property: Property): string {
  if (slip.given === null) return showDigits(slip.becomes);
  return `${showDigits(slip.given.text)} ${slip.given.unit}, which is ${showDigits(slip.becomes)} ${propertyInfo[property].unit},`;
}

/** Two neighbouring digits exchanged, also across the decimal point. */
function exchanged(number: Digits): Digits[] {
  const at = digitPositions(number);
  return at.slice(0, -1).flatMap((position, index) => {
    const next = at[index + 1] ?? position;
    const [a, b] = [number[position] ?? "", number[next] ?? ""];
    return a === b ? [] : respelled(replaceAt(replaceAt(number, position, b), next, a));
  });
}

/** One digit read as any other. */
function misread(number: Digits): Digits[] {
  return digitPositions(number).flatMap((position) =>
    Array.from("0123456789")
      .filter((digit) => digit !== number[position])
      .flatMap((digit) => respelled(replaceAt(number, position, digit))),
  );
}

/** The point moved by so many places (right when positive); undefined where that would invent digits. */
function movePoint(number: Digits, shift: number): Digits | undefined {
  if (shift > places(number)) return undefined;
  return shift > 0
    ? roundTo(multiply(number, `1${"0".repeat(shift)}`), places(number) - shift)
    : multiply(number, `0.${"0".repeat(-shift - 1)}1`);
}

function scaleUp(number: Digits): Digits {
  return roundTo(multiply(number, "1000"), Math.max(0, places(number) - 3));
}

function digitPositions(number: string): number[] {
  return Array.from(number, (character, index) => (/\d/.test(character) ? index : -1)).filter((index) => index >= 0);
}

function replaceAt(text: string, index: number, character: string): string {
  return text.slice(0, index) + character + text.slice(index + 1);
}

/** Numbers as people print them: no zero in front of other digits. */
function respelled(text: string): Digits[] {
  if (/^-?0\d/.test(text)) return [];
  const read = readDigits(text);
  return read === undefined ? [] : [read];
}
