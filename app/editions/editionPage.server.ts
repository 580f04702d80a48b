import { database } from "#app/db/database.server.ts";
import { demand } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { firstLine } from "./editionPage.ts";
import { type Edition, findEditions } from "./editions.queries.server.ts";
import { findFrame } from "./frame.server.ts";
import { leadingChanges, type ListedChange } from "./leadingChanges.ts";
import { compareEditionsNet } from "./read.server.ts";
import { digestTableFile } from "./tableFile.server.ts";

/** Changes listed on the page of an edition; the comparison has them all. */
const LISTED = 12;
/** Editions that changed more than this are not compared for their page. */
const MOST_COMPARED = 5_000;
/** The file of an edition with more values than this is not hashed for its page; its download says the hash. */
const MOST_HASHED = 10_000;

/** An edition as the list of all has it. */
export interface ListedEdition {
  number: number;
  publishedAt: Date;
  publisher: string;
  /** First line of the notes. */
  note: string;
  speciesCount: number;
  valueCount: number;
  came: number;
  changed: number;
  went: number;
  /** The older edition it withdraws, with the reason. */
  withdraws: { edition: number; reason: string } | null;
  /** The later edition that withdrew it, with the reason. */
  withdrawn: { edition: number; reason: string } | null;
}

/** Every edition, the newest first. @throws Forbidden */
export async function findEditionsPage(acting: Acting): Promise<ListedEdition[]> {
  demand(acting, "table:read");
  return (await findEditions(database())).map((edition) => {
    const { number, publishedAt, publisher, speciesCount, valueCount, came, changed, went } = edition;
    return {
      number,
      publishedAt,
      publisher,
      note: firstLine(edition.notes),
      speciesCount,
      valueCount,
      came,
      changed,
      went,
      ...withdrawals(edition),
    };
  });
}

/** What an edition changed against the one before it. */
export interface EditionChanges {
  /** The first changes; empty where there are too many to compare here. */
  listed: readonly ListedChange[];
  /** Species and sources that are called or cited otherwise than before. */
  renamed: number;
  recited: number;
}

/** One edition as its page tells of it, as far as the table itself knows. @throws Forbidden */
export async function findEditionPage(acting: Acting, edition: Edition) {
  demand(acting, "table:read");
  const { number, notes, licence, came, changed, went } = edition;
  const file = edition.valueCount <= MOST_HASHED ? await digestTableFile(edition) : null;
  return {
    frame: await findFrame(edition),
    notes,
    licence,
    came,
    changed,
    went,
    /** Number of the edition before; null for the first. */
    previous: number > 1 ? number - 1 : null,
    withdraws: withdrawals(edition).withdraws,
    /** Null for the first edition, which has nothing to be held against. */
    changes: await findChanges(edition),
    digest: edition.digest.toString("hex"),
    previousDigest: edition.previousDigest?.toString("hex") ?? null,
    /** Its CSV: SHA-256 in hexadecimal and length in bytes; null where it is too long to be hashed for a page. */
    file: file && { sha256: file.sha256.toString("hex"), length: file.length },
  };
}

export type EditionPage = Awaited<ReturnType<typeof findEditionPage>>;

async function findChanges(edition: Edition): Promise<EditionChanges | null> {
  const previous = (await findEditions(database())).find((one) => one.number === edition.number - 1);
  if (!previous) return null;
  if (edition.came + edition.changed + edition.went > MOST_COMPARED) return { listed: [], renamed: 0, recited: 0 };
  const { values, species, sources } = await compareEditionsNet(previous, edition);
  return {
    listed: leadingChanges(values, LISTED),
    renamed: species.filter(({ what }) => what === "changed").length,
    recited: sources.filter(({ what }) => what === "changed").length,
  };
}

function withdrawals(edition: Edition): Pick<ListedEdition, "withdraws" | "withdrawn"> {
  const { withdraws, withdrawalReason, withdrawnBy, withdrawnBecause } = edition;
  return {
    withdraws: withdraws === null ? null : { edition: withdraws, reason: withdrawalReason ?? "" },
    withdrawn: withdrawnBy === null ? null : { edition: withdrawnBy, reason: withdrawnBecause ?? "" },
  };
}
