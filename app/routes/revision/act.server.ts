import { BadRequest, DomainError, Invalid, NotFound } from "#app/http/errors.ts";
import { demand } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { demandFresh } from "#app/people/signing.server.ts";
import { answerComment, commentOn } from "#app/review/comments.server.ts";
import { acceptLines, closeReview, declineLines, returnRevision, setFindingAside } from "#app/review/decide.server.ts";
import { type MixtureAnswer, MixtureRefused } from "#app/review/mixture.ts";
import {
  describeRevision,
  restateLines,
  sendToReview,
  takeLineOut,
  withdrawRevision,
} from "#app/review/revise.server.ts";
import { acceptCleanLines } from "#app/review/revisionPage.server.ts";
import { readFields, type RevisionForm, revisionForm } from "#app/review/revisionPageForms.ts";
import { takeSuggestionOf, writeValue } from "#app/review/revisionPageWrite.server.ts";
import type { Outcome } from "./outcome.ts";

/** Who sends a form, by which session and from where: closing a review may ask for the password once more. */
export interface Signer {
  acting: Acting;
  sessionId: string;
  /** The client's address, against which failed passwords are counted. */
  address: string;
}

/**
 * Does what a form on the page of a revision asks, by the act of the review room that it names.
 *
 * A refusal comes back as an outcome with its status and sentence, and with what was typed; only what cannot be shown on
 * the page (no such revision, a broken body) is thrown.
 */
export async function actOnRevision(
  { acting, sessionId, address }: Signer,
  revisionId: number,
  form: FormData,
): Promise<Outcome> {
  const typed: Record<string, string> = {};
  for (const [name, value] of form) if (typeof value === "string" && name !== "password") typed[name] = value;
  const intent = typed["intent"] ?? "";
  const wrong = (
    status: number,
    sentence: string,
    errors: Record<string, readonly string[]> = {},
  ): Outcome & { ok: false } => ({
    ok: false,
    status,
    intent,
    sentence,
    errors,
    typed,
  });
  const reading = readFields(form, revisionForm);
  if (!reading.ok) {
    // Fields that no person fills in are nobody's typing mistake; their sentence stands above the form.
    const shown = ["reason", "remark", "body", "title", "summary", "value", "unit", "uncertainty", "kind"];
    const above = Object.entries(reading.errors).flatMap(([name, texts]) => (shown.includes(name) ? [] : texts));
    const errors = Object.fromEntries(Object.entries(reading.errors).filter(([name]) => shown.includes(name)));
    return wrong(422, above[0] ?? "", errors);
  }
  try {
    if (reading.value.intent === "close") {
      demand(acting, "revision:decide");
      await demandFresh(acting, sessionId, reading.value.password, { address, requestId: acting.requestId });
    }
    return { ok: true, intent, said: await perform(acting, revisionId, reading.value) };
  } catch (error) {
    if (error instanceof MixtureRefused) {
      const fields = [...form].flatMap(([name, value]): (readonly [string, string])[] =>
        typeof value === "string" && !["mixture", "mixtureReason"].includes(name) ? [[name, value]] : [],
      );
      return { ...wrong(error.status, error.message), asks: { ...error.question, fields } };
    }
    if (!(error instanceof DomainError) || error instanceof NotFound || error instanceof BadRequest) throw error;
    if (!(error instanceof Invalid) || error.errors.length === 0) return wrong(error.status, error.message);
    const errors: Record<string, string[]> = {};
    for (const { pointer, detail } of error.errors) (errors[pointer.replace(/^\//, "")] ??= []).push(detail);
    return wrong(error.status, "", errors);
  }
}

/** @returns what was done, in a sentence */
async function perform(acting: Acting, id: number, form: RevisionForm): Promise<string> {
  switch (form.intent) {
    case "accept":
      await acceptLines(acting, id, form.seen, answerOf(form));
      return form.seen.length === 1 ? "Line accepted." : `${form.seen.length} lines accepted.`;
    case "accept-clean": {
      const accepted = await acceptCleanLines(acting, id, form.digest, answerOf(form));
      return accepted === 1 ? "The clean line is accepted." : `${accepted} clean lines accepted.`;
    }
    case "decline":
      await declineLines(acting, id, form.seen, form.reason, answerOf(form));
      return form.seen.length === 1 ? "Line declined." : `${form.seen.length} lines declined.`;
    case "set-aside":
      await setFindingAside(acting, id, form.finding, form.reason);
      return "Finding set aside.";
    case "comment":
      await commentOn(acting, { revisionId: id, lineId: form.line ?? null, body: form.body });
      return "Comment written.";
    case "answer":
      await answerComment(acting, { revisionId: id, comment: form.comment, body: form.body });
      return "Answer written.";
    case "return":
      await returnRevision(acting, id, form.remark);
      return "Returned to the steward.";
    case "close": {
      const { accepted, declined } = await closeReview(acting, id);
      return `Review closed: ${accepted} accepted, ${declined} declined.`;
    }
    case "rewrite":
      await writeValue(acting, id, form);
      return "Line changed and examined again.";
    case "take-suggestion":
      await takeSuggestionOf(acting, id, form);
      return "Suggestion taken and the revision examined again.";
    case "take-out":
      await takeLineOut(acting, id, form.line, form.reason);
      return "Line taken out; it stays on record.";
    case "describe":
      await describeRevision(acting, id, { title: form.title, summary: form.summary });
      return "Title and summary saved.";
    case "send":
      await sendToReview(acting, id, form.remark);
      return "Sent to review; the reviewers have been written to.";
    case "restate": {
      const { restated, idle } = await restateLines(acting, id, form.line ?? null);
      const done = restated === 1 ? "One line restated." : `${restated} lines restated.`;
      return idle === 0
        ? done
        : `${done} ${idle === 1 ? "One would change nothing any more and is left: take it out." : `${idle} would change nothing any more and are left: take them out.`}`;
    }
    case "withdraw":
      await withdrawRevision(acting, id, form.reason);
      return "Revision withdrawn; it stays on record.";
  }
}

/** The answer to the question that an earlier try came back with, where there was one. */
function answerOf(form: { mixture?: string | undefined; mixtureReason: string }): MixtureAnswer | null {
  return form.mixture === undefined ? null : { token: form.mixture, reason: form.mixtureReason };
}
