import { act } from "#app/audit/act.server.ts";
import { type Database, database } from "#app/db/database.server.ts";
import { NotFound, Refused } from "#app/http/errors.ts";
import { enqueueLetter } from "#app/notify/letters.server.ts";
import {
  type AccountLetter,
  addressChangedLetter,
  renamedLetter,
  rolesChangedLetter,
  switchedOffLetter,
  switchedOnLetter,
} from "#app/notify/texts.ts";
import { writeInvitation } from "./invitations.server.ts";
import { findKnownAccount } from "./known.server.ts";
import { insertInvitation, updateAllUsed } from "./links.queries.server.ts";
import { demandEmail, demandName } from "./naming.ts";
import {
  type Account,
  countAdministrators,
  findAccountByEmail,
  findAccountLines,
  insertPerson,
  lockPeople,
  type PeopleFilter,
  replaceRoles,
  updateAccount,
  updateSwitchedOff,
} from "./people.queries.server.ts";
import { demand } from "./permissions.ts";
import { type AccountState, type Acting, orderRoles, type Role } from "./person.ts";
import { makeSecret } from "./secrets.server.ts";
import { IDLE_LIMIT } from "./session.ts";
import { updateEnded } from "./sessions.queries.server.ts";

const DAY = 24 * 60 * 60 * 1000;

/** An account as the administrator's list shows it. */
export interface ListedAccount {
  id: string;
  name: string;
  email: string;
  roles: readonly Role[];
  state: AccountState;
  lastSignIn: Date | null;
  /** Sessions that can still be used. */
  sessions: number;
}

/** Everybody with an account, or those who fit a filter. */
export async function findPeople(
  acting: Acting,
  filter: PeopleFilter = {},
  now: Date = new Date(),
): Promise<ListedAccount[]> {
  demand(acting, "people:manage");
  const limits = { now, seenAfter: new Date(now.getTime() - IDLE_LIMIT) };
  const lines = await findAccountLines(filter, limits, database());
  return lines.map((line) => ({
    id: line.id,
    name: line.name,
    email: line.email,
    roles: line.roles,
    state: stateOf(line),
    lastSignIn: line.lastSignIn,
    sessions: line.switchedOffAt ? 0 : line.sessions,
  }));
}

/** How an account stands. */
export function stateOf({
  passwordHash,
  switchedOffAt,
}: Pick<Account, "passwordHash" | "switchedOffAt">): AccountState {
  if (switchedOffAt) return "switched off";
  return passwordHash === null ? "invited" : "in use";
}

/**
 * Gives somebody exactly these roles. They hold from the person's next request on, API keys included.
 * @throws Refused for one's own roles, when nothing would change, and when no administrator would be left
 */
export async function giveRoles(acting: Acting, personId: string, roles: readonly Role[]): Promise<void> {
  demand(acting, "people:manage");
  const next = orderRoles(roles);
  await act(acting, async ({ trx, record }) => {
    await lockPeople(trx);
    const account = await findKnownAccount(personId, trx);
    const before = orderRoles(account.roles);
    if (account.id === acting.person.id) {
      throw new Refused("Nobody changes their own roles. Ask another administrator.");
    }
    if (before.join() === next.join()) throw new Refused(`${account.name} holds exactly these roles already.`);
    await replaceRoles(account.id, next, acting.person.id, trx);
    await keepOneAdministrator(trx);
    await tell(account, rolesChangedLetter({ ...namesOf(account, acting), before, after: next }), acting, trx);
    record({ act: "person.roles-changed", objectId: account.id, detail: { before, after: next } });
  });
}

/**
 * Writes somebody's name or address anew. The old address hears of the new one; whoever was only invited there is invited
 * at the new one, and the old letter's link no longer opens.
 *
 * @throws Invalid; Refused when another account has the address, or nothing would change
 */
export async function changeAccount(
  acting: Acting,
  personId: string,
  to: { name: string; email: string },
  now: Date = new Date(),
): Promise<void> {
  demand(acting, "people:manage");
  const name = demandName(to.name);
  const email = demandEmail(to.email);
  await act(acting, async ({ trx, record }) => {
    await lockPeople(trx);
    const account = await findKnownAccount(personId, trx);
    if (account.name === name && account.email === email) throw new Refused("Name and address are these already.");
    const holder = await findAccountByEmail(email, trx);
    if (holder && holder.id !== account.id) throw new Refused("There is already an account with this address.");
    await updateAccount(account.id, { name, email }, trx);
    if (account.name !== name) {
      const letter = renamedLetter({ name, by: acting.person.name, before: account.name });
      if (acting.person.id !== account.id) await tell(account, letter, acting, trx);
      record({ act: "person.renamed", objectId: account.id, detail: { before: account.name, after: name } });
    }
    if (account.email !== email) {
      await updateAllUsed(account.id, now, trx);
      if (account.passwordHash === null && !account.switchedOffAt) {
        await writeInvitation({ id: account.id, email, name }, acting, trx);
      } else {
        const letter = addressChangedLetter({ name, by: acting.person.name, from: account.email, to: email });
        await tell(account, letter, acting, trx);
        await tell({ ...account, email }, letter, acting, trx);
      }
      record({ act: "person.address-changed", objectId: account.id, detail: { before: account.email, after: email } });
    }
  });
}

/**
 * Switches an account off: sessions end, API keys no longer work, the name stays beside what the person did.
 * @throws Refused when no administrator would be left
 */
export async function switchOff(acting: Acting, personId: string, now: Date = new Date()): Promise<void> {
  demand(acting, "people:manage");
  await act(acting, async ({ trx, record }) => {
    await lockPeople(trx);
    const account = await findKnownAccount(personId, trx);
    if (account.switchedOffAt) throw new Refused("This account is switched off already.");
    await updateSwitchedOff(account.id, now, trx);
    await keepOneAdministrator(trx);
    const sessionsEnded = await updateEnded(account.id, {}, now, trx);
    await updateAllUsed(account.id, now, trx);
    await tell(account, switchedOffLetter(namesOf(account, acting)), acting, trx);
    record({ act: "person.switched-off", objectId: account.id, detail: { sessionsEnded } });
  });
}

/**
 * Switches an account on again, with the roles and the password it had. Whoever never chose one is invited anew.
 * @throws Refused when it is in use
 */
export async function switchOn(acting: Acting, personId: string): Promise<void> {
  demand(acting, "people:manage");
  await act(acting, async ({ trx, record }) => {
    await lockPeople(trx);
    const account = await findKnownAccount(personId, trx);
    if (!account.switchedOffAt) throw new Refused("This account is in use already.");
    await updateSwitchedOff(account.id, null, trx);
    record({ act: "person.switched-on", objectId: account.id });
    if (account.passwordHash === null) {
      await writeInvitation(account, acting, trx);
      record({ act: "person.invited", objectId: account.id, detail: { again: true } });
    } else {
      await tell(account, switchedOnLetter(namesOf(account, acting)), acting, trx);
    }
  });
}

/**
 * Ends sessions of somebody.
 * @param only the id of the one that is ended; all when left out
 * @returns how many were ended
 * @throws NotFound when the one was ended already
 */
export async function endSessionsOf(
  acting: Acting,
  personId: string,
  { only }: { only?: string | undefined } = {},
  now: Date = new Date(),
): Promise<number> {
  demand(acting, "people:manage");
  return act(acting, async ({ trx, record }) => {
    const account = await findKnownAccount(personId, trx);
    const which = only === undefined ? {} : { only: Buffer.from(only, "hex") };
    const ended = await updateEnded(account.id, which, now, trx);
    if (only !== undefined && ended === 0) throw new NotFound("This session has ended already.");
    record({ act: "person.sessions-ended", objectId: account.id, detail: { ended } });
    return ended;
  });
}

/**
 * Makes the first administrator of a new database, from the command line of the machine it runs on. While nobody has
 * taken up an administrator's account, it can be run again for the same address and gives a new link.
 *
 * @returns the token of a link by which the password is chosen; only its hash is stored
 * @throws Refused when there is an administrator already; Invalid for an address or name that is none
 */
export async function makeFirstAdministrator(
  person: { email: string; name: string },
  now: Date = new Date(),
): Promise<{ token: string; endsAt: Date }> {
  const email = demandEmail(person.email);
  const name = demandName(person.name);
  const secret = makeSecret();
  const endsAt = new Date(now.getTime() + DAY);
  await act(null, async ({ trx, record }) => {
    await lockPeople(trx);
    if ((await countAdministrators(trx)) > 0) {
      throw new Refused("There is an administrator already, who can invite further people on the page People.");
    }
    const known = await findAccountByEmail(email, trx);
    if (known?.switchedOffAt) throw new Refused("The account with this address is switched off.");
    const id = known?.id ?? (await insertPerson({ email, name, passwordHash: null }, trx));
    await replaceRoles(id, orderRoles([...(known?.roles ?? []), "administrator"]), null, trx);
    await insertInvitation({ tokenHash: secret.hash, personId: id, invitedBy: null, endsAt }, trx);
    record({ act: "person.made", objectId: id, detail: { email, name, roles: ["administrator"], by: "command line" } });
  });
  return { token: secret.text, endsAt };
}

/** Writes to somebody what changed of their account, unless they have never taken it up: then nothing of it is theirs yet. */
async function tell(account: Account, letter: AccountLetter, acting: Acting, trx: Database): Promise<void> {
  if (account.passwordHash === null) return;
  await enqueueLetter({ ...letter, toAddress: account.email, toPerson: account.id, fromPerson: acting.person.id }, trx);
}

const namesOf = (account: Account, acting: Acting) => ({ name: account.name, by: acting.person.name });

async function keepOneAdministrator(trx: Database): Promise<void> {
  if ((await countAdministrators(trx)) === 0) {
    throw new Refused("This would leave no administrator. Give somebody else that role first.");
  }
}
