import { database } from "#app/db/database.server.ts";
import { NotFound } from "#app/http/errors.ts";
import { demand } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { countValuesBySource } from "#app/sources/sources.queries.server.ts";
import { findNewestEdition, findSourceDetailsAsOf, findValuesAsOf } from "./editions.queries.server.ts";

/** The sources of the newest edition, each with how many values rest on it. */
export async function findSourcesPage(acting: Acting) {
  demand(acting, "table:read");
  const edition = (await findNewestEdition(database()))?.number ?? 0;
  const counts = await countValuesBySource(edition, database());
  const sources = await findSourceDetailsAsOf(edition, {}, database());
  return {
    edition,
    sources: sources.map(({ sourceId, citation, doi, kind, notice }) => ({
      sourceId,
      citation,
      doi,
      kind,
      notice,
      values: counts.get(sourceId) ?? 0,
    })),
  };
}

/** One source of the newest edition with the values that rest on it. */
export async function findSourcePage(acting: Acting, sourceId: string) {
  demand(acting, "table:read");
  const edition = (await findNewestEdition(database()))?.number ?? 0;
  const [source] = await findSourceDetailsAsOf(edition, { ids: [sourceId] }, database());
  if (!source) throw new NotFound(`The newest edition has no source ${sourceId}.`);
  const values = await findValuesAsOf(edition, { sourceIds: [sourceId] }, database());
  const bySpecies = new Map<
    string,
    { key: string; values: Pick<(typeof values)[number], "property" | "digits" | "uncertainty">[] }
  >();
  for (const { key, property, digits, uncertainty } of values) {
    const row = bySpecies.get(key) ?? { key, values: [] };
    row.values.push({ property, digits, uncertainty });
    bySpecies.set(key, row);
  }
  const { citation, doi, kind, notice, since } = source;
  return { edition, source: { sourceId, citation, doi, kind, notice, since }, species: [...bySpecies.values()] };
}
