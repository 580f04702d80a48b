import { act } from "#app/audit/act.server.ts";
import type { Database } from "#app/db/database.server.ts";
import { Refused } from "#app/http/errors.ts";
import { enqueueLetter } from "#app/notify/letters.server.ts";
import { invitationLetter } from "#app/notify/texts.ts";
import { findKnownAccount } from "./known.server.ts";
import { updateAllUsed } from "./links.queries.server.ts";
import { INVITATION_DAYS } from "./links.server.ts";
import { demandEmail, demandName } from "./naming.ts";
import {
  findAccountByEmail,
  insertPerson,
  lockPeople,
  replaceRoles,
  updateSwitchedOff,
} from "./people.queries.server.ts";
import { demand } from "./permissions.ts";
import { type Acting, orderRoles, type Role } from "./person.ts";

/**
 * Makes an account and writes to its owner, who chooses the password; an administrator never knows one.
 * @throws Invalid; Refused when there is an account with this address
 */
export async function invitePerson(
  acting: Acting,
  invited: { email: string; name: string; roles: readonly Role[] },
): Promise<{ id: string }> {
  demand(acting, "people:manage");
  const email = demandEmail(invited.email);
  const name = demandName(invited.name);
  const roles = orderRoles(invited.roles);
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
 * Sends the invitation again to somebody who has not chosen a password yet. Links of earlier letters no longer open.
 * @throws Refused when they have, or the account is switched off
 */
export async function inviteAgain(acting: Acting, personId: string, now: Date = new Date()): Promise<void> {
  demand(acting, "people:manage");
  await act(acting, async ({ trx, record }) => {
    await lockPeople(trx);
    const account = await findKnownAccount(personId, trx);
    if (account.switchedOffAt) throw new Refused("This account is switched off. Switch it on first.");
    if (account.passwordHash !== null) {
      throw new Refused(`${account.name} has chosen a password already and can ask for a new one on the sign-in page.`);
    }
    await updateAllUsed(account.id, now, trx);
    await writeInvitation(account, acting, trx);
    record({ act: "person.invited", objectId: account.id, detail: { again: true } });
  });
}

/**
 * Takes an invitation back before it is taken up: its link no longer opens, and the account is switched off. It stays, as
 * every account does, and can be switched on and invited anew.
 * @throws Refused when there is nothing to take back
 */
export async function withdrawInvitation(acting: Acting, personId: string, now: Date = new Date()): Promise<void> {
  demand(acting, "people:manage");
  await act(acting, async ({ trx, record }) => {
    await lockPeople(trx);
    const account = await findKnownAccount(personId, trx);
    if (account.passwordHash !== null) {
      throw new Refused(`${account.name} has taken up the invitation already. Switch the account off instead.`);
    }
    if (account.switchedOffAt) throw new Refused("This invitation is withdrawn already.");
    await updateSwitchedOff(account.id, now, trx);
    await updateAllUsed(account.id, now, trx);
    record({ act: "person.invitation-withdrawn", objectId: account.id });
  });
}

/** Puts the letter of an invitation into the outbox; its link is made when it is sent. */
export async function writeInvitation(
  to: { id: string; email: string; name: string },
  acting: Acting,
  trx: Database,
): Promise<void> {
  const letter = invitationLetter({ name: to.name, invitedBy: acting.person.name, days: INVITATION_DAYS });
  await enqueueLetter({ ...letter, toAddress: to.email, toPerson: to.id, fromPerson: acting.person.id }, trx);
}
