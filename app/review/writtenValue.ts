import { digits, type Digits, isZero, toNumber } from "#app/thermo/digits.ts";
import { showDigits } from "#app/thermo/notation.ts";
import { readNumber, type ReadNumber } from "#app/thermo/number.ts";
import { type Property, propertyInfo } from "#app/thermo/property.ts";
import { plainText } from "#app/thermo/typography.ts";
import type { Uncertainty } from "#app/thermo/uncertainty.ts";
import { convert, isLikeUnit, readUnit, type Unit } from "#app/thermo/unit.ts";
import type { UncertaintyContent, ValueContent } from "./content.ts";

/*
 * A value as a person writes it into a form: read by the readers that read a sheet's cells, converted by the same rules,
 * and asked about where it has two readings.
 */

/** How an uncertainty can be stated in a form. */
export const UNCERTAINTY_CHOICES = ["standard", "expanded", "unstated", "exact", "none"] as const;
export type UncertaintyChoice = (typeof UNCERTAINTY_CHOICES)[number];

/** The fields of a written value, as typed. */
export interface WrittenFigure {
  value: string;
  unit: string;
  uncertainty: string;
  kind: UncertaintyChoice;
  /** Coverage factor of an expanded uncertainty; left out or empty it is 2. */
  k?: string;
  /** Which of its readings an ambiguous number is meant as, in digits; what fits none of them is not heeded. */
  valueIs?: string;
  uncertaintyIs?: string;
  /** An empty uncertainty says that none is stated, whatever kind is chosen: one choice serves several values. */
  mayStateNone?: boolean;
}

export type FigureField = "value" | "unit" | "uncertainty" | "k";

/** What writing came to, or what is wrong with which field and, where a number has two readings, which they are. */
export type ReadFigure =
  | { outcome: "read"; figure: Pick<ValueContent, "digits" | "uncertainty" | "given"> }
  | {
      outcome: "wrong";
      errors: Partial<Record<FigureField, string>>;
      readings: Partial<Record<"value" | "uncertainty", readonly Digits[]>>;
    };

/**
 * Reads what was written. An uncertainty written with the value, "−45.94(35)" or "−45.94 ± 0.35", counts; otherwise the
 * field beside it does. Text and unit stay as they were given.
 */
export function readFigure(written: WrittenFigure, property: Property): ReadFigure {
  const errors: Partial<Record<FigureField, string>> = {};
  const readings: Partial<Record<"value" | "uncertainty", readonly Digits[]>> = {};
  const value = number(written.value, written.valueIs);
  if (value.outcome === "wrong") {
    errors.value = value.sentence;
    if (value.readings) readings.value = value.readings;
  }
  const unit = unitOf(written.unit, property);
  if (unit.outcome === "wrong") errors.unit = unit.sentence;
  const within = value.outcome === "read" ? value.number.uncertainty : undefined;
  const beside = within ? { outcome: "read" as const, uncertainty: null } : readBeside(written);
  if (beside.outcome === "wrong") {
    errors[beside.field] = beside.sentence;
    if (beside.readings) readings.uncertainty = beside.readings;
  }
  if (value.outcome === "wrong" || unit.outcome === "wrong" || beside.outcome === "wrong") {
    return { outcome: "wrong", errors, readings };
  }
  const stated: Uncertainty | null = within ? statedWithin(within, written) : beside.uncertainty;
  const own = propertyInfo[property].unit;
  const converted = convert(value.number.digits, unit.unit, own);
  const uncertainty: UncertaintyContent | null = stated && {
    ...stated,
    digits: convert(stated.digits, unit.unit, own).digits,
  };
  const spelled = written.unit.trim();
  const notes = [
    spelled === unit.unit ? null : `unit given as ${spelled}`,
    written.valueIs && value.settled ? `read as ${showDigits(value.number.digits)}` : null,
    converted.note,
  ].filter((note) => note !== null);
  return {
    outcome: "read",
    figure: {
      digits: converted.digits,
      uncertainty,
      given: { text: written.value.trim(), unit: unit.unit, note: notes.length > 0 ? notes.join("; ") : null },
    },
  };
}

type NumberRead =
  | { outcome: "read"; number: ReadNumber; /** It had two readings, and the person chose one. */ settled: boolean }
  | { outcome: "wrong"; sentence: string; readings?: readonly Digits[] };

function number(text: string, is: string | undefined): NumberRead {
  const reading = readNumber(text);
  switch (reading.outcome) {
    case "read":
      return { outcome: "read", number: reading.value, settled: false };
    case "refused":
      return { outcome: "wrong", sentence: reading.sentence };
    case "ambiguous": {
      const meant = reading.candidates.find((one) => one.digits === is);
      if (meant) return { outcome: "read", number: meant, settled: true };
      const readings = reading.candidates.map((one) => one.digits);
      return {
        outcome: "wrong",
        sentence: `“${text.trim()}” can be read as ${readings.map(showDigits).join(" or as ")}. Say which it is.`,
        readings,
      };
    }
  }
}

type UnitRead = { outcome: "read"; unit: Unit } | { outcome: "wrong"; sentence: string };

function unitOf(text: string, property: Property): UnitRead {
  const { symbol, unit: own } = propertyInfo[property];
  const reading = readUnit(text);
  if (reading.outcome !== "read") return { outcome: "wrong", sentence: reading.sentence };
  if (!isLikeUnit(reading.value, own)) {
    return {
      outcome: "wrong",
      sentence: `${symbol} is written in ${own} or its like, not in ${plainText(text).trim()}.`,
    };
  }
  return { outcome: "read", unit: reading.value };
}

/** An uncertainty written with the value. What stands after ± is of the kind chosen beside it, if one was. */
function statedWithin(within: NonNullable<ReadNumber["uncertainty"]>, { kind, k }: WrittenFigure): Uncertainty {
  const factor = coverageFactor(k ?? "");
  if (within.kind === "unstated" && kind === "standard") return { ...within, kind, coverageFactor: null };
  if (within.kind === "unstated" && kind === "expanded" && factor !== undefined) {
    return { ...within, kind, coverageFactor: factor };
  }
  return { ...within, coverageFactor: null };
}

type Beside =
  | { outcome: "read"; uncertainty: Uncertainty | null }
  | { outcome: "wrong"; field: "uncertainty" | "k"; sentence: string; readings?: readonly Digits[] };

/** The uncertainty from the fields of its own. */
function readBeside({ uncertainty: text, uncertaintyIs, kind, k, mayStateNone }: WrittenFigure): Beside {
  const wrong = (sentence: string, readings?: readonly Digits[]): Beside => ({
    outcome: "wrong",
    field: "uncertainty",
    sentence,
    ...(readings ? { readings } : {}),
  });
  const empty = text.trim() === "";
  if (kind === "none") {
    return empty
      ? { outcome: "read", uncertainty: null }
      : wrong("An uncertainty is given, but “none stated” is chosen. Say which kind it is.");
  }
  if (kind === "exact") {
    return { outcome: "read", uncertainty: { digits: digits("0"), kind: "exact", coverageFactor: null } };
  }
  if (empty && mayStateNone) return { outcome: "read", uncertainty: null };
  if (empty) return wrong("Give the uncertainty, or choose “none stated”.");
  const reading = number(text, uncertaintyIs);
  if (reading.outcome === "wrong") return wrong(reading.sentence, reading.readings);
  const stated = reading.number.digits;
  if (stated.startsWith("-") || isZero(stated)) return wrong("An uncertainty is larger than zero.");
  const factor = kind === "expanded" ? coverageFactor(k ?? "") : null;
  if (factor === undefined) {
    return { outcome: "wrong", field: "k", sentence: "The coverage factor k is a number such as 2 or 1.96." };
  }
  return { outcome: "read", uncertainty: { digits: stated, kind, coverageFactor: factor } };
}

/** Larger coverage factors do not occur: even 99.9 % of a Student distribution with three degrees of freedom needs 13. */
const LARGEST_K = 20;

function coverageFactor(text: string): number | undefined {
  if (text.trim() === "") return 2;
  const reading = readNumber(text, { decimalComma: text.includes(",") });
  if (reading.outcome !== "read") return undefined;
  const k = toNumber(reading.value.digits);
  return k > 0 && k <= LARGEST_K ? k : undefined;
}
