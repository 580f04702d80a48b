import { database } from "#app/db/database.server.ts";
import { type Edition, findEditions, findNewestEdition } from "./editions.queries.server.ts";

/** Number of the newest published edition; null before the first. The frame of every page asks it. */
export async function findCurrentEdition(): Promise<number | null> {
  return (await findNewestEdition(database()))?.number ?? null;
}

/** Every published edition, the newest first. */
export async function findAllEditions(): Promise<Edition[]> {
  return findEditions(database());
}
