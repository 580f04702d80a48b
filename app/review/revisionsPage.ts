import type { RevisionState } from "./states.ts";

/*
 * The list of revisions, sorted into what is to be done with them. Pure.
 */

export interface RevisionItem {
  id: number;
  title: string;
  state: RevisionState;
  round: number;
  madeBy: string;
  madeByName: string;
  madeAt: Date;
  sentAt: Date | null;
  decidedAt: Date | null;
  /** Findings of the newest examination. */
  blocks: number;
  looks: number;
  lines: number;
  /** Accepted lines that no edition holds yet. */
  waiting: number;
  publishedIn: number | null;
}

export type ListName = "inReview" | "returned" | "drafts" | "waiting" | "published" | "declined" | "withdrawn";

export interface RevisionList {
  name: ListName;
  head: string;
  /** What stands in the list, in one sentence. */
  lede: string;
  items: readonly RevisionItem[];
}

const HEADS: Record<ListName, readonly [head: string, lede: string]> = {
  inReview: ["In review", "A reviewer decides each line: accept, decline, or return the whole with comments."],
  returned: ["Returned", "A reviewer asked for something; the steward mends it and sends it again."],
  drafts: ["Drafts", "Begun by a steward and not sent yet."],
  waiting: ["Decided, waiting for the next edition", "Their accepted lines go into the next edition."],
  published: ["Published", "Their accepted lines stand in an edition."],
  declined: ["Decided, nothing accepted", "Every line was declined; the reasons stay to be read."],
  withdrawn: ["Withdrawn", "Taken back by the steward; they stay to be read."],
};

/** What a reviewer looks at first, and what a steward does. */
const REVIEWER_ORDER: readonly ListName[] = ["inReview", "waiting", "returned", "drafts"];
const STEWARD_ORDER: readonly ListName[] = ["returned", "drafts", "inReview", "waiting"];
const LATER: readonly ListName[] = ["published", "declined", "withdrawn"];

/** The names of the lists, as an address says them. */
export const LIST_NAMES: readonly ListName[] = [...REVIEWER_ORDER, ...LATER];

/** In which list a revision stands. */
export function listOf(item: Pick<RevisionItem, "state" | "waiting" | "publishedIn">): ListName {
  switch (item.state) {
    case "draft":
      return "drafts";
    case "in_review":
      return "inReview";
    case "returned":
      return "returned";
    case "withdrawn":
      return "withdrawn";
    case "decided":
      if (item.waiting > 0) return "waiting";
      return item.publishedIn === null ? "declined" : "published";
  }
}

/** Which revisions are listed: those of one list, by one person, or all. */
export interface RevisionsFilter {
  list: ListName | null;
  /** Id of the person who began them. */
  person: string | null;
}

/** What can be chosen, with how many revisions each choice would list beside the other one. */
export interface RevisionsChoices {
  lists: readonly { name: ListName; head: string; n: number }[];
  people: readonly { id: string; name: string; n: number }[];
}

/** The revisions that a filter leaves. */
export function filterRevisions(items: readonly RevisionItem[], { list, person }: RevisionsFilter): RevisionItem[] {
  return items.filter(
    (item) => (list === null || listOf(item) === list) && (person === null || item.madeBy === person),
  );
}

/** Counts what each choice would list, people by name. A choice that is made stays among them, though it lists nothing. */
export function revisionsChoices(items: readonly RevisionItem[], filter: RevisionsFilter): RevisionsChoices {
  const ofPerson = filterRevisions(items, { ...filter, list: null });
  const ofList = filterRevisions(items, { ...filter, person: null });
  const people = new Map(items.map((item) => [item.madeBy, item.madeByName]));
  return {
    lists: LIST_NAMES.map((name) => ({
      name,
      head: HEADS[name][0],
      n: ofPerson.filter((item) => listOf(item) === name).length,
    })).filter((one) => one.n > 0 || one.name === filter.list),
    people: [...people]
      .map(([id, name]) => ({ id, name, n: ofList.filter((item) => item.madeBy === id).length }))
      .filter((one) => one.n > 0 || one.id === filter.person)
      .sort((a, b) => a.name.localeCompare(b.name, "en")),
  };
}

/** The lists that hold something, in the order in which this person's work asks for them. */
export function revisionLists(items: readonly RevisionItem[], decides: boolean): RevisionList[] {
  const order = [...(decides ? REVIEWER_ORDER : STEWARD_ORDER), ...LATER];
  return order
    .map((name) => {
      const [head, lede] = HEADS[name];
      return { name, head, lede, items: items.filter((item) => listOf(item) === name) };
    })
    .filter((list) => list.items.length > 0);
}
