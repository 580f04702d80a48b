import { database } from "#app/db/database.server.ts";
import { type Edition, findEditions } from "./editions.queries.server.ts";

/** What every page of the table says of the edition it shows. */
export interface EditionFrame {
  number: number;
  publishedAt: Date;
  publisher: string;
  speciesCount: number;
  valueCount: number;
  licence: string;
  /** Why it was withdrawn, and by which edition; null while it was not. */
  withdrawn: { edition: number; reason: string } | null;
  newest: number;
  /** All editions, the newest first. */
  editions: readonly number[];
}

/** The frame of an edition's pages. */
export async function findFrame(edition: Edition): Promise<EditionFrame> {
  const numbers = (await findEditions(database())).map((one) => one.number);
  const { number, publishedAt, publisher, speciesCount, valueCount, licence, withdrawnBy, withdrawnBecause } = edition;
  return {
    number,
    publishedAt,
    publisher,
    speciesCount,
    valueCount,
    licence,
    withdrawn: withdrawnBy === null ? null : { edition: withdrawnBy, reason: withdrawnBecause ?? "" },
    newest: numbers[0] ?? number,
    editions: numbers,
  };
}
