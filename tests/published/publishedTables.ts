import { readFileSync } from "node:fs";
import Papa from "papaparse";
import type { ClosureValue, ElementEntropy } from "#app/thermo/closure.ts";
import { type Digits, digits } from "#app/thermo/digits.ts";
import { readFormula } from "#app/thermo/formula.ts";
import { normalizeLabel } from "#app/thermo/label.ts";
import { readNumber } from "#app/thermo/number.ts";
import { readPhase } from "#app/thermo/phase.ts";
import { isConventionalZero, isReferenceState, referenceStateOf } from "#app/thermo/referenceStates.ts";
import type { Property } from "#app/thermo/property.ts";
import type { Reading } from "#app/thermo/reading.ts";
import { formatKey, type SpeciesIdentity } from "#app/thermo/speciesKey.ts";
import type { Uncertainty } from "#app/thermo/uncertainty.ts";

/** Remarks of the excerpt that name a crystal form; the others name the substance. */
const NAMED_FORMS = new Set(["diamond", "hematite", "magnetite", "α", "magnesite", "calcite", "aragonite", "selenite"]);

/** A row of a published table, read by the program's own readers; it throws where one of them asks or refuses. */
export interface PublishedRow {
  readonly key: string;
  readonly identity: SpeciesIdentity;
  readonly description: string;
  readonly values: Partial<Record<Property, ClosureValue>>;
}

/**
 * J. D. Cox, D. D. Wagman, V. A. Medvedev, CODATA Key Values for Thermodynamics, Hemisphere, New York, 1989.
 * As remembered, and compared with other tables where noted. Uncertainties are expanded, k = 2.
 */
export const codata: readonly PublishedRow[] = readTable("codata-key-values.csv", (cells) => {
  return row(identityOf(cells(0), cells(1), cells(2)), cells(2), "codata", {
    enthalpyOfFormation: [cells(3), cells(4)],
    entropy: [cells(5), cells(6)],
    enthalpyIncrement: [cells(7), cells(8)],
  });
});

/**
 * D. D. Wagman and others, The NBS Tables of Chemical Thermodynamic Properties, J. Phys. Chem. Ref. Data 11, Suppl. 2
 * (1982): an excerpt. The remark of a second crystal form names that form.
 */
export const nbs: readonly PublishedRow[] = readTable("nbs-1982-excerpt.csv", (cells) => {
  const form = NAMED_FORMS.has(cells(2)) ? cells(2) : "";
  return row(identityOf(cells(0), cells(1), form), cells(2), "nbs", {
    enthalpyOfFormation: [cells(3), ""],
    gibbsEnergyOfFormation: [cells(4), ""],
    entropy: [cells(5), ""],
    heatCapacity: [cells(6), ""],
  });
});

/** Heat capacities of the species of the CODATA table, from the same NBS tables. */
export const nbsHeatCapacities: readonly PublishedRow[] = readTable("nbs-1982-heat-capacities.csv", (cells) => {
  return row(identityOf(cells(0), cells(1), cells(2)), cells(2), "nbs", { heatCapacity: [cells(3), ""] });
});

/** S° of an element's reference state: from the first table that has it. */
export function elementEntropyFrom(
  ...tables: readonly (readonly PublishedRow[])[]
): (element: string) => ElementEntropy | undefined {
  return (element) => {
    for (const row of tables.flat()) {
      const entropy = row.values.entropy;
      if (entropy === undefined || !isReferenceState(row.identity)) continue;
      if (!(element in row.identity.formula.composition) || referenceStateOf(element) === undefined) continue;
      return { digits: entropy.digits, uncertainty: entropy.uncertainty, key: row.key, fromSheet: false };
    }
    return undefined;
  };
}

/** The row of a species; throws when the table has none. */
export function rowOf(table: readonly PublishedRow[], key: string): PublishedRow {
  const found = table.find((row) => row.key === key);
  if (found === undefined) throw new Error(`${key} is not in the table`);
  return found;
}

/** A value that the table must hold. */
export function valueOf(row: PublishedRow, property: Property): ClosureValue {
  const value = row.values[property];
  if (value === undefined) throw new Error(`${row.key} has no ${property}`);
  return value;
}

function identityOf(formula: string, phase: string, form: string): SpeciesIdentity {
  const readPhaseValue = mustRead(readPhase(phase), phase);
  const identity: SpeciesIdentity = { formula: mustRead(readFormula(formula), formula), phase: readPhaseValue.phase };
  const label = form === "" ? readPhaseValue.label : normalizeLabel(form);
  return label === undefined ? identity : { ...identity, label };
}

function row(
  identity: SpeciesIdentity,
  description: string,
  sourceId: string,
  cells: Partial<Record<Property, [value: string, uncertainty: string]>>,
): PublishedRow {
  const values: Partial<Record<Property, ClosureValue>> = {};
  for (const [property, [text, uncertainty]] of Object.entries(cells) as [Property, [string, string]][]) {
    if (text === "") continue;
    const value: Digits = mustRead(readNumber(text), text).digits;
    const conventional = isConventionalZero(identity, property);
    values[property] = {
      digits: value,
      uncertainty: uncertaintyOf(uncertainty, conventional),
      given: null,
      sourceId,
      conventional,
    };
  }
  return { key: formatKey(identity), identity, description, values };
}

function uncertaintyOf(text: string, conventional: boolean): Uncertainty | null {
  if (conventional) return { digits: digits("0"), kind: "exact", coverageFactor: null };
  if (text === "") return null;
  return { digits: mustRead(readNumber(text), text).digits, kind: "expanded", coverageFactor: 2 };
}

function mustRead<T>(reading: Reading<T>, text: string): T {
  if (reading.outcome === "read") return reading.value;
  throw new Error(`${text}: ${reading.sentence}`);
}

function readTable(file: string, build: (cells: Cells) => PublishedRow): PublishedRow[] {
  const text = readFileSync(new URL(`../../fixtures/${file}`, import.meta.url), "utf8");
  const lines = Papa.parse<string[]>(text.trim()).data.slice(1);
  return lines.map((line) => build((index) => line[index] ?? ""));
}

/** The text of a cell by its column, counted from zero. */
type Cells = (column: number) => string;
