import type { FormQuestions } from "#app/review/proposal.ts";

/** What came of a form that could not be done; what was typed comes back, so that nothing is lost. */
export interface ProposeReply {
  intent: string;
  /** What is wrong with the form as a whole; empty where the fields say all. */
  sentence: string;
  errors: Readonly<Record<string, readonly string[]>>;
  /** The readings of an entry that has more than one, by field. */
  readings: Readonly<Record<string, readonly string[]>>;
  questions: FormQuestions | null;
  typed: Readonly<Record<string, string>>;
}

/** The kinds of proposal that are begun for a species, as their page's address names them. */
export const PROPOSALS = ["values", "withdrawal", "names", "other"] as const;
export type Proposal = (typeof PROPOSALS)[number];

export const proposalWords: Readonly<Record<Proposal, string>> = {
  values: "Values",
  withdrawal: "A withdrawal",
  names: "What it is called",
  other: "It is another species",
};
