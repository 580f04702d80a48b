const months = "January February March April May June July August September October November December".split(" ");

/** "12 March 2026", or with the time "12 March 2026, 14:05 UTC". Dates are UTC, the same for every reader and every print. */
export function dateInWords(at: Date | string, withTime = false): string {
  const date = typeof at === "string" ? new Date(at) : at;
  if (Number.isNaN(date.getTime())) return "an unknown date";
  const day = `${date.getUTCDate()} ${months[date.getUTCMonth()]} ${date.getUTCFullYear()}`;
  return withTime ? `${day}, ${date.toISOString().slice(11, 16)} UTC` : day;
}

/** A moment in words with its machine form beside it. */
export function Time({ at, withTime = false }: { at: Date | string; withTime?: boolean }) {
  const date = typeof at === "string" ? new Date(at) : at;
  if (Number.isNaN(date.getTime())) return <>{dateInWords(date)}</>;
  return (
    <time dateTime={withTime ? date.toISOString() : date.toISOString().slice(0, 10)}>
      {dateInWords(date, withTime)}
    </time>
  );
}
