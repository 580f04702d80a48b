/**
 * A small seeded generator (mulberry32): the same seed gives the same run, and the seed is printed, so that a failure can
 * be repeated.
 */
export interface Random {
  /** In [0, 1). */
  next(): number;
  /** A whole number from 0 up to, but not including, `below`. */
  below(below: number): number;
  pick<T>(list: readonly T[]): T;
  /** `count` different entries of the list, in random order. */
  sample<T>(list: readonly T[], count: number): T[];
}

export function randomFrom(seed: number): Random {
  let state = seed >>> 0;
  const next = (): number => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 2 ** 32;
  };
  const below = (limit: number): number => Math.floor(next() * limit);
  const pick = <T>(list: readonly T[]): T => {
    const found = list[below(list.length)];
    if (found === undefined) throw new RangeError("pick: the list is empty");
    return found;
  };
  const sample = <T>(list: readonly T[], count: number): T[] => {
    const rest = [...list];
    const taken: T[] = [];
    while (taken.length < count && rest.length > 0) taken.push(...rest.splice(below(rest.length), 1));
    return taken;
  };
  return { next, below, pick, sample };
}

/** The seed of a run: TEST_SEED when it is set, else one made now. Print it. */
export function seedOfRun(): number {
  const given = Number(process.env["TEST_SEED"]);
  return Number.isInteger(given) && given > 0 ? given : Math.floor(Math.random() * 2 ** 31) + 1;
}
