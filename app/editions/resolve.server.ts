import { database } from "#app/db/database.server.ts";
import { NotFound } from "#app/http/errors.ts";
import { quote } from "#app/thermo/reading.ts";
import { formatKey, isSameSpecies, readKey } from "#app/thermo/speciesKey.ts";
import {
  type DetailAsOf,
  type Edition,
  findDetailsAsOf,
  findEdition,
  findNewestEdition,
  findSpeciesOnceCalled,
} from "./editions.queries.server.ts";
import { identityOf } from "./identity.ts";
import { plusKept } from "./search.ts";

/** The edition an address names, and whether it named it by its number. */
export interface ResolvedEdition {
  edition: Edition;
  /** The address said "current" and not a number. */
  isCurrent: boolean;
}

/**
 * The edition that stands at an address: a number, or the word "current" for the newest.
 * @throws NotFound with a sentence that says which editions there are
 */
export async function resolveEdition(text: string | undefined): Promise<ResolvedEdition> {
  if (text === "current") {
    const newest = await findNewestEdition(database());
    if (!newest) throw new NotFound("No edition is published yet.");
    return { edition: newest, isCurrent: true };
  }
  if (!/^[1-9]\d{0,8}$/.test(text ?? "")) {
    throw new NotFound(`${quote(text ?? "")} is not an edition. Give its number, or the word current for the newest.`);
  }
  const edition = await findEdition(Number(text), database());
  if (edition) return { edition, isCurrent: false };
  const newest = await findNewestEdition(database());
  throw new NotFound(
    newest
      ? `There is no edition ${text}; the newest is edition ${newest.number}.`
      : `There is no edition ${text}; none is published yet.`,
  );
}

/**
 * The species that a key names in edition n: the key itself, a common variant of it, or one that the species had in this
 * edition or an earlier one. Looks at nothing later than n. Compare the key of the answer with the one asked for to know
 * whether to send the caller on.
 * @throws NotFound with what comes near
 */
export async function resolveSpecies(n: number, asked: string): Promise<DetailAsOf> {
  const db = database();
  const [exact] = await findDetailsAsOf(n, { keys: [asked] }, db);
  if (exact) return exact;
  const spellings = [...new Set([asked, plusKept(asked)])];
  const readings = spellings.map(readKey);
  // What may be two species is asked back, even where only one of them stands here: it may not be the one that was meant.
  const doubt = readings.find((reading) => reading.outcome === "ambiguous");
  if (doubt) throw new NotFound(`Edition ${n} has no species of the key ${quote(asked)}. ${doubt.sentence}`);
  const identities = readings.flatMap((reading) => (reading.outcome === "read" ? [reading.value] : []));
  const canonical = identities.map(formatKey);
  const byKey = await findDetailsAsOf(n, { keys: [...spellings, ...canonical] }, db);
  if (byKey.length === 1 && byKey[0]) return byKey[0];

  const former = await findSpeciesOnceCalled(n, asked, db);
  const renamed = await findDetailsAsOf(n, { speciesIds: former.map((one) => one.speciesId) }, db);
  if (renamed.length === 1 && renamed[0]) return renamed[0];

  const alike = await findDetailsAsOf(n, { hill: identities.map((one) => one.formula.hill) }, db);
  const [same, ...others] = alike.filter((detail) => identities.some((one) => isSameSpecies(identityOf(detail), one)));
  if (same && others.length === 0) return same;
  throw new NotFound(
    missing(
      n,
      asked,
      alike.map((detail) => detail.key),
    ),
  );
}

function missing(n: number, asked: string, near: readonly string[]): string {
  const head = `Edition ${n} has no species ${quote(asked)}.`;
  if (near.length > 0) return `${head} It has ${near.slice(0, 5).join(", ")}.`;
  const reading = readKey(asked);
  return reading.outcome === "refused" ? `${head} ${reading.sentence}` : `${head} Search it by formula or name.`;
}

/**
 * The ids of the species that a list of keys names, each as `resolveSpecies` reads it.
 * @throws NotFound naming the first one that the edition does not have
 */
export async function resolveMany(n: number, asked: readonly string[]): Promise<string[]> {
  const exact = new Map((await findDetailsAsOf(n, { keys: asked }, database())).map((one) => [one.key, one.speciesId]));
  const ids: string[] = [];
  for (const key of asked) ids.push(exact.get(key) ?? (await resolveSpecies(n, key)).speciesId);
  return ids;
}
