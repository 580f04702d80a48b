import { database } from "#app/db/database.server.ts";
import { Invalid } from "#app/http/errors.ts";
import type { Acting } from "./person.ts";
import { IDLE_LIMIT } from "./session.ts";
import { findSessions } from "./sessions.queries.server.ts";
import { checkCredentials, SignInFailed } from "./signIn.server.ts";

/**
 * How long after signing in a person signs off, or changes accounts, without giving the password again, in milliseconds:
 * a quarter of an hour.
 */
export const FRESH_FOR = 15 * 60 * 1000;

const SENTENCES = {
  "sign off": {
    missing: "You signed in a while ago. Give your password once more to sign off.",
    wrong: "This is not your password. Nothing was signed off.",
  },
  "change accounts": {
    missing: "You signed in a while ago. Give your password once more for this change.",
    wrong: "This is not your password. Nothing was changed.",
  },
} as const;

/** Whether a person signed in too long ago to sign off (close a review, publish) or to change accounts without the password. */
export async function asksPassword(acting: Acting, sessionId: string, now: Date = new Date()): Promise<boolean> {
  const seenAfter = new Date(now.getTime() - IDLE_LIMIT);
  const sessions = await findSessions(acting.person.id, { seenAfter, now }, database());
  const own = sessions.find((session) => session.id === sessionId);
  return !own || now.getTime() - own.begunAt.getTime() > FRESH_FOR;
}

/**
 * Lets a sign-off or a change of an account go on when the sign-in is fresh or the password given with it is right. Wrong
 * passwords count as failed sign-ins do.
 *
 * @param purpose what is asked for, for the sentences
 * @throws Invalid at `/password` when it is missing or wrong; TooMany after too many tries
 */
export async function demandFresh(
  acting: Acting,
  sessionId: string,
  password: string,
  from: { address: string; requestId: string | null },
  now: Date = new Date(),
  purpose: keyof typeof SENTENCES = "sign off",
): Promise<void> {
  if (!(await asksPassword(acting, sessionId, now))) return;
  if (password === "") {
    const sentence = SENTENCES[purpose].missing;
    throw new Invalid(sentence, [{ pointer: "/password", detail: sentence }]);
  }
  try {
    await checkCredentials({ email: acting.person.email, password }, from, now);
  } catch (error) {
    if (!(error instanceof SignInFailed)) throw error;
    const sentence = SENTENCES[purpose].wrong;
    throw new Invalid(sentence, [{ pointer: "/password", detail: sentence }]);
  }
}
