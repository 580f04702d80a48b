import { expect, it } from "vitest";
import { explanationSentence, ranked } from "./ranking.ts";

it("Equal explanations share a rank, the next one is counted after them, and three are shown", () => {
  const explanations = [
    { item: "d", score: -6 },
    { item: "a", score: -2 },
    { item: "c", score: -4 },
    { item: "b", score: -2.1 },
    { item: "e", score: -30 },
  ];
  expect(ranked(explanations)).toEqual([
    { item: "a", rank: 1 },
    { item: "b", rank: 1 },
    { item: "c", rank: 3 },
  ]);
});

it("Explanations far less likely than the best are left out", () => {
  expect(
    ranked([
      { item: "a", score: 0 },
      { item: "b", score: -10 },
    ]),
  ).toEqual([{ item: "a", rank: 1 }]);
});

it("Nothing to rank gives nothing", () => {
  expect(ranked([])).toEqual([]);
});

it("The words say how an explanation compares with those above it", () => {
  expect(explanationSentence("the sign of S° lost", "4.2", 1, 0)).toBe("The sign of S° lost would explain it: 4.2.");
  expect(explanationSentence("the sign of S° lost", "4.2", 1, 1)).toBe(
    "The sign of S° lost would explain it equally well: 4.2.",
  );
  expect(explanationSentence("the sign of S° lost", "4.2", 2, 1)).toBe("Less likely: the sign of S° lost: 4.2.");
});
