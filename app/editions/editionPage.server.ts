import { database } from "#app/db/database.server.ts";
import { type Edition, findEditions } from "./editions.queries.server.ts";

/** Every published edition, the newest first. */
export async function findFrames(): Promise<Edition[]> {
  return findEditions(database());
}
