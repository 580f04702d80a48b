/** The states of a revision and the moves between them; every other move is refused, here and by trigger. */
export const REVISION_STATES = ["draft", "in_review", "returned", "decided", "withdrawn"] as const;
export type RevisionState = (typeof REVISION_STATES)[number];

export const revisionMoves: Record<RevisionState, readonly RevisionState[]> = {
  draft: ["in_review", "withdrawn"],
  in_review: ["returned", "decided", "withdrawn"],
  returned: ["in_review", "withdrawn"],
  decided: [],
  withdrawn: [],
};

/** How each state is called on a page. */
export const revisionStateWords: Record<RevisionState, string> = {
  draft: "draft",
  in_review: "in review",
  returned: "returned",
  decided: "decided",
  withdrawn: "withdrawn",
};

/** Whether a revision may go from one state to another. */
export function mayMove(from: RevisionState, to: RevisionState): boolean {
  return revisionMoves[from].includes(to);
}

/** Whether its lines may be written and taken out. */
export function isWritable(state: RevisionState): boolean {
  return state === "draft" || state === "returned";
}
