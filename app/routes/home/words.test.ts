import { describe, expect, test } from "vitest";
import { changesInWords, dayInWords, sheetNeed, waitingInWords, waitingSentence } from "./words.ts";

const now = new Date("2026-04-02T09:00:00Z");
const at = (text: string): Date => new Date(`${text}Z`);

test.each([
  ["2026-04-02T08:59:00", "since today"],
  ["2026-04-02T00:00:00", "since today"],
  // A clock that runs ahead must not give a negative number of days.
  ["2026-04-02T09:30:00", "since today"],
  ["2026-04-01T23:59:00", "since yesterday"],
  ["2026-03-27T12:00:00", "6 days"],
])("what was sent %s has been waiting %s", (sent, words) => {
  expect(waitingInWords(at(sent), now)).toBe(words);
});

test.each([
  ["2026-04-02T08:00:00", "today"],
  ["2026-04-01T08:00:00", "yesterday"],
  ["2026-03-28T08:00:00", "28 March"],
  ["2025-12-31T23:59:00", "31 December 2025"],
])("what happened %s was %s", (happened, words) => {
  expect(dayInWords(at(happened), now)).toBe(words);
});

test.each([
  ["planned", 0, "confirm what its columns mean"],
  ["read", 0, "build its revision"],
  ["read", 1, "mend one row or leave them out"],
  ["read", 12, "mend 12 rows or leave them out"],
  ["failed", 0, "look why it stopped"],
  ["reading", 0, null],
  ["received", 0, null],
] as const)("a sheet that is %s with %i refused rows needs: %s", (state, refused, need) => {
  expect(sheetNeed({ state, refused })).toBe(need);
});

describe("what waits, in a sentence", () => {
  const sent = [at("2026-03-27T12:00:00"), at("2026-04-02T07:00:00")];

  test.each([
    [
      "for a reviewer",
      { toDecide: sent, own: null },
      "Two revisions need a decision; one has been waiting for six days.",
    ],
    [
      "for one revision",
      { toDecide: [sent[0]!], own: null },
      "One revision needs a decision and has been waiting for six days.",
    ],
    ["of today", { toDecide: [sent[1]!], own: null }, "One revision needs a decision."],
    ["for nobody", { toDecide: [], own: null }, "No revision waits for a decision."],
    [
      "for a steward",
      { toDecide: null, own: { sheets: 2, returned: 1, drafts: 1 } },
      "Two sheets need you, one revision came back and one draft is not sent.",
    ],
    [
      "for an idle steward",
      { toDecide: null, own: { sheets: 0, returned: 0, drafts: 0 } },
      "Nothing of yours waits for you.",
    ],
    [
      "for a steward who also reviews",
      { toDecide: [sent[1]!], own: { sheets: 1, returned: 0, drafts: 0 } },
      "One sheet needs you. One revision needs a decision.",
    ],
    ["for an analyst", { toDecide: null, own: null }, ""],
  ])("%s", (_who, waiting, sentence) => {
    expect(waitingSentence(waiting, now)).toBe(sentence);
  });
});

test.each([
  [{ came: 3, changed: 41, went: 1 }, "41 values changed, 3 came, 1 went"],
  [{ came: 1, changed: 0, went: 0 }, "1 value came"],
  [{ came: 0, changed: 0, went: 0 }, "no value changed"],
])("%o reads %s", (counts, words) => {
  expect(changesInWords(counts)).toBe(words);
});
