import { database } from "#app/db/database.server.ts";
import { demand, may } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { findRevisionsByState } from "./review.queries.server.ts";
import { type RevisionItem, type RevisionList, revisionLists } from "./revisionsPage.ts";

/** How many revisions of the past are listed; those with something to do are never cut. */
const MOST_PAST = 200;
const MOST_OPEN = 1000;

export interface RevisionsPage {
  lists: readonly RevisionList[];
  may: { write: boolean; decide: boolean; publish: boolean };
  /** Whether something waits to be published. */
  waiting: number;
}

/** The lists of revisions as this person's work asks for them. @throws Forbidden */
export async function findRevisionsPage(acting: Acting): Promise<RevisionsPage> {
  demand(acting, "revision:read");
  const { roles } = acting.person;
  const [open, past] = await Promise.all([
    findRevisionsByState(["draft", "in_review", "returned"], MOST_OPEN, database()),
    findRevisionsByState(["decided", "withdrawn"], MOST_PAST, database()),
  ]);
  const items = [...open, ...past].map(asItem);
  const decides = may(roles, "revision:decide");
  const lists = revisionLists(items, decides);
  return {
    lists,
    may: { write: may(roles, "revision:write"), decide: decides, publish: may(roles, "edition:publish") },
    waiting: lists.find((list) => list.name === "waiting")?.items.length ?? 0,
  };
}

/** A row of the list as pages show it. */
export function asItem(row: Awaited<ReturnType<typeof findRevisionsByState>>[number]): RevisionItem {
  return {
    ...row,
    blocks: row.blocks ?? 0,
    looks: row.looks ?? 0,
    lines: Number(row.lines),
    waiting: Number(row.waiting),
    publishedIn: row.publishedIn === null ? null : Number(row.publishedIn),
  };
}
