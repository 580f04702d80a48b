import { readFileSync } from "node:fs";
import { database } from "#app/db/database.server.ts";
import { buildRevision } from "#app/intake/buildRevision.server.ts";
import { confirmPlan } from "#app/intake/confirmPlan.server.ts";
import { findSheet } from "#app/intake/intake.queries.server.ts";
import type { ColumnPlan, SheetSettings } from "#app/intake/plan.ts";
import { readSheet } from "#app/intake/readSheet.server.ts";
import { receiveSheet } from "#app/intake/receiveSheet.server.ts";
import type { SourceChoice } from "#app/intake/sourceChoice.ts";
import type { Acting } from "#app/people/person.ts";
import type { NewSource } from "#app/sources/sourceForm.ts";

/** The bytes of a sheet in fixtures/. */
export function fixture(name: string): Uint8Array {
  return readFileSync(new URL(`../../fixtures/${name}`, import.meta.url));
}

/** A source of invented numbers, as the steward describes it. */
export const notebook: NewSource = {
  title: "Calorimetry notebook 12",
  authors: "Calder Point Laboratory",
  year: "2026",
  container: "",
  publisher: "Calder Point Laboratory",
  doi: "",
  sourceKind: "measurement",
  note: "Invented numbers, for trying Tablewright out.",
};

export interface Confirmation {
  settings?: Partial<SheetSettings>;
  /** Null for a sheet without values. */
  source?: SourceChoice | null;
  columns?: (columns: ColumnPlan) => ColumnPlan;
}

/** Confirms the guessed plan as a steward would who finds it right, at 298.15 K and 100 kPa. */
export async function confirmGuess(steward: Acting, sheetId: number, confirmation: Confirmation = {}): Promise<void> {
  const sheet = await findSheet(sheetId, database());
  if (!sheet?.plan) throw new Error(`sheet ${sheetId} has no plan`);
  await confirmPlan(steward, sheetId, {
    columns: confirmation.columns?.(sheet.plan.columns) ?? sheet.plan.columns,
    settings: {
      ...sheet.settings,
      temperature: "298.15",
      standardPressure: "100000",
      uncertaintyKind: "expanded",
      ...confirmation.settings,
    },
    source: confirmation.source === undefined ? { kind: "new", source: notebook } : confirmation.source,
  });
}

/** A sheet taken in, its plan confirmed and its rows read, as the worker would. Answers its number. */
export async function sheetRead(
  steward: Acting,
  upload: { name: string; bytes: Uint8Array },
  confirmation: Confirmation = {},
): Promise<number> {
  const id = await receiveSheet(steward, upload);
  await confirmGuess(steward, id, confirmation);
  await readSheet(id);
  return id;
}

/** The draft revision of a sheet whose every row can be read. */
export async function revisionFromSheet(
  steward: Acting,
  upload: { name: string; bytes: Uint8Array },
  confirmation: Confirmation = {},
) {
  return buildRevision(steward, await sheetRead(steward, upload, confirmation), { title: upload.name, summary: "" });
}
