import { database } from "#app/db/database.server.ts";
import type { Property } from "#app/thermo/property.ts";
import { compareBytes } from "./digest.ts";
import { pairRecords, pairValues, type RecordChange, turnRound, type ValueChange } from "./compare.ts";
import {
  type DetailAsOf,
  type Edition,
  findDetailsThatCame,
  findDetailsThatWent,
  findSourceDetailsAsOf,
  findSourceDetailsThatCame,
  findSourceDetailsThatWent,
  findValuesAsOf,
  findValuesThatCame,
  findValuesThatWent,
  type SourceAsOf,
  type Sources,
  type ValueAsOf,
} from "./editions.queries.server.ts";
import { detailFields, sourceFields } from "./recordFields.ts";

/** The citations of edition n: all of them, or those named. */
export async function findSources(n: number, ids?: readonly string[]): Promise<Sources> {
  const found = await findSourceDetailsAsOf(n, ids ? { ids: [...new Set(ids)] } : {}, database());
  return new Map(found.map((source) => [source.sourceId, source]));
}

export interface SpeciesWithValues {
  detail: DetailAsOf;
  values: readonly ValueAsOf[];
}

/** Species with their values as of edition n, in the order given, and the citations of those values. */
export async function findSpeciesWithValues(
  n: number,
  details: readonly DetailAsOf[],
): Promise<{ species: SpeciesWithValues[]; sources: Sources }> {
  const values = await findValuesAsOf(n, { speciesIds: details.map((detail) => detail.speciesId) }, database());
  const bySpecies = new Map<string, ValueAsOf[]>(details.map((detail) => [detail.speciesId, []]));
  for (const value of values) bySpecies.get(value.speciesId)?.push(value);
  return {
    species: details.map((detail) => ({ detail, values: bySpecies.get(detail.speciesId) ?? [] })),
    sources: await findSources(
      n,
      values.map((value) => value.sourceId),
    ),
  };
}

/** Values of edition n with their citations. Lists left out ask for all. */
export async function findValuesWithSources(
  n: number,
  filter: { speciesIds?: readonly string[]; properties?: readonly Property[] },
): Promise<{ values: ValueAsOf[]; sources: Sources }> {
  const values = await findValuesAsOf(n, filter, database());
  return {
    values,
    sources: await findSources(
      n,
      values.map((value) => value.sourceId),
    ),
  };
}

export interface EditionComparison {
  from: Edition;
  to: Edition;
  values: ValueChange<ValueAsOf>[];
  species: RecordChange<DetailAsOf>[];
  sources: RecordChange<SourceAsOf>[];
  /** Values of the second edition that are as they were in the first. */
  unchanged: number;
  citationsBefore: Sources;
  citationsAfter: Sources;
}

/** What lies between two editions, net. The second may be the older one: then everything is seen from the other side. */
export async function compareEditionsNet(from: Edition, to: Edition): Promise<EditionComparison> {
  const db = database();
  const turned = from.number > to.number;
  const [low, high] = turned ? [to.number, from.number] : [from.number, to.number];
  const pairs = pairValues(await findValuesThatWent(low, high, db), await findValuesThatCame(low, high, db));
  const values = turned
    ? pairs.map(turnRound).sort((a, b) => compareBytes(a.key, b.key) || compareBytes(a.property, b.property))
    : pairs;

  const details = [await findDetailsThatWent(low, high, db), await findDetailsThatCame(low, high, db)] as const;
  const sources = [
    await findSourceDetailsThatWent(low, high, db),
    await findSourceDetailsThatCame(low, high, db),
  ] as const;
  const oriented = <Row>([older, newer]: readonly [Row[], Row[]]): [Row[], Row[]] =>
    turned ? [newer, older] : [older, newer];
  const arrived = values.filter((change) => change.what !== "went").length;
  const cited = (side: "before" | "after"): string[] => values.flatMap((change) => change[side]?.sourceId ?? []);
  return {
    from,
    to,
    values,
    species: pairRecords(...oriented(details), (row) => row.speciesId, detailFields),
    sources: pairRecords(...oriented(sources), (row) => row.sourceId, sourceFields),
    unchanged: to.valueCount - arrived,
    citationsBefore: await findSources(from.number, cited("before")),
    citationsAfter: await findSources(to.number, cited("after")),
  };
}
