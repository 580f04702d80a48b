/** A possible explanation with the logarithm of how likely it is, up to a constant shared by all that compete. */
export interface Weighed<T> {
  readonly item: T;
  readonly score: number;
}

/** At most this many explanations are shown. */
const SHOWN = 3;
/** Explanations whose likelihoods differ by less than this factor (e^0.25 = 1.28) are equal. */
const EQUAL = 0.25;
/** Explanations less likely than the best by more than this factor (e^5 = 150) are not worth showing. */
const WORTH_SHOWING = 5;

/** The likeliest explanations, best first, with equal ones under one rank: 1, 1, 3. The order is fixed for equal input. */
export function ranked<T>(explanations: readonly Weighed<T>[]): { item: T; rank: number }[] {
  const sorted = [...explanations].sort((a, b) => b.score - a.score);
  const best = sorted[0]?.score ?? 0;
  let rank = 1;
  let leader = best;
  return sorted
    .filter((one) => one.score > best - WORTH_SHOWING)
    .slice(0, SHOWN)
    .map((one, index) => {
      if (leader - one.score > EQUAL) {
        rank = index + 1;
        leader = one.score;
      }
      return { item: one.item, rank };
    });
}

/** "… would explain it: …", in words that say how it compares with the explanations above it. */
export function explanationSentence(cause: string, outcome: string, rank: number, index: number): string {
  const start = cause.charAt(0).toUpperCase() + cause.slice(1);
  if (index === 0) return `${start} would explain it: ${outcome}.`;
  if (rank === 1) return `${start} would explain it equally well: ${outcome}.`;
  return `Less likely: ${cause.replace(/,$/, "")}: ${outcome}.`;
}
