import { BadRequest, DomainError, Invalid, NotFound } from "#app/http/errors.ts";
import type { Acting } from "#app/people/person.ts";
import type { Typed } from "#app/review/proposal.ts";
import {
  proposeMove,
  proposeNames,
  type ProposeOutcome,
  proposeSpecies,
  proposeValues,
  proposeWithdrawal,
} from "#app/review/proposeForm.server.ts";
import type { ProposeReply } from "./outcome.ts";

/** Where the lines went, or what could not be done. */
export type Answer = { revisionId: number } | { status: number; reply: ProposeReply };

/**
 * Does what a form of the page asks, for the species of its address; `key` is null where the page is about none.
 * @throws what `held` throws
 */
export function proposeFrom(acting: Acting, key: string | null, form: FormData): Promise<Answer> {
  return held(form, (typed) => perform(acting, key, typed("intent"), typed));
}

/**
 * Hands a form's texts to an act. A refusal comes back with its status and sentence, and with what was typed; only what
 * cannot be shown on the page is thrown.
 */
export async function held(form: FormData, work: (typed: Typed) => Promise<ProposeOutcome>): Promise<Answer> {
  const typed: Record<string, string> = {};
  for (const [name, value] of form) if (typeof value === "string") typed[name] = value;
  const reply = (status: number, sentence: string, rest: Partial<ProposeReply> = {}): Answer => ({
    status,
    reply: { intent: typed["intent"] ?? "", sentence, errors: {}, readings: {}, questions: null, ...rest, typed },
  });
  try {
    const outcome = await work((name) => (Object.hasOwn(typed, name) ? (typed[name] ?? "") : ""));
    if (outcome.ok) return outcome;
    return reply(422, "", {
      errors: byField(outcome.errors),
      readings: outcome.readings,
      questions: outcome.questions,
    });
  } catch (error) {
    if (!(error instanceof DomainError) || error instanceof NotFound || error instanceof BadRequest) throw error;
    if (error instanceof Invalid && error.errors.length > 0) {
      return reply(error.status, "", { errors: byField(error.errors) });
    }
    return reply(error.status, error.message);
  }
}

function byField(errors: readonly { pointer: string; detail: string }[]): Record<string, string[]> {
  const fields: Record<string, string[]> = {};
  for (const { pointer, detail } of errors) (fields[pointer.replace(/^\//, "")] ??= []).push(detail);
  return fields;
}

function perform(acting: Acting, key: string | null, intent: string, typed: Typed): Promise<ProposeOutcome> {
  if (key === null) {
    if (intent === "species") return proposeSpecies(acting, typed);
  } else {
    switch (intent) {
      case "values":
        return proposeValues(acting, key, typed);
      case "withdrawal":
        return proposeWithdrawal(acting, key, typed);
      case "names":
        return proposeNames(acting, key, typed);
      case "other":
        return proposeMove(acting, key, typed);
    }
  }
  throw new BadRequest("The form does not say what to do. Load the page again.");
}
