import { act } from "#app/audit/act.server.ts";
import { Invalid, NotFound, Refused } from "#app/http/errors.ts";
import { demand } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { decodeSheet } from "./decode.ts";
import { ENCODINGS } from "./encodings.ts";
import { countRows, findSheetBytes, findSheetForUpdate } from "./intake.queries.server.ts";
import { planSheet } from "./receiveSheet.server.ts";
import { sheetStateWords } from "./states.ts";

/**
 * Decodes the bytes of a sheet anew in the encoding that the steward says, and guesses its columns again. Only while its
 * columns wait to be confirmed.
 * @throws Invalid when the bytes are no sheet in that encoding; Refused when rows that were read before would not be the
 *   same rows; nothing changes then
 */
export async function chooseEncoding(acting: Acting, sheetId: number, chosen: string): Promise<void> {
  demand(acting, "sheet:work");
  const encoding = ENCODINGS.find((one) => one === chosen);
  const refuse = (detail: string): never => {
    throw new Invalid(detail, [{ pointer: "/encoding", detail }]);
  };
  if (!encoding) return refuse("Choose an encoding of the list.");
  await act(acting, async ({ trx, record }) => {
    const sheet = await findSheetForUpdate(sheetId, trx);
    if (!sheet) throw new NotFound(`There is no sheet ${sheetId}.`);
    if (sheet.state !== "planned") {
      throw new Refused(
        `Sheet ${sheetId} is now in the state “${sheetStateWords[sheet.state]}”, so reading it in another encoding is not possible.`,
      );
    }
    if (sheet.dialect?.encoding === encoding) return;
    const decoding = decodeSheet(await findSheetBytes(sheetId, trx), encoding);
    if (decoding.outcome === "refused") return refuse(decoding.sentence);
    const counts = await countRows(sheetId, trx);
    const before = counts.read + counts.refused + counts.leftOut + counts.skipped;
    if (before > 0 && decoding.sheet.rows.length !== sheet.rowsTotal) {
      throw new Refused(
        `In ${encoding} the file has ${decoding.sheet.rows.length} rows, but ${sheet.rowsTotal ?? 0} were read before. Save it as UTF-8 and send that file.`,
      );
    }
    await planSheet(sheetId, decoding.sheet, trx);
    record({
      act: "sheet.planned",
      objectId: sheetId,
      detail: { again: true, encoding, before: sheet.dialect?.encoding ?? null },
    });
  });
}
