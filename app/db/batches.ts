// A row of any of our tables carries fewer than thirty parameters; PostgreSQL takes 65 535 in a statement.
const BATCH = 2000;

/** Cuts a long list into pieces that fit into one INSERT each. */
export function* batches<T>(rows: readonly T[]): Generator<readonly T[]> {
  for (let start = 0; start < rows.length; start += BATCH) yield rows.slice(start, start + BATCH);
}
