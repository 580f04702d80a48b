import type { FieldError } from "#app/http/errors.ts";
import { readSourceForm } from "#app/sources/sourceForm.ts";
import { isProperty } from "#app/thermo/property.ts";
import { UNITS } from "#app/thermo/unit.ts";
import { COLUMN_MEANS, type ColumnMeans } from "./meaning.ts";
import { meaningValue, meansField, NEW_SOURCE, takesUnit, unitField } from "./planChoices.ts";
import { checkPlan, type ColumnPlan, type PlannedColumn, type SheetSettings, sheetSettings } from "./plan.ts";
import type { SourceChoice } from "./sourceChoice.ts";

export type PlanForm =
  | { readonly ok: true; readonly columns: ColumnPlan; readonly settings: SheetSettings; readonly source: SourceChoice }
  | { readonly ok: false; readonly errors: FieldError[] };

/** Reads the form back, with everything that is missing or wrong in it at once, each at its field. */
export function readPlanForm(form: FormData, planned: ColumnPlan): PlanForm {
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
  const source = readSource(text, errors);
  if (errors.length > 0 || !settings.success || !source) return { ok: false, errors };
  return { ok: true, columns, settings: settings.data, source };
}

function readMeaning(value: string): Pick<PlannedColumn, "means" | "property"> | null {
  const [means = "", property = ""] = value.split(":");
  const known = COLUMN_MEANS.find((one): one is ColumnMeans => one === means);
  if (!known) return null;
  if (known !== "value" && known !== "uncertainty") return { means: known, property: null };
  return isProperty(property) ? { means: known, property } : null;
}

function readSource(text: (name: string) => string, errors: FieldError[]): SourceChoice | null {
  const chosen = text("source");
  if (chosen === "") {
    errors.push({ pointer: "/source", detail: "Say where the values come from." });
    return null;
  }
  if (chosen !== NEW_SOURCE) return { kind: "known", sourceId: chosen };
  const described = readSourceForm((field) => text(`source.${field}`));
  if (described.ok) return { kind: "new", source: described.source };
  for (const { field, detail } of described.errors) errors.push({ pointer: `/source/${field}`, detail });
  return null;
}
