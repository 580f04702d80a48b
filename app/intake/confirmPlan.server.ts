import { act } from "#app/audit/act.server.ts";
import type { ActScope } from "#app/audit/act.server.ts";
import { findNewestEdition } from "#app/editions/editions.queries.server.ts";
import { Invalid, NotFound, Refused } from "#app/http/errors.ts";
import { enqueueJob } from "#app/jobs/enqueue.server.ts";
import { demand } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { findChoosableSources } from "#app/sources/sources.queries.server.ts";
import { DOI_IS_KNOWN, holderOfDoi } from "#app/sources/twins.ts";
import {
  findSheetForUpdate,
  insertColumnPlan,
  type Sheet,
  updateSheetConfirmed,
  updateSheetFailed,
  updateSheetReopened,
} from "./intake.queries.server.ts";
import { checkPlan, type ColumnPlan, columnsOf, holdsValues, type SheetSettings } from "./plan.ts";
import { headsHash } from "./receiveSheet.server.ts";
import { chosenSources, type SourceChoice } from "./sourceChoice.ts";
import { mayMove, type SheetState, sheetStateWords } from "./states.ts";

/** What the steward confirms: every column, what holds for the whole sheet, and where its values come from. */
export interface ConfirmedPlan {
  columns: ColumnPlan;
  settings: SheetSettings;
  /** Null for a sheet without values: what a species is called has no source of its own. */
  source: SourceChoice | null;
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
    await checkSources(confirmed, sheet.plan?.keys ?? [], trx);

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

/** Values need a source; a known one must be there, a new one must not be there already. */
async function checkSources(
  { columns, source }: ConfirmedPlan,
  keysOfColumns: readonly (readonly string[])[],
  trx: ActScope["trx"],
): Promise<void> {
  const refuse = (sentence: string, pointer: string): never => {
    throw new Invalid(sentence, [{ pointer, detail: sentence }]);
  };
  if (!holdsValues(columns)) return;
  if (source === null) return refuse("Say where the values come from.", "/source");
  const [keyColumn] = columnsOf(columns, "sourceKey");
  if ((source.kind === "byKey") !== (keyColumn !== undefined)) {
    return refuse(
      keyColumn === undefined
        ? "Sources are given by key, but no column holds the keys."
        : "A column holds source keys. Say which source each of them stands for.",
      "/source",
    );
  }
  const chosen = chosenSources(source);
  if (chosen.length === 0) return refuse("Say of at least one key which source it stands for.", "/source");
  const edition = (await findNewestEdition(trx))?.number ?? 0;
  const sources = await findChoosableSources(edition, trx);
  for (const { key, choice } of chosen) {
    const at = key === null ? "/source" : `/keys/${keysOfColumns[keyColumn ?? -1]?.indexOf(key) ?? 0}`;
    if (choice.kind === "known") {
      if (!sources.some((one) => one.sourceId === choice.sourceId)) {
        refuse("This source is neither in the table nor proposed. Choose another, or describe a new one.", at);
      }
      continue;
    }
    if (holderOfDoi(choice.source.doi, sources)) refuse(DOI_IS_KNOWN, `${at}/doi`);
  }
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
