import { database } from "#app/db/database.server.ts";
import {
  countSpeciesAsOf,
  type DetailAsOf,
  findSpeciesPageAsOf,
  type SpeciesOrder,
} from "./editions.queries.server.ts";
import type { SpeciesFilter } from "./search.ts";

/** Species of edition n behind a key, by the bytes of their keys, and whether there are more. */
export async function browseSpecies(
  n: number,
  { filter, after, limit }: { filter: SpeciesFilter; after: string | null; limit: number },
): Promise<{ details: DetailAsOf[]; more: boolean }> {
  const order: SpeciesOrder = { by: "key", direction: "ascending" };
  const found = await findSpeciesPageAsOf(n, filter, { order, limit: limit + 1, after }, database());
  return { details: found.slice(0, limit), more: found.length > limit };
}

/** One numbered page of the species of edition n, in any order, with the count of all that the filter lets through. */
export async function pageOfSpecies(
  n: number,
  { filter, order, page, size }: { filter: SpeciesFilter; order: SpeciesOrder; page: number; size: number },
): Promise<{ details: DetailAsOf[]; count: number }> {
  const slice = { order, limit: size, offset: (page - 1) * size };
  const [details, count] = await Promise.all([
    findSpeciesPageAsOf(n, filter, slice, database()),
    countSpeciesAsOf(n, filter, database()),
  ]);
  return { details, count };
}
