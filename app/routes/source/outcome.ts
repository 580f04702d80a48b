/** What came of a form about a source that could not be done at once; what was typed comes back, so nothing is lost. */
export interface SourceOutcome {
  /** What is wrong with the form as a whole. */
  sentences: string[];
  errors: { field: string; detail: string }[];
  typed: Readonly<Record<string, string>>;
  /** Known sources it may be, with what they have in common. */
  twins: { sourceId: string; reference: string; because: string; proposed: number | null; sameDoi: boolean }[];
  /** How the record would change, word by word; null until it was asked for. */
  change: { field: string; runs: { kind: "same" | "went" | "came"; text: string }[] }[] | null;
}
