import { checks } from "#app/checks/registry.ts";
import { database } from "#app/db/database.server.ts";
import { findEditions } from "#app/editions/editions.queries.server.ts";
import { demand } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { fullCitation } from "#app/sources/citation.ts";
import { findNextEdition, findNextEditionStops } from "./publish.server.ts";
import { nextEditionContent, type NextCounts, type NextRevision, type WaitingRevision } from "./publishPage.ts";
import { findLinesWithHandOf, findMoves, findRevision, findRevisionsByState } from "./review.queries.server.ts";
import { findNames, findStood } from "./revisionPage.server.ts";

/** The licence an edition has unless its publisher says otherwise. */
const USUAL_LICENCE = "CC-BY-4.0";

/** What stops the next edition. */
export interface Stop {
  species: string;
  check: string;
  title: string;
  sentence: string;
  arithmetic: readonly string[];
}

export interface PublishPage {
  /** Number that the next edition would get. */
  number: number;
  previous: number;
  digest: string;
  counts: NextCounts;
  revisions: readonly NextRevision[];
  stops: readonly Stop[];
  /** Whether the viewer had a hand in every line, so that somebody else must publish. */
  allOwn: boolean;
  licence: string;
  /** Editions that could be withdrawn, newest first. */
  withdrawable: readonly number[];
  /** Revisions still in review, with how many lines each. */
  inReview: readonly { id: number; title: string }[];
}

/** The next edition as it would be. @throws Forbidden */
export async function findPublishPage(acting: Acting): Promise<PublishPage> {
  demand(acting, "edition:publish");
  const db = database();
  const [next, editions, inReview] = await Promise.all([
    findNextEdition(),
    findEditions(db),
    findRevisionsByState(["in_review"], 50, db),
  ]);
  const { lines, previous, digest } = next;
  const ids = [...new Set(lines.map((line) => line.revisionId))];
  const [stood, names, revisions, hands, stops] = await Promise.all([
    findStood(lines.map((line) => ({ line, row: line.againstRow, version: line.againstVersion }))),
    findNames(lines),
    Promise.all(ids.map(findWaitingRevision)),
    Promise.all(ids.map((id) => findLinesWithHandOf(id, acting.person.id, db))),
    lines.length > 0 ? findNextEditionStops(lines) : [],
  ]);
  const own = new Set(hands.flatMap((ofOne) => [...ofOne]));
  const titles = new Map(checks.map((check) => [check.code, check.title]));
  const withdrawn = new Set(editions.map((edition) => edition.withdraws));
  return {
    number: previous + 1,
    previous,
    digest,
    ...nextEditionContent({
      lines,
      revisions: new Map(revisions.flatMap((one) => (one ? [[one.id, one]] : []))),
      stood,
      names,
      printCitation: fullCitation,
    }),
    stops: stops.map(({ species, check, sentence, arithmetic }) => ({
      species,
      check,
      title: titles.get(check) ?? check,
      sentence,
      arithmetic,
    })),
    allOwn: lines.length > 0 && lines.every((line) => own.has(line.id)),
    licence: editions[0]?.licence ?? USUAL_LICENCE,
    withdrawable: editions.map((edition) => edition.number).filter((number) => !withdrawn.has(number)),
    inReview: inReview.map(({ id, title }) => ({ id, title })),
  };
}

async function findWaitingRevision(id: number): Promise<WaitingRevision | undefined> {
  const [revision, moves] = await Promise.all([findRevision(id, database()), findMoves(id, database())]);
  const closed = moves.findLast((move) => move.to === "decided");
  return (
    revision && {
      id,
      title: revision.title,
      madeByName: revision.madeByName,
      decided: closed ? { by: closed.by, at: closed.at } : null,
    }
  );
}

/** The newest edition, named when somebody else's publication came first. */
export async function findNewestPublication(): Promise<{
  number: number;
  publisher: string;
  publishedAt: Date;
} | null> {
  const [newest] = await findEditions(database());
  return newest ? { number: newest.number, publisher: newest.publisher, publishedAt: newest.publishedAt } : null;
}
