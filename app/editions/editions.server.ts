import { database } from "#app/db/database.server.ts";
import { findNewestEdition } from "./editions.queries.server.ts";

/** Number of the newest published edition; null before the first. The frame of every page asks it. */
export async function findCurrentEdition(): Promise<number | null> {
  return (await findNewestEdition(database()))?.number ?? null;
}
