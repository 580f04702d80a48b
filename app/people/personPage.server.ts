import { database } from "#app/db/database.server.ts";
import { findKnownAccount } from "./known.server.ts";
import { findKeys, type ListedKey } from "./keys.queries.server.ts";
import { findInvitationEnd } from "./links.queries.server.ts";
import { stateOf } from "./people.server.ts";
import { demand } from "./permissions.ts";
import { type AccountState, type Acting, orderRoles, type Role } from "./person.ts";
import { IDLE_LIMIT } from "./session.ts";
import { findSessions, type ListedSession } from "./sessions.queries.server.ts";

/** An account as its page shows it to an administrator. */
export interface PersonPage {
  id: string;
  name: string;
  email: string;
  roles: readonly Role[];
  state: AccountState;
  madeAt: Date;
  /** Whether a password was ever chosen: else the account was only invited. */
  takenUp: boolean;
  /** How the invitation stands, while it is not taken up. */
  invitation: "its letter waits to be sent" | { endsAt: Date; over: boolean } | null;
  sessions: readonly ListedSession[];
  /** Keys that can still be used. */
  keys: readonly ListedKey[];
}

/** @throws NotFound */
export async function findPersonPage(acting: Acting, personId: string, now: Date = new Date()): Promise<PersonPage> {
  demand(acting, "people:manage");
  const account = await findKnownAccount(personId, database());
  const state = stateOf(account);
  const [sessions, keys, link] = await Promise.all([
    state === "in use"
      ? findSessions(account.id, { now, seenAfter: new Date(now.getTime() - IDLE_LIMIT) }, database())
      : [],
    findKeys(account.id, database()),
    state === "invited" ? findInvitationEnd(account.id, database()) : undefined,
  ]);
  const waits = state === "invited" ? ("its letter waits to be sent" as const) : null;
  return {
    id: account.id,
    name: account.name,
    email: account.email,
    roles: orderRoles(account.roles),
    state,
    madeAt: account.createdAt,
    takenUp: account.passwordHash !== null,
    invitation: link ? { endsAt: link.endsAt, over: link.endsAt <= now } : waits,
    sessions,
    keys: keys.filter((key) => !key.withdrawnAt && key.endsAt > now),
  };
}
