import { database } from "#app/db/database.server.ts";
import { NotFound } from "#app/http/errors.ts";
import { demand } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { countValuesBySource, findProposalOfSource } from "#app/sources/sources.queries.server.ts";
import { PROPERTIES, type Property } from "#app/thermo/property.ts";
import { textChanges } from "./compare.ts";
import { wordRuns } from "./comparePage.ts";
import {
  type Edition,
  findNewestEdition,
  findSourceDetailsAsOf,
  findValuesAsOf,
  type SourceAsOf,
} from "./editions.queries.server.ts";
import { findFrame } from "./frame.server.ts";
import { sourceFields } from "./recordFields.ts";
import { type ListedSource, selectSources, type SourceQuery } from "./sourceList.ts";
import {
  countSpeciesOn,
  countValuesByProperty,
  countValuesThroughEditions,
  findFirstEditionOf,
  findSheetsOf,
  findSourceHistory,
  findSpeciesOn,
} from "./sourcePage.queries.server.ts";
import { TABLE_PAGE } from "./tableQuery.ts";

/** The sources of an edition that a query asks for, each with how many values lean on it. @throws Forbidden */
export async function findSourcesPage(acting: Acting, edition: Edition, query: SourceQuery) {
  demand(acting, "table:read");
  const n = edition.number;
  const counts = await countValuesBySource(n, database());
  const all = (await findSourceDetailsAsOf(n, {}, database())).map(
    ({ sourceId, citation, doi, kind, notice }): ListedSource => ({
      sourceId,
      citation,
      doi,
      kind,
      notice,
      values: counts.get(sourceId) ?? 0,
    }),
  );
  return { frame: await findFrame(edition), ...selectSources(all, query), all: all.length, query };
}

export type SourcesPage = Awaited<ReturnType<typeof findSourcesPage>>;

/**
 * A source as an edition cites it.
 * @throws NotFound with the edition in which it came in, where it came in later
 */
export async function findSourceIn(edition: Edition, sourceId: string): Promise<SourceAsOf> {
  const [source] = await findSourceDetailsAsOf(edition.number, { ids: [sourceId] }, database());
  if (source) return source;
  const first = await findFirstEditionOf(sourceId, database());
  throw new NotFound(
    first === undefined
      ? `Edition ${edition.number} has no source ${sourceId}.`
      : `Edition ${edition.number} has no source ${sourceId} yet; it came in with edition ${first}.`,
  );
}

/** One source as of an edition, with a page of the values that lean on it. @throws Forbidden; NotFound */
export async function findSourcePage(
  acting: Acting,
  edition: Edition,
  sourceId: string,
  query: { property: Property | null; page: number },
) {
  demand(acting, "table:read");
  const n = edition.number;
  const db = database();
  const { citation, doi, kind, notice } = await findSourceIn(edition, sourceId);
  const counts = await countValuesByProperty(n, sourceId, db);
  const { property } = query;
  const count = await countSpeciesOn(n, sourceId, property, db);
  const pages = Math.max(1, Math.ceil(count / TABLE_PAGE));
  const page = Math.min(query.page, pages);
  const speciesIds = await findSpeciesOn(
    n,
    sourceId,
    property,
    { limit: TABLE_PAGE, offset: (page - 1) * TABLE_PAGE },
    db,
  );
  const values = await findValuesAsOf(
    n,
    { speciesIds, sourceIds: [sourceId], ...(property === null ? {} : { properties: [property] }) },
    db,
  );
  const history = await findSourceHistory(n, sourceId, db);
  return {
    frame: await findFrame(edition),
    source: { sourceId, citation, doi, kind, notice, since: history[0]?.since ?? n },
    property,
    counts: PROPERTIES.flatMap((one) => {
      const values = counts.get(one);
      return values === undefined ? [] : [{ property: one, values }];
    }),
    species: bySpecies(values),
    count,
    page,
    pages,
    pageSize: TABLE_PAGE,
    history: throughEditions(history, await countValuesThroughEditions(n, sourceId, db)),
    sheets: (await findSheetsOf(n, sourceId, db)).map((sheet) => ({ ...sheet, values: Number(sheet.values) })),
  };
}

export type SourcePage = Awaited<ReturnType<typeof findSourcePage>>;

type LeaningValue = Pick<Awaited<ReturnType<typeof findValuesAsOf>>[number], "digits" | "uncertainty">;

/** One row a species, as a table shows it; the values come in the order of the keys. */
function bySpecies(values: Awaited<ReturnType<typeof findValuesAsOf>>) {
  const rows = new Map<string, { key: string; values: Partial<Record<Property, LeaningValue>> }>();
  for (const { key, property, digits, uncertainty } of values) {
    const row = rows.get(key) ?? { key, values: {} };
    row.values[property] = { digits, uncertainty };
    rows.set(key, row);
  }
  return [...rows.values()];
}

/** What each edition did to a source: how it is cited since, word by word, and which values came to it and went. */
function throughEditions(
  history: Awaited<ReturnType<typeof findSourceHistory>>,
  moves: Awaited<ReturnType<typeof countValuesThroughEditions>>,
) {
  const editions = [...new Set([...history.map((row) => row.since), ...moves.map((move) => move.edition)])];
  return editions
    .sort((a, b) => a - b)
    .map((edition) => {
      const at = history.findIndex((row) => row.since === edition);
      const row = history[at];
      const before = history[at - 1];
      const moved = moves.find((move) => move.edition === edition);
      return {
        edition,
        came: moved?.came ?? 0,
        went: moved?.went ?? 0,
        cited: row
          ? {
              texts: before
                ? textChanges(before, row, sourceFields).map((text) => ({ field: text.field, runs: wordRuns(text) }))
                : null,
              revisionId: row.revisionId,
              writer: row.writer,
              decider: row.decider,
            }
          : null,
      };
    });
}

/**
 * Where the address of a source without an edition leads: to the newest edition if that has it, else to the open revision
 * that proposes it.
 * @throws Forbidden; NotFound
 */
export async function findWhereSourceStands(
  acting: Acting,
  sourceId: string,
): Promise<{ edition: number } | { revisionId: number }> {
  demand(acting, "table:read");
  const edition = (await findNewestEdition(database()))?.number ?? 0;
  const [standing] = await findSourceDetailsAsOf(edition, { ids: [sourceId] }, database());
  if (standing) return { edition };
  const revisionId = await findProposalOfSource(sourceId, database());
  if (revisionId !== undefined) return { revisionId };
  throw new NotFound(`There is no source ${sourceId}, neither in an edition nor proposed.`);
}
