import type { FieldError } from "#app/http/errors.ts";
import { readSourceForm } from "#app/sources/sourceForm.ts";
import { isProperty } from "#app/thermo/property.ts";
import { UNITS } from "#app/thermo/unit.ts";
import { COLUMN_MEANS, type ColumnMeans } from "./meaning.ts";
import { keyField, meaningValue, meansField, NEW_SOURCE, takesUnit, unitField } from "./planChoices.ts";
import {
  checkPlan,
  type ColumnPlan,
  columnsOf,
  holdsValues,
  type PlannedColumn,
  type SheetSettings,
  sheetSettings,
} from "./plan.ts";
import type { OneSource, SourceChoice } from "./sourceChoice.ts";
import { KEYS_AT_MOST } from "./sourceKeys.ts";

export type PlanForm =
  | {
      readonly ok: true;
      readonly columns: ColumnPlan;
      readonly settings: SheetSettings;
      /** Null for a sheet without values. */
      readonly source: SourceChoice | null;
    }
  | { readonly ok: false; readonly errors: FieldError[] };

/**
 * Reads the form back, with everything that is missing or wrong in it at once, each at its field.
 *
 * @param keysOfColumns the different texts of each column, from which the keys of sources are taken
 */
export function readPlanForm(
  form: FormData,
  planned: ColumnPlan,
  keysOfColumns: readonly (readonly string[])[] = [],
): PlanForm {
  const errors: FieldError[] = [];
  const text = (name: string): string => {
    const value = form.get(name);
    return typeof value === "string" ? value : "";
  };
  const columns = planned.map((column, index) => {
    const chosen = readMeaning(text(meansField(index)));
    const unit = UNITS.find((one) => one === text(unitField(index)));
    if (!chosen) errors.push({ pointer: `/columns/${index}`, detail: "Choose what this column holds." });
    const next = chosen ?? { means: column.means, property: column.property };
    const carries = takesUnit(meaningValue(next));
    const changed = next.means !== column.means || next.property !== column.property;
    return {
      head: column.head,
      ...next,
      unit: carries ? (unit ?? null) : null,
      because: changed ? "chosen by hand" : column.because,
      asks: false,
    };
  });
  const settings = sheetSettings.safeParse({
    temperature: text("temperature") || null,
    standardPressure: text("standardPressure") || null,
    basis: text("basis") || null,
    uncertaintyKind: text("uncertaintyKind") || null,
    decimalComma: text("decimalComma") === "on",
    solidIs: text("solidIs") || "cr",
    method: text("method").trim() || null,
  });
  if (!settings.success) {
    for (const issue of settings.error.issues) {
      const name = String(issue.path[0] ?? "");
      const detail = name === "method" ? "Say it in at most 500 characters." : "Choose one of the list.";
      errors.push({ pointer: `/settings/${name}`, detail });
    }
  } else errors.push(...checkPlan(columns, settings.data));
  const keyColumn = columnsOf(columns, "sourceKey")[0];
  const source = !holdsValues(columns)
    ? null
    : keyColumn === undefined
      ? readSource(text, "source", "/source", errors)
      : readSourcesByKey(text, form, keyColumn, keysOfColumns[keyColumn] ?? [], errors);
  if (errors.length > 0 || !settings.success) return { ok: false, errors };
  return { ok: true, columns, settings: settings.data, source };
}

function readMeaning(value: string): Pick<PlannedColumn, "means" | "property"> | null {
  const [means = "", property = ""] = value.split(":");
  const known = COLUMN_MEANS.find((one): one is ColumnMeans => one === means);
  if (!known) return null;
  if (known !== "value" && known !== "uncertainty") return { means: known, property: null };
  return isProperty(property) ? { means: known, property } : null;
}

type TextOf = (name: string) => string;

/** The source chosen in one field; null with an error in the list when nothing was chosen or the description is wrong. */
function readSource(text: TextOf, field: string, pointer: string, errors: FieldError[]): OneSource | null {
  const chosen = text(field);
  if (chosen === "") {
    errors.push({ pointer, detail: "Say where the values come from." });
    return null;
  }
  if (chosen !== NEW_SOURCE) return { kind: "known", sourceId: chosen };
  const described = readSourceForm((name) => text(`${field}.${name}`));
  if (described.ok) return { kind: "new", source: described.source };
  for (const { field: name, detail } of described.errors) errors.push({ pointer: `${pointer}/${name}`, detail });
  return null;
}

/** One source for each key; a key that was asked about and left open has its rows refused. */
function readSourcesByKey(
  text: TextOf,
  form: FormData,
  column: number,
  keys: readonly string[],
  errors: FieldError[],
): SourceChoice | null {
  if (keys.length === 0) {
    errors.push({
      pointer: `/columns/${column}`,
      detail: `This column holds no keys, or more than ${KEYS_AT_MOST} different texts. Choose one source for the whole sheet.`,
    });
    return null;
  }
  if (keys.every((_, index) => !form.has(keyField(index)))) {
    errors.push({ pointer: "/keys/0", detail: "Say which source each key stands for." });
    return null;
  }
  const before = errors.length;
  const answers = keys.map((key, index) => ({
    key,
    choice: text(keyField(index)) === "" ? null : readSource(text, keyField(index), `/keys/${index}`, errors),
  }));
  const otherwise = text("source") === "" ? null : readSource(text, "source", "/source", errors);
  if (errors.length === before && otherwise === null && answers.every((one) => one.choice === null)) {
    errors.push({ pointer: "/keys/0", detail: "Say of at least one key which source it stands for." });
  }
  return { kind: "byKey", keys: answers, otherwise };
}
