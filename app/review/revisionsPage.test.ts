import { describe, expect, test } from "vitest";
import { type RevisionItem, revisionLists } from "./revisionsPage.ts";

const item = (id: number, rest: Partial<RevisionItem>): RevisionItem => ({
  id,
  title: "",
  state: "draft",
  round: 0,
  madeBy: "",
  madeByName: "",
  madeAt: new Date(0),
  sentAt: null,
  decidedAt: null,
  blocks: 0,
  looks: 0,
  lines: 1,
  waiting: 0,
  publishedIn: null,
  ...rest,
});
const ALL = [
  item(1, { state: "decided", publishedIn: 7 }),
  item(2, { state: "decided", waiting: 3 }),
  item(3, { state: "decided" }),
  item(4, { state: "withdrawn" }),
  item(5, { state: "in_review" }),
  item(6, { state: "returned" }),
  item(7, { state: "draft" }),
];
const names = (decides: boolean, items = ALL) => revisionLists(items, decides).map((list) => list.name);

describe("lists of revisions", () => {
  test("a reviewer sees first what is in review", () => {
    expect(names(true)).toEqual(["inReview", "waiting", "returned", "drafts", "published", "declined", "withdrawn"]);
  });

  test("a steward sees first what came back and what is begun", () => {
    expect(names(false)).toEqual(["returned", "drafts", "inReview", "waiting", "published", "declined", "withdrawn"]);
  });

  test("each revision stands in one list, and empty lists are left out", () => {
    const lists = revisionLists(ALL, true);
    expect(lists.flatMap((list) => list.items.map((one) => one.id)).sort()).toEqual([1, 2, 3, 4, 5, 6, 7]);
    expect(names(true, [item(1, { state: "draft" })])).toEqual(["drafts"]);
  });
});
