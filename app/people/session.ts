const HOUR = 60 * 60 * 1000;

/** A session ends when nothing was asked through it for this long, in milliseconds (12 hours: a day at the bench). */
export const IDLE_LIMIT = 12 * HOUR;
/** A session ends this long after its sign-in whatever happens, in milliseconds (7 days). */
export const ABSOLUTE_LIMIT = 7 * 24 * HOUR;
/** Most sessions one person may hold at once; a further sign-in ends the one unused for longest. */
export const MOST_SESSIONS = 10;
/** How often at most the time of last use is written, in milliseconds. */
export const SEEN_EVERY = 60 * 1000;

/** The two limits of a session as they are stored. */
export interface SessionTimes {
  seenAt: Date;
  endsAt: Date;
  endedAt: Date | null;
}

/** Whether a session may still be used at a moment. At the limit itself it has ended. */
export function isCurrent({ seenAt, endsAt, endedAt }: SessionTimes, now: Date): boolean {
  return endedAt === null && now < endsAt && now.getTime() - seenAt.getTime() < IDLE_LIMIT;
}

/**
 * The path of this site that a `to` parameter names, or `/`. Anything that a browser would read as another site or
 * another scheme falls back: "//host", "/\host", "https:…", "javascript:…".
 */
export function pathOfThisSite(to: string | null | undefined): string {
  if (!to || to.length > 2000 || !/^\/(?![/\\])/.test(to) || /[\\\p{Cc}]/u.test(to)) return "/";
  // Browsers drop tabs and line breaks and resolve dots before they decide on the host; so does the parser.
  const base = "http://site.invalid";
  const url = URL.canParse(to, base) ? new URL(to, base) : undefined;
  if (!url || url.origin !== base || url.pathname.startsWith("//")) return "/";
  return url.pathname + url.search + url.hash;
}
