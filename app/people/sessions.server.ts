import { act } from "#app/audit/act.server.ts";
import { database } from "#app/db/database.server.ts";
import { NotFound } from "#app/http/errors.ts";
import { demand } from "./permissions.ts";
import type { Acting, Person } from "./person.ts";
import { hashSecret, makeSecret } from "./secrets.server.ts";
import { ABSOLUTE_LIMIT, IDLE_LIMIT, isCurrent, MOST_SESSIONS, SEEN_EVERY } from "./session.ts";
import {
  findSession,
  findSessions,
  insertSession,
  type ListedSession,
  updateEnded,
  updateSeen,
} from "./sessions.queries.server.ts";

const LONGEST_AGENT = 200;

/**
 * Begins a session for a person who proved who they are. The token is new; a session that the browser held before is
 * ended, and beyond the allowed number the one unused for longest goes.
 *
 * @returns the token for the cookie; only its hash is stored
 */
export async function beginSession(
  person: Person,
  from: { agent: string; formerToken: string | null; requestId: string | null },
  now: Date = new Date(),
): Promise<string> {
  const { text, hash } = makeSecret();
  await act({ person, apiKeyId: null, requestId: from.requestId }, async ({ trx, record }) => {
    // Whosever it was: the browser no longer has its token, so nobody could sign out of it.
    const former = from.formerToken ? await findSession(hashSecret(from.formerToken), trx) : undefined;
    if (from.formerToken && former) {
      await updateEnded(former.person.id, { only: hashSecret(from.formerToken) }, now, trx);
    }
    const others = await findSessions(person.id, { seenAfter: new Date(now.getTime() - IDLE_LIMIT), now }, trx);
    for (const { id } of others.slice(MOST_SESSIONS - 1)) {
      await updateEnded(person.id, { only: Buffer.from(id, "hex") }, now, trx);
    }
    const agent = from.agent.replace(/\p{Cc}/gu, " ").slice(0, LONGEST_AGENT);
    const endsAt = new Date(now.getTime() + ABSOLUTE_LIMIT);
    await insertSession({ tokenHash: hash, personId: person.id, agent, begunAt: now, endsAt }, trx);
    record({ act: "person.signed-in", objectId: person.id });
  });
  return text;
}

/** Who holds the token of a session in use, and the session's id; null when nobody does. Notes the use, once a minute. */
export async function findHolder(
  token: string,
  now: Date = new Date(),
): Promise<{ person: Person; sessionId: string } | null> {
  const hash = hashSecret(token);
  const session = await findSession(hash, database());
  if (!session || !isCurrent(session, now)) return null;
  if (now.getTime() - session.seenAt.getTime() >= SEEN_EVERY) await updateSeen(hash, now, database());
  return { person: session.person, sessionId: hash.toString("hex") };
}

/** Ends the session one is signed in with. */
export async function signOut(acting: Acting, sessionId: string): Promise<void> {
  await act(acting, async ({ trx, record }) => {
    await updateEnded(acting.person.id, { only: Buffer.from(sessionId, "hex") }, new Date(), trx);
    record({ act: "person.signed-out", objectId: acting.person.id });
  });
}

/** One's own sessions that are in use. */
export async function findOwnSessions(acting: Acting, now: Date = new Date()): Promise<ListedSession[]> {
  demand(acting, "account:own");
  return findSessions(acting.person.id, { seenAfter: new Date(now.getTime() - IDLE_LIMIT), now }, database());
}

/**
 * Ends one of one's own sessions, or all but the present one.
 * @throws NotFound when one's own sessions do not hold it
 */
export async function endOwnSessions(
  acting: Acting,
  which: { only: string } | { but: string },
  now: Date = new Date(),
): Promise<number> {
  demand(acting, "account:own");
  return act(acting, async ({ trx, record }) => {
    const ended = await updateEnded(
      acting.person.id,
      "only" in which ? { only: Buffer.from(which.only, "hex") } : { but: Buffer.from(which.but, "hex") },
      now,
      trx,
    );
    if ("only" in which && ended === 0) throw new NotFound("This session has ended already.");
    record({ act: "person.sessions-ended", objectId: acting.person.id, detail: { ended } });
    return ended;
  });
}
