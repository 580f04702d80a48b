import { act, type ActScope } from "#app/audit/act.server.ts";
import { Invalid, NotFound, Refused } from "#app/http/errors.ts";
import { demand } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { SHEET_LIMITS } from "./decode.ts";
import {
  findRepairs,
  findRow,
  findRowsByOutcome,
  findSheetForUpdate,
  insertRepair,
  type Sheet,
  updateRowsLeftOut,
} from "./intake.queries.server.ts";
import { ANSWER } from "./meaning.ts";
import type { CellProblem } from "./readRows.ts";
import { repairsByRow, rereadRows } from "./rereadRows.server.ts";
import { sheetStateWords } from "./states.ts";

/** A cell mended on the page. */
export interface CellRepair {
  /** Row number as a person counts it. */
  row: number;
  /** Index of the column, or `ANSWER` when it says which species the row is. */
  column: number;
  /** What the person saw in the cell. */
  was: string;
  becomes: string;
}

async function readSheetForUpdate(id: number, trx: ActScope["trx"]): Promise<Sheet> {
  const sheet = await findSheetForUpdate(id, trx);
  if (!sheet) throw new NotFound(`There is no sheet ${id}.`);
  if (sheet.state !== "read") {
    throw new Refused(
      `Sheet ${id} is now in the state “${sheetStateWords[sheet.state]}”; its rows are mended after they were read and before a revision is built.`,
    );
  }
  return sheet;
}

/**
 * Mends one cell: the original stays, the repair stands beside it with the person's name, and the row is read again at
 * once. A row that was left out comes back in by it.
 * @throws Refused when somebody else mended the cell in the meantime; Invalid for a cell that is not there
 */
export async function repairCell(acting: Acting, sheetId: number, repair: CellRepair): Promise<void> {
  demand(acting, "sheet:work");
  await act(acting, async ({ trx, record }) => {
    const sheet = await readSheetForUpdate(sheetId, trx);
    const row = await findRow(sheetId, repair.row, trx);
    if (!row) throw new NotFound(`Sheet ${sheetId} has no row ${repair.row}.`);
    const original = repair.column === ANSWER ? "" : row.cells[repair.column];
    if (original === undefined) throw new Invalid(`Row ${repair.row} has no column ${repair.column + 1}.`);
    if (repair.becomes.length > SHEET_LIMITS.cell || /[\0\r\n]/.test(repair.becomes)) {
      throw new Invalid(`A cell holds one line of at most ${SHEET_LIMITS.cell.toLocaleString("en")} characters.`);
    }
    const repairs = repairsByRow(await findRepairs(sheetId, [repair.row], trx));
    const now = repairs.get(repair.row)?.get(repair.column) ?? original;
    if (now === repair.becomes) return;
    if (now !== repair.was) {
      throw new Refused(`This cell was mended in the meantime and says “${now}” now. Look at it again, then mend it.`);
    }
    await insertRepair(
      {
        sheetId,
        row: repair.row,
        column: repair.column,
        was: now,
        becomes: repair.becomes,
        by: acting.person.id,
      },
      trx,
    );
    await rereadRows(sheet, [repair.row], trx);
    record({
      act: "sheet.cell-repaired",
      objectId: sheetId,
      detail: { row: repair.row, column: repair.column, was: now, becomes: repair.becomes },
    });
  });
}

/**
 * Gives one answer to one question wherever it is asked: takes a repair that a row offers, and the same in every other
 * refused row with the same problem that offers it too.
 * @returns how many rows were mended
 * @throws Refused when the row does not ask this any more
 */
export async function repairAlike(acting: Acting, sheetId: number, repair: Omit<CellRepair, "was">): Promise<number> {
  demand(acting, "sheet:work");
  return act(acting, async ({ trx, record }) => {
    const sheet = await readSheetForUpdate(sheetId, trx);
    const refused = await findRowsByOutcome(sheetId, "refused", { after: 0, limit: SHEET_LIMITS.rows }, trx);
    const asks = (problem: CellProblem): boolean =>
      problem.repairs.some((one) => one.column === repair.column && one.text === repair.becomes);
    const question = refused.find((row) => row.number === repair.row)?.problems.find(asks);
    if (!question) throw new Refused(`Row ${repair.row} does not ask this any more. Look at it again.`);
    const alike = refused.filter(
      (row) => row.leftOutAt === null && row.problems.some((one) => one.sentence === question.sentence && asks(one)),
    );
    const numbers = alike.map((row) => row.number);
    const repairs = repairsByRow(await findRepairs(sheetId, numbers, trx));
    for (const row of alike) {
      const original = repair.column === ANSWER ? "" : (row.cells[repair.column] ?? "");
      const was = repairs.get(row.number)?.get(repair.column) ?? original;
      const { column, becomes } = repair;
      await insertRepair({ sheetId, row: row.number, column, was, becomes, by: acting.person.id }, trx);
    }
    await rereadRows(sheet, numbers, trx);
    record({
      act: "sheet.cell-repaired",
      objectId: sheetId,
      detail: { rows: numbers, column: repair.column, becomes: repair.becomes },
    });
    return numbers.length;
  });
}

/**
 * Leaves refused rows out of the revision; they stay to be seen. `rows` null leaves out all that wait. Rows that were in
 * dispute with one of them are read again.
 */
export async function leaveRowsOut(acting: Acting, sheetId: number, rows: readonly number[] | null): Promise<number> {
  demand(acting, "sheet:work");
  return act(acting, async ({ trx, record }) => {
    const sheet = await readSheetForUpdate(sheetId, trx);
    const left = await updateRowsLeftOut(sheetId, rows, acting.person.id, trx);
    if (left.length === 0) throw new Refused("No refused row waits there: it was mended or left out already.");
    await rereadRows(sheet, [], trx);
    record({ act: "sheet.rows-left-out", objectId: sheetId, detail: { rows: left } });
    return left.length;
  });
}
