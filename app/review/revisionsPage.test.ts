import { describe, expect, test } from "vitest";
import { filterRevisions, type RevisionItem, revisionLists, revisionsChoices } from "./revisionsPage.ts";

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

describe("filtered", () => {
  const items = [
    item(1, { state: "draft", madeBy: "i", madeByName: "Ines" }),
    item(2, { state: "in_review", madeBy: "i", madeByName: "Ines" }),
    item(3, { state: "in_review", madeBy: "t", madeByName: "Tom" }),
  ];

  test.each([
    [{ list: null, person: null }, [1, 2, 3]],
    [{ list: "inReview" as const, person: null }, [2, 3]],
    [{ list: null, person: "i" }, [1, 2]],
    [{ list: "inReview" as const, person: "t" }, [3]],
    [{ list: "withdrawn" as const, person: "t" }, []],
  ])("%j leaves %j", (filter, left) => {
    expect(filterRevisions(items, filter).map((one) => one.id)).toEqual(left);
  });

  test("each choice is counted beside the other one, and a choice that lists nothing stays to be undone", () => {
    const { lists, people } = revisionsChoices(items, { list: "drafts", person: "t" });
    expect(lists.map(({ name, n }) => [name, n])).toEqual([
      ["inReview", 1],
      ["drafts", 0],
    ]);
    expect(people.map(({ name, n }) => [name, n])).toEqual([
      ["Ines", 1],
      ["Tom", 0],
    ]);
  });
});
