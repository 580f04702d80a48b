import { data } from "react-router";
import { Invalid, NotFound, Refused } from "#app/http/errors.ts";
import type { ProposalFrame } from "#app/review/proposeSource.server.ts";
import { type ReadSource, readSourceForm } from "#app/sources/sourceForm.ts";
import type { SourceOutcome } from "./outcome.ts";

/** The fields of a form about a source as they were sent. */
export interface SentSource {
  typed: Readonly<Record<string, string>>;
  read: ReadSource;
  frame: ProposalFrame;
}

/** Most characters of a reason; it stands beside the line for ever. */
const LONGEST_REASON = 2000;

/**
 * Reads a form about a source and where its line goes.
 * @throws Invalid for a revision that is none
 */
export function readSent(form: FormData): SentSource {
  const typed = Object.fromEntries(
    [...form].flatMap(([name, value]) => (typeof value === "string" ? [[name, value] as const] : [])),
  );
  const into = typed["into"] ?? "";
  if (into !== "" && !/^[1-9]\d{0,8}$/.test(into)) {
    throw new Invalid("Choose the revision from the list.", [{ pointer: "/into", detail: "Choose one of the list." }]);
  }
  const reason = (typed["reason"] ?? "").trim();
  if (reason.length > LONGEST_REASON) {
    throw new Invalid("The reason is too long.", [
      { pointer: "/reason", detail: `Say it in at most ${LONGEST_REASON} characters.` },
    ]);
  }
  return {
    typed,
    read: readSourceForm((field) => typed[field] ?? ""),
    frame: { revisionId: into === "" ? null : Number(into), title: typed["revisionTitle"] ?? "", reason },
  };
}

/** An outcome with nothing in it yet. */
export function outcomeOf(typed: SentSource["typed"], found: Partial<SourceOutcome>): SourceOutcome {
  return { sentences: [], errors: [], twins: [], change: null, typed, ...found };
}

/**
 * What a refused form answers: what a person can put right, at its field where it has one.
 * @throws whatever is no refusal of the form
 */
export function refusedForm(error: unknown, typed: SentSource["typed"]) {
  if (!(error instanceof Invalid || error instanceof Refused || error instanceof NotFound)) throw error;
  const errors = (error instanceof Invalid ? error.errors : []).map(({ pointer, detail }) => ({
    field: pointer === "/title" ? "revisionTitle" : pointer.slice(1),
    detail,
  }));
  const outcome = outcomeOf(typed, { sentences: errors.length > 0 ? [] : [error.message], errors });
  return data(outcome, { status: error.status });
}
