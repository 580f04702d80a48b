import { z } from "zod";
import type { FieldError } from "#app/http/errors.ts";
import { toNumber } from "#app/thermo/digits.ts";
import { readFormula } from "#app/thermo/formula.ts";
import { readCas } from "#app/thermo/cas.ts";
import { readNumber } from "#app/thermo/number.ts";
import { type Phase, readPhase } from "#app/thermo/phase.ts";
import { PROPERTIES, type Property, propertyInfo } from "#app/thermo/property.ts";
import { readKey } from "#app/thermo/speciesKey.ts";
import { conversionFactor, isLikeUnit, readUnit, type Unit, UNITS } from "#app/thermo/unit.ts";
import type { DecodedSheet } from "./decode.ts";
import { type HeadReading, propertyOf, readHead } from "./head.ts";
import { isAbsent, isComment, isUnitsRow } from "./cells.ts";
import { readTemperature } from "./temperature.ts";
import { COLUMN_MEANS, type ColumnMeans, meaningWords } from "./meaning.ts";

const propertyCode = z.enum(PROPERTIES as [Property, ...Property[]]);
const unitCode = z.enum(UNITS as [Unit, ...Unit[]]);

/** One column of a plan: what it holds, in which unit, and why that is thought. */
export const plannedColumn = z.strictObject({
  head: z.string(),
  means: z.enum(COLUMN_MEANS),
  /** Of a value or an uncertainty; null for the other meanings. */
  property: propertyCode.nullable(),
  /** Of a value; an uncertainty shares the unit of its value. Null where the sheet says it row by row, or not yet. */
  unit: unitCode.nullable(),
  /** The reason, as the page shows it. */
  because: z.string(),
  /** Whether the steward should look at this column before going on. */
  asks: z.boolean(),
});
export type PlannedColumn = z.infer<typeof plannedColumn>;

/** What every column of the sheet holds, in the order of the columns. */
export const columnPlan = z.array(plannedColumn);
export type ColumnPlan = z.infer<typeof columnPlan>;

/** What the steward says of the whole sheet. */
export const sheetSettings = z.strictObject({
  /** In kelvin; null until it was said. */
  temperature: z.literal("298.15").nullable(),
  /** In pascal; null until it was said. */
  standardPressure: z.enum(["100000", "101325"]).nullable(),
  /** Standard state of the solutes; null = the source does not say. */
  basis: z.enum(["molality", "concentration"]).nullable(),
  /** What the uncertainty columns and ± hold; null until it was said. Expanded means k = 2. */
  uncertaintyKind: z.enum(["standard", "expanded", "unstated"]).nullable(),
  decimalComma: z.boolean(),
  /** What a bare `s` in the phase column means: a crystal, or a solid of a form not said. */
  solidIs: z.enum(["cr", "s"]),
  /** How the values were obtained, where the source says; null when it does not. */
  method: z.string().trim().max(500).nullable(),
});
export type SheetSettings = z.infer<typeof sheetSettings>;

export interface PlanGuess {
  readonly plan: ColumnPlan;
  readonly settings: SheetSettings;
  /** What was noticed about the whole sheet, each a sentence. */
  readonly notices: readonly string[];
}

/** What stands in the newest edition for the formulas of the sheet, to tell units by. */
export interface PlanContext {
  /** Number of that edition; null when there is none. */
  readonly edition: number | null;
  /** By `standingKey`: the values that stand for this composition, charge and phase, in the units of the table. */
  readonly standing: ReadonlyMap<string, readonly { readonly property: Property; readonly value: number }[]>;
}

export const NO_CONTEXT: PlanContext = { edition: null, standing: new Map() };

/** The key of `PlanContext.standing`. */
export const standingKey = (hill: string, charge: number, phase: Phase): string => `${hill}|${charge}|${phase}`;

/** As many rows as the guesses look at. */
const SAMPLE = 200;

/**
 * Guesses what each column holds, from its head first and from its cells where the head says nothing or the cells
 * contradict it, with the reason for each. Nothing is final: the steward confirms.
 */
export function planColumns(sheet: DecodedSheet, context: PlanContext): PlanGuess {
  const samples = sheet.heads.map((_, index) => sampleOf(sheet, index));
  const heads = sheet.heads.map(readHead);
  const { decimalComma } = sheet.dialect;

  const plan = sheet.heads.map((head, index): PlannedColumn => {
    const reading = heads[index];
    const sample = samples[index];
    if (!reading || !sample) throw new RangeError("a head without a column");
    return { head, ...guessColumn(reading, sample, decimalComma) };
  });
  unitsBelowHeads(plan, sheet);
  longSheets(plan);
  uncertaintiesFollowValues(plan);
  onlyOnce(plan);
  unitsFromTable(plan, sheet, context);
  const stated = statementsOf(sheet, heads, plan);

  return {
    plan,
    settings: {
      temperature: stated.temperature,
      standardPressure: stated.standardPressure,
      basis: stated.basis,
      uncertaintyKind: null,
      decimalComma,
      solidIs: "cr",
      method: null,
    },
    notices: stated.notices,
  };
}

/** The formulas of the sheet in Hill order, for reading what stands of them. */
export function hillsOf(sheet: DecodedSheet, plan: ColumnPlan): string[] {
  const hills = new Set<string>();
  for (const row of sheet.rows) {
    for (const species of speciesIn(row.cells, plan)) hills.add(species.hill);
  }
  return [...hills];
}

/** The first values of each column, to be shown beside its head. */
export function firstValues(sheet: DecodedSheet): string[][] {
  const long = (cell: string): string => (cell.length > 24 ? `${cell.slice(0, 23)}…` : cell);
  return sheet.heads.map((_, index) => sampleOf(sheet, index).slice(0, 3).map(long));
}

/** Whether a cell says only that a species is solid (`s`, `NaCl(s)`), which may mean a crystal. */
export function hasBareSolid(sheet: DecodedSheet): boolean {
  return sheet.rows.some((row) => row.cells.some((cell) => /^(?:.*\()?(?:s|solid)\)?$/.test(cell.trim())));
}

/** The columns with this meaning, by their index. */
export function columnsOf(plan: ColumnPlan, means: ColumnMeans): number[] {
  return plan.flatMap((column, index) => (column.means === means ? [index] : []));
}

/** Whether any column holds uncertainties, so that their kind has to be said. */
export function hasUncertainties(plan: ColumnPlan): boolean {
  return plan.some((column) => column.means === "uncertainty" || column.means === "anyUncertainty");
}

/** Whether any column holds values. A sheet without one can still say what species are called. */
export function holdsValues(plan: ColumnPlan): boolean {
  return plan.some((column) => column.means === "value" || column.means === "anyValue");
}

function holdsNames(plan: ColumnPlan): boolean {
  return plan.some((column) => column.means === "name" || column.means === "cas" || column.means === "synonyms");
}

/** How a column is called in a sentence. */
export function columnName(head: string, index: number): string {
  return head === "" ? `column ${index + 1}` : head;
}

/**
 * What is missing or contradictory in a plan that is about to be confirmed. Pointers are `/columns/<index>` and
 * `/settings/<name>`; an empty list means it can be read.
 */
export function checkPlan(plan: ColumnPlan, settings: SheetSettings): FieldError[] {
  const errors: FieldError[] = [];
  const add = (pointer: string, detail: string): void => void errors.push({ pointer, detail });
  const indexes = (means: ColumnMeans): number[] => columnsOf(plan, means);

  const species = [...indexes("formula"), ...indexes("key")];
  if (species.length === 0) add("/columns", "No column holds the formula or the species key. Say which one does.");
  if (indexes("formula").length > 0 && indexes("phase").length === 0 && indexes("key").length === 0) {
    add("/columns", "No column holds the phase. Say which one does; without its phase a formula names no species.");
  }
  for (const means of ONLY_ONCE) {
    for (const index of indexes(means).slice(1)) {
      add(`/columns/${index}`, `Another column already is the ${meaningWords[means]}. Only one can be read.`);
    }
  }
  if (indexes("formula").length > 0 && indexes("key").length > 0) {
    add(
      `/columns/${indexes("key")[0] ?? 0}`,
      "The species is named twice, by a formula and by a key. Read one of them.",
    );
  }

  const values = indexes("value");
  const long = indexes("anyValue").length > 0;
  const valued = holdsValues(plan);
  if (!valued && !holdsNames(plan)) {
    add("/columns", "No column holds values, names or CAS numbers. Say which quantity is in which column.");
  }
  if (long && indexes("propertyName").length === 0) {
    add("/columns", "A column holds values of different quantities, but none says which quantity. Say which one does.");
  }
  for (const [index, column] of plan.entries()) {
    if (column.means === "value" || column.means === "uncertainty") {
      if (column.property === null) add(`/columns/${index}`, "Say of which quantity this column is.");
    }
    if (column.means === "value" && column.property !== null) {
      const same = values.filter((other) => plan[other]?.property === column.property);
      if (same[0] !== index)
        add(`/columns/${index}`, `Another column already holds ${propertyInfo[column.property].symbol}.`);
      if (column.unit === null) add(`/columns/${index}`, "Say in which unit the values are. A unit is never assumed.");
      else if (!isLikeUnit(column.unit, propertyInfo[column.property].unit)) {
        add(
          `/columns/${index}`,
          `${propertyInfo[column.property].symbol} is not measured in ${column.unit}. Choose its unit.`,
        );
      }
    }
    if (column.means === "uncertainty" && column.property !== null) {
      if (!values.some((value) => plan[value]?.property === column.property)) {
        add(
          `/columns/${index}`,
          `No column holds the ${propertyInfo[column.property].symbol} this is the uncertainty of.`,
        );
      }
      const same = indexes("uncertainty").filter((other) => plan[other]?.property === column.property);
      if (same[0] !== index) add(`/columns/${index}`, "Another column already is this uncertainty.");
    }
    if (column.means === "anyValue" && column.unit === null && indexes("unitName").length === 0) {
      add(`/columns/${index}`, "No column says the unit of these values. Say which one does, or choose the unit here.");
    }
  }

  if (!valued) return errors;
  if (settings.temperature === null) {
    add(
      "/settings/temperature",
      "Say that the values are at 298.15 K. Values at another temperature are not taken in.",
    );
  }
  if (settings.standardPressure === null)
    add("/settings/standardPressure", "Say at which standard pressure the values are.");
  if (settings.uncertaintyKind === null && hasUncertainties(plan)) {
    add(
      "/settings/uncertaintyKind",
      "Say what the uncertainties are: standard, expanded (k = 2), or of a kind not said.",
    );
  }
  return errors;
}

/** Meanings that only one column can have. */
const ONLY_ONCE: readonly ColumnMeans[] = [
  "key",
  "formula",
  "phase",
  "label",
  "description",
  "name",
  "cas",
  "propertyName",
  "anyValue",
  "anyUncertainty",
  "unitName",
  "synonyms",
  "temperature",
  "sourceKey",
];

type Guess = Omit<PlannedColumn, "head">;

const guess = (means: ColumnMeans, because: string, more: Partial<Guess> = {}): Guess => ({
  means,
  property: null,
  unit: null,
  because,
  asks: false,
  ...more,
});

/** The cells of a column that hold something, from rows that hold more than a title. */
function sampleOf(sheet: DecodedSheet, index: number): string[] {
  const cells: string[] = [];
  for (const row of sheet.rows) {
    if (row.cells.filter((cell) => cell.trim() !== "").length < 2) continue;
    if (row.number < sheet.headRow || isComment(row.cells) || isUnitsRow(row.cells)) continue;
    const cell = row.cells[index]?.trim() ?? "";
    if (cell !== "") cells.push(cell);
    if (cells.length === SAMPLE) break;
  }
  return cells;
}

function guessColumn(head: HeadReading, sample: readonly string[], decimalComma: boolean): Guess {
  const share = (test: (cell: string) => boolean): number =>
    sample.length === 0 ? 0 : sample.filter(test).length / sample.length;
  const isFormula = (cell: string): boolean => readFormula(cell).outcome !== "refused";
  const isKey = (cell: string): boolean => readKey(cell).outcome !== "refused";
  const isPhase = (cell: string): boolean => readPhase(cell).outcome === "read";
  const isNumber = (cell: string): boolean => readNumber(cell, { decimalComma }).outcome !== "refused";

  if (head.property !== null && head.temperature !== null && head.temperature !== "298.15") {
    const { symbol } = propertyInfo[head.property];
    const at = /C$/.test(head.temperature) ? head.temperature : `${head.temperature} K`;
    return guess("ignore", `${symbol} at ${at}: the table is kept at 298.15 K, so this column is left out`);
  }
  switch (head.means) {
    case "value":
      // A few footnotes and ranges are repaired row by row; a column of words is not what its head says.
      if (sample.length > 2 && share((cell) => /\d/.test(cell) || isAbsent(cell)) < 0.5) {
        return guess(
          "ignore",
          `the head names ${head.property ? propertyInfo[head.property].symbol : "a value"}, but most cells are no numbers`,
          {
            asks: true,
          },
        );
      }
      return guess("value", head.unitIncomplete ? "head; per mole is assumed" : "head", {
        property: head.property,
        unit: head.unit,
      });
    case "uncertainty":
      return guess("uncertainty", "head", { property: head.property });
    case "anyValue":
      return guess("anyValue", "head", { unit: head.unit });
    case "formula":
    case "key":
      if (share(isFormula) >= 0.6) return guess("formula", "head; the cells read as formulas");
      if (share(isKey) >= 0.6) return guess("key", "the cells read as formulas with their phase");
      return guess(head.means, "head, although most cells cannot be read as formulas", { asks: true });
    case "phase":
      return guess("phase", share(isPhase) >= 0.6 ? "head; values from the list of phases" : "head");
    case "sourceKey": {
      const keys = new Set(sample).size;
      if (keys === 0) return guess("ignore", "the column is empty");
      return guess("sourceKey", `head; ${keys} different ${keys === 1 ? "key" : "keys"}, to be answered below`);
    }
    case "synonyms":
      return guess("synonyms", "head; semicolons stand between them");
    case "ignore":
    case null:
      break;
    default:
      return guess(head.means, head.means === "molarMass" ? "head; not read, the formula gives it" : "head");
  }

  if (sample.length === 0) return guess("ignore", "the column is empty");
  if (share(isPhase) === 1) return guess("phase", "values from the list of phases");
  if (share(isFormula) >= 0.9) {
    return guess(
      "formula",
      share(isFormula) === 1 ? "every cell reads as a formula" : "nearly every cell reads as a formula",
    );
  }
  if (share(isKey) >= 0.9) return guess("key", "the cells read as formulas with their phase");
  if (share((cell) => readCas(cell).outcome === "read" && cell.includes("-")) >= 0.6) {
    return guess("cas", "the cells are CAS numbers");
  }
  if (share((cell) => propertyOf(cell) !== null) >= 0.9) return guess("propertyName", "the cells name quantities");
  if (share((cell) => readUnit(cell).outcome === "read") >= 0.9) return guess("unitName", "the cells are units");
  if (share(isNumber) >= 0.6) {
    return guess("ignore", "numbers, but the head names no quantity: choose it, or leave the column out", {
      asks: true,
    });
  }
  return guess("ignore", "the head means nothing here, and the cells are text");
}

/** An uncertainty that names no quantity belongs to the value column before it; the head `U` may repeat. */
function uncertaintiesFollowValues(plan: ColumnPlan): void {
  for (const [index, column] of plan.entries()) {
    if (column.means !== "uncertainty" || column.property !== null) continue;
    const before = plan.slice(0, index).findLast((other) => other.means !== "uncertainty");
    if (before?.means === "value" && before.property !== null) {
      column.property = before.property;
      column.because = `head; belongs to ${propertyInfo[before.property].symbol}, the column before it`;
    } else {
      column.means = "ignore";
      column.asks = before?.because.includes("left out") !== true;
      column.because = before
        ? "an uncertainty behind a column that is not read"
        : "an uncertainty with no value before it";
    }
  }
}

/** Units that stand in a row of their own below the heads. */
function unitsBelowHeads(plan: ColumnPlan, sheet: DecodedSheet): void {
  const row = sheet.rows.find((one) => one.number > sheet.headRow && one.cells.some((cell) => cell.trim() !== ""));
  if (!row || !isUnitsRow(row.cells)) return;
  for (const [index, column] of plan.entries()) {
    if (column.means !== "value" || column.unit !== null) continue;
    const reading = readUnit((row.cells[index] ?? "").trim().replace(/^[[(](.*)[\])]$/, "$1"));
    if (reading.outcome !== "read") continue;
    column.unit = reading.value;
    column.because = `head; the unit stands in row ${row.number}`;
  }
}

/** A column of values beside one that names the quantity is a long sheet; without the latter it means nothing. */
function longSheets(plan: ColumnPlan): void {
  const isLong = plan.some((column) => column.means === "propertyName");
  for (const column of plan) {
    if (column.means === "anyValue" && !isLong) {
      column.means = "ignore";
      column.because = "values, but no column says of which quantity: choose it";
      column.asks = true;
    }
    if (column.means === "uncertainty" && isLong && column.property === null) column.means = "anyUncertainty";
  }
}

/** Two columns for one thing: the first is read, the others ask. */
function onlyOnce(plan: ColumnPlan): void {
  const seen = new Set<string>();
  for (const column of plan) {
    const once = ONLY_ONCE.includes(column.means) || column.means === "value" || column.means === "uncertainty";
    if (!once) continue;
    const what = `${column.means} ${column.property ?? ""}`;
    if (seen.has(what)) {
      column.because = `another column already is ${column.property ? propertyInfo[column.property].symbol : `the ${meaningWords[column.means]}`}`;
      column.means = "ignore";
      column.property = null;
      column.unit = null;
      column.asks = true;
    }
    seen.add(what);
  }
}

/** Agreement to 1 % is what "fits" means. */
const FITS = 0.01;

/** Fills in missing units and doubts stated ones by what the newest edition holds for the same species. */
function unitsFromTable(plan: ColumnPlan, sheet: DecodedSheet, context: PlanContext): void {
  for (const [index, column] of plan.entries()) {
    if (column.means !== "value" || column.property === null) continue;
    const fit = context.edition === null ? null : bestUnit(index, column.property, plan, sheet, context);
    const edition = context.edition === null ? "" : `edition ${context.edition}`;
    if (column.unit === null) {
      column.asks = true;
      column.unit = fit?.unit ?? null;
      column.because = fit
        ? `no unit in the head; agrees with ${edition} to 1 % in ${fit.unit}${fit.others ? ", not in another unit" : ""}`
        : "no unit in the head, and nothing in the table to compare with: choose it";
    } else if (fit && fit.unit !== column.unit) {
      column.asks = true;
      column.because = `the head says ${column.unit}, but the values agree with ${edition} to 1 % in ${fit.unit}`;
    } else if (fit) {
      column.because = `${column.because}; agrees with ${edition} to 1 % in ${fit.unit}`;
    }
  }
}

function bestUnit(
  index: number,
  property: Property,
  plan: ColumnPlan,
  sheet: DecodedSheet,
  context: PlanContext,
): { unit: Unit; others: boolean } | null {
  // The two calories differ by less than values of two tables do: without a word in the head it is the thermochemical.
  const candidates = UNITS.filter((unit) => isLikeUnit(unit, propertyInfo[property].unit) && !unit.includes("(IT)"));
  const agreeing = new Map<Unit, number>(candidates.map((unit) => [unit, 0]));
  let compared = 0;
  for (const row of sheet.rows) {
    if (compared === SAMPLE) break;
    const reading = readNumber(row.cells[index] ?? "", { decimalComma: sheet.dialect.decimalComma });
    const [species] = speciesIn(row.cells, plan);
    if (reading.outcome !== "read" || !species) continue;
    const value = toNumber(reading.value.digits);
    const stands = (context.standing.get(standingKey(species.hill, species.charge, species.phase)) ?? [])
      .filter((one) => one.property === property && one.value !== 0)
      .map((one) => one.value);
    if (value === 0 || stands.length === 0) continue;
    compared += 1;
    for (const unit of candidates) {
      const converted = value * conversionFactor(unit, propertyInfo[property].unit);
      if (stands.some((one) => Math.abs(converted - one) <= FITS * Math.abs(one))) {
        agreeing.set(unit, (agreeing.get(unit) ?? 0) + 1);
      }
    }
  }
  const [best] = [...agreeing].sort((a, b) => b[1] - a[1]);
  if (!best || compared < 2 || best[1] < 0.6 * compared) return null;
  return { unit: best[0], others: [...agreeing].every(([unit, count]) => unit === best[0] || count === 0) };
}

/** The species a row seems to name, where both its formula and its phase have one reading. */
function speciesIn(cells: readonly string[], plan: ColumnPlan): { hill: string; charge: number; phase: Phase }[] {
  const cellOf = (means: ColumnMeans): string => cells[plan.findIndex((column) => column.means === means)] ?? "";
  const key = cellOf("key");
  if (key !== "") {
    const reading = readKey(key);
    if (reading.outcome !== "read") return [];
    return [{ hill: reading.value.formula.hill, charge: reading.value.formula.charge, phase: reading.value.phase }];
  }
  const formula = readFormula(cellOf("formula"));
  const phase = readPhase(cellOf("phase"));
  if (formula.outcome !== "read" || phase.outcome !== "read") return [];
  return [
    {
      hill: formula.value.hill,
      charge: formula.value.charge,
      phase: phase.value.phase === "s" ? "cr" : phase.value.phase,
    },
  ];
}

interface Statements extends Pick<SheetSettings, "temperature" | "standardPressure" | "basis"> {
  notices: string[];
}

/** What the sheet itself says of all its values, in its heads and titles: filled in for the steward, who confirms it. */
function statementsOf(sheet: DecodedSheet, heads: readonly HeadReading[], plan: ColumnPlan): Statements {
  const notices: string[] = [];
  const titles = sheet.rows.filter((row) => row.number < sheet.headRow).map((row) => row.cells.join(" "));
  const inTitles = (pattern: RegExp): boolean => titles.some((title) => pattern.test(title));
  const atm = heads.some((head) => head.pressure === "101325") || inTitles(/\b1\s*atm\b|101[.,]?325\s*k?Pa/i);
  const bar = heads.some((head) => head.pressure === "100000") || inTitles(/\b1\s*bar\b|100\s*kPa|0[.,]1\s*MPa/i);
  if (atm && bar) notices.push("The sheet speaks of 1 atm and of 1 bar. Say at which its values are.");
  else if (atm) {
    notices.push("The sheet speaks of 1 atm: its values are brought to 1 bar (100 kPa), each with the step beside it.");
  } else if (bar) notices.push("The sheet speaks of 1 bar (100 kPa).");

  const [column] = columnsOf(plan, "temperature");
  const cells = column === undefined ? [] : sampleOf(sheet, column);
  const isReference = (cell: string): boolean =>
    readTemperature(cell, plan[column ?? -1]?.head ?? "").is === "reference";
  const named =
    heads.some((head) => head.temperature === "298.15") ||
    inTitles(/\b298([.,]15)?\s*K|\b25([.,]0+)?\s*°\s*C/) ||
    cells.some(isReference);
  if (named) notices.push("The sheet speaks of 298.15 K (25 °C).");
  const others = cells.filter((cell) => !isReference(cell)).length;
  if (others > 0) {
    notices.push(
      `${others} ${others === 1 ? "row is" : "rows are"} at another temperature and will be refused: the table is kept at 298.15 K.`,
    );
  }
  const other = titles
    .map((title) => /\b(\d{3,4}(?:[.,]\d+)?)\s*K\b/.exec(title)?.[1])
    .find((one) => one && !/^298/.test(one));
  if (!named && other) {
    notices.push(
      `The sheet speaks of ${other} K, and the table is kept at 298.15 K: values at another temperature are not taken in.`,
    );
  }
  const molality = inTitles(/\b1\s*mol\s*(?:\/\s*kg|kg-1|kg⁻¹)|\bmolality\b/i);
  const concentration = inTitles(/\b1\s*mol\s*(?:\/\s*(?:L|dm3|dm³)|L-1|L⁻¹|dm-3|dm⁻³)|\b1\s*M\b/);
  return {
    temperature: named ? "298.15" : null,
    standardPressure: atm === bar ? null : atm ? "101325" : "100000",
    basis: molality === concentration ? null : molality ? "molality" : "concentration",
    notices,
  };
}
