import { compare, digits, type Digits, isZero } from "#app/thermo/digits.ts";
import { type Formula, readFormula } from "#app/thermo/formula.ts";
import { readCas } from "#app/thermo/cas.ts";
import { normalizeLabel } from "#app/thermo/label.ts";
import { type NumberOptions, readNumber, type ReadNumber, spellNumber } from "#app/thermo/number.ts";
import { type Phase, readPhase } from "#app/thermo/phase.ts";
import { type Property, propertyInfo } from "#app/thermo/property.ts";
import { readQuantity } from "#app/thermo/quantity.ts";
import { quote, type Reading } from "#app/thermo/reading.ts";
import { isConventionalZero } from "#app/thermo/referenceStates.ts";
import { formatKey, readKey, type SpeciesIdentity } from "#app/thermo/speciesKey.ts";
import type { Uncertainty } from "#app/thermo/uncertainty.ts";
import { convert, isLikeUnit, readUnit, type Unit } from "#app/thermo/unit.ts";
import { printedAtBar } from "#app/thermo/standardState.ts";
import { isAbsent, isComment, isUnitsRow, namesDelimiter } from "./cells.ts";
import { readDescription } from "./description.ts";
import { propertyOf } from "./head.ts";
import type { ColumnMeans } from "./meaning.ts";
import { type ColumnPlan, columnsOf, type SheetSettings } from "./plan.ts";
import { readTemperature } from "./temperature.ts";

/** A row as it came, with the repairs of its cells laid over it. */
export interface SheetRow {
  /** Line of the file. */
  readonly number: number;
  readonly cells: readonly string[];
  /** What the steward answered when asked which species this is: a key of the table, `new`, or nothing yet. */
  readonly answer: string | null;
}

/** One click that would mend a cell. `column` may be `ANSWER`: the steward says which species the row is. */
export interface Repair {
  readonly label: string;
  readonly column: number;
  readonly text: string;
}

/** What is wrong with a row, at the cell where it shows; `column` null when it is the row as a whole. */
export interface CellProblem {
  readonly column: number | null;
  readonly sentence: string;
  readonly repairs: readonly Repair[];
  /** Set when the problem came of comparing rows with each other, so that mending another row may settle it. */
  readonly amongRows?: readonly number[];
}

export interface ReadValue {
  readonly property: Property;
  /** In the unit of the property. */
  readonly digits: Digits;
  readonly uncertainty: Uncertainty | null;
  readonly given: { readonly text: string; readonly unit: Unit; readonly note: string | null };
  readonly column: number;
}

/** A row that was read: a species as the sheet names it, and its values. */
export interface RowReading {
  readonly species: {
    readonly formula: Formula;
    readonly phase: Phase;
    readonly label: string | null;
    readonly name: string | null;
    readonly cas: string | null;
    /** Further names of the substance; left out in rows that were read before synonyms were. */
    readonly synonyms?: readonly string[];
  };
  readonly values: readonly ReadValue[];
  /** The key by which the row names its source; null where the sheet has no such column or the cell is empty. */
  readonly sourceKey?: string | null;
  readonly remark: string | null;
  /** What was taken for granted while reading, each a sentence. */
  readonly notes: readonly string[];
}

export type RowOutcome =
  | { readonly outcome: "read"; readonly reading: RowReading }
  | { readonly outcome: "refused"; readonly problems: readonly CellProblem[] }
  | { readonly outcome: "skipped"; readonly problems: readonly CellProblem[] };

/** What reading a row needs to know of its sheet. */
export interface SheetFrame {
  readonly heads: readonly string[];
  readonly headRow: number;
  readonly plan: ColumnPlan;
  readonly settings: SheetSettings;
  /** Which source keys were answered, where a column holds them; the empty key is a row without one. */
  readonly sourceKeys?: ReadonlySet<string>;
}

/** Reads every row; a row never stops the others. */
export function readRows(rows: readonly SheetRow[], frame: SheetFrame): RowOutcome[] {
  return rows.map((row) => readRow(row, frame));
}

/** Reads one row: to values of one species, to problems with their cells, or to the reason why it is none. */
export function readRow(row: SheetRow, frame: SheetFrame): RowOutcome {
  const skipped = whyNoValues(row, frame);
  if (skipped !== null) return { outcome: "skipped", problems: [problem(null, skipped)] };

  const { plan } = frame;
  const problems: CellProblem[] = [];
  const ragged = whyRagged(row, frame);
  if (ragged !== null) return { outcome: "refused", problems: [problem(null, ragged)] };

  const cell = (means: ColumnMeans): { text: string; column: number } => {
    const column = columnsOf(plan, means)[0] ?? -1;
    return { text: row.cells[column]?.trim() ?? "", column };
  };
  const named = readIdentity(cell, problems, frame);
  const cas = cell("cas");
  const readNumberOfCas = cas.text === "" ? null : readCas(cas.text);
  if (readNumberOfCas && readNumberOfCas.outcome !== "read") {
    problems.push(
      problem(cas.column, readNumberOfCas.sentence, [{ label: "Leave the number out", column: cas.column, text: "" }]),
    );
  }

  const notes = [...(named?.notes ?? [])];
  if (row.cells.length < frame.heads.length) {
    notes.push(
      `The row has ${row.cells.length} cells where the heads name ${frame.heads.length}; the missing ones are read as empty.`,
    );
  }
  readRowTemperature(row, frame, problems, notes);
  const sourceKey = readSourceKey(cell("sourceKey"), frame, problems);
  const values = named
    ? readValues(row, named.identity, frame, problems, notes)
    : readValues(row, null, frame, problems, notes);
  if (problems.length > 0 || !named) return { outcome: "refused", problems };
  return {
    outcome: "read",
    reading: {
      species: {
        formula: named.identity.formula,
        phase: named.identity.phase,
        label: named.identity.label ?? null,
        name: cell("name").text || named.name,
        cas: readNumberOfCas?.outcome === "read" ? readNumberOfCas.value : null,
        // Commas stand inside names (1,2-ethanediol), so only semicolons and bars stand between them.
        synonyms: cell("synonyms")
          .text.split(/[;|]/)
          .map((name) => name.trim())
          .filter((name) => !isAbsent(name)),
      },
      values,
      remark:
        [...columnsOf(plan, "remark").map((index) => row.cells[index]?.trim() ?? ""), named.remark ?? ""]
          .filter(Boolean)
          .join("; ") || null,
      notes,
      sourceKey,
    },
  };
}

/**
 * Why a row with another number of cells than there are heads cannot be read; null when it can. Cells beyond the heads may
 * be blank, and cells missing at the end are empty. A cell lost in the middle shows by a number among the words.
 */
function whyRagged(row: SheetRow, { heads, plan }: SheetFrame): string | null {
  const filled = row.cells.findLastIndex((cell) => cell.trim() !== "") + 1;
  const sentence = (count: number): string =>
    `The row has ${count} ${count === 1 ? "cell" : "cells"} where the heads name ${heads.length}. A delimiter is missing or doubled, or a text that holds one lacks its quotation marks.`;
  if (filled > heads.length) return sentence(filled);
  if (row.cells.length >= heads.length) return null;
  const isValue = (means: ColumnMeans): boolean => means === "value" || means === "anyValue";
  const holds = (means: (one: ColumnMeans) => boolean): boolean =>
    plan.some((column, index) => means(column.means) && !isAbsent(row.cells[index] ?? ""));
  const shifted = plan.some(
    (column, index) => WORDED.has(column.means) && /^[-−–+]?\d+(?:[.,]\d+)?$/.test(row.cells[index]?.trim() ?? ""),
  );
  return shifted || !(holds(isValue) || holds((means) => NAMING.has(means))) ? sentence(row.cells.length) : null;
}

/** Columns in which a bare number is out of place. */
const WORDED: ReadonlySet<ColumnMeans> = new Set(["phase", "label", "description", "name", "cas", "synonyms"]);

/** Columns that say what a species is called. */
const NAMING: ReadonlySet<ColumnMeans> = new Set(["name", "cas", "synonyms"]);

/** A row at another temperature than the table's is refused, whatever the sheet is said to be at. */
function readRowTemperature(row: SheetRow, frame: SheetFrame, problems: CellProblem[], notes: string[]): void {
  const [column] = columnsOf(frame.plan, "temperature");
  const text = column === undefined ? "" : (row.cells[column]?.trim() ?? "");
  if (column === undefined || isAbsent(text)) return;
  const reading = readTemperature(text, frame.heads[column] ?? "");
  if (reading.is === "reference") {
    if (reading.note) notes.push(reading.note);
    return;
  }
  const { becomes } = reading;
  problems.push(
    problem(column, reading.sentence, becomes === null ? [] : [{ label: `Take ${becomes}`, column, text: becomes }]),
  );
}

/** The key of the row's source, which the steward must have answered for. */
function readSourceKey(
  { text, column }: { text: string; column: number },
  { sourceKeys }: SheetFrame,
  problems: CellProblem[],
): string | null {
  if (column === -1 || !sourceKeys) return null;
  if (sourceKeys.has(text)) return text === "" ? null : text;
  problems.push(
    problem(
      column,
      text === ""
        ? "The row names no source, and none was chosen for such rows."
        : `No source was chosen for the key ${quote(text)}. Go back to the columns and say which it is, or write another key here.`,
    ),
  );
  return null;
}

function problem(column: number | null, sentence: string, repairs: readonly Repair[] = []): CellProblem {
  return { column, sentence, repairs };
}

/** The reason why a row holds no values: blank, a title, the heads again, a footnote. Null when it should be read. */
function whyNoValues(row: SheetRow, frame: SheetFrame): string | null {
  const { plan, heads } = frame;
  const filled = row.cells.filter((cell) => cell.trim() !== "");
  if (filled.length === 0) return "a blank row";
  if (isComment(row.cells)) return "a comment, as # says";
  if (row.number < frame.headRow) return namesDelimiter(row.cells) ? "names the delimiter" : "a title above the heads";
  if (heads.length > 1 && heads.every((head, index) => (row.cells[index]?.trim() ?? "") === head))
    return "the heads again";
  if (isUnitsRow(row.cells)) return "the units of the columns";
  const valueColumns = plan.flatMap((column, index) =>
    column.means === "value" || column.means === "anyValue" ? [index] : [],
  );
  if (valueColumns.some((index) => !isAbsent(row.cells[index] ?? ""))) return null;
  if (filled.length === 1) return "a title or a note: one cell, no values";
  const holds = (means: ColumnMeans): boolean =>
    columnsOf(plan, means).some((index) => (row.cells[index]?.trim() ?? "") !== "");
  const named = holds("phase") || holds("key");
  // A short row may have lost its values with a delimiter: that is for the steward to see, not to skip.
  if (named && (row.cells.length < heads.length || [...NAMING].some(holds))) return null;
  return named ? "a species without values in the columns that are read" : "a title or a note: no phase and no values";
}

interface NamedSpecies {
  identity: SpeciesIdentity;
  name: string | null;
  remark: string | null;
  notes: string[];
}

type CellOf = (means: ColumnMeans) => { text: string; column: number };

/** Formula, phase and form of the row; problems are added to the list, and then there is no identity. */
function readIdentity(cell: CellOf, problems: CellProblem[], frame: SheetFrame): NamedSpecies | null {
  const keyed = cell("key").column !== -1;
  const notes: string[] = [];
  let formula: Formula | null = null;
  let phase: Phase | null = null;
  let label: string | null = null;
  let furtherForm = false;
  const phaseNotes: string[] = [];

  if (keyed) {
    const key = cell("key");
    const identity = take(readKey(key.text), key.column, problems, notes, formatKey);
    if (identity) ({ formula, phase } = identity);
    label = identity?.label ?? null;
    furtherForm = /^form-\d$/.test(label ?? "");
  } else {
    const formulaCell = cell("formula");
    formula = take(readFormula(formulaCell.text), formulaCell.column, problems, notes, (one) => one.printed);
    const phaseCell = cell("phase");
    const read = take(readPhase(phaseCell.text), phaseCell.column, problems, phaseNotes, (one) => one.phase);
    phase = read?.phase ?? null;
    label = read?.label ?? null;
    furtherForm = read?.handbookCode !== undefined && /^cr?\d$/.test(read.handbookCode);
  }
  if (phase === "s" && frame.settings.solidIs === "cr") phase = "cr";

  const form = cell("label");
  const described = phase ? readDescription(cell("description").text, phase) : null;
  const named = form.text === "" ? described?.label : normalizeLabel(form.text);
  if (named === undefined && form.text !== "") {
    problems.push(
      problem(
        form.column,
        `The form ${quote(form.text)} holds characters that a species key cannot. Use letters, digits and hyphens.`,
      ),
    );
  }
  if (named) {
    if (label !== null && !furtherForm && label !== named) {
      problems.push(
        problem(
          form.column === -1 ? cell("description").column : form.column,
          `The phase names the form ${label}, but this cell says ${named}. Which is it?`,
        ),
      );
    }
    label = named;
  } else if (furtherForm) {
    problems.push(
      problem(
        form.column === -1
          ? cell("description").column === -1
            ? cell("phase").column
            : cell("description").column
          : form.column,
        `${quote(cell("phase").text || cell("key").text)} is a further crystal form, and nothing says which. Name the form.`,
      ),
    );
  }
  // That a further form should be named is settled once it is.
  if (!(furtherForm && named)) notes.push(...phaseNotes);
  if (!formula || !phase || problems.length > 0) return null;

  if (formula.charge !== 0 && phase !== "aq" && phase !== "g") {
    const column = keyed ? cell("key").column : cell("phase").column;
    problems.push(
      problem(
        column,
        `${formula.printed} carries a charge, and ions are kept in water (aq) or in the gas (g) only. Is the phase or the charge wrong?`,
        keyed ? [] : [{ label: "Take aq", column, text: "aq" }],
      ),
    );
    return null;
  }
  return {
    identity: label === null ? { formula, phase } : { formula, phase, label },
    name: described?.name ?? null,
    remark: described?.remark ?? null,
    notes,
  };
}

/** The value of a reading, or null with its problem in the list; two readings become one-click repairs. */
function take<T>(
  reading: Reading<T>,
  column: number,
  problems: CellProblem[],
  notes: string[],
  spell: (value: T) => string,
): T | null {
  switch (reading.outcome) {
    case "read":
      notes.push(...reading.notes);
      return reading.value;
    case "ambiguous":
      problems.push(
        problem(
          column,
          reading.sentence,
          reading.candidates.map((candidate) => ({
            label: `Take ${spell(candidate)}`,
            column,
            text: spell(candidate),
          })),
        ),
      );
      return null;
    case "refused":
      problems.push(problem(column, reading.sentence));
      return null;
  }
}

/** The values of a row in a wide or a long sheet. */
function readValues(
  row: SheetRow,
  identity: SpeciesIdentity | null,
  frame: SheetFrame,
  problems: CellProblem[],
  notes: string[],
): ReadValue[] {
  const values: ReadValue[] = [];
  for (const slot of slotsOf(row, frame, problems)) {
    const value = readValue(row, slot, identity, frame, problems, notes);
    if (value) values.push(value);
  }
  return values;
}

/** One value to read: which cell, of what, in which unit, with which cell for its uncertainty. */
interface Slot {
  column: number;
  property: Property;
  unit: Unit;
  uncertaintyColumn: number;
}

function slotsOf(row: SheetRow, frame: SheetFrame, problems: CellProblem[]): Slot[] {
  const { plan } = frame;
  const slots: Slot[] = [];
  for (const [column, planned] of plan.entries()) {
    if (planned.means === "value" && planned.property && planned.unit) {
      const { property, unit } = planned;
      const uncertaintyColumn = plan.findIndex((other) => other.means === "uncertainty" && other.property === property);
      slots.push({ column, property, unit, uncertaintyColumn });
    }
    if (planned.means !== "anyValue") continue;
    const which = columnsOf(plan, "propertyName")[0] ?? -1;
    const property = propertyOf(row.cells[which] ?? "");
    if (!property) {
      problems.push(
        problem(
          which,
          `${quote(row.cells[which]?.trim() ?? "")} is no quantity of this table. Write ΔfH°, S°, ΔfG°, Cp° or H°(T)−H°(0).`,
        ),
      );
      continue;
    }
    const unitColumn = columnsOf(plan, "unitName")[0] ?? -1;
    const unitText = row.cells[unitColumn]?.trim() ?? "";
    const reading = unitText === "" && planned.unit ? null : readUnit(unitText);
    if (reading && reading.outcome !== "read") {
      problems.push(problem(unitColumn === -1 ? column : unitColumn, reading.sentence));
      continue;
    }
    const unit = reading ? reading.value : planned.unit;
    if (!unit) continue;
    if (!isLikeUnit(unit, propertyInfo[property].unit)) {
      problems.push(
        problem(
          unitColumn === -1 ? column : unitColumn,
          `${propertyInfo[property].symbol} is not measured in ${unit} but in ${propertyInfo[property].unit} or another unit of its kind. Is the quantity or the unit wrong?`,
        ),
      );
      continue;
    }
    slots.push({ column, property, unit, uncertaintyColumn: columnsOf(plan, "anyUncertainty")[0] ?? -1 });
  }
  return slots;
}

function readValue(
  row: SheetRow,
  slot: Slot,
  identity: SpeciesIdentity | null,
  frame: SheetFrame,
  problems: CellProblem[],
  notes: string[],
): ReadValue | null {
  const { column, property } = slot;
  const text = row.cells[column]?.trim() ?? "";
  const spreadText = slot.uncertaintyColumn === -1 ? "" : (row.cells[slot.uncertaintyColumn]?.trim() ?? "");
  if (isAbsent(text)) {
    if (!isAbsent(spreadText) && !/^0(?:[.,]0*)?$/.test(spreadText)) {
      problems.push(problem(column, `There is an uncertainty (${spreadText}) but no value. Was the value lost?`));
    }
    return null;
  }
  const options: NumberOptions = { decimalComma: frame.settings.decimalComma };
  const number = readCell(text, slot, column, options, problems, notes);
  if (!number) return null;

  const before = problems.length;
  const value = convert(number.digits, slot.unit, propertyInfo[property].unit);
  if (identity && mustBePositive(property, identity.phase) && compare(value.digits, ZERO) <= 0) {
    problems.push(notPositive(text, slot, number.digits, row, frame));
  }
  const uncertainty = readSpread(
    { text: spreadText, slot, number, identity, valueDigits: value.digits },
    options,
    frame,
    problems,
    notes,
  );
  const atBar =
    identity && frame.settings.standardPressure === "101325" ? printedAtBar(property, value.digits, identity) : null;
  if (atBar === undefined) {
    problems.push(
      problem(
        column,
        `${propertyInfo[property].symbol} at 1 atm cannot be brought to 1 bar: the table knows no reference state of an element of ${identity?.formula.printed ?? "this formula"}.`,
      ),
    );
  }
  if (problems.length > before) return null;
  return {
    property,
    digits: atBar?.digits ?? value.digits,
    uncertainty,
    given: { text, unit: slot.unit, note: [value.note, atBar?.note].filter(Boolean).join("; ") || null },
    column,
  };
}

const ZERO = digits("0");

/**
 * A number, or its problem. One that carries its unit is read where that is the unit of the column; another unit is a
 * question, since either the head or the cell is wrong.
 */
function readCell(
  text: string,
  { unit }: Slot,
  column: number,
  options: NumberOptions,
  problems: CellProblem[],
  notes: string[],
): ReadNumber | null {
  const reading = readNumber(text, options);
  const quantity = reading.outcome === "refused" ? readQuantity(text, options) : null;
  if (quantity?.outcome !== "read") return take(reading, column, problems, notes, spellNumber);
  const { number, unit: own } = quantity.value;
  if (own === unit) {
    notes.push(...quantity.notes);
    return number;
  }
  const becomes = isLikeUnit(own, unit) && !number.uncertainty ? convert(number.digits, own, unit).digits : null;
  problems.push(
    problem(
      column,
      `The cell is in ${own}, its column in ${unit}. Write the number in ${unit}.`,
      becomes === null ? [] : [{ label: `Take ${becomes.replace("-", "−")}`, column, text: becomes }],
    ),
  );
  return null;
}

/** Third law: a pure substance has a positive entropy; so is its heat capacity and its enthalpy increment. */
function mustBePositive(property: Property, phase: Phase): boolean {
  if (property === "enthalpyIncrement") return true;
  return (property === "entropy" || property === "heatCapacity") && phase !== "aq";
}

function notPositive(text: string, slot: Slot, value: Digits, row: SheetRow, frame: SheetFrame): CellProblem {
  const what = {
    entropy: "The entropy of a substance",
    heatCapacity: "The heat capacity of a substance",
    enthalpyIncrement: "The enthalpy increment of a substance",
  }[slot.property as "entropy" | "heatCapacity" | "enthalpyIncrement"];
  if (isZero(value)) {
    return problem(slot.column, `${what} is not zero at 298.15 K. Was a missing value typed as 0?`, [
      { label: "Leave the cell empty", column: slot.column, text: "" },
    ]);
  }
  const neighbour = frame.plan.findIndex(
    (column) => column.property === "enthalpyOfFormation" && column.means === "value",
  );
  const positive = text.replace(/^\s*[-−–]\s*/, "");
  const from = isAbsent(row.cells[neighbour] ?? "")
    ? ""
    : ` Did the sign come from the ${propertyInfo.enthalpyOfFormation.symbol} column?`;
  return problem(slot.column, `${what} cannot be negative.${from}`, [
    { label: `Take ${positive}`, column: slot.column, text: positive },
  ]);
}

interface SpreadCell {
  text: string;
  slot: Slot;
  number: ReadNumber;
  identity: SpeciesIdentity | null;
  valueDigits: Digits;
}

/** The uncertainty of a value, from its own column or from the value's cell, in the unit of the property. */
function readSpread(
  cell: SpreadCell,
  options: NumberOptions,
  frame: SheetFrame,
  problems: CellProblem[],
  notes: string[],
): Uncertainty | null {
  const { slot, number, identity } = cell;
  const column = slot.uncertaintyColumn;
  const conventional = identity !== null && isZero(cell.valueDigits) && isConventionalZero(identity, slot.property);
  const exact: Uncertainty = { digits: ZERO, kind: "exact", coverageFactor: null };
  const inCell = number.uncertainty;
  if (isAbsent(cell.text)) {
    if (!inCell) return conventional ? exact : null;
    if (isZero(inCell.digits) && conventional) return exact;
    return inTableUnit(inCell.digits, inCell.kind === "unstated" ? kindOf(frame) : inCell.kind, slot);
  }

  // A bare ± before the number in a column of its own says nothing new.
  const read = readCell(cell.text.replace(/^(?:±|\+\/-)\s*/, ""), slot, column, options, problems, notes);
  if (!read) return null;
  if (inCell) {
    if (compare(inCell.digits, read.digits) === 0) return inTableUnit(read.digits, kindOf(frame), slot);
    problems.push(
      problem(column, `The value's cell says ± ${inCell.digits}, this one ${read.digits}. Leave one of them.`),
    );
    return null;
  }
  if (compare(read.digits, ZERO) < 0) {
    const positive = cell.text.replace(/^\s*[-−–]\s*/, "");
    problems.push(
      problem(column, "An uncertainty is never negative.", [{ label: `Take ${positive}`, column, text: positive }]),
    );
    return null;
  }
  if (isZero(read.digits)) {
    if (conventional) return exact;
    problems.push(
      problem(
        column,
        "Only a value that holds by convention has no uncertainty at all. Leave the cell empty where none is known.",
        [{ label: "Leave the cell empty", column, text: "" }],
      ),
    );
    return null;
  }
  return inTableUnit(read.digits, kindOf(frame), slot);
}

function kindOf(frame: SheetFrame): "standard" | "expanded" | "unstated" {
  return frame.settings.uncertaintyKind ?? "unstated";
}

function inTableUnit(value: Digits, kind: "standard" | "expanded" | "unstated", slot: Slot): Uncertainty {
  return {
    digits: convert(value, slot.unit, propertyInfo[slot.property].unit).digits,
    kind,
    coverageFactor: kind === "expanded" ? 2 : null,
  };
}
