import type { Severity, SourceKind, Suggestion } from "#app/checks/types.ts";
import { type TextRun, wordRuns } from "#app/editions/comparePage.ts";
import { noteOf } from "#app/sources/citation.ts";
import { type Digits, subtract } from "#app/thermo/digits.ts";
import { showDigits } from "#app/thermo/notation.ts";
import { type Property, PROPERTIES, propertyInfo } from "#app/thermo/property.ts";
import { normalizedError, type Uncertainty } from "#app/thermo/uncertainty.ts";
import type { LineContent } from "./content.ts";
import { type HistoryRound, historyOf } from "./revisionPageHistory.ts";
import {
  byLine,
  type FindingText,
  type Round,
  roundAt,
  type RoundChanges,
  roundChanges,
  roundsOf,
} from "./roundChanges.ts";
import { isWritable, type RevisionState } from "./states.ts";
import { type Thread, threadsOf } from "./threads.ts";

/*
 * What the page of one revision shows, shaped from rows. Pure: everything that was read comes in, and what the viewer may
 * do with each line goes out beside it, so that the page draws buttons only where an act would be allowed.
 */

/** How many lines a page of a revision holds; a species is never torn apart, so a page may hold a few more. */
export const LINES_A_PAGE = 200;

/** What stood or waits in a line's place; the part of a line's content that a comparison needs. */
export type StoodContent =
  | { kind: "value"; digits: Digits; uncertainty: Uncertainty | null; sourceId: string }
  | { kind: "withdrawal"; reason: string }
  | {
      kind: "detail";
      key: string;
      printed: string;
      label: string | null;
      name: string;
      cas: string | null;
      inchikey: string | null;
      synonyms: readonly string[];
    }
  | {
      kind: "source";
      citation: Record<string, unknown>;
      doi: string | null;
      sourceKind: SourceKind;
      notice: string | null;
    };

/** What stood, and since which edition, or in which revision it waits. */
export interface Stood {
  content: StoodContent;
  since: number | null;
  waitsIn: number | null;
}

/** A line as the page reads it: the row, and whether something else came into its place. */
export interface PageLine {
  id: string;
  position: number;
  kind: LineContent["kind"];
  speciesId: string | null;
  property: Property | null;
  sourceId: string | null;
  rowNumber: number | null;
  state: "open" | "accepted" | "declined" | "dropped" | "published";
  publishedIn: number | null;
  /** The revision it was taken over from, and when; null for a line that never left its revision. */
  cameFrom: number | null;
  cameAt: Date | null;
  versionId: string;
  version: number;
  content: LineContent;
  overtaken: boolean;
  /** Revision whose accepted line for the same place must be published first; null where the place is free. */
  behind: number | null;
}

export interface PageFinding {
  id: string;
  lineId: string | null;
  speciesId: string;
  property: Property | null;
  check: string;
  title: string;
  severity: Severity;
  sentence: string;
  arithmetic: readonly string[];
  suggestions: readonly Suggestion[];
  setAside: { reason: string; by: string; at: Date } | null;
}

export interface PageDecision {
  lineId: string;
  version: number;
  decision: "accept" | "decline";
  reason: string;
  at: Date;
  by: string;
  void: boolean;
}

export interface PageVersion {
  lineId: string;
  version: number;
  content: LineContent;
  at: Date;
  reason: string;
  by: string;
}

export interface PageComment {
  id: string;
  lineId: string | null;
  round: number;
  body: string;
  at: Date;
  by: string;
  byId: string;
  /** The comment it answers; null where it opens a thread. */
  answers: string | null;
}

export interface PageMove {
  from: string;
  to: string;
  round: number;
  at: Date;
  by: string;
  remark: string;
}

export interface RevisionRow {
  id: number;
  title: string;
  summary: string;
  state: RevisionState;
  round: number;
  sheetId: number | null;
  sheetName: string | null;
  /** Id of the person who began it. */
  madeBy: string;
  madeByName: string;
  madeAt: Date;
  sentAt: Date | null;
  decidedAt: Date | null;
}

/** What the viewer may do with revisions, from their roles. */
export interface ViewerRights {
  write: boolean;
  comment: boolean;
  decide: boolean;
}

export interface RevisionPageInput {
  revision: RevisionRow;
  /** Number of the newest edition; 0 before the first. */
  newest: number;
  lines: readonly PageLine[];
  /** Lines taken out, for the history. */
  takenOut: readonly { line: PageLine; reason: string; at: Date; by: string }[];
  /** What each line was written against, by line id. */
  stood: ReadonlyMap<string, Stood>;
  /** What stands or waits now in the place of an overtaken line, by line id. */
  now: ReadonlyMap<string, Stood>;
  names: ReadonlyMap<string, { key: string; name: string; stands: boolean }>;
  citations: ReadonlyMap<string, { short: string; full: string }>;
  /** How a citation of a source line is printed. */
  printCitation: (citation: Record<string, unknown>) => string;
  findings: readonly PageFinding[];
  /** Of the examination made when the round was sent that changes are shown against; empty where there is none. */
  findingsBefore: readonly FindingText[];
  decisions: readonly PageDecision[];
  versions: readonly PageVersion[];
  comments: readonly PageComment[];
  moves: readonly PageMove[];
  setAsides: readonly { sentence: string; reason: string; at: Date; by: string }[];
  /** Revisions whose lines were taken over into this one. */
  takenOver: readonly { from: number; lines: number; at: Date; by: string }[];
  /** Revisions into which lines of this one were taken over. */
  wentInto: readonly number[];
  /** Lines in which the viewer had a hand. */
  hands: ReadonlySet<string>;
  rights: ViewerRights;
  /** Which lines are shown. */
  show: Show;
  /** Which page of lines, from 1. */
  page: number;
}

/** The lines that a page can be narrowed to; a set is never torn apart, so its other lines stay beside them. */
export const SHOWS = ["all", "open", "changed", "overtaken", "unanswered"] as const;
export type Show = (typeof SHOWS)[number];

export interface ShownFigure {
  digits: Digits;
  uncertainty: Uncertainty | null;
}

/** One thing that a line says in words: a name, a number of a registry, a citation. */
export interface TextChange {
  label: string;
  before: string | null;
  after: string | null;
  /** Word by word, where a text was changed in part. */
  runs?: readonly TextRun[];
}

export interface SuggestionView {
  property: Property | null;
  becomes: string;
  slip: string;
  sentence: string;
  /** For the form that takes it: its place in the finding and the lines it rewrites; null where it cannot be taken here. */
  takes: { index: number; seen: readonly string[] } | null;
  /** For the reviewer: the words with which the revision would be returned. */
  asRemark: string;
}

export interface FindingView {
  id: string;
  check: string;
  title: string;
  severity: Severity;
  sentence: string;
  arithmetic: readonly string[];
  suggestions: readonly SuggestionView[];
  setAside: { reason: string; by: string; at: Date } | null;
  maySetAside: boolean;
}

export interface DecisionView {
  /** The round in which it was made. */
  round: number;
  decision: "accept" | "decline";
  reason: string;
  by: string;
  at: Date;
  version: number;
}

export interface VersionView {
  version: number;
  figure: ShownFigure | null;
  by: string;
  at: Date;
  reason: string;
}

export interface LineView {
  id: string;
  versionId: string;
  version: number;
  kind: LineContent["kind"];
  speciesKey: string | null;
  property: Property | null;
  /** What the line is about in plain text, for labels: "NH3(g) ΔfH°". */
  about: string;
  state: PageLine["state"];
  publishedIn: number | null;
  /** The most serious finding that nobody set aside; null for a line without one. */
  mark: Severity | null;
  hasSetAside: boolean;
  stood: ShownFigure | null;
  /** Revision in which what it was written against waits; null where that stands or stood in an edition. */
  stoodWaitsIn: number | null;
  proposed: ShownFigure | null;
  /** Proposed less standing, exact, in the property's unit. */
  difference: Digits | null;
  normalizedError: number | null;
  changes: readonly TextChange[];
  withdrawalReason: string | null;
  given: { text: string; unit: string; note: string | null } | null;
  source: { short: string; full: string } | null;
  /** The source before, where the line changes it. */
  sourceBefore: string | null;
  method: string | null;
  remark: string | null;
  rowNumber: number | null;
  /** Whether the viewer had a hand in it. */
  own: boolean;
  /** What happened to what the line was written against; null while it still stands. */
  overtaken: string | null;
  /** What stands or waits in the place of an overtaken line now. */
  now: { figure: ShownFigure | null; since: number | null; waitsIn: number | null } | null;
  /** Revision whose accepted line for the same place must be published before this one can be accepted. */
  behind: number | null;
  decision: DecisionView | null;
  voided: readonly DecisionView[];
  /** All versions, oldest first, where there is more than one or the first gives its reason. */
  versions: readonly VersionView[];
  threads: readonly Thread[];
  /** The revision it was taken over from. */
  cameFrom: number | null;
  findings: readonly FindingView[];
  mayAccept: boolean;
  mayDecline: boolean;
  mayEdit: boolean;
  mayTakeOut: boolean;
  mayRestate: boolean;
}

/** The lines of one species (or of one source): they are looked at together and, where they are clean, accepted together. */
export interface LineGroup {
  id: string;
  /** Key of the species; null for a source. */
  speciesKey: string | null;
  name: string;
  /** Whether the newest edition holds the species, so that a link leads somewhere. */
  stands: boolean;
  rank: Rank;
  lines: readonly LineView[];
  /** Open lines that the viewer may accept together, as the form sends them; empty with fewer than two. */
  together: readonly string[];
  /** How far a set of several lines was decided, where it was decided in part only. */
  inPart: { accepted: number; declined: number; open: number } | null;
}

/** Where a group stands on the page: what blocks, then what asks to be looked at, then the rest. */
export type Rank = "block" | "look" | "clean";

export interface RevisionPage {
  revision: RevisionRow;
  newest: number;
  sent: { at: Date; by: string; remark: string } | null;
  ended: { to: string; at: Date; by: string; remark: string } | null;
  publishedIn: readonly number[];
  /** The rounds, oldest first. */
  rounds: readonly Round[];
  /** What changed since the round before; null in the first round and after the review. */
  changed: RoundChanges | null;
  /** Comments on the revision as a whole, with their answers. */
  threads: readonly Thread[];
  /** What the comments are about that still wait for an answer. */
  unanswered: readonly { lineId: string | null; about: string | null }[];
  wentInto: readonly number[];
  show: Show;
  /** How many lines each choice of lines holds. */
  shows: Readonly<Record<Show, number>>;
  groups: readonly LineGroup[];
  pages: { page: number; pages: number; from: number; to: number };
  counts: {
    lines: number;
    open: number;
    accepted: number;
    declined: number;
    overtaken: number;
    /** Findings that nobody set aside. */
    blocks: number;
    looks: number;
    /** Lines without a finding that blocks or asks for a look, in species without one. */
    clean: number;
  };
  /** What "accept the clean lines" would accept for this viewer. */
  cleanSet: { count: number; seen: readonly SeenPair[] };
  /** Lines in which the viewer had a hand. */
  own: number;
  may: {
    decide: boolean;
    close: boolean;
    comment: boolean;
    write: boolean;
    send: boolean;
    withdraw: boolean;
    restate: boolean;
  };
  history: readonly HistoryRound[];
}

/** A line and the version of it that was seen. */
export interface SeenPair {
  lineId: string;
  versionId: string;
}

const RANKS: readonly Rank[] = ["block", "look", "clean"];

const groupKey = (line: Pick<PageLine, "speciesId" | "sourceId">): string =>
  line.sourceId !== null ? `source-${line.sourceId}` : `species-${line.speciesId ?? ""}`;

interface Grouped {
  id: string;
  rank: Rank;
  lines: PageLine[];
  findings: PageFinding[];
}

/** Groups lines by what they are about, the gravest first, otherwise in the order of the revision. */
function groupLines(lines: readonly PageLine[], findings: readonly PageFinding[]): Grouped[] {
  const groups = new Map<string, Grouped>();
  for (const line of lines) {
    const id = groupKey(line);
    const group = groups.get(id) ?? { id, rank: "clean", lines: [], findings: [] };
    group.lines.push(line);
    groups.set(id, group);
  }
  for (const finding of findings) {
    const group = groups.get(`species-${finding.speciesId}`);
    if (!group) continue;
    group.findings.push(finding);
    // A finding that was set aside keeps its species in place, so that nothing jumps while somebody decides.
    const rank = finding.severity === "remark" ? "clean" : finding.severity;
    if (RANKS.indexOf(rank) < RANKS.indexOf(group.rank)) group.rank = rank;
  }
  const order = (line: PageLine): number => (line.property ? PROPERTIES.indexOf(line.property) + 1 : 0);
  for (const group of groups.values()) group.lines.sort((a, b) => order(a) - order(b) || a.position - b.position);
  return [...groups.values()].sort((a, b) => RANKS.indexOf(a.rank) - RANKS.indexOf(b.rank));
}

/**
 * The lines that can be accepted together without a look at each: open, not overtaken, not behind another accepted line,
 * not the viewer's own, of a species (or source) of which no line blocks, asks for a look or was declined.
 */
export function cleanLines(input: Pick<RevisionPageInput, "lines" | "findings" | "hands">): readonly SeenPair[] {
  return cleanOf(groupLines(input.lines, input.findings), input.hands);
}

function cleanOf(groups: readonly Grouped[], hands: ReadonlySet<string>): SeenPair[] {
  return groups
    .filter((group) => group.rank === "clean" && group.lines.every((line) => line.state !== "declined"))
    .flatMap((group) => group.lines)
    .filter((line) => line.state === "open" && !line.overtaken && line.behind === null && !hands.has(line.id))
    .map((line) => ({ lineId: line.id, versionId: line.versionId }));
}

/** Shapes the page. */
export function revisionPage(input: RevisionPageInput): RevisionPage {
  const { revision, lines, findings, moves, hands, rights } = input;
  const inReview = revision.state === "in_review";
  const writable = isWritable(revision.state) && rights.write;
  const groups = groupLines(lines, findings);
  const rounds = roundsOf(moves);
  const threads = threadsOf(input.comments, moves, revision.madeBy);
  const changed = roundChanges({
    ...input,
    state: revision.state,
    rounds,
    threads,
    aboutOf: (line) => aboutOf(line, input.names),
    figureOf,
    textChanges: (before, after) => textChanges(storedContent(before), after, input.printCitation),
  });
  const chosen: Record<Show, (line: PageLine) => boolean> = {
    all: () => true,
    open: (line) => line.state === "open",
    changed: idsAmong([...(changed?.edited ?? []), ...(changed?.added ?? [])].map((one) => one.id)),
    overtaken: (line) => line.overtaken,
    unanswered: idsAmong(threads.flatMap((thread) => (thread.waits && thread.lineId !== null ? [thread.lineId] : []))),
  };
  const context = lineContext(input, rounds, threads, writable, inReview && rights.decide);
  const pages = pagesOf(groups.filter((group) => group.lines.some(chosen[input.show])));
  const page = Math.min(Math.max(input.page, 1), pages.length);
  const shown = pages[page - 1] ?? { groups: [], from: 0, to: 0 };
  const count = (state: PageLine["state"]): number => lines.filter((line) => line.state === state).length;
  const standing = findings.filter((finding) => !finding.setAside);
  const cleanSet = inReview && rights.decide ? cleanOf(groups, hands) : [];
  const overtaken = lines.filter((line) => line.overtaken).length;
  const open = count("open");
  const last = moves.at(-1);
  return {
    revision,
    newest: input.newest,
    sent: lastMove(moves, "in_review"),
    ended: last && last.to !== "in_review" ? { to: last.to, at: last.at, by: last.by, remark: last.remark } : null,
    publishedIn: [...new Set(lines.map((line) => line.publishedIn).filter((edition) => edition !== null))],
    rounds,
    changed,
    threads: threads.filter((thread) => thread.lineId === null),
    unanswered: unansweredOf(threads, lines, input.names),
    wentInto: input.wentInto,
    show: input.show,
    shows: {
      all: lines.length,
      open,
      changed: lines.filter(chosen.changed).length,
      overtaken,
      unanswered: lines.filter(chosen.unanswered).length,
    },
    groups: shown.groups.map((group) => groupView(group, context)),
    pages: { page, pages: pages.length, from: shown.from, to: shown.to },
    counts: {
      lines: lines.length,
      open,
      accepted: count("accepted") + count("published"),
      declined: count("declined"),
      overtaken,
      blocks: standing.filter((finding) => finding.severity === "block").length,
      looks: standing.filter((finding) => finding.severity === "look").length,
      clean: groups.filter((group) => group.rank === "clean").reduce((sum, group) => sum + group.lines.length, 0),
    },
    cleanSet: { count: cleanSet.length, seen: cleanSet },
    own: hands.size,
    may: {
      decide: inReview && rights.decide,
      close: inReview && rights.decide && open === 0 && hands.size === 0 && lines.length > 0,
      comment: rights.comment && revision.state !== "withdrawn",
      write: writable,
      send: writable && lines.length > 0,
      withdraw: rights.write && ["draft", "in_review", "returned"].includes(revision.state),
      restate: writable && overtaken > 0,
    },
    history: historyOf(input, (line) => aboutOf(line, input.names)),
  };
}

function idsAmong(ids: readonly string[]): (line: PageLine) => boolean {
  const among = new Set(ids);
  return (line) => among.has(line.id);
}

function unansweredOf(
  threads: readonly Thread[],
  lines: readonly PageLine[],
  names: RevisionPageInput["names"],
): RevisionPage["unanswered"] {
  const byId = new Map(lines.map((line) => [line.id, line]));
  return threads
    .filter((thread) => thread.waits)
    .map(({ lineId }) => {
      const line = lineId === null ? undefined : byId.get(lineId);
      return { lineId: line ? lineId : null, about: line ? aboutOf(line, names) : null };
    });
}

/** An earlier version of a line in the shape of what stood, so that the two can be compared word by word. */
function storedContent(content: LineContent): StoodContent | undefined {
  return content.kind === "detail" || content.kind === "source" ? content : undefined;
}

function lastMove(moves: readonly PageMove[], to: string): RevisionPage["sent"] {
  const move = moves.findLast((one) => one.to === to);
  return move ? { at: move.at, by: move.by, remark: move.remark } : null;
}

function pagesOf(groups: readonly Grouped[]): { groups: Grouped[]; from: number; to: number }[] {
  const pages: { groups: Grouped[]; from: number; to: number }[] = [];
  let held = LINES_A_PAGE;
  let total = 0;
  for (const group of groups) {
    if (held >= LINES_A_PAGE) {
      pages.push({ groups: [], from: total + 1, to: total });
      held = 0;
    }
    const current = pages.at(-1);
    if (!current) continue;
    current.groups.push(group);
    held += group.lines.length;
    total += group.lines.length;
    current.to = total;
  }
  return pages.length > 0 ? pages : [{ groups: [], from: 0, to: 0 }];
}

interface LineContext {
  input: RevisionPageInput;
  writable: boolean;
  decides: boolean;
  decisions: ReadonlyMap<string, PageDecision[]>;
  versions: ReadonlyMap<string, PageVersion[]>;
  threads: ReadonlyMap<string, Thread[]>;
  rounds: readonly Round[];
}

function lineContext(
  input: RevisionPageInput,
  rounds: readonly Round[],
  threads: readonly Thread[],
  writable: boolean,
  decides: boolean,
): LineContext {
  return {
    input,
    rounds,
    writable,
    decides,
    decisions: byLine(input.decisions),
    versions: byLine(input.versions),
    threads: byLine(threads),
  };
}

function groupView(group: Grouped, context: LineContext): LineGroup {
  const [first] = group.lines;
  const { names, citations, hands } = context.input;
  const named = first?.speciesId ? names.get(first.speciesId) : undefined;
  const ownSpecies = group.lines.some((line) => hands.has(line.id));
  const views = group.lines.map((line, index) => {
    // What a check says of the species as a whole, or of a value that stands, is printed under its first line.
    const own = group.findings.filter((finding) =>
      finding.lineId === null || !group.lines.some((one) => one.id === finding.lineId)
        ? index === 0
        : finding.lineId === line.id,
    );
    return lineView(line, own, group, context, ownSpecies);
  });
  const together = views.filter((line) => line.mayAccept && line.state === "open");
  return {
    id: group.id,
    speciesKey: named?.key ?? null,
    name: named?.name ?? (first?.sourceId ? (citations.get(first.sourceId)?.short ?? first.sourceId) : ""),
    stands: named?.stands ?? false,
    rank: group.rank,
    lines: views,
    together: together.length > 1 ? together.map((line) => `${line.id}:${line.versionId}`) : [],
    inPart: inPartOf(group.lines),
  };
}

function inPartOf(lines: readonly PageLine[]): LineGroup["inPart"] {
  const count = (state: PageLine["state"]): number => lines.filter((line) => line.state === state).length;
  const counts = { accepted: count("accepted"), declined: count("declined"), open: count("open") };
  return counts.accepted > 0 && counts.accepted < lines.length && counts.declined + counts.open > 0 ? counts : null;
}

function lineView(
  line: PageLine,
  findings: readonly PageFinding[],
  group: Grouped,
  context: LineContext,
  ownSpecies: boolean,
): LineView {
  const { input, writable, decides } = context;
  const { content } = line;
  const stood = input.stood.get(line.id);
  const before = figureOf(stood?.content);
  const after = figureOf(content);
  const decisions = context.decisions.get(line.id) ?? [];
  const versions = context.versions.get(line.id) ?? [];
  const standing = findings.filter((finding) => !finding.setAside);
  const own = input.hands.has(line.id);
  const current = decisions.filter((one) => !one.void).at(-1);
  const mayDecide = decides && !own && ["open", "accepted", "declined"].includes(line.state);
  const sourceId = content.kind === "value" ? content.sourceId : null;
  const sourceBefore = stood?.content.kind === "value" ? stood.content.sourceId : null;
  const about = aboutOf(line, input.names);
  return {
    id: line.id,
    versionId: line.versionId,
    version: line.version,
    kind: line.kind,
    speciesKey: (line.speciesId && input.names.get(line.speciesId)?.key) ?? null,
    property: line.property,
    about,
    state: line.state,
    publishedIn: line.publishedIn,
    mark: worst(standing),
    hasSetAside: findings.length > standing.length,
    stood: before,
    stoodWaitsIn: stood?.waitsIn ?? null,
    proposed: after,
    difference: before && after ? subtract(after.digits, before.digits) : null,
    normalizedError: before && after ? normalizedError(after, before) : null,
    changes: textChanges(stood?.content, content, input.printCitation),
    withdrawalReason: content.kind === "withdrawal" ? content.reason : null,
    given: content.kind === "value" ? content.given : null,
    source: sourceId === null ? null : (input.citations.get(sourceId) ?? { short: sourceId, full: sourceId }),
    sourceBefore:
      sourceBefore !== null && sourceBefore !== sourceId
        ? (input.citations.get(sourceBefore)?.short ?? sourceBefore)
        : null,
    method: content.kind === "value" ? content.method : null,
    remark: content.kind === "value" ? content.remark : null,
    rowNumber: line.rowNumber,
    own,
    overtaken: line.overtaken ? overtakenSentence(input.now.get(line.id), line.property) : null,
    behind: line.overtaken ? null : line.behind,
    now: line.overtaken ? nowView(input.now.get(line.id)) : null,
    decision: current ? decisionView(current, context.rounds) : null,
    voided: decisions.filter((one) => one.void).map((one) => decisionView(one, context.rounds)),
    versions:
      versions.length > 1 || versions.some((version) => version.reason !== "")
        ? versions.map(({ version, content: said, by, at, reason }) => ({
            version,
            figure: figureOf(said),
            by,
            at,
            reason,
          }))
        : [],
    threads: context.threads.get(line.id) ?? [],
    cameFrom: line.cameFrom,
    findings: findings.map((finding) => findingView(finding, group, context, ownSpecies)),
    mayAccept: mayDecide && !line.overtaken && line.behind === null && line.state !== "accepted",
    mayDecline: mayDecide && line.state !== "declined",
    mayEdit: writable && line.kind === "value",
    mayTakeOut: writable,
    mayRestate: writable && line.overtaken,
  };
}

function decisionView({ decision, reason, by, at, version }: PageDecision, rounds: readonly Round[]): DecisionView {
  return { round: roundAt(rounds, at), decision, reason, by, at, version };
}

function nowView(now: Stood | undefined): LineView["now"] {
  return now ? { figure: figureOf(now.content), since: now.since, waitsIn: now.waitsIn } : null;
}

function findingView(finding: PageFinding, group: Grouped, context: LineContext, ownSpecies: boolean): FindingView {
  const { id, check, title, severity, sentence, arithmetic, setAside } = finding;
  const key = context.input.names.get(finding.speciesId)?.key ?? "";
  return {
    id,
    check,
    title,
    severity,
    sentence,
    arithmetic,
    setAside,
    maySetAside: context.decides && severity === "block" && !setAside && !ownSpecies,
    suggestions: finding.suggestions.map((suggestion, index) => {
      const repairs = context.writable ? repairsOf(suggestion, group.lines) : null;
      return {
        property: suggestion.property,
        becomes: suggestion.becomes,
        slip: suggestion.slip,
        sentence: suggestion.sentence,
        takes: repairs && { index, seen: repairs.map(({ line }) => `${line.id}:${line.versionId}`) },
        asRemark: `${key}: ${finding.sentence} ${suggestion.sentence}`,
      };
    }),
  };
}

/** One value that taking a suggestion would change, and the line that says it. */
export interface LineRepair<Line> {
  line: Line;
  becomes: string;
}

/**
 * The lines that taking a suggestion rewrites.
 * @returns null when the slip is not in a value, or in one that this revision has no line for
 */
export function repairsOf<Line extends Pick<PageLine, "kind" | "property">>(
  suggestion: Pick<Suggestion, "property" | "becomes" | "also">,
  lines: readonly Line[],
): LineRepair<Line>[] | null {
  if (suggestion.property === null) return null;
  const wanted = [{ property: suggestion.property, becomes: suggestion.becomes }, ...suggestion.also];
  const repairs = wanted.flatMap(({ property, becomes }) => {
    const line = lines.find((one) => one.kind === "value" && one.property === property);
    return line ? [{ line, becomes }] : [];
  });
  return repairs.length === wanted.length ? repairs : null;
}

function worst(findings: readonly { severity: Severity }[]): Severity | null {
  const order: readonly Severity[] = ["block", "look", "remark"];
  return order.find((severity) => findings.some((finding) => finding.severity === severity)) ?? null;
}

/** What a line is about in plain text: "NH3(g) ΔfH°", "what NH3(g) is called". */
export function aboutOf(
  line: Pick<PageLine, "kind" | "speciesId" | "property" | "sourceId">,
  names: RevisionPageInput["names"],
): string {
  if (line.kind === "source") return "the source";
  const key = (line.speciesId && names.get(line.speciesId)?.key) ?? "a species";
  return line.property ? `${key} ${propertyInfo[line.property].symbol}` : `the name of ${key}`;
}

/** The figure that a content holds, where it holds one. */
export function figureOf(content: StoodContent | LineContent | undefined): ShownFigure | null {
  return content?.kind === "value" ? { digits: content.digits, uncertainty: content.uncertainty } : null;
}

function overtakenSentence(now: Stood | undefined, property: Property | null): string {
  const figure = figureOf(now?.content);
  const says = figure && property ? ` (${showDigits(figure.digits)} ${propertyInfo[property].unit})` : "";
  if (now?.waitsIn) {
    return now.content.kind === "withdrawal"
      ? `Revision ${now.waitsIn} takes out what stands here; it was accepted since this line was written and waits for the next edition.`
      : `Another proposal for this place${says} was accepted since and waits in revision ${now.waitsIn}.`;
  }
  if (now?.since) return `Edition ${now.since} changed what stands here${says} since this line was written.`;
  return "What stood here when this line was written has gone out of the table since.";
}

const DETAIL_FIELDS = [
  ["name", "name"],
  ["key", "key"],
  ["printed", "formula"],
  ["label", "form"],
  ["cas", "CAS"],
  ["inchikey", "InChIKey"],
  ["synonyms", "also called"],
] as const;

const SOURCE_KINDS: Record<SourceKind, string> = {
  measurement: "measurement",
  evaluation: "evaluation",
  calculation: "calculation",
  estimate: "estimate",
};

/** What a line that says words changes, field by field; empty for values. */
export function textChanges(
  before: StoodContent | undefined,
  after: LineContent,
  printCitation: RevisionPageInput["printCitation"],
): TextChange[] {
  const fields = (content: StoodContent | LineContent): (readonly [string, string | null])[] => {
    if (content.kind === "detail") {
      return DETAIL_FIELDS.map(([name, label]) => {
        const said = content[name];
        return [label, typeof said === "string" || said === null ? said : said.join(", ")];
      });
    }
    if (content.kind === "source") {
      return [
        ["citation", printCitation(content.citation)],
        ["DOI", content.doi],
        ["kind", SOURCE_KINDS[content.sourceKind]],
        ["notice", content.notice],
        ["remark", noteOf(content.citation)],
      ];
    }
    return [];
  };
  const stood = new Map(before && before.kind === after.kind ? fields(before) : []);
  // The row's own head says the key of a species that is new.
  const told = after.kind === "detail" && stood.size === 0 ? after.key : null;
  return fields(after)
    .map(([label, said]) => ({ label, before: stood.get(label) || null, after: said || null }))
    .filter((change) => change.before !== change.after)
    .filter((change) => told === null || change.after === null || !told.startsWith(change.after))
    .map(wordByWord);
}

/** Registry numbers and keys are read whole: one letter more or less is another one. */
const READ_WHOLE: readonly string[] = ["key", "formula", "form", "CAS", "InChIKey", "DOI", "kind"];

function wordByWord(change: TextChange): TextChange {
  const { label, before, after } = change;
  if (before === null || after === null || READ_WHOLE.includes(label)) return change;
  const runs = wordRuns({ field: label, before, after });
  return runs.some((run) => run.kind === "same" && run.text.trim() !== "") ? { ...change, runs } : change;
}
