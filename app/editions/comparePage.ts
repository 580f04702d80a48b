import { diffWordsWithSpace } from "diff";
import { type Digits, isZero, toNumber } from "#app/thermo/digits.ts";
import { showDigits, showNumber } from "#app/thermo/notation.ts";
import { PROPERTIES, type Property } from "#app/thermo/property.ts";
import { expandedUncertainty, type Uncertainty } from "#app/thermo/uncertainty.ts";
import type { TextChange, ValueChange } from "./compare.ts";
import type { ValueAsOf } from "./editions.queries.server.ts";

/** A run of a text that both have, or that only the first or the second has. */
export interface TextRun {
  kind: "same" | "went" | "came";
  text: string;
}

/** A text change word by word. */
export function wordRuns({ before, after }: TextChange): TextRun[] {
  return diffWordsWithSpace(before, after).map(({ value, added, removed }) => ({
    kind: added ? "came" : removed ? "went" : "same",
    text: value,
  }));
}

interface Side {
  digits: Digits;
  uncertainty: Uncertainty | null;
  sourceId: string;
}

/** A change as the comparison's table shows it. */
export interface ShownChange {
  what: ValueChange["what"];
  speciesId: string;
  key: string;
  property: Property;
  before: Side | null;
  after: Side | null;
  difference: Digits | null;
  /** In per cent, as printed; null where it says nothing. */
  relative: string | null;
  /** E_n as printed; null where it is not defined. */
  normalizedError: string | null;
  /** The difference is larger than both uncertainties allow. */
  beyond: boolean;
  /** What else or what alone differs, in words. */
  remark: string;
}

const ASPECTS: Readonly<Record<ValueChange["aspects"][number], string>> = {
  value: "value",
  digits: "digits only",
  uncertainty: "uncertainty",
  source: "source",
  state: "standard state",
  origin: "origin",
};

function side(value: ValueAsOf | null): Side | null {
  return value && { digits: value.digits, uncertainty: value.uncertainty, sourceId: value.sourceId };
}

/** Shapes a change for the table. */
export function shownChange(change: ValueChange<ValueAsOf>): ShownChange {
  const { what, speciesId, key, property, difference, relative, normalizedError, aspects } = change;
  const moved = difference !== null && !isZero(difference);
  const others = aspects.filter((aspect) => aspect !== "value");
  return {
    what,
    speciesId,
    key,
    property,
    before: side(change.before),
    after: side(change.after),
    difference,
    relative: relative === null || !moved ? null : percent(relative),
    normalizedError: normalizedError === null || !moved ? null : showNumber(normalizedError, 2),
    beyond: moved && normalizedError !== null && normalizedError > 1,
    remark: others.map((aspect) => ASPECTS[aspect]).join(", "),
  };
}

/** With two significant digits, or none behind the point from 10 % on. */
function percent(relative: number): string {
  const size = Math.abs(relative) * 100;
  return showNumber(relative * 100, Math.min(6, Math.max(0, 1 - Math.floor(Math.log10(size)))));
}

/** Differences of one property as the drawing takes them. */
export interface DrawnDifferences {
  property: Property;
  differences: { key: string; difference: number; /** With its sign. */ printed: string; expanded: number | null }[];
  /** How many more there are than are drawn. */
  left: number;
}

/** Most differences drawn of one property. */
const MOST_DRAWN = 12;

/** The largest differences of each property: by E_n where it is defined, else by size. */
export function drawnDifferences(changes: readonly ValueChange<ValueAsOf>[]): DrawnDifferences[] {
  return PROPERTIES.flatMap((property) => {
    const moved = changes.filter(
      (change) => change.property === property && change.difference !== null && !isZero(change.difference),
    );
    if (moved.length === 0) return [];
    const weight = (change: ValueChange): number => change.normalizedError ?? 0;
    const size = (change: ValueChange): number => Math.abs(toNumber(change.difference ?? ("0" as Digits)));
    const drawn = [...moved].sort((a, b) => weight(b) - weight(a) || size(b) - size(a)).slice(0, MOST_DRAWN);
    return [
      {
        property,
        differences: drawn.flatMap(({ key, difference, before, after }) =>
          difference === null
            ? []
            : [{ key, difference: toNumber(difference), printed: signed(difference), expanded: joined(before, after) }],
        ),
        left: moved.length - drawn.length,
      },
    ];
  });
}

/** √(Ua² + Ub²), or null where one is missing. */
function joined(before: ValueAsOf | null, after: ValueAsOf | null): number | null {
  const a = expandedUncertainty(before?.uncertainty ?? null);
  const b = expandedUncertainty(after?.uncertainty ?? null);
  return a === null || b === null ? null : Math.hypot(a, b);
}

function signed(difference: Digits): string {
  return `${toNumber(difference) > 0 ? "+" : ""}${showDigits(difference)}`;
}
