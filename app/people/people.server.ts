import { act, type ActScope } from "#app/audit/act.server.ts";
import { database } from "#app/db/database.server.ts";
import { Invalid, NotFound, Refused } from "#app/http/errors.ts";
import { enqueueLetter } from "#app/notify/letters.server.ts";
import { invitationLetter } from "#app/notify/texts.ts";
import { readEmail } from "./email.ts";
import { insertInvitation } from "./links.queries.server.ts";
import { INVITATION_DAYS } from "./links.server.ts";
import {
  type Account,
  countAdministrators,
  findAccount,
  findAccountByEmail,
  findAllAccounts,
  insertPerson,
  lockPeople,
  replaceRoles,
  updateSwitchedOff,
} from "./people.queries.server.ts";
import { demand } from "./permissions.ts";
import { type Acting, type Role, ROLES } from "./person.ts";
import { makeSecret } from "./secrets.server.ts";
import { updateEnded } from "./sessions.queries.server.ts";

const DAY = 24 * 60 * 60 * 1000;
const LONGEST_NAME = 120;

/** An account as the administrator's list shows it. */
export interface ListedAccount {
  id: string;
  name: string;
  email: string;
  roles: readonly Role[];
  /** "invited" until a password was chosen. */
  state: "in use" | "invited" | "switched off";
}

/** Everybody with an account. */
export async function findPeople(acting: Acting): Promise<ListedAccount[]> {
  demand(acting, "people:manage");
  const accounts = await findAllAccounts(database());
  return accounts.map(({ id, name, email, roles, passwordHash, switchedOffAt }) => ({
    id,
    name,
    email,
    roles,
    state: switchedOffAt ? "switched off" : passwordHash === null ? "invited" : "in use",
  }));
}

/**
 * Makes an account and writes to its owner, who chooses the password; an administrator never knows one.
 * @throws Invalid; Refused when there is an account with this address
 */
export async function invitePerson(
  acting: Acting,
  invited: { email: string; name: string; roles: readonly Role[] },
): Promise<{ id: string }> {
  demand(acting, "people:manage");
  const { email, name } = readNewPerson(invited);
  const roles = readRoles(invited.roles);
  return act(acting, async ({ trx, record }) => {
    if (await findAccountByEmail(email, trx)) throw new Refused("There is already an account with this address.");
    const id = await insertPerson({ email, name, passwordHash: null }, trx);
    await replaceRoles(id, roles, acting.person.id, trx);
    await writeInvitation({ id, email, name }, acting, trx);
    record({ act: "person.invited", objectId: id, detail: { email, name, roles } });
    return { id };
  });
}

/**
 * Sends the invitation again to somebody who has not chosen a password yet.
 * @throws Refused when they have, or the account is switched off
 */
export async function inviteAgain(acting: Acting, personId: string): Promise<void> {
  demand(acting, "people:manage");
  await act(acting, async ({ trx, record }) => {
    const account = await findOther(personId, trx);
    if (account.switchedOffAt) throw new Refused("This account is switched off. Switch it on first.");
    if (account.passwordHash !== null) {
      throw new Refused(`${account.name} has chosen a password already and can ask for a new one on the sign-in page.`);
    }
    await writeInvitation(account, acting, trx);
    record({ act: "person.invited", objectId: account.id, detail: { again: true } });
  });
}

async function writeInvitation(
  to: { id: string; email: string; name: string },
  acting: Acting,
  trx: ActScope["trx"],
): Promise<void> {
  const letter = invitationLetter({ name: to.name, invitedBy: acting.person.name, days: INVITATION_DAYS });
  await enqueueLetter({ ...letter, toAddress: to.email, toPerson: to.id, fromPerson: acting.person.id }, trx);
}

/**
 * Gives somebody exactly these roles. They hold from the person's next request on, API keys included.
 * @throws Refused when no administrator would be left
 */
export async function giveRoles(acting: Acting, personId: string, roles: readonly Role[]): Promise<void> {
  demand(acting, "people:manage");
  const next = readRoles(roles);
  await act(acting, async ({ trx, record }) => {
    await lockPeople(trx);
    const account = await findOther(personId, trx);
    await replaceRoles(account.id, next, acting.person.id, trx);
    await keepOneAdministrator(trx);
    record({ act: "person.roles-changed", objectId: account.id, detail: { before: account.roles, after: next } });
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
    const account = await findOther(personId, trx);
    if (account.switchedOffAt) throw new Refused("This account is switched off already.");
    await updateSwitchedOff(account.id, now, trx);
    await keepOneAdministrator(trx);
    const sessionsEnded = await updateEnded(account.id, {}, now, trx);
    record({ act: "person.switched-off", objectId: account.id, detail: { sessionsEnded } });
  });
}

/** Switches an account on again, with the roles and the password it had. */
export async function switchOn(acting: Acting, personId: string): Promise<void> {
  demand(acting, "people:manage");
  await act(acting, async ({ trx, record }) => {
    const account = await findOther(personId, trx);
    if (!account.switchedOffAt) throw new Refused("This account is in use already.");
    await updateSwitchedOff(account.id, null, trx);
    record({ act: "person.switched-on", objectId: account.id });
  });
}

/** Ends every session of somebody. @returns how many were ended */
export async function endSessionsOf(acting: Acting, personId: string, now: Date = new Date()): Promise<number> {
  demand(acting, "people:manage");
  return act(acting, async ({ trx, record }) => {
    const account = await findOther(personId, trx);
    const ended = await updateEnded(account.id, {}, now, trx);
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
  const { email, name } = readNewPerson(person);
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
    await replaceRoles(id, readRoles([...(known?.roles ?? []), "administrator"]), null, trx);
    await insertInvitation({ tokenHash: secret.hash, personId: id, invitedBy: null, endsAt }, trx);
    record({ act: "person.made", objectId: id, detail: { email, name, roles: ["administrator"], by: "command line" } });
  });
  return { token: secret.text, endsAt };
}

function readNewPerson(given: { email: string; name: string }): { email: string; name: string } {
  const email = readEmail(given.email);
  if (!email) {
    const detail = "This is not an e-mail address of the form name@example.org.";
    throw new Invalid(detail, [{ pointer: "/email", detail }]);
  }
  const name = given.name.trim();
  if (name === "" || name.length > LONGEST_NAME || /[\p{Cc}\u2028\u2029]/u.test(name)) {
    const detail = `Give a name of 1 to ${LONGEST_NAME} characters on one line.`;
    throw new Invalid(detail, [{ pointer: "/name", detail }]);
  }
  return { email, name };
}

/** The roles in their usual order, each once; a word that is none cannot get here from a checked form. */
function readRoles(roles: readonly Role[]): Role[] {
  return ROLES.filter((role) => roles.includes(role));
}

async function findOther(personId: string, trx: ActScope["trx"]): Promise<Account> {
  const account = /^[0-9a-f-]{36}$/i.test(personId) ? await findAccount(personId, trx) : undefined;
  if (!account) throw new NotFound("There is no such account.");
  return account;
}

async function keepOneAdministrator(trx: ActScope["trx"]): Promise<void> {
  if ((await countAdministrators(trx)) === 0) {
    throw new Refused("This would leave no administrator. Give somebody else that role first.");
  }
}
