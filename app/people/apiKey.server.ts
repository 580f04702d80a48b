import { timingSafeEqual } from "node:crypto";
import { act } from "#app/audit/act.server.ts";
import { database } from "#app/db/database.server.ts";
import { Forbidden, Invalid, NotFound, Refused, Unauthenticated } from "#app/http/errors.ts";
import { enqueueLetter } from "#app/notify/letters.server.ts";
import { keyWithdrawnLetter } from "#app/notify/texts.ts";
import { readEmail } from "./email.ts";
import {
  formatApiKey,
  LONGEST_KEY_DAYS,
  MOST_KEYS,
  readApiKey,
  type Scope,
  SCOPES,
  scopeInfo,
  USED_EVERY,
} from "./key.ts";
import {
  countKeys,
  findKey,
  findKeys,
  insertKey,
  type ListedKey,
  updateFirstUsed,
  updateLastUsed,
  updateWithdrawn,
} from "./keys.queries.server.ts";
import { findKnownAccount } from "./known.server.ts";
import { asPerson, findAccountByEmail } from "./people.queries.server.ts";
import { demand, may, permissions } from "./permissions.ts";
import type { Acting, Person } from "./person.ts";
import { hashSecret, makeKeyId, makeSecret } from "./secrets.server.ts";

const DAY = 24 * 60 * 60 * 1000;

/**
 * Who acts through the API key of a request. Keys are taken from the Authorization header only: an address ends up in logs
 * and histories, and a cookie is sent by a browser without being asked.
 *
 * @throws Unauthenticated for a missing, mistyped, unknown, withdrawn or outdated key, or one whose owner is switched off;
 *   Forbidden when the key lacks the scope or its owner no longer the role for it
 */
export async function requireKey(request: Request, scope: Scope, now: Date = new Date()): Promise<Acting> {
  const header = request.headers.get("Authorization");
  if (header === null) throw new Unauthenticated("Give an API key in the header Authorization: Bearer twk_….");
  const [, text] = /^Bearer +(\S+)$/i.exec(header.trim()) ?? [];
  const parts = text === undefined ? undefined : readApiKey(text);
  if (!parts) throw new Unauthenticated("The Authorization header does not hold an API key of the form Bearer twk_….");
  const key = await findKey(parts.id, database());
  // The same sentence whether the id or the secret is wrong: neither can be tried by itself.
  if (!key || !timingSafeEqual(key.secretHash, hashSecret(parts.secret))) {
    throw new Unauthenticated("This API key is not known. Look at its spelling, or make a new one.");
  }
  if (key.withdrawnAt) throw new Unauthenticated("This API key was withdrawn. Make a new one.");
  if (key.endsAt <= now) throw new Unauthenticated("This API key is past its time. Make a new one.");
  if (key.ownerSwitchedOffAt) throw new Unauthenticated("The account that this API key belongs to is switched off.");
  if (!key.scopes.includes(scope)) {
    throw new Forbidden(`This API key does not hold the scope ${scope}. Make one that does.`);
  }
  if (!may(key.owner.roles, scopeInfo[scope].permission)) {
    const needed = permissions[scopeInfo[scope].permission].join(" or ");
    throw new Forbidden(`The owner of this API key no longer holds a role that this needs (${needed}).`);
  }
  const acting: Acting = { person: key.owner, apiKeyId: key.id, requestId: request.headers.get("X-Request-Id") };
  if (!key.lastUsedAt) await noteFirstUse(acting, key.id, now);
  else if (now.getTime() - key.lastUsedAt.getTime() >= USED_EVERY) await updateLastUsed(key.id, now, database());
  return acting;
}

/** The first use of a key goes on record: a key that somebody else got hold of shows there. Later ones are only dated. */
async function noteFirstUse(acting: Acting, id: string, now: Date): Promise<void> {
  await act(acting, async ({ trx, record }) => {
    // Of several first requests at once, one finds it unused.
    if (await updateFirstUsed(id, now, trx)) record({ act: "key.first-used", objectId: id });
  });
}

/** What a key is made of, as its owner chooses it. */
export interface NewKey {
  name: string;
  scopes: readonly Scope[];
  /** How long it can be used. */
  days: number;
}

/** A key as it is handed over, this once: only its hash is stored. */
export interface MadeKey {
  id: string;
  key: string;
  endsAt: Date;
}

/**
 * Makes an API key of one's own.
 * @throws Invalid, Refused (too many keys), Forbidden (a scope for which one lacks the role)
 */
export async function makeKey(acting: Acting, wanted: NewKey, now: Date = new Date()): Promise<MadeKey> {
  demand(acting, "key:own");
  return putKey(acting.person, wanted, acting, now);
}

/**
 * Makes an API key for somebody, from the command line of the machine the service runs on.
 * @param email as it was typed
 * @throws NotFound when nobody has this address; else as `makeKey`
 */
export async function makeKeyFor(email: string, wanted: NewKey, now: Date = new Date()): Promise<MadeKey> {
  const address = readEmail(email);
  const owner = address === undefined ? undefined : await findAccountByEmail(address, database());
  if (!owner || owner.switchedOffAt) throw new NotFound("There is no account in use with this address.");
  return putKey(asPerson(owner), wanted, null, now);
}

async function putKey(
  owner: Person,
  { name, scopes, days }: NewKey,
  acting: Acting | null,
  now: Date,
): Promise<MadeKey> {
  const title = name.trim();
  if (title === "" || title.length > 80 || /\p{Cc}/u.test(title)) {
    const detail = "Give the key a name of 1 to 80 characters that says which program uses it.";
    throw new Invalid(detail, [{ pointer: "/name", detail }]);
  }
  const chosen = SCOPES.filter((scope) => scopes.includes(scope));
  if (chosen.length === 0) {
    const detail = "Choose at least one thing the key may do.";
    throw new Invalid(detail, [{ pointer: "/scopes", detail }]);
  }
  for (const scope of chosen) {
    demand({ person: owner, apiKeyId: null, requestId: null }, scopeInfo[scope].permission);
  }
  if (!Number.isInteger(days) || days < 1 || days > LONGEST_KEY_DAYS) {
    const detail = `Give a whole number of days from 1 to ${LONGEST_KEY_DAYS}.`;
    throw new Invalid(detail, [{ pointer: "/days", detail }]);
  }
  const secret = makeSecret();
  const id = makeKeyId();
  const endsAt = new Date(now.getTime() + days * DAY);
  await act(acting, async ({ trx, record }) => {
    if ((await countKeys(owner.id, now, trx)) >= MOST_KEYS) {
      throw new Refused(
        `${MOST_KEYS} keys are in use already, which is the most. Withdraw one that is no longer needed.`,
      );
    }
    await insertKey(
      { id, personId: owner.id, name: title, scopes: chosen, secretHash: secret.hash, madeAt: now, endsAt },
      trx,
    );
    record({
      act: "key.made",
      objectId: id,
      detail: { owner: owner.id, name: title, scopes: chosen, endsAt: endsAt.toISOString() },
    });
  });
  return { id, key: formatApiKey({ id, secret: secret.text }), endsAt };
}

/**
 * Withdraws one of one's own keys; its next request is refused.
 * @throws NotFound when one has no such key, or it was withdrawn before
 */
export async function withdrawKey(acting: Acting, id: string, now: Date = new Date()): Promise<void> {
  demand(acting, "key:own");
  await act(acting, async ({ trx, record }) => {
    if (!(await updateWithdrawn(id, acting.person.id, now, trx))) {
      throw new NotFound("You have no such key in use; it may have been withdrawn already.");
    }
    record({ act: "key.withdrawn", objectId: id });
  });
}

/**
 * Withdraws a key of somebody else, who hears of it by letter.
 * @throws NotFound when the person has no such key in use
 */
export async function withdrawKeyOf(
  acting: Acting,
  personId: string,
  id: string,
  now: Date = new Date(),
): Promise<void> {
  demand(acting, "people:manage");
  await act(acting, async ({ trx, record }) => {
    const owner = await findKnownAccount(personId, trx);
    const key = await findKey(id, trx);
    if (!key || !(await updateWithdrawn(id, owner.id, now, trx))) {
      throw new NotFound(`${owner.name} has no such key in use; it may have been withdrawn already.`);
    }
    const letter = keyWithdrawnLetter({ name: owner.name, by: acting.person.name, key: key.name });
    await enqueueLetter({ ...letter, toAddress: owner.email, toPerson: owner.id, fromPerson: acting.person.id }, trx);
    record({ act: "key.withdrawn", objectId: id, detail: { owner: owner.id, name: key.name } });
  });
}

/** One's own keys, the newest first. */
export async function findOwnKeys(acting: Acting): Promise<ListedKey[]> {
  demand(acting, "key:own");
  return findKeys(acting.person.id, database());
}
