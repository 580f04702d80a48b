/** How the kinds of sources are called on a page. */
export const sourceKindWords = {
  measurement: "measured",
  evaluation: "evaluated",
  calculation: "calculated",
  estimate: "estimated",
} as const;

/** The same as a statement about the values of a source. */
export const sourceKindSentence = {
  measurement: "Its values were measured.",
  evaluation: "Its values were evaluated from measurements.",
  calculation: "Its values were calculated.",
  estimate: "Its values are estimates.",
} as const;
