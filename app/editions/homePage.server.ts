import { database } from "#app/db/database.server.ts";
import { demand } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { findEditions } from "./editions.queries.server.ts";
import { leadingChanges, type ListedChange, type Stood } from "./leadingChanges.ts";
import { compareEditionsNet } from "./read.server.ts";

/** Changed values listed on the first page; the comparison has them all. */
const LISTED = 6;
/** Editions that changed more than this are not compared for the first page. */
const MOST_COMPARED = 2000;

/** A value that the newest edition changed. */
export interface ChangedValue extends ListedChange {
  before: Stood;
  after: Stood;
}

/** The newest edition as the first page tells of it. */
export interface EditionHome {
  number: number;
  /** The edition before it; null for the first. */
  previous: number | null;
  publishedAt: Date;
  publisher: string;
  notes: string;
  speciesCount: number;
  valueCount: number;
  came: number;
  changed: number;
  went: number;
  /** The older edition it withdraws, with the reason. */
  withdraws: { edition: number; reason: string } | null;
  /** Values it changed, those furthest beyond their uncertainties first; at most six. */
  changes: readonly ChangedValue[];
}

/** The newest edition and what it changed; null before the first. @throws Forbidden */
export async function findEditionHome(acting: Acting): Promise<EditionHome | null> {
  demand(acting, "table:read");
  const [newest, previous] = await findEditions(database());
  if (!newest) return null;
  const { number, publishedAt, publisher, notes, speciesCount, valueCount, came, changed, went } = newest;
  const few = previous && changed > 0 && came + changed + went <= MOST_COMPARED;
  const { values } = few ? await compareEditionsNet(previous, newest) : { values: [] };
  const changes = leadingChanges(values, LISTED).flatMap((change): ChangedValue[] =>
    change.before && change.after ? [{ ...change, before: change.before, after: change.after }] : [],
  );
  return {
    number,
    previous: previous?.number ?? null,
    publishedAt,
    publisher,
    notes,
    speciesCount,
    valueCount,
    came,
    changed,
    went,
    withdraws: newest.withdraws === null ? null : { edition: newest.withdraws, reason: newest.withdrawalReason ?? "" },
    changes,
  };
}
