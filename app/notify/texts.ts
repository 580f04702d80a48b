/** The words of the letters about accounts. Pure: the act that sends one gives the facts. */

/** A letter before it is addressed. */
export interface AccountLetter {
  kind: LetterKind;
  subject: string;
  body: string;
}

type LetterKind = "invitation" | "password-reset" | "password-changed" | "address-change" | "account-changed";

/**
 * Stands on a line of its own where the secret link goes. The link is made when the letter is sent, so that neither the
 * outbox nor the queue ever holds it; nobody's name can hold a line of its own, so nobody can place one.
 */
export const LINK_LINE = "{link}";

/** To somebody who gets an account. `days` is how long the link can be used. */
export function invitationLetter(facts: { name: string; invitedBy: string; days: number }): AccountLetter {
  return {
    kind: "invitation",
    subject: "Your account on Tablewright",
    body: [
      `${facts.name},`,
      "",
      `${facts.invitedBy} made an account for you on Tablewright, the laboratory's table of thermochemical reference values. Choose your password here:`,
      "",
      LINK_LINE,
      "",
      `The link can be used once, within ${facts.days} days. If you did not expect it, leave it alone; nothing happens without it.`,
    ].join("\n"),
  };
}

/** To somebody who asked for a new password. `minutes` is how long the link can be used. */
export function resetLetter(facts: { name: string; minutes: number }): AccountLetter {
  return {
    kind: "password-reset",
    subject: "Choose a new password",
    body: [
      `${facts.name},`,
      "",
      "Somebody, probably you, asked for a new password for your account on Tablewright. Choose it here:",
      "",
      LINK_LINE,
      "",
      `The link can be used once, within ${facts.minutes} minutes. If it was not you, leave it alone; your password stays as it is.`,
    ].join("\n"),
  };
}

/** To the owner of an account whose password was changed. */
export function passwordChangedLetter(facts: { name: string }): AccountLetter {
  return {
    kind: "password-changed",
    subject: "Your password was changed",
    body: [
      `${facts.name},`,
      "",
      "The password of your account on Tablewright was changed, and your other sessions were ended.",
      "",
      "If it was not you, choose a new password with “Forgotten?” on the sign-in page, and tell an administrator.",
    ].join("\n"),
  };
}

/** To the new address of somebody who wants to sign in with it. `minutes` is how long the link can be used. */
export function addressChangeLetter(facts: { name: string; from: string; minutes: number }): AccountLetter {
  return {
    kind: "address-change",
    subject: "Confirm your new address",
    body: [
      `${facts.name},`,
      "",
      `Somebody, probably you, wants to sign in to Tablewright with this address in the place of ${facts.from}. Confirm it here:`,
      "",
      LINK_LINE,
      "",
      `The link can be used once, within ${facts.minutes} minutes. If it was not you, leave it alone; nothing changes.`,
    ].join("\n"),
  };
}

/** To the owner of an account when something of it changed: what, in whole sentences, and who did it. */
function accountChanged(name: string, subject: string, sentences: readonly string[]): AccountLetter {
  return {
    kind: "account-changed",
    subject,
    body: [`${name},`, "", ...sentences, "", "If you did not expect it, tell an administrator of the laboratory."].join(
      "\n",
    ),
  };
}

/** To the old address and to the new one when the address of an account has changed. `by` is null for the owner. */
export function addressChangedLetter(facts: {
  name: string;
  by: string | null;
  from: string;
  to: string;
}): AccountLetter {
  return accountChanged(facts.name, "The address of your account was changed", [
    `${facts.by ?? "You"} changed the address of your account on Tablewright from ${facts.from} to ${facts.to}. Sign in with the new one; letters go there.`,
  ]);
}

/** To somebody whose name an administrator wrote anew. */
export function renamedLetter(facts: { name: string; by: string; before: string }): AccountLetter {
  return accountChanged(facts.name, "The name of your account was changed", [
    `${facts.by} changed the name of your account on Tablewright from ${facts.before} to ${facts.name}.`,
  ]);
}

/** To somebody whose roles have changed. */
export function rolesChangedLetter(facts: {
  name: string;
  by: string;
  before: readonly string[];
  after: readonly string[];
}): AccountLetter {
  const listed = (roles: readonly string[]): string => (roles.length === 0 ? "none" : roles.join(", "));
  return accountChanged(facts.name, "Your roles were changed", [
    `${facts.by} changed your roles on Tablewright, from your next request on.`,
    `Before: ${listed(facts.before)}.`,
    `Now: ${listed(facts.after)}.`,
  ]);
}

/** To somebody whose account was switched off. */
export function switchedOffLetter(facts: { name: string; by: string }): AccountLetter {
  return accountChanged(facts.name, "Your account was switched off", [
    `${facts.by} switched off your account on Tablewright. Your sessions are ended and your API keys are refused; what you did stays on record under your name.`,
  ]);
}

/** To somebody whose account was switched on again. */
export function switchedOnLetter(facts: { name: string; by: string }): AccountLetter {
  return accountChanged(facts.name, "Your account is in use again", [
    `${facts.by} switched on your account on Tablewright, with the roles and the password it had.`,
  ]);
}

/** To the owner of an API key that an administrator withdrew. */
export function keyWithdrawnLetter(facts: { name: string; by: string; key: string }): AccountLetter {
  return accountChanged(facts.name, "An API key of yours was withdrawn", [
    `${facts.by} withdrew your API key “${facts.key}” on Tablewright. Whatever program used it is refused from now on.`,
  ]);
}
