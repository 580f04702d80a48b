import { database } from "#app/db/database.server.ts";
import { findEditions } from "#app/editions/editions.queries.server.ts";
import { demand, may } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { moveInWords, nextCounts } from "./homePage.ts";
import type { NextCounts } from "./publishPage.ts";
import {
  countNextLines,
  findLatestMoves,
  findNewestMoves,
  findRevisionsByState,
  findRevisionsOf,
} from "./review.queries.server.ts";
import type { RevisionItem } from "./revisionsPage.ts";
import { asItem } from "./revisionsPage.server.ts";

const MOST_LISTED = 200;
/** A steward's newest revisions among which those that need something are looked for. */
const MOST_OWN = 200;
const LATELY = 6;
/** How long a decision counts as news to the steward, in days. */
const NEWS = 14;
const DAY = 24 * 60 * 60 * 1000;

/** A revision of one's own, with what its newest step says. */
export interface OwnRevision extends RevisionItem {
  /** Who took the newest step, and with which words; null for a draft. */
  newest: { by: string; at: Date; remark: string } | null;
}

/** Something that happened in the review or to the table. */
export type LatelyEntry =
  | { kind: "revision"; at: Date; by: string; did: [before: string, after: string]; id: number; title: string }
  | { kind: "edition"; at: Date; by: string; number: number };

export interface ReviewHome {
  /** Revisions by others that wait for this person's decision, the longest waiting first. Empty unless they decide. */
  toDecide: readonly RevisionItem[];
  /** This person's own: returned, then drafts, in review, decided of late. Empty unless they write. */
  own: readonly OwnRevision[];
  /** The next edition, when something is ready for it. */
  next: { number: number; revisions: readonly number[]; counts: NextCounts; mayPublish: boolean } | null;
}

const ORDER: readonly RevisionItem["state"][] = ["returned", "draft", "in_review", "decided"];

/** What waits in the review for this person. @throws Forbidden */
export async function findReviewHome(acting: Acting, now: Date): Promise<ReviewHome> {
  demand(acting, "revision:read");
  const { id, roles } = acting.person;
  const db = database();
  const [inReview, own, next, editions] = await Promise.all([
    may(roles, "revision:decide") ? findRevisionsByState(["in_review"], MOST_LISTED, db) : [],
    may(roles, "revision:write") ? findRevisionsOf(id, MOST_OWN, db) : [],
    countNextLines(db),
    findEditions(db),
  ]);
  const needed = own
    .map(asItem)
    .filter(({ state, decidedAt }) =>
      state === "decided" ? isNews(decidedAt, now) : state !== "withdrawn" && ORDER.includes(state),
    )
    .sort((a, b) => ORDER.indexOf(a.state) - ORDER.indexOf(b.state) || b.id - a.id);
  const moves = new Map(
    (
      await findNewestMoves(
        needed.map((item) => item.id),
        db,
      )
    ).map((move) => [move.revisionId, move]),
  );
  return {
    toDecide: inReview
      .filter((row) => row.madeBy !== id)
      .map(asItem)
      .sort((a, b) => (a.sentAt ?? a.madeAt).getTime() - (b.sentAt ?? b.madeAt).getTime()),
    own: needed.map((item): OwnRevision => {
      const move = moves.get(item.id);
      return { ...item, newest: move ? { by: move.by, at: move.at, remark: move.remark } : null };
    }),
    next:
      next.length === 0
        ? null
        : {
            number: (editions[0]?.number ?? 0) + 1,
            revisions: [...new Set(next.map((row) => row.revisionId))],
            counts: nextCounts(next),
            mayPublish: may(roles, "edition:publish"),
          },
  };
}

function isNews(decidedAt: Date | null, now: Date): boolean {
  return decidedAt !== null && now.getTime() - decidedAt.getTime() < NEWS * DAY;
}

/** The last steps of revisions and the last publications, newest first. @throws Forbidden */
export async function findLately(acting: Acting): Promise<LatelyEntry[]> {
  demand(acting, "revision:read");
  demand(acting, "table:read");
  const [moves, editions] = await Promise.all([findLatestMoves(LATELY, database()), findEditions(database())]);
  const entries: LatelyEntry[] = [
    ...moves.map((move): LatelyEntry => ({
      kind: "revision",
      at: move.at,
      by: move.by,
      did: moveInWords(move),
      id: move.revisionId,
      title: move.title,
    })),
    ...editions.slice(0, LATELY).map((edition): LatelyEntry => ({
      kind: "edition",
      at: edition.publishedAt,
      by: edition.publisher,
      number: edition.number,
    })),
  ];
  return entries.sort((a, b) => b.at.getTime() - a.at.getTime()).slice(0, LATELY);
}
