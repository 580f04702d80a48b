import { PROPERTIES, propertyInfo } from "#app/thermo/property.ts";
import type { SourceField } from "#app/sources/sourceFields.ts";
import { UNITS } from "#app/thermo/unit.ts";
import { COLUMN_MEANS, meaningWords } from "./meaning.ts";
import type { PlannedColumn } from "./plan.ts";

/*
 * The form in which the steward confirms what the columns hold: the names of its fields and what their choices are
 * called. Apart from the reading of the form, so that a browser loads no more than it shows.
 */

/** Names of the fields of a column. */
export const meansField = (index: number): string => `means.${index}`;
export const unitField = (index: number): string => `unit.${index}`;

/** The field of the answer to a source key, by its place among the keys of its column; `.title` and so on behind it. */
export const keyField = (index: number): string => `key.${index}`;

/** The value of a column's choice: its meaning and, where that needs one, the quantity (`value:entropy`). */
export function meaningValue(column: Pick<PlannedColumn, "means" | "property">): string {
  return column.property === null ? column.means : `${column.means}:${column.property}`;
}

/** The choices of a column, each with its words. */
export const MEANING_OPTIONS: readonly (readonly [string, string])[] = [
  ...PROPERTIES.map((property) => [`value:${property}`, propertyInfo[property].symbol] as const),
  ...PROPERTIES.map(
    (property) => [`uncertainty:${property}`, `uncertainty of ${propertyInfo[property].symbol}`] as const,
  ),
  ...COLUMN_MEANS.filter((means) => means !== "value" && means !== "uncertainty").map(
    (means) => [means, meaningWords[means]] as const,
  ),
];

/** The choices of a unit; the empty one is no unit. */
export const UNIT_OPTIONS: readonly (readonly [string, string])[] = [
  ["", "—"],
  ...UNITS.map((unit) => [unit, unit] as const),
];

/** Whether a column with this choice carries a unit of its own. */
export function takesUnit(meaning: string): boolean {
  return meaning.startsWith("value:") || meaning === "anyValue";
}

/** The fields about the whole sheet, with their choices. */
export const SETTING_OPTIONS = {
  temperature: [
    ["", "say at which temperature"],
    ["298.15", "298.15 K (25 °C)"],
  ],
  standardPressure: [
    ["", "say at which pressure"],
    ["100000", "100 kPa (1 bar)"],
    ["101325", "101.325 kPa (1 atm)"],
  ],
  uncertaintyKind: [
    ["", "say which kind"],
    ["expanded", "expanded, k = 2 (about 95 %)"],
    ["standard", "standard (one standard deviation)"],
    ["unstated", "of a kind the source does not say"],
  ],
  basis: [
    ["", "not said"],
    ["molality", "1 mol per kg of water"],
    ["concentration", "1 mol per litre"],
  ],
  decimalComma: [
    ["", "12.5 (a point)"],
    ["on", "12,5 (a comma)"],
  ],
  solidIs: [
    ["cr", "crystal (cr)"],
    ["s", "solid of a form not said (s)"],
  ],
} as const satisfies Record<string, readonly (readonly [string, string])[]>;

/** What is asked of a source that is described for one key: enough to find it; the rest is mended on its page. */
export const KEY_SOURCE_FIELDS: ReadonlySet<SourceField> = new Set([
  "authors",
  "title",
  "container",
  "year",
  "doi",
  "sourceKind",
]);

/** The choice of the source field that stands for one described below it. */
export const NEW_SOURCE = "new";
