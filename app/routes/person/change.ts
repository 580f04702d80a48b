import { agentInWords } from "#app/people/agent.ts";
import type { PersonChange } from "#app/people/forms.ts";
import { orderRoles, type Role } from "#app/people/person.ts";

/*
 * What a change of an account comes to, in words: the question asked before it is made, and what is said after it. Pure.
 */

type Intent = PersonChange["intent"];

/** Of an account, what the words need. */
export interface Changed {
  name: string;
  email: string;
  roles: readonly Role[];
  takenUp: boolean;
  sessions: readonly { id: string; agent: string }[];
  keys: readonly { id: string; name: string }[];
}

/** What somebody is shown before a change is made: the head, what will happen, and the button that does it. */
export interface Question {
  head: string;
  sentences: string[];
  verb: string;
}

/** Said on the page after each change. */
export const NOTICES: Readonly<Record<Intent | "invite", string>> = {
  invite: "Invited. A letter is on its way.",
  "invite-again": "Invited again. A letter is on its way; the link of the former one no longer opens.",
  "withdraw-invitation": "The invitation is withdrawn; its link no longer opens.",
  roles: "The roles are changed, from the person’s next request on.",
  change: "Changed.",
  "switch-off": "The account is switched off and its sessions are ended.",
  "switch-on": "The account can be used again.",
  "end-session": "The session is ended.",
  "end-sessions": "The sessions are ended.",
  "withdraw-key": "The key is withdrawn; its next request is refused.",
};

/** Changes that are asked about whenever they are wanted; the others only when the password is needed. */
export const ALWAYS_ASKED: ReadonlySet<Intent> = new Set([
  "roles",
  "change",
  "switch-off",
  "withdraw-invitation",
  "withdraw-key",
]);

function listed(words: readonly string[]): string {
  if (words.length <= 1) return words.join("");
  return `${words.slice(0, -1).join(", ")} and ${words.at(-1)}`;
}

const rolesInWords = (roles: readonly Role[]): string =>
  `the ${roles.length === 1 ? "role" : "roles"} ${listed(roles)}`;

/** What is asked before a change, or nothing to do: a sentence in its place. */
export function questionOf(change: PersonChange, account: Changed): Question {
  const { name } = account;
  switch (change.intent) {
    case "roles": {
      const next = orderRoles(change.roles);
      const gets = next.filter((role) => !account.roles.includes(role));
      const loses = account.roles.filter((role) => !next.includes(role));
      return {
        head: `Change the roles of ${name}?`,
        sentences: [
          ...(gets.length > 0 ? [`${name} gets ${rolesInWords(gets)}.`] : []),
          ...(loses.length > 0 ? [`${name} loses ${rolesInWords(loses)}.`] : []),
          ...(gets.length + loses.length === 0 ? ["Nothing changes: these are the roles held already."] : []),
          ...(next.length === 0 ? ["With no role at all, nothing of the table is open."] : []),
          "It holds from the next request on, API keys included.",
        ],
        verb: "Change the roles",
      };
    }
    case "change": {
      const email = change.email.trim().toLowerCase();
      const renamed = change.name.trim() !== name;
      const moved = email !== account.email;
      return {
        head: `Change the account of ${name}?`,
        sentences: [
          ...(renamed ? [`The name becomes ${change.name.trim()}, also beside what was done before.`] : []),
          ...(moved ? [`The address becomes ${email}; ${account.email} no longer signs in.`] : []),
          ...(moved && account.takenUp ? ["A letter tells both addresses."] : []),
          ...(moved && !account.takenUp ? ["The invitation is sent to the new address; the former link is void."] : []),
          ...(!renamed && !moved ? ["Nothing changes: name and address are these already."] : []),
        ],
        verb: "Change the account",
      };
    }
    case "switch-off":
      return {
        head: `Switch off the account of ${name}?`,
        sentences: [
          `${name} can no longer sign in; ${sessionsInWords(account.sessions.length)} and ${keysInWords(account.keys.length)}.`,
          "What was done stays, under the same name. The account can be switched on again.",
        ],
        verb: "Switch off",
      };
    case "switch-on":
      return {
        head: `Switch on the account of ${name}?`,
        sentences: [
          account.takenUp
            ? `${name} can sign in again, with the roles and the password from before.`
            : `${name} is invited again, at ${account.email}.`,
        ],
        verb: account.takenUp ? "Switch on" : "Switch on and invite again",
      };
    case "invite-again":
      return {
        head: `Invite ${name} again?`,
        sentences: [`A new letter goes to ${account.email}; the link of the former one no longer opens.`],
        verb: "Invite again",
      };
    case "withdraw-invitation":
      return {
        head: `Withdraw the invitation of ${name}?`,
        sentences: [
          "Its link no longer opens, and the account is switched off. It can be switched on and invited anew.",
        ],
        verb: "Withdraw the invitation",
      };
    case "end-session": {
      const agent = account.sessions.find(({ id }) => id === change.session)?.agent;
      return {
        head: `End a session of ${name}?`,
        sentences: [`It was begun with ${agent ? agentInWords(agent) : "a browser that gave no name"}.`],
        verb: "End the session",
      };
    }
    case "end-sessions":
      return {
        head: `End every session of ${name}?`,
        sentences: ["Each browser has to sign in again. What was typed there and not sent is lost."],
        verb: "End the sessions",
      };
    case "withdraw-key": {
      const key = account.keys.find(({ id }) => id === change.key);
      return {
        head: `Withdraw a key of ${name}?`,
        sentences: [
          `The program ${key ? `“${key.name}”` : "that uses it"} is refused from its next request on, and ${name} hears of it by letter.`,
        ],
        verb: "Withdraw the key",
      };
    }
  }
}

function sessionsInWords(sessions: number): string {
  if (sessions === 0) return "there is no session to end";
  return sessions === 1 ? "one session ends" : `${sessions} sessions end`;
}

function keysInWords(keys: number): string {
  if (keys === 0) return "there is no API key";
  return keys === 1 ? "one API key is refused" : `${keys} API keys are refused`;
}
