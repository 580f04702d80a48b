import { BadRequest, DomainError, Invalid, NotFound } from "#app/http/errors.ts";
import { buildRevision } from "#app/intake/buildRevision.server.ts";
import { chooseEncoding } from "#app/intake/chooseEncoding.server.ts";
import { confirmPlan, reopenPlan, stopReading } from "#app/intake/confirmPlan.server.ts";
import { readPlanForm } from "#app/intake/planForm.ts";
import { leaveRowsOut, repairAlike, repairCell } from "#app/intake/repairCell.server.ts";
import { findSheetPage } from "#app/intake/sheetPage.server.ts";
import { paths } from "#app/paths.ts";
import type { Acting } from "#app/people/person.ts";
import type { SheetOutcome } from "./outcome.ts";

/** Where the person goes next, or what could not be done. */
export type Answer = { goTo: string } | { status: number; outcome: SheetOutcome };

function textOf(form: FormData, name: string): string {
  const value = form.get(name);
  return typeof value === "string" ? value : "";
}

function numberOf(form: FormData, name: string): number {
  const text = textOf(form, name);
  if (!/^\d{1,9}$/.test(text))
    throw new BadRequest("The form does not say which row and column it is about. Open the sheet again.");
  return Number(text);
}

/** Mends the cell that the form names. @returns what was done, in a sentence */
export async function repairFrom(acting: Acting, sheetId: number, form: FormData): Promise<string> {
  const row = numberOf(form, "row");
  if (textOf(form, "alike") !== "") {
    const mended = await repairAlike(acting, sheetId, {
      row,
      column: numberOf(form, "column"),
      becomes: textOf(form, "becomes"),
    });
    return `${mended} rows were read again.`;
  }
  await repairCell(acting, sheetId, {
    row,
    column: numberOf(form, "column"),
    was: textOf(form, "was"),
    becomes: textOf(form, "becomes"),
  });
  return `Row ${row} was read again.`;
}

/** Does what a form of the page asks for, by the act of the intake room that it names. */
export async function actOnSheet(acting: Acting, sheetId: number, form: FormData): Promise<Answer> {
  const intent = textOf(form, "intent");
  try {
    return { goTo: await perform(acting, sheetId, intent, form) };
  } catch (error) {
    if (!(error instanceof DomainError) || error instanceof NotFound || error instanceof BadRequest) throw error;
    const typed: Record<string, string> = {};
    for (const [name, value] of form) if (typeof value === "string") typed[name] = value;
    const errors = error instanceof Invalid ? [...error.errors] : [];
    return { status: error.status, outcome: { intent, sentence: error.message, errors, typed } };
  }
}

async function perform(acting: Acting, sheetId: number, intent: string, form: FormData): Promise<string> {
  const page = paths.sheet(sheetId);
  switch (intent) {
    case "confirm": {
      const { columns } = await findSheetPage(acting, sheetId, 0);
      const plan = readPlanForm(
        form,
        columns.map(({ head, means, property, unit, because, asks }) => ({
          head,
          means,
          property,
          unit,
          because,
          asks,
        })),
        columns.map(({ keys }) => keys.map(({ key }) => key)),
      );
      if (!plan.ok) throw new Invalid(plan.errors[0]?.detail ?? "The plan is not complete.", plan.errors);
      await confirmPlan(acting, sheetId, plan);
      return page;
    }
    case "encoding":
      await chooseEncoding(acting, sheetId, textOf(form, "encoding"));
      return page;
    case "stop":
      await stopReading(acting, sheetId);
      return page;
    case "reopen":
      await reopenPlan(acting, sheetId);
      return page;
    case "repair": {
      await repairFrom(acting, sheetId, form);
      return `${page}#row-${numberOf(form, "row")}`;
    }
    case "leave-out":
      await leaveRowsOut(acting, sheetId, [numberOf(form, "row")]);
      return `${page}#rows`;
    case "leave-all-out":
      await leaveRowsOut(acting, sheetId, null);
      return `${page}#rows`;
    case "build": {
      const built = await buildRevision(acting, sheetId, {
        title: textOf(form, "title"),
        summary: textOf(form, "summary"),
      });
      return paths.revision(built.revisionId);
    }
    default:
      throw new BadRequest("The form does not say what is to be done. Open the sheet again.");
  }
}
