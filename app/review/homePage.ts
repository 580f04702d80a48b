import type { NextCounts } from "./publishPage.ts";
import type { RevisionState } from "./states.ts";

/*
 * What waits in the review, as the first page tells it. Pure.
 */

/** Lines of the next edition: how many of one kind, and whether they replace what stands. */
export interface NextLineCount {
  kind: "value" | "withdrawal" | "detail" | "source";
  replaces: boolean;
  n: number;
}

/** What the next edition would bring, from counted lines. */
export function nextCounts(rows: readonly NextLineCount[]): NextCounts {
  const sum = (kind: NextLineCount["kind"], replaces?: boolean): number =>
    rows
      .filter((row) => row.kind === kind && (replaces === undefined || row.replaces === replaces))
      .reduce((total, row) => total + row.n, 0);
  return {
    lines: rows.reduce((total, row) => total + row.n, 0),
    newValues: sum("value", false),
    changedValues: sum("value", true),
    withdrawnValues: sum("withdrawal"),
    newSpecies: sum("detail", false),
    renamedSpecies: sum("detail", true),
    sources: sum("source"),
  };
}

/** A step of a revision in words around its number: "sent" revision 4 "to review". */
export function moveInWords({ from, to }: { from: RevisionState; to: RevisionState }): [before: string, after: string] {
  switch (to) {
    case "in_review":
      return from === "returned" ? ["mended", "and sent it again"] : ["sent", "to review"];
    case "returned":
      return ["returned", "with comments"];
    case "decided":
      return ["closed the review of", ""];
    case "withdrawn":
      return ["withdrew", ""];
    case "draft":
      return ["began", ""];
  }
}
