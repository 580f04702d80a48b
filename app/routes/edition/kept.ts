/*
 * Pages whose address pins an edition show the same numbers every time, so going back to one need not ask the server
 * again. Kept for a minute in this tab only, because the frame of such a page also says whether a newer edition stands;
 * signing out loads the document anew and so forgets all of it.
 */
const KEPT_FOR = 60_000;
const MOST_KEPT = 40;

interface Kept {
  answer: Promise<unknown>;
  until: number;
}

const kept = new Map<string, Kept>();

/** The answer for a pinned address: the one kept, or the server's. Failures and addresses under "current" are not kept. */
export async function keptByAddress<Answer>(request: Request, ask: () => Promise<Answer>): Promise<Answer> {
  const { pathname, search } = new URL(request.url);
  if (!/^\/editions\/\d+(\/|$)/.test(pathname)) return ask();
  const address = pathname + search;
  const known = kept.get(address);
  // What is kept under an address came from the same loader, so it has that loader's type.
  if (known && known.until > Date.now()) return known.answer as Promise<Answer>;
  const answer = ask();
  kept.delete(address);
  kept.set(address, { answer, until: Date.now() + KEPT_FOR });
  for (const oldest of kept.keys()) {
    if (kept.size <= MOST_KEPT) break;
    kept.delete(oldest);
  }
  try {
    return await answer;
  } catch (error) {
    kept.delete(address);
    throw error;
  }
}
