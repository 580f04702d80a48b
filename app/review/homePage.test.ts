import { expect, test } from "vitest";
import { moveInWords, nextCounts } from "./homePage.ts";

test("counted lines become what the next edition brings", () => {
  expect(
    nextCounts([
      { kind: "value", replaces: true, n: 57 },
      { kind: "value", replaces: false, n: 3 },
      { kind: "value", replaces: false, n: 2 },
      { kind: "withdrawal", replaces: true, n: 1 },
      { kind: "detail", replaces: false, n: 4 },
      { kind: "detail", replaces: true, n: 1 },
      { kind: "source", replaces: false, n: 1 },
      { kind: "source", replaces: true, n: 1 },
    ]),
  ).toEqual({
    lines: 70,
    newValues: 5,
    changedValues: 57,
    withdrawnValues: 1,
    newSpecies: 4,
    renamedSpecies: 1,
    sources: 2,
  });
});

test.each([
  ["draft", "in_review", "sent revision 4 to review"],
  ["returned", "in_review", "mended revision 4 and sent it again"],
  ["in_review", "returned", "returned revision 4 with comments"],
  ["in_review", "decided", "closed the review of revision 4"],
  ["returned", "withdrawn", "withdrew revision 4"],
] as const)("from %s to %s: somebody %s", (from, to, words) => {
  const [before, after] = moveInWords({ from, to });
  expect(`${before} revision 4 ${after}`.trim()).toBe(words);
});
