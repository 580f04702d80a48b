import { database } from "#app/db/database.server.ts";
import { demand, may } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { findRevisionsByState } from "./review.queries.server.ts";
import {
  filterRevisions,
  listOf,
  type RevisionItem,
  type RevisionList,
  revisionLists,
  type RevisionsChoices,
  revisionsChoices,
  type RevisionsFilter,
} from "./revisionsPage.ts";

/** How many revisions of the past are listed; those with something to do are never cut. */
const MOST_PAST = 200;
const MOST_OPEN = 1000;

export interface RevisionsPage {
  lists: readonly RevisionList[];
  may: { write: boolean; decide: boolean; publish: boolean };
  /** Whether something waits to be published. */
  waiting: number;
  /** How many revisions there are, whatever the filter leaves. */
  total: number;
  choices: RevisionsChoices;
}

/** The lists of revisions as this person's work asks for them. @throws Forbidden */
export async function findRevisionsPage(
  acting: Acting,
  filter: RevisionsFilter = { list: null, person: null },
): Promise<RevisionsPage> {
  demand(acting, "revision:read");
  const { roles } = acting.person;
  const [open, past] = await Promise.all([
    findRevisionsByState(["draft", "in_review", "returned"], MOST_OPEN, database()),
    findRevisionsByState(["decided", "withdrawn"], MOST_PAST, database()),
  ]);
  const items = [...open, ...past].map(asItem);
  const decides = may(roles, "revision:decide");
  const lists = revisionLists(filterRevisions(items, filter), decides);
  return {
    lists,
    may: { write: may(roles, "revision:write"), decide: decides, publish: may(roles, "edition:publish") },
    waiting: items.filter((item) => listOf(item) === "waiting").length,
    total: items.length,
    choices: revisionsChoices(items, filter),
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
