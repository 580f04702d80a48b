import { act } from "#app/audit/act.server.ts";
import { database } from "#app/db/database.server.ts";
import { Invalid, Refused, TooMany } from "#app/http/errors.ts";
import { enqueueLetter } from "#app/notify/letters.server.ts";
import { addressChangedLetter, addressChangeLetter } from "#app/notify/texts.ts";
import { limits } from "./limits.ts";
import { insertTry } from "./limits.queries.server.ts";
import { findAddressChange, updateAllUsed, updateUsed } from "./links.queries.server.ts";
import { ADDRESS_MINUTES } from "./links.server.ts";
import { demandEmail, demandName } from "./naming.ts";
import { demandCurrent, minutes } from "./passwords.server.ts";
import { findAccountByEmail, lockPeople, updateAccount } from "./people.queries.server.ts";
import { demand } from "./permissions.ts";
import type { Acting } from "./person.ts";
import { hashSecret } from "./secrets.server.ts";

/**
 * Writes one's own name anew. What was done under the former one stays on record with both.
 * @throws Invalid; Refused when it is the same
 */
export async function renameOneself(acting: Acting, given: string): Promise<void> {
  demand(acting, "account:own");
  const name = demandName(given);
  const { id, name: before } = acting.person;
  if (name === before) throw new Refused("This is your name already.");
  await act(acting, async ({ trx, record }) => {
    await updateAccount(id, { name }, trx);
    record({ act: "person.renamed", objectId: id, detail: { before, after: name } });
  });
}

/**
 * Asks for a letter to a new address, by which one confirms that one reads it. The account keeps its address until then.
 * What comes back does not tell whether another account has the address.
 *
 * @throws Invalid at `/email` or `/current`; TooMany after too many wrong passwords or letters
 */
export async function askForAddress(
  acting: Acting,
  { email: given, current }: { email: string; current: string },
  { address }: { address: string },
): Promise<void> {
  demand(acting, "account:own");
  const email = demandEmail(given);
  const account = await demandCurrent(acting, current, { address });
  if (email === account.email) {
    const detail = "This is the address of your account already.";
    throw new Invalid(detail, [{ pointer: "/email", detail }]);
  }
  const wait = await insertTry(limits.addressLetters, [account.id], new Date(), database());
  if (wait > 0) throw new TooMany(`Letters were asked for too often. Wait ${minutes(wait)}.`, wait);
  await act(acting, async ({ trx, record }) => {
    if (!(await findAccountByEmail(email, trx))) {
      const letter = addressChangeLetter({ name: account.name, from: account.email, minutes: ADDRESS_MINUTES });
      await enqueueLetter({ ...letter, toAddress: email, toPerson: account.id }, trx);
    }
    record({ act: "person.address-asked", objectId: account.id, detail: { email } });
  });
}

const GONE = "This link was used, has run out or was never made. Ask for a new one on the page of your account.";

/**
 * Gives an account the address that its owner confirmed by letter. The old address hears of it, and no older letter sets
 * anything any more.
 *
 * @throws Refused when the link cannot be used, or another account took the address meanwhile
 */
export async function takeAddress(
  token: string,
  { requestId }: { requestId: string | null },
  now: Date = new Date(),
): Promise<void> {
  const link = await findAddressChange(hashSecret(token), now, database());
  if (!link) throw new Refused(GONE);
  const { personId: id, name, email: from, newEmail: to } = link;
  const owner: Acting = { person: { id, name, email: from, roles: [] }, apiKeyId: null, requestId };
  await act(owner, async ({ trx, record }) => {
    await lockPeople(trx);
    if (!(await updateUsed("address_change", link.id, now, trx))) throw new Refused(GONE);
    await updateAccount(id, { email: to }, trx);
    await updateAllUsed(id, now, trx);
    const letter = addressChangedLetter({ name, by: null, from, to });
    await enqueueLetter({ ...letter, toAddress: from, toPerson: id }, trx);
    record({ act: "person.address-changed", objectId: id, detail: { before: from, after: to, by: "letter" } });
  });
}
