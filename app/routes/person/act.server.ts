import { parseWithZod } from "@conform-to/zod/v4";
import { Invalid, Refused, TooMany } from "#app/http/errors.ts";
import { withdrawKeyOf } from "#app/people/apiKey.server.ts";
import { personForm, type PersonChange } from "#app/people/forms.ts";
import { inviteAgain, withdrawInvitation } from "#app/people/invitations.server.ts";
import { changeAccount, endSessionsOf, giveRoles, switchOff, switchOn } from "#app/people/people.server.ts";
import { findPersonPage } from "#app/people/personPage.server.ts";
import type { Acting } from "#app/people/person.ts";
import { asksPassword, demandFresh } from "#app/people/signing.server.ts";
import { ALWAYS_ASKED, type Question, questionOf } from "./change.ts";

/** What a form of a person's page came to when it was not simply done. */
export interface Answer {
  status: number;
  intent: string;
  /** What was typed, to stand in the fields again. */
  typed: { name?: string; email?: string; roles?: readonly string[] };
  /** What is wrong, above the page. */
  sentences: readonly string[];
  /** What is wrong with a field. */
  errors: Readonly<Record<string, readonly string[]>>;
  /** The question to be answered first, with the fields that carry the change on. */
  ask: (Question & { fields: readonly (readonly [string, string])[]; password: boolean }) | null;
}

/** Who changes an account, as the route knows them. */
export interface Changer {
  acting: Acting;
  sessionId: string;
  address: string;
}

/**
 * Does what a form of a person's page asks for, once it was confirmed where that is needed and the password was given
 * where the sign-in is no longer fresh.
 * @returns the intent that was done, or what to show instead
 */
export async function changePerson(
  { acting, sessionId, address }: Changer,
  personId: string,
  form: FormData,
): Promise<{ done: PersonChange["intent"] } | Answer> {
  const account = await findPersonPage(acting, personId);
  const submission = parseWithZod(form, { schema: personForm });
  const text = (name: string): string | undefined => {
    const value = form.get(name);
    return typeof value === "string" ? value : undefined;
  };
  const intent = text("intent") ?? "";
  const { name, email } = { name: text("name"), email: text("email") };
  const typed: Answer["typed"] = {
    ...(name !== undefined && { name }),
    ...(email !== undefined && { email }),
    ...(intent === "roles" && { roles: form.getAll("roles").map(String) }),
  };
  const answer = (status: number, rest: Partial<Answer>): Answer => ({
    status,
    intent,
    typed,
    sentences: [],
    errors: {},
    ask: null,
    ...rest,
  });
  if (submission.status !== "success") {
    const { "": whole = [], ...errors } = submission.error ?? {};
    const shown = ["name", "email"];
    const others = Object.entries(errors).flatMap(([field, texts]) => (shown.includes(field) ? [] : (texts ?? [])));
    const fields = Object.fromEntries(shown.map((field) => [field, errors[field] ?? []]));
    return answer(422, { sentences: [...(whole ?? []), ...others], errors: fields });
  }
  const change = submission.value;
  const password = await asksPassword(acting, sessionId);
  const ask = {
    ...questionOf(change, account),
    fields: [...form]
      .filter(([field]) => field !== "password" && field !== "confirmed")
      .map(([field, value]) => [field, String(value)] as const),
    password,
  };
  if (change.confirmed !== "yes" && (password || ALWAYS_ASKED.has(change.intent))) return answer(200, { ask });
  try {
    const from = { address, requestId: acting.requestId };
    await demandFresh(acting, sessionId, change.password ?? "", from, new Date(), "change accounts");
  } catch (error) {
    if (!(error instanceof Invalid)) throw error;
    return answer(error.status, { ask: { ...ask, password: true }, errors: { password: [error.message] } });
  }
  try {
    await perform(acting, account.id, change);
    return { done: change.intent };
  } catch (error) {
    if (error instanceof Invalid && error.errors.length > 0) {
      const errors = Object.fromEntries(error.errors.map(({ pointer, detail }) => [pointer.slice(1), [detail]]));
      return answer(error.status, { errors });
    }
    if (error instanceof Invalid || error instanceof Refused || error instanceof TooMany) {
      return answer(error.status, { sentences: [error.message] });
    }
    throw error;
  }
}

async function perform(acting: Acting, personId: string, change: PersonChange): Promise<void> {
  switch (change.intent) {
    case "roles":
      return giveRoles(acting, personId, change.roles);
    case "change":
      return changeAccount(acting, personId, change);
    case "invite-again":
      return inviteAgain(acting, personId);
    case "withdraw-invitation":
      return withdrawInvitation(acting, personId);
    case "switch-off":
      return switchOff(acting, personId);
    case "switch-on":
      return switchOn(acting, personId);
    case "withdraw-key":
      return withdrawKeyOf(acting, personId, change.key);
    case "end-session":
    case "end-sessions":
      await endSessionsOf(acting, personId, { only: change.intent === "end-session" ? change.session : undefined });
  }
}
