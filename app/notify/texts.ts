/** The words of the letters about accounts. Pure: the act that sends one gives the facts. */

/** A letter before it is addressed. */
export interface AccountLetter {
  kind: LetterKind;
  subject: string;
  body: string;
}

type LetterKind = "invitation" | "password-reset" | "password-changed";

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
