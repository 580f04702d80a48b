import { Authenticator } from "remix-auth";
import { FormStrategy } from "remix-auth-form";
import { act } from "#app/audit/act.server.ts";
import { database } from "#app/db/database.server.ts";
import { DomainError, TooMany } from "#app/http/errors.ts";
import { log } from "#app/log.server.ts";
import { readEmail } from "./email.ts";
import { limits, sourceOf } from "./limits.ts";
import { deleteTries, insertTry, updateTryTakenBack } from "./limits.queries.server.ts";
import { isPassword } from "./passwordHash.server.ts";
import { isTooLong } from "./passwordRules.ts";
import { minutes } from "./passwords.server.ts";
import { asPerson, findAccountByEmail } from "./people.queries.server.ts";
import type { Person } from "./person.ts";

/** One answer for every way in which a sign-in fails: no such account, switched off, no password yet, wrong password. */
export class SignInFailed extends DomainError {
  readonly status = 401;
  readonly kind = "unauthenticated";
  readonly title = "Sign in first";

  constructor() {
    super(
      "The address and the password do not belong together. Look at both, or choose a new password with “Forgotten?”.",
    );
  }
}

/** What a sign-in is tried with, beside where it comes from. */
export interface Credentials {
  email: string;
  password: string;
}

/**
 * Finds the person whom an address and a password prove.
 *
 * @param from the source address, and the request's id for the log
 * @throws SignInFailed, or TooMany after too many failed tries from one source
 */
export async function checkCredentials(
  { email, password }: Credentials,
  from: { address: string; requestId: string | null },
  now: Date = new Date(),
): Promise<Person> {
  const source = sourceOf(from.address);
  const address = readEmail(email) ?? "";
  // Tries are counted before the password is looked at: many at once must not slip past the count.
  const wait = Math.max(
    await insertTry(limits.signInSource, [source], now, database()),
    await insertTry(limits.signInAccount, [address, source], now, database()),
  );
  if (wait > 0) {
    log.warn({ event: "sign-in-limited", requestId: from.requestId, address: from.address });
    throw new TooMany(`That was too many tries from here. Wait ${minutes(wait)}, then try again.`, wait);
  }
  const account = address === "" ? undefined : await findAccountByEmail(address, database());
  const usable = account && !account.switchedOffAt ? account : undefined;
  // The hash is worked out in any case, so that the time does not tell whether there is an account.
  const right = isTooLong(password)
    ? await isPassword(null, "")
    : await isPassword(usable?.passwordHash ?? null, password);
  if (!usable || !right) {
    log.warn({ event: "sign-in-failed", requestId: from.requestId, address: from.address, personId: account?.id });
    await act(null, async ({ record }) => {
      // The address as typed is not kept: people type their password there.
      record({
        act: "person.sign-in-failed",
        objectId: account?.id ?? "unknown",
        detail: { request: from.requestId },
      });
    });
    throw new SignInFailed();
  }
  await updateTryTakenBack(limits.signInSource, [source], database());
  await deleteTries(limits.signInAccount, [address, source], now, database());
  return asPerson(usable);
}

/**
 * Signs in with the fields `email` and `password` of a posted form, through remix-auth's form strategy.
 * @throws SignInFailed, TooMany
 */
export async function signIn(request: Request, from: { address: string; requestId: string | null }): Promise<Person> {
  const strategy = new FormStrategy<Person>(({ form }) => {
    const text = (name: string): string => {
      const value = form.get(name);
      return typeof value === "string" ? value : "";
    };
    return checkCredentials({ email: text("email"), password: text("password") }, from);
  });
  return new Authenticator<Person>().use(strategy).authenticate("form", request);
}
