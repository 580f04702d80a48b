import type { LineContent } from "./content.ts";
import type {
  PageComment,
  PageDecision,
  PageLine,
  PageMove,
  PageVersion,
  RevisionRow,
  ShownFigure,
} from "./revisionPage.ts";
import { isRemark } from "./threads.ts";

/*
 * What happened to a revision, told in rounds: every sending, return, comment, edit and decision in its order. Decisions
 * that one person made in one go are told in one entry, and what an edit made void stays visible as void.
 */

/** Lines named one by one in an entry; beyond it, their number is enough. */
const NAMED_LINES = 6;

/** Decisions of one person further apart than this, in milliseconds, are told apart. */
const ONE_GO = 10 * 60 * 1000;

export interface HistoryEntry {
  at: Date;
  by: string;
  /** What was done, in words: "accepted 12 lines". */
  did: string;
  /** What the person wrote with it. */
  words: string | null;
  /** The lines it is about, by what they are about; at most six. */
  lines: readonly { id: string; about: string }[];
  /** How many lines more. */
  more: number;
  /** What stood on the line before and after an edit. */
  before: ShownFigure | null;
  after: ShownFigure | null;
  /** How many of its decisions no longer count because the line was edited afterwards. */
  voided: number;
}

/** What happened between one sending and the next. Round 0 is the time before the first sending. */
export interface HistoryRound {
  round: number;
  entries: readonly HistoryEntry[];
}

export interface HistoryInput {
  revision: Pick<RevisionRow, "madeByName" | "madeAt">;
  lines: readonly PageLine[];
  takenOut: readonly { line: PageLine; reason: string; at: Date; by: string }[];
  decisions: readonly PageDecision[];
  versions: readonly PageVersion[];
  comments: readonly PageComment[];
  moves: readonly PageMove[];
  setAsides: readonly { sentence: string; reason: string; at: Date; by: string }[];
  takenOver: readonly { from: number; lines: number; at: Date; by: string }[];
}

const MOVE_WORDS: Record<string, string> = {
  in_review: "sent it to review",
  returned: "returned it",
  decided: "closed the review",
  withdrawn: "withdrew it",
};

interface Timed {
  at: number;
  /** 1 where a new round begins with it. */
  opens: number;
  entry: HistoryEntry;
}

/** Tells the history of a revision. `aboutOf` says in a few words what a line is about. */
export function historyOf(input: HistoryInput, aboutOf: (line: PageLine) => string): HistoryRound[] {
  const lines = new Map(input.lines.map((line) => [line.id, line]));
  const named = (ids: readonly string[]) => ({
    lines: ids.slice(0, NAMED_LINES).flatMap((id) => {
      const line = lines.get(id);
      return line ? [{ id, about: aboutOf(line) }] : [];
    }),
    more: Math.max(0, ids.length - NAMED_LINES),
  });
  const roundAt = (at: Date): number =>
    input.moves.filter((move) => move.to === "in_review" && move.at.getTime() <= at.getTime()).length;
  const timed: Timed[] = [];
  const tell = (at: Date, by: string, did: string, rest: Partial<HistoryEntry> = {}, opens = 0): void => {
    timed.push({
      at: at.getTime(),
      opens,
      entry: { at, by, did, words: null, lines: [], more: 0, before: null, after: null, voided: 0, ...rest },
    });
  };

  tell(input.revision.madeAt, input.revision.madeByName, "began it");
  for (const move of input.moves) {
    const opens = move.to === "in_review" ? 1 : 0;
    tell(move.at, move.by, MOVE_WORDS[move.to] ?? move.to, { words: move.remark.trim() || null }, opens);
  }
  for (const comment of input.comments) {
    // A remark with which the revision was sent or returned is kept as a comment too; it is told once.
    if (isRemark(comment, input.moves)) continue;
    const did = comment.answers === null ? "wrote" : "answered";
    tell(comment.at, comment.by, did, { words: comment.body, ...named(comment.lineId ? [comment.lineId] : []) });
  }
  for (const run of runs(
    input.decisions,
    (a, b) =>
      a.by === b.by &&
      a.decision === b.decision &&
      a.reason === b.reason &&
      near(a, b) &&
      roundAt(a.at) === roundAt(b.at),
  )) {
    const [first] = run;
    if (!first) continue;
    const did = `${first.decision === "accept" ? "accepted" : "declined"} ${countOf(run.length)}`;
    tell(first.at, first.by, did, {
      words: first.reason.trim() || null,
      voided: run.filter((one) => one.void).length,
      ...named(run.map((one) => one.lineId)),
    });
  }
  for (const { from, lines: taken, at, by } of input.takenOver) {
    tell(at, by, `took ${taken === 1 ? "a line" : `${taken} lines`} over from revision ${from}`);
  }
  tellEdits(input.versions, named, tell);
  for (const { sentence, reason, at, by } of input.setAsides) {
    tell(at, by, `set a finding aside: ${sentence}`, { words: reason });
  }
  for (const { line, reason, at, by } of input.takenOut) {
    const { content } = line;
    tell(at, by, `took out ${aboutOf(line)}`, {
      words: reason,
      before: content.kind === "value" ? { digits: content.digits, uncertainty: content.uncertainty } : null,
    });
  }

  timed.sort((a, b) => a.at - b.at);
  const rounds: { round: number; entries: HistoryEntry[] }[] = [{ round: 0, entries: [] }];
  for (const { entry, opens } of timed) {
    if (opens) rounds.push({ round: rounds.length, entries: [] });
    rounds.at(-1)?.entries.push(entry);
  }
  return rounds;
}

type Tell = (at: Date, by: string, did: string, rest?: Partial<HistoryEntry>) => void;
type Named = (ids: readonly string[]) => Pick<HistoryEntry, "lines" | "more">;

function tellEdits(versions: readonly PageVersion[], named: Named, tell: Tell): void {
  const before = new Map<string, LineContent>();
  const edits = versions.flatMap((version) => {
    const earlier = before.get(version.lineId);
    before.set(version.lineId, version.content);
    return earlier ? [{ ...version, earlier }] : [];
  });
  for (const run of runs(edits, (a, b) => a.by === b.by && a.reason === b.reason && same(a) && same(b) && near(a, b))) {
    const [first] = run;
    if (!first) continue;
    const words = first.reason.trim() || null;
    const about = named(run.map((one) => one.lineId));
    // The same content again is a line written anew against what stands now.
    if (same(first)) tell(first.at, first.by, `wrote ${countOf(run.length)} anew`, { words, ...about });
    else
      tell(first.at, first.by, "changed", {
        words,
        ...about,
        before: figure(first.earlier),
        after: figure(first.content),
      });
  }
}

/** Done in one go, or nearly. */
function near(a: { at: Date }, b: { at: Date }): boolean {
  return Math.abs(a.at.getTime() - b.at.getTime()) < ONE_GO;
}

function same(edit: { earlier: LineContent; content: LineContent }): boolean {
  return JSON.stringify(edit.earlier) === JSON.stringify(edit.content);
}

function figure(content: LineContent): ShownFigure | null {
  return content.kind === "value" ? { digits: content.digits, uncertainty: content.uncertainty } : null;
}

function countOf(lines: number): string {
  return lines === 1 ? "a line" : `${lines} lines`;
}

/** Neighbours that belong together, as lists. */
function runs<T>(items: readonly T[], together: (a: T, b: T) => boolean): T[][] {
  const lists: T[][] = [];
  for (const item of items) {
    const current = lists.at(-1);
    const last = current?.at(-1);
    if (current && last !== undefined && together(last, item)) current.push(item);
    else lists.push([item]);
  }
  return lists;
}
