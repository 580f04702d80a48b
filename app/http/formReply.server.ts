import type { Submission, SubmissionResult } from "@conform-to/react";
import { data } from "react-router";
import { Forbidden, Invalid, Refused, TooMany } from "./errors.ts";

/** A form's answer with its status: what the page gets as `actionData` and hands to conform as `lastResult`. */
export type FormReply = ReturnType<typeof data<SubmissionResult>>;

interface ReplyOptions {
  /** Fields whose content never goes back to the browser: every password. */
  hide?: readonly string[];
}

/** The answer to a form whose fields did not fit their schema: 422, with what was typed and what is wrong with it. */
export function invalidReply<Schema>(submission: Submission<Schema>, { hide = [] }: ReplyOptions = {}): FormReply {
  return data(submission.reply({ hideFields: [...hide] }), { status: 422 });
}

/**
 * The answer to a form that an act refused: its sentences stand beside the fields they point at, or above the form, and
 * what was typed stays.
 *
 * @throws whatever is not a refusal that belongs on the page
 */
export function refusedReply<Schema>(
  submission: Submission<Schema>,
  error: unknown,
  { hide = [] }: ReplyOptions = {},
): FormReply {
  const hideFields = [...hide];
  if (error instanceof Invalid && error.errors.length > 0) {
    const fieldErrors: Record<string, string[]> = {};
    for (const { pointer, detail } of error.errors) (fieldErrors[pointer.slice(1)] ??= []).push(detail);
    return data(submission.reply({ fieldErrors, hideFields }), { status: error.status });
  }
  if (error instanceof Invalid || error instanceof Refused || error instanceof Forbidden || error instanceof TooMany) {
    const headers: Record<string, string> = error instanceof TooMany ? { "Retry-After": String(error.retryAfter) } : {};
    return data(submission.reply({ formErrors: [error.message], hideFields }), { status: error.status, headers });
  }
  throw error;
}
