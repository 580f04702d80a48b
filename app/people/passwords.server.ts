import { act, type ActScope } from "#app/audit/act.server.ts";
import { database } from "#app/db/database.server.ts";
import { Invalid, Refused, TooMany } from "#app/http/errors.ts";
import { enqueueLetter } from "#app/notify/letters.server.ts";
import { passwordChangedLetter, resetLetter } from "#app/notify/texts.ts";
import { limits, sourceOf } from "./limits.ts";
import { deleteTries, insertTry } from "./limits.queries.server.ts";
import { findLink, type LinkTable, updateAllUsed, updateUsed } from "./links.queries.server.ts";
import { RESET_MINUTES } from "./links.server.ts";
import { hashPassword, isPassword } from "./passwordHash.server.ts";
import { isTooLong, passwordProblem } from "./passwordRules.ts";
import { type Account, findAccount, findAccountByEmail, updatePassword } from "./people.queries.server.ts";
import { demand } from "./permissions.ts";
import type { Acting } from "./person.ts";
import { hashSecret } from "./secrets.server.ts";
import { updateEnded } from "./sessions.queries.server.ts";

/** Every answer to "I forgot my password" takes at least this long, so that its time does not tell whether there is an account. */
export const RESET_ANSWER_MILLISECONDS = 250;

const GONE: Readonly<Record<LinkTable, string>> = {
  invitation: "This invitation was used, has run out or was never made. Ask an administrator for a new one.",
  password_reset: "This link was used, has run out or was never made. Ask for a new one on the sign-in page.",
};

/** @throws Invalid when the password cannot be taken */
function checkNewPassword(password: string, own: { email: string; name: string }): void {
  const problem = passwordProblem(password, own);
  if (problem) throw new Invalid(problem, [{ pointer: "/password", detail: problem }]);
}

/** Sets the password, voids every link that could set another, ends sessions and tells the owner. */
async function putPassword(
  account: Pick<Account, "id" | "email" | "name">,
  passwordHash: string,
  { but, tell }: { but?: Buffer; tell: boolean },
  { trx }: ActScope,
): Promise<number> {
  const now = new Date();
  await updatePassword(account.id, passwordHash, trx);
  await updateAllUsed(account.id, now, trx);
  const ended = await updateEnded(account.id, but ? { but } : {}, now, trx);
  if (tell) {
    await enqueueLetter({ ...passwordChangedLetter(account), toAddress: account.email, toPerson: account.id }, trx);
  }
  return ended;
}

/**
 * Changes one's own password, which needs the current one, and ends one's other sessions.
 * @param sessionId the session that stays
 * @throws Invalid with a pointer to the field that is wrong; TooMany after too many wrong current passwords
 */
export async function changePassword(
  acting: Acting,
  passwords: { current: string; password: string },
  { sessionId, address }: { sessionId: string; address: string },
): Promise<void> {
  demand(acting, "account:own");
  const account = await demandCurrent(acting, passwords.current, { address });
  checkNewPassword(passwords.password, account);
  const passwordHash = await hashPassword(passwords.password);
  await act(acting, async (scope) => {
    const sessionsEnded = await putPassword(
      account,
      passwordHash,
      { but: Buffer.from(sessionId, "hex"), tell: true },
      scope,
    );
    scope.record({ act: "person.password-changed", objectId: account.id, detail: { sessionsEnded } });
  });
}

/**
 * Holds what somebody typed against their current password, before their password or address is changed.
 * @throws Invalid at `/current`; TooMany after too many wrong ones
 */
export async function demandCurrent(
  acting: Acting,
  current: string,
  { address }: { address: string },
): Promise<Account> {
  const account = await findAccount(acting.person.id, database());
  if (!account) throw new Refused("This account is no longer there.");
  // Whoever found an open session must not be able to try passwords without end.
  const now = new Date();
  const tried = [account.email, sourceOf(address)];
  const wait = await insertTry(limits.signInAccount, tried, now, database());
  if (wait > 0) throw new TooMany(`That was too many tries. Wait ${minutes(wait)}, then try again.`, wait);
  if (isTooLong(current) || !(await isPassword(account.passwordHash, current))) {
    const detail = "This is not your current password.";
    throw new Invalid(detail, [{ pointer: "/current", detail }]);
  }
  await deleteTries(limits.signInAccount, tried, now, database());
  return account;
}

/**
 * Asks for a letter with which a new password can be chosen. What comes back is the same, and takes as long, whether or
 * not there is such an account.
 *
 * @param email as `readEmail` gives it
 * @throws TooMany when one source asks too often
 */
export async function askForReset(
  email: string,
  { address, requestId }: { address: string; requestId: string | null },
): Promise<void> {
  const answer = new Promise<void>((resolve) => setTimeout(resolve, RESET_ANSWER_MILLISECONDS));
  const now = new Date();
  const wait = await insertTry(limits.resetSource, [sourceOf(address)], now, database());
  if (wait > 0) throw new TooMany(`Letters were asked for too often from here. Wait ${minutes(wait)}.`, wait);
  const tooOften = await insertTry(limits.resetAddress, [email], now, database());
  const account = await findAccountByEmail(email, database());
  if (account && !account.switchedOffAt && tooOften === 0) {
    await act({ person: account, apiKeyId: null, requestId }, async ({ trx, record }) => {
      await enqueueLetter(
        { ...resetLetter({ name: account.name, minutes: RESET_MINUTES }), toAddress: email, toPerson: account.id },
        trx,
      );
      record({ act: "person.password-reset-asked", objectId: account.id });
    });
  }
  await answer;
}

/**
 * Sets a password by the link of an invitation or a reset letter. The link is used up, and whoever was signed in with
 * the account no longer is.
 *
 * @throws Refused when the link cannot be used; Invalid when the password cannot be taken
 */
export async function setPasswordByLink(
  table: LinkTable,
  token: string,
  password: string,
  { requestId }: { requestId: string | null },
  now: Date = new Date(),
): Promise<void> {
  const tokenHash = hashSecret(token);
  const link = await findLink(table, tokenHash, now, database());
  if (!link) throw new Refused(GONE[table]);
  checkNewPassword(password, link);
  const passwordHash = await hashPassword(password);
  const account = { id: link.personId, email: link.email, name: link.name };
  await act({ person: { ...account, roles: [] }, apiKeyId: null, requestId }, async (scope) => {
    if (!(await updateUsed(table, link.id, now, scope.trx))) throw new Refused(GONE[table]);
    const sessionsEnded = await putPassword(account, passwordHash, { tell: table === "password_reset" }, scope);
    if (table === "invitation") scope.record({ act: "person.invitation-taken", objectId: account.id });
    else
      scope.record({ act: "person.password-changed", objectId: account.id, detail: { sessionsEnded, by: "letter" } });
  });
}

/** "3 minutes", for a number of seconds to wait. */
export function minutes(seconds: number): string {
  const whole = Math.ceil(seconds / 60);
  return whole === 1 ? "a minute" : `${whole} minutes`;
}
