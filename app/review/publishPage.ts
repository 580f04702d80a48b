import { type Digits, subtract } from "#app/thermo/digits.ts";
import type { Property } from "#app/thermo/property.ts";
import type { LineContent } from "./content.ts";
import { aboutOf, figureOf, type ShownFigure, type Stood, type TextChange, textChanges } from "./revisionPage.ts";

/*
 * The next edition as it would be: every accepted line beside what it replaces, revision by revision. Pure.
 */

/** How many lines of one revision are listed; the rest are counted. Its own page has them all. */
export const LISTED_LINES = 200;

export interface WaitingLine {
  id: string;
  revisionId: number;
  kind: LineContent["kind"];
  speciesId: string | null;
  property: Property | null;
  sourceId: string | null;
  content: LineContent;
}

export interface WaitingRevision {
  id: number;
  title: string;
  madeByName: string;
  /** Who closed the review, and when. */
  decided: { by: string; at: Date } | null;
}

export interface NextLine {
  id: string;
  what: "new" | "changed" | "withdrawn" | "new species" | "name" | "new source" | "citation";
  about: string;
  speciesKey: string | null;
  property: Property | null;
  stood: ShownFigure | null;
  proposed: ShownFigure | null;
  difference: Digits | null;
  changes: readonly TextChange[];
  reason: string | null;
}

export interface NextRevision extends WaitingRevision {
  lines: readonly NextLine[];
  /** Lines that are not listed. */
  more: number;
}

/** What the next edition would bring, counted. */
export interface NextCounts {
  lines: number;
  newValues: number;
  changedValues: number;
  withdrawnValues: number;
  newSpecies: number;
  renamedSpecies: number;
  sources: number;
}

/** Sorts accepted lines under their revisions and counts what they bring. */
export function nextEditionContent(input: {
  lines: readonly WaitingLine[];
  revisions: ReadonlyMap<number, WaitingRevision>;
  stood: ReadonlyMap<string, Stood>;
  names: ReadonlyMap<string, { key: string; name: string; stands: boolean }>;
  printCitation: (citation: Record<string, unknown>) => string;
}): { counts: NextCounts; revisions: NextRevision[] } {
  const counts: NextCounts = {
    lines: input.lines.length,
    newValues: 0,
    changedValues: 0,
    withdrawnValues: 0,
    newSpecies: 0,
    renamedSpecies: 0,
    sources: 0,
  };
  const byRevision = new Map<number, NextLine[]>();
  for (const line of input.lines) {
    const { content } = line;
    const stood = input.stood.get(line.id);
    const before = figureOf(stood?.content);
    const after = figureOf(content);
    const what = whatOf(content, stood);
    if (what === "new") counts.newValues += 1;
    if (what === "changed") counts.changedValues += 1;
    if (what === "withdrawn") counts.withdrawnValues += 1;
    if (what === "new species") counts.newSpecies += 1;
    if (what === "name") counts.renamedSpecies += 1;
    if (content.kind === "source") counts.sources += 1;
    const list = byRevision.get(line.revisionId) ?? [];
    list.push({
      id: line.id,
      what,
      about: aboutOf(line, input.names),
      speciesKey: (line.speciesId && input.names.get(line.speciesId)?.key) ?? null,
      property: line.property,
      stood: before,
      proposed: after,
      difference: before && after ? subtract(after.digits, before.digits) : null,
      changes: textChanges(stood?.content, content, input.printCitation),
      reason: content.kind === "withdrawal" ? content.reason : null,
    });
    byRevision.set(line.revisionId, list);
  }
  const revisions = [...byRevision].flatMap(([id, lines]) => {
    const revision = input.revisions.get(id);
    if (!revision) return [];
    return [{ ...revision, lines: lines.slice(0, LISTED_LINES), more: Math.max(0, lines.length - LISTED_LINES) }];
  });
  return { counts, revisions };
}

function whatOf(content: LineContent, stood: Stood | undefined): NextLine["what"] {
  switch (content.kind) {
    case "value":
      return stood?.content.kind === "value" ? "changed" : "new";
    case "withdrawal":
      return "withdrawn";
    case "detail":
      return stood?.content.kind === "detail" ? "name" : "new species";
    case "source":
      return stood?.content.kind === "source" ? "citation" : "new source";
  }
}

/** The counts in words, for the page and the button's sentence: "57 changed values, 4 new species". */
export function countsInWords(counts: NextCounts): string {
  const parts = [
    [counts.newValues, "new value", "new values"],
    [counts.changedValues, "changed value", "changed values"],
    [counts.withdrawnValues, "value taken out", "values taken out"],
    [counts.newSpecies, "new species", "new species"],
    [counts.renamedSpecies, "species called otherwise", "species called otherwise"],
    [counts.sources, "source", "sources"],
  ] as const;
  const said = parts.filter(([n]) => n > 0).map(([n, one, many]) => `${n} ${n === 1 ? one : many}`);
  return said.join(", ");
}
