import { createHash } from "node:crypto";
import { act } from "#app/audit/act.server.ts";
import type { Database } from "#app/db/database.server.ts";
import { findDetailsAsOf, findNewestEdition, findValuesAsOf } from "#app/editions/editions.queries.server.ts";
import { Invalid, Refused } from "#app/http/errors.ts";
import { demand } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { toNumber } from "#app/thermo/digits.ts";
import type { Property } from "#app/thermo/property.ts";
import { decodeSheet, type DecodedSheet } from "./decode.ts";
import {
  findColumnPlan,
  findOpenSheetOfBytes,
  insertSheet,
  lockBytes,
  updateSheetPlanned,
} from "./intake.queries.server.ts";
import {
  columnPlan,
  firstValues,
  hasBareSolid,
  hillsOf,
  NO_CONTEXT,
  type PlanContext,
  planColumns,
  type PlanGuess,
  type SheetSettings,
  sheetSettings,
  standingKey,
} from "./plan.ts";
import { keysOfColumns } from "./sourceKeys.ts";

/** A file as it was uploaded. */
export interface UploadedSheet {
  /** The name it had; only ever shown. */
  name: string;
  bytes: Uint8Array;
}

/**
 * Takes a property sheet in: keeps its bytes untouched, decodes them and guesses what its columns hold. Answers the
 * sheet's number.
 * @throws Invalid when the bytes are no sheet (nothing is kept then); Refused when the same bytes are being worked on
 */
export async function receiveSheet(acting: Acting, upload: UploadedSheet): Promise<number> {
  demand(acting, "sheet:work");
  const decoding = decodeSheet(upload.bytes);
  if (decoding.outcome === "refused") {
    throw new Invalid(decoding.sentence, [{ pointer: "/sheet", detail: decoding.sentence }]);
  }
  const { sheet } = decoding;
  const sha256 = createHash("sha256").update(upload.bytes).digest();
  const name = shownName(upload.name);

  return act(acting, async ({ trx, record }) => {
    await lockBytes(sha256, trx);
    const twin = await findOpenSheetOfBytes(sha256, trx);
    if (twin) {
      throw new Refused(
        `The same bytes are already here as sheet ${twin.id} (${twin.name}), which is still being worked on. Go on with that one.`,
      );
    }
    const id = await insertSheet({ name, bytes: upload.bytes, sha256, uploadedBy: acting.person.id }, trx);
    record({
      act: "sheet.received",
      objectId: id,
      detail: { name, bytes: upload.bytes.length, sha256: sha256.toString("hex") },
    });
    await planSheet(id, sheet, trx);
    record({ act: "sheet.planned", objectId: id, detail: { rows: sheet.rows.length, columns: sheet.heads.length } });
    return id;
  });
}

/** Writes down how a sheet was decoded and what its columns seem to hold; the steward is to confirm it. */
export async function planSheet(id: number, sheet: DecodedSheet, trx: Database): Promise<void> {
  const guess = await rememberedOrGuessed(sheet, trx);
  await updateSheetPlanned(
    id,
    {
      dialect: sheet.dialect,
      heads: sheet.heads,
      plan: {
        columns: guess.plan,
        notices: guess.notices,
        headRow: sheet.headRow,
        samples: firstValues(sheet),
        bareSolid: hasBareSolid(sheet),
        keys: keysOfColumns(sheet),
      },
      settings: guess.settings,
      rowsTotal: sheet.rows.length,
    },
    trx,
  );
}

/** SHA-256 of the heads: what a remembered plan is found by. */
export function headsHash(heads: readonly string[]): Buffer {
  return createHash("sha256").update(JSON.stringify(heads)).digest();
}

/** The last part of the name without control characters, at most 255 characters. */
function shownName(name: string): string {
  const last = name.split(/[/\\]/).at(-1) ?? "";
  const plain = Array.from(last.normalize("NFC").replace(/\p{C}/gu, "").trim()).slice(0, 255).join("");
  return plain === "" ? "sheet without a name" : plain;
}

/** The plan confirmed for the same heads before, else a guess held against the newest edition. */
async function rememberedOrGuessed(sheet: DecodedSheet, trx: Database): Promise<PlanGuess> {
  const guess = planColumns(sheet, await contextOf(sheet, trx));
  const remembered = await findColumnPlan(headsHash(sheet.heads), trx);
  const columns = columnPlan.safeParse(remembered?.plan);
  const settings = sheetSettings.safeParse(remembered?.settings);
  if (!remembered || !columns.success || columns.data.length !== sheet.heads.length) return guess;
  return {
    plan: columns.data.map((column, index) => {
      const doubt = guess.plan[index];
      const agrees = doubt?.means === column.means && doubt.unit === column.unit && doubt.property === column.property;
      return {
        ...column,
        because: agrees ? `as confirmed before; ${doubt.because}` : "as confirmed before for these heads",
        // A unit that the table contradicts is asked about even when it was confirmed once.
        asks: doubt !== undefined && !agrees && doubt.means === column.means && doubt.unit !== null && doubt.asks,
      };
    }),
    settings: settings.success ? statedOver(guess.settings, settings.data) : guess.settings,
    notices: [
      `Columns and settings are filled in as ${remembered.savedByName} confirmed them for a sheet with the same heads.`,
      ...guess.notices,
    ],
  };
}

/** What was confirmed before, except where this sheet itself says something. */
function statedOver(stated: SheetSettings, before: SheetSettings): SheetSettings {
  return {
    ...before,
    temperature: stated.temperature ?? before.temperature,
    standardPressure: stated.standardPressure ?? before.standardPressure,
    basis: stated.basis ?? before.basis,
    decimalComma: stated.decimalComma,
  };
}

async function contextOf(sheet: DecodedSheet, trx: Database): Promise<PlanContext> {
  const edition = await findNewestEdition(trx);
  if (!edition) return NO_CONTEXT;
  const hill = hillsOf(sheet, planColumns(sheet, NO_CONTEXT).plan);
  const details = await findDetailsAsOf(edition.number, { hill }, trx);
  const placeOf = new Map(details.map((one) => [one.speciesId, standingKey(one.hill, one.charge, one.phase)]));
  const values = await findValuesAsOf(edition.number, { speciesIds: [...placeOf.keys()] }, trx);
  const standing = new Map<string, { property: Property; value: number }[]>();
  for (const value of values) {
    const place = placeOf.get(value.speciesId);
    if (place === undefined) continue;
    standing.set(place, [...(standing.get(place) ?? []), { property: value.property, value: toNumber(value.digits) }]);
  }
  return { edition: edition.number, standing };
}
