import { type Kysely, sql } from "kysely";

/*
 * The bytes of a sheet stay as they came, but which text they are can turn out to have been guessed wrong (Windows-1252
 * for UTF-8 and the reverse). A sheet that goes back to its columns may then be read in another encoding, and the cells
 * of rows that were read before are written anew from the same bytes.
 */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    grant update (cells) on sheet_row to tablewright_app;
    comment on column sheet_row.cells is 'The cells as uploaded, to the letter, in the encoding the sheet is read in. Repairs are sheet_repair.';
  `.execute(db);
}
