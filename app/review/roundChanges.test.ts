import { expect, test } from "vitest";
import type { PageMove } from "./revisionPage.ts";
import { comparedRound, roundAt, roundsOf } from "./roundChanges.ts";
import { threadsOf } from "./threads.ts";

const at = (minute: number): Date => new Date(Date.UTC(2026, 2, 27, 9, minute));
const move = (to: string, minute: number, by: string, remark = ""): PageMove => ({
  from: "draft",
  to,
  round: 0,
  at: at(minute),
  by,
  remark,
});
const MOVES = [
  move("in_review", 1, "Ines"),
  move("returned", 5, "Ruth", "Mend it."),
  move("in_review", 9, "Ines"),
  move("decided", 20, "Ruth"),
];

test("every sending begins a round, and the step after it ends it", () => {
  expect(roundsOf(MOVES).map(({ round, by, outcome, endedBy }) => [round, by, outcome, endedBy])).toEqual([
    [1, "Ines", "returned", "Ruth"],
    [2, "Ines", "decided", "Ruth"],
  ]);
  expect(roundsOf([move("withdrawn", 1, "Ines")])).toEqual([]);
});

test.each([
  [0, 0],
  [1, 1],
  [8, 1],
  [9, 2],
])("minute %i lies in round %i", (minute, round) => {
  expect(roundAt(roundsOf(MOVES), at(minute))).toBe(round);
});

test.each([
  ["in_review", MOVES.slice(0, 1), undefined, "there is no round before the first"],
  ["returned", MOVES.slice(0, 2), 1, "what is mended is compared with what was returned"],
  ["in_review", MOVES.slice(0, 3), 1, "the reviewer compares with what they saw"],
  ["decided", MOVES, undefined, "after the review the history tells it"],
  ["draft", [], undefined, "nothing was sent"],
] as const)("%s: %#", (state, moves, round, _why) => {
  expect(comparedRound(state, roundsOf(moves))?.round).toBe(round);
});

test("a comment waits while nobody but its writer wrote in it, unless it is the author's own or a step's remark", () => {
  const comment = (id: string, byId: string, body: string, answers: string | null = null, minute = 3) => ({
    id,
    lineId: null,
    round: 1,
    body,
    at: at(minute),
    by: byId === "r" ? "Ruth" : "Ines",
    byId,
    answers,
  });
  const threads = threadsOf(
    [
      comment("1", "r", "Which sample?"),
      comment("2", "r", "Which run?"),
      comment("3", "i", "For the record."),
      comment("4", "r", "I mean the second.", "1"),
      comment("5", "i", "The last.", "2"),
      comment("6", "r", "Mend it.", null, 5),
    ],
    MOVES,
    "i",
  );
  expect(threads.map(({ id, waits, answers }) => [id, waits, answers.map((one) => one.id)])).toEqual([
    ["1", true, ["4"]],
    ["2", false, ["5"]],
    ["3", false, []],
  ]);
});
