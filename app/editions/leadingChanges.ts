import type { Digits } from "#app/thermo/digits.ts";
import type { Property } from "#app/thermo/property.ts";
import type { Uncertainty } from "#app/thermo/uncertainty.ts";
import type { ComparedValue, ValueChange, What } from "./compare.ts";

/*
 * The changes of an edition worth naming where there is no room for all of them. Pure.
 */

/** A figure as it stood on one side of a change. */
export interface Stood {
  digits: Digits;
  uncertainty: Uncertainty | null;
}

/** One value that an edition changed, brought or took out. */
export interface ListedChange {
  what: What;
  key: string;
  property: Property;
  before: Stood | null;
  after: Stood | null;
  difference: Digits | null;
  normalizedError: number | null;
}

const TURN: Record<What, number> = { changed: 0, went: 1, came: 2 };

/**
 * The first `limit` changes: changed values, those furthest beyond their uncertainties first, then what went, then what
 * came. Equals keep the order in which they are given.
 */
export function leadingChanges(changes: readonly ValueChange<ComparedValue>[], limit: number): ListedChange[] {
  return [...changes]
    .sort((a, b) => TURN[a.what] - TURN[b.what] || Math.abs(b.normalizedError ?? 0) - Math.abs(a.normalizedError ?? 0))
    .slice(0, limit)
    .map(({ what, key, property, before, after, difference, normalizedError }) => ({
      what,
      key,
      property,
      before: before && stood(before),
      after: after && stood(after),
      difference,
      normalizedError,
    }));
}

function stood({ digits, uncertainty }: ComparedValue): Stood {
  return { digits, uncertainty };
}
