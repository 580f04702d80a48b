/** How the kinds of sources are called on a page. */
export const sourceKindWords = {
  measurement: "measured",
  evaluation: "evaluated",
  calculation: "calculated",
  estimate: "estimated",
} as const;
