import { saysTheSame } from "./content.ts";
import type {
  PageComment,
  PageDecision,
  PageLine,
  PageMove,
  PageVersion,
  RevisionPageInput,
  ShownFigure,
  TextChange,
} from "./revisionPage.ts";
import type { RevisionState } from "./states.ts";
import type { Thread } from "./threads.ts";

/*
 * The rounds of a revision: every sending begins one. What changed since the round before is read from the versions of the
 * lines, the steps of the revision and the two examinations made on sending; nothing of it is stored. Pure.
 */

/** One round: when it was sent, and how it ended. */
export interface Round {
  round: number;
  sentAt: Date;
  by: string;
  outcome: "returned" | "decided" | "withdrawn" | null;
  endedAt: Date | null;
  endedBy: string | null;
}

/** The rounds of a revision, oldest first; none before it is sent. */
export function roundsOf(moves: readonly PageMove[]): Round[] {
  const rounds: Round[] = [];
  for (const move of moves) {
    const open = rounds.at(-1);
    if (move.to === "in_review") {
      rounds.push({
        round: rounds.length + 1,
        sentAt: move.at,
        by: move.by,
        outcome: null,
        endedAt: null,
        endedBy: null,
      });
    } else if (open?.outcome === null && (move.to === "returned" || move.to === "decided" || move.to === "withdrawn")) {
      open.outcome = move.to;
      open.endedAt = move.at;
      open.endedBy = move.by;
    }
  }
  return rounds;
}

/** In which round something was done; 0 is the time before the first sending. */
export function roundAt(rounds: readonly Pick<Round, "sentAt">[], at: Date): number {
  return rounds.filter((round) => round.sentAt.getTime() <= at.getTime()).length;
}

/**
 * The round against which changes are shown: in review the one before the newest, after a return the newest itself.
 * @returns undefined where there is nothing to compare with
 */
export function comparedRound(state: RevisionState, rounds: readonly Round[]): Round | undefined {
  if (state === "in_review") return rounds.at(-2);
  return state === "returned" ? rounds.at(-1) : undefined;
}

/** A finding in what it says; two examinations are compared by it. */
export interface FindingText {
  check: string;
  title: string;
  severity: "block" | "look" | "remark";
  speciesId: string;
  sentence: string;
}

export interface EditedLine {
  id: string;
  about: string;
  before: ShownFigure | null;
  after: ShownFigure | null;
  /** What is said in words, field by field. */
  changes: readonly TextChange[];
  /** Whether it says what it said, and was written anew against what stands or waits now. */
  restated: boolean;
  by: string;
  reason: string;
  /** The decision that the edit made void. */
  decided: { decision: "accept" | "decline"; round: number } | null;
}

export interface AddedLine {
  id: string;
  about: string;
  figure: ShownFigure | null;
  /** The revision it was taken over from. */
  from: number | null;
}

export interface TakenOutLine {
  id: string;
  about: string;
  figure: ShownFigure | null;
  by: string;
  reason: string;
}

/** What changed since a round. */
export interface RoundChanges {
  since: number;
  edited: readonly EditedLine[];
  takenOut: readonly TakenOutLine[];
  added: readonly AddedLine[];
  /** Comments that got an answer. */
  answers: readonly (Thread & { about: string | null })[];
  findings: { gone: readonly FindingText[]; come: readonly FindingText[] };
  /** Lines decided in an earlier round and untouched since: they stay decided. */
  kept: number;
}

/** What the comparison needs to read, and the two words for a line that the page has. */
export interface RoundChangesInput {
  state: RevisionState;
  rounds: readonly Round[];
  lines: readonly PageLine[];
  takenOut: RevisionPageInput["takenOut"];
  versions: readonly PageVersion[];
  decisions: readonly PageDecision[];
  comments: readonly PageComment[];
  threads: readonly Thread[];
  /** Of the examination made when the compared round was sent, and of the newest one. */
  findingsBefore: readonly FindingText[];
  findings: readonly FindingText[];
  aboutOf: (line: PageLine) => string;
  figureOf: (content: PageLine["content"]) => ShownFigure | null;
  textChanges: (before: PageLine["content"], after: PageLine["content"]) => TextChange[];
}

/** Compares a revision with what it was when the round before was sent; null where there is no such round. */
export function roundChanges(input: RoundChangesInput): RoundChanges | null {
  const compared = comparedRound(input.state, input.rounds);
  if (!compared) return null;
  const since = compared.sentAt.getTime();
  const isBefore = (at: Date): boolean => at.getTime() <= since;
  const versions = byLine(input.versions);
  const decisions = byLine(input.decisions);
  const lastSent = input.rounds.at(-1)?.sentAt.getTime() ?? since;

  const added: AddedLine[] = [];
  const edited: EditedLine[] = [];
  let kept = 0;
  for (const line of input.lines) {
    const all = versions.get(line.id) ?? [];
    const then = all.findLast((version) => isBefore(version.at));
    const cameSince = line.cameAt !== null && !isBefore(line.cameAt);
    if (!then || cameSince) {
      added.push({
        id: line.id,
        about: input.aboutOf(line),
        figure: input.figureOf(line.content),
        from: cameSince ? line.cameFrom : null,
      });
      continue;
    }
    const current = decisions.get(line.id)?.findLast((decision) => !decision.void);
    if (then.version === line.version) {
      if (current && (current.at.getTime() < lastSent || input.state === "returned")) kept += 1;
      continue;
    }
    const newest = all.at(-1) ?? then;
    const voided = decisions.get(line.id)?.findLast((decision) => decision.void && decision.version <= then.version);
    edited.push({
      id: line.id,
      about: input.aboutOf(line),
      before: input.figureOf(then.content),
      after: input.figureOf(line.content),
      changes: input.textChanges(then.content, line.content),
      restated: saysTheSame(then.content, line.content),
      by: newest.by,
      reason: newest.reason,
      decided: voided ? { decision: voided.decision, round: roundAt(input.rounds, voided.at) } : null,
    });
  }
  const said = (finding: FindingText): string => JSON.stringify([finding.check, finding.speciesId, finding.sentence]);
  const before = new Set(input.findingsBefore.map(said));
  const now = new Set(input.findings.map(said));
  const grave = (finding: FindingText): boolean => finding.severity !== "remark";
  const answeredSince = new Set(
    input.comments.flatMap((comment) => (comment.answers !== null && !isBefore(comment.at) ? [comment.answers] : [])),
  );
  const byId = new Map(input.lines.map((line) => [line.id, line]));
  return {
    since: compared.round,
    edited,
    added,
    takenOut: input.takenOut
      .filter((one) => !isBefore(one.at))
      .map(({ line, by, reason }) => ({
        id: line.id,
        about: input.aboutOf(line),
        figure: input.figureOf(line.content),
        by,
        reason,
      })),
    answers: input.threads
      .filter((thread) => answeredSince.has(thread.id))
      .map((thread) => {
        const line = thread.lineId === null ? undefined : byId.get(thread.lineId);
        return { ...thread, about: line ? input.aboutOf(line) : null };
      }),
    findings: {
      gone: input.findingsBefore.filter((finding) => grave(finding) && !now.has(said(finding))),
      come: input.findings.filter((finding) => grave(finding) && !before.has(said(finding))),
    },
    kept,
  };
}

/** Rows by the line they are about, in their order. */
export function byLine<Row extends { lineId: string | null }>(rows: readonly Row[]): Map<string, Row[]> {
  const map = new Map<string, Row[]>();
  for (const row of rows) {
    if (row.lineId === null) continue;
    const list = map.get(row.lineId);
    if (list) list.push(row);
    else map.set(row.lineId, [row]);
  }
  return map;
}
