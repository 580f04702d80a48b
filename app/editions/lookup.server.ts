import { database } from "#app/db/database.server.ts";
import type { Phase } from "#app/thermo/phase.ts";
import type { Property } from "#app/thermo/property.ts";
import {
  type DetailAsOf,
  findDetailsAsOf,
  findValuesAsOf,
  type Sources,
  type ValueAsOf,
} from "./editions.queries.server.ts";
import { hillsOf, keysOf, readAsked, type Settled, settler } from "./lookup.ts";
import { findIdsNamed, findIdsOnceCalled } from "./lookup.queries.server.ts";
import { findSources } from "./read.server.ts";

/** What a program asks of an edition. */
export interface LookupQuestion {
  /** Names, keys in any usual spelling, or CAS numbers. */
  species: readonly string[];
  phase: Phase | null;
  /** Properties wanted; null asks for all. */
  properties: readonly Property[] | null;
}

export interface LookupAnswer {
  /** One for each item, in the order asked. */
  entries: { asked: string; settled: Settled<DetailAsOf> }[];
  /** Values of the species found, by their ids. */
  values: ReadonlyMap<string, readonly ValueAsOf[]>;
  sources: Sources;
}

/**
 * Finds each item of a question in edition n: its keys, names and CAS numbers as they stand there. One query for each way
 * of naming a species, however many are asked for. Looks at nothing later than n.
 */
export async function lookUpSpecies(n: number, question: LookupQuestion): Promise<LookupAnswer> {
  const db = database();
  const asked = question.species.map(readAsked);
  const unique = (texts: readonly string[]): string[] => [...new Set(texts)];
  const keys = unique(asked.flatMap(keysOf));
  const former = await findIdsOnceCalled(n, keys, db);
  const named = await findIdsNamed(
    n,
    unique(asked.map((one) => one.name)).filter((name) => name !== ""),
    db,
  );
  const found = [
    ...(await findDetailsAsOf(n, { keys }, db)),
    ...(await findDetailsAsOf(n, { hill: unique(asked.flatMap(hillsOf)) }, db)),
    ...(await findDetailsAsOf(n, { cas: unique(asked.flatMap((one) => one.cas ?? [])) }, db)),
    ...(await findDetailsAsOf(n, { speciesIds: unique([...named, ...former.map((one) => one.id)]) }, db)),
  ];
  const species = [...new Map(found.map((one) => [one.speciesId, one])).values()];
  const formerKeys = new Map<string, string[]>();
  for (const { key, id } of former) formerKeys.set(key, [...(formerKeys.get(key) ?? []), id]);

  const settle = settler(n, { species, formerKeys }, question.phase);
  const entries = asked.map((one, index) => ({ asked: question.species[index] ?? "", settled: settle(one) }));

  const speciesIds = unique(
    entries.flatMap(({ settled }) => (settled.outcome === "found" ? [settled.species.speciesId] : [])),
  );
  const { properties } = question;
  const list = await findValuesAsOf(n, { speciesIds, ...(properties ? { properties } : {}) }, db);
  const values = new Map<string, ValueAsOf[]>(speciesIds.map((id) => [id, []]));
  for (const value of list) values.get(value.speciesId)?.push(value);
  return {
    entries,
    values,
    sources: await findSources(
      n,
      list.map((value) => value.sourceId),
    ),
  };
}
