import { act } from "#app/audit/act.server.ts";
import type { ActScope } from "#app/audit/act.server.ts";
import { findNewestEdition } from "#app/editions/editions.queries.server.ts";
import { Invalid, NotFound, Refused } from "#app/http/errors.ts";
import { enqueueJob } from "#app/jobs/enqueue.server.ts";
import { demand } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { findChoosableSources } from "#app/sources/sources.queries.server.ts";
import {
  findSheetForUpdate,
  insertColumnPlan,
  type Sheet,
  updateSheetConfirmed,
  updateSheetFailed,
  updateSheetReopened,
} from "./intake.queries.server.ts";
import { checkPlan, type ColumnPlan, type SheetSettings } from "./plan.ts";
import { headsHash } from "./receiveSheet.server.ts";
import type { SourceChoice } from "./sourceChoice.ts";
import { mayMove, type SheetState, sheetStateWords } from "./states.ts";

/** What the steward confirms: every column, what holds for the whole sheet, and where its values come from. */
export interface ConfirmedPlan {
  columns: ColumnPlan;
  settings: SheetSettings;
  source: SourceChoice;
}

/** The sheet, held until the act ends, if it may go to the state that the act leads to. */
export async function sheetToMove(id: number, to: SheetState, doing: string, trx: ActScope["trx"]): Promise<Sheet> {
  const sheet = await findSheetForUpdate(id, trx);
  if (!sheet) throw new NotFound(`There is no sheet ${id}.`);
  if (!mayMove(sheet.state, to)) {
    throw new Refused(
      `Sheet ${id} is now in the state “${sheetStateWords[sheet.state]}”, so ${doing} is not possible.`,
    );
  }
  return sheet;
}

/**
 * Confirms what the columns hold and has the worker read the rows. The plan is remembered for sheets with these heads.
 * @throws Invalid with a pointer to each column or setting that is missing or contradictory
 */
export async function confirmPlan(acting: Acting, sheetId: number, confirmed: ConfirmedPlan): Promise<void> {
  demand(acting, "sheet:work");
  await act(acting, async ({ trx, record }) => {
    const sheet = await sheetToMove(sheetId, "reading", "confirming its columns", trx);
    const heads = sheet.heads ?? [];
    if (
      confirmed.columns.length !== heads.length ||
      confirmed.columns.some((one, index) => one.head !== heads[index])
    ) {
      throw new Invalid(`The plan names other columns than sheet ${sheetId} has. Open the sheet again.`);
    }
    const errors = checkPlan(confirmed.columns, confirmed.settings);
    if (errors.length > 0) throw new Invalid(errors[0]?.detail ?? "The plan is not complete.", errors);
    await checkSource(confirmed.source, trx);

    await updateSheetConfirmed(
      sheetId,
      {
        plan: { notices: [], headRow: 1, samples: [], bareSolid: false, ...sheet.plan, columns: confirmed.columns },
        settings: confirmed.settings,
        sourceChoice: confirmed.source,
        by: acting.person.id,
      },
      trx,
    );
    await insertColumnPlan(
      {
        headsHash: headsHash(heads),
        heads,
        columns: confirmed.columns,
        settings: confirmed.settings,
        by: acting.person.id,
      },
      trx,
    );
    await enqueueJob("readSheet", { sheetId }, trx, { jobKey: `read-sheet-${sheetId}` });
    record({
      act: "sheet.plan-confirmed",
      objectId: sheetId,
      detail: {
        columns: confirmed.columns.map(({ head, means, property, unit }) => ({ head, means, property, unit })),
        settings: confirmed.settings,
        source: confirmed.source,
      },
    });
  });
}

/** A known source must be there; a new one must not be there already. */
async function checkSource(choice: SourceChoice, trx: ActScope["trx"]): Promise<void> {
  const edition = (await findNewestEdition(trx))?.number ?? 0;
  const sources = await findChoosableSources(edition, trx);
  const refuse = (sentence: string, pointer: string): never => {
    throw new Invalid(sentence, [{ pointer, detail: sentence }]);
  };
  if (choice.kind === "known") {
    if (!sources.some((one) => one.sourceId === choice.sourceId)) {
      refuse("This source is neither in the table nor proposed. Choose another, or describe a new one.", "/source");
    }
    return;
  }
  const { doi } = choice.source;
  const twin = doi === "" ? undefined : sources.find((one) => one.doi?.toLowerCase() === doi.toLowerCase());
  if (twin) refuse("A source with this DOI is there already. Choose it from the list instead.", "/source/doi");
}

/** Goes back from the read rows, or from a stopped reading, to the columns. Repairs are kept. */
export async function reopenPlan(acting: Acting, sheetId: number): Promise<void> {
  demand(acting, "sheet:work");
  await act(acting, async ({ trx, record }) => {
    const sheet = await sheetToMove(sheetId, "planned", "changing its columns", trx);
    await updateSheetReopened(sheetId, trx);
    record({ act: "sheet.planned", objectId: sheetId, detail: { again: true, from: sheet.state } });
  });
}

/** Stops the reading; what was read so far stays to be looked at, and the columns can be changed. */
export async function stopReading(acting: Acting, sheetId: number): Promise<void> {
  demand(acting, "sheet:work");
  await act(acting, async ({ trx, record }) => {
    const sheet = await sheetToMove(sheetId, "failed", "stopping its reading", trx);
    if (sheet.state !== "reading") throw new Refused(`Sheet ${sheetId} is not being read.`);
    const failure = `Stopped by ${acting.person.name} after ${sheet.rowsDone} of ${sheet.rowsTotal ?? 0} rows.`;
    await updateSheetFailed(sheetId, failure, trx);
    record({ act: "sheet.failed", objectId: sheetId, detail: { reason: failure } });
  });
}
