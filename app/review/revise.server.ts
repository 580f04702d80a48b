import type { ActScope } from "#app/audit/act.server.ts";
import { act } from "#app/audit/act.server.ts";
import { database } from "#app/db/database.server.ts";
import { Invalid, NotFound, Refused } from "#app/http/errors.ts";
import { enqueueLetter } from "#app/notify/letters.server.ts";
import { revisionSentLetter } from "#app/notify/reviewLetters.ts";
import { demand } from "#app/people/permissions.ts";
import { findPeopleWithRole } from "#app/people/people.queries.server.ts";
import type { Acting } from "#app/people/person.ts";
import { contentHash, type LineContent, saysTheSame } from "./content.ts";
import { examineRevision } from "./examine.server.ts";
import {
  findComments,
  findLine,
  findLineBases,
  findLines,
  findMoves,
  findRevisionForUpdate,
  insertComment,
  insertLineVersion,
  insertLines,
  insertRevision,
  type LineBase,
  type LineRow,
  type NewLine,
  updateLineBase,
  updateLinesDropped,
  updateRevisionState,
  updateRevisionText,
} from "./review.queries.server.ts";
import { findVersionContents } from "./revisionPage.queries.server.ts";
import { isWritable, mayMove, revisionStateWords } from "./states.ts";
import { threadsOf } from "./threads.ts";

export type { NewLine } from "./review.queries.server.ts";

/** What a new revision is made of. */
export interface RevisionDraft {
  title: string;
  summary: string;
  sheetId: number | null;
  lines: readonly NewLine[];
}

/**
 * Inserts a revision with its lines and examines it, inside the caller's act (a sheet being built, a change begun on a
 * species page). Answers the revision's number.
 */
export async function insertRevisionWithLines(acting: Acting, draft: RevisionDraft, scope: ActScope): Promise<number> {
  demand(acting, "revision:write");
  const id = await insertRevision({ ...draft, madeBy: acting.person.id }, scope.trx);
  await insertLines(id, draft.lines, acting.person.id, scope.trx);
  const { findings } = await examineRevision(id, "build", scope.trx);
  scope.record({
    act: "revision.begun",
    objectId: id,
    detail: { title: draft.title, sheet: draft.sheetId, lines: draft.lines.length, findings: findings.length },
  });
  return id;
}

/** The revision, if it exists and this person may write in it now. */
export async function findWritable(acting: Acting, id: number, trx: ActScope["trx"]) {
  demand(acting, "revision:write");
  const revision = await findRevisionForUpdate(id, trx);
  if (!revision) throw new NotFound(`There is no revision ${id}.`);
  if (!isWritable(revision.state)) {
    throw new Refused(
      `Revision ${id} is ${revisionStateWords[revision.state]}; its lines are written only while it is a draft or was returned.`,
    );
  }
  return revision;
}

/** A line of this revision that was not taken out. @throws NotFound */
export async function findOwnLine(revisionId: number, lineId: string, trx: ActScope["trx"]): Promise<LineRow> {
  const line = await findLine(lineId, trx);
  if (!line || line.revisionId !== revisionId || line.state === "dropped") {
    throw new NotFound(`Revision ${revisionId} has no such line.`);
  }
  return line;
}

/**
 * Gives a line a new version: a mended value, a suggestion taken. The decision on the version before is void, and the
 * revision is examined again. `expectedVersion` is the version the person saw.
 * @throws Refused when the line was edited in the meantime; Invalid when nothing changes.
 */
export async function rewriteLine(acting: Acting, change: LineChange): Promise<void> {
  await act(acting, (scope) => writeLine(acting, change, scope));
}

/** What a line shall say, and which version of it the person saw. */
export interface LineChange {
  revisionId: number;
  lineId: string;
  expectedVersion: number;
  content: LineContent;
  reason: string;
}

/** The same inside a caller's act. */
export async function writeLine(acting: Acting, change: LineChange, { trx, record }: ActScope): Promise<void> {
  await findWritable(acting, change.revisionId, trx);
  const written = await insertChange(acting, change, trx);
  await examineRevision(change.revisionId, "edit", trx);
  record({ act: "revision.line-written", objectId: change.revisionId, detail: { ...written, reason: change.reason } });
}

/**
 * Gives several lines of one revision a new version in one act: a slip that touched two values is mended as a whole or
 * not at all, and stands in the record once.
 * @throws what `rewriteLine` throws, for the first line that is refused
 */
export async function rewriteLines(
  acting: Acting,
  revisionId: number,
  changes: readonly Omit<LineChange, "revisionId">[],
): Promise<void> {
  await act(acting, async ({ trx, record }) => {
    await findWritable(acting, revisionId, trx);
    const lines: (WrittenChange & { reason: string })[] = [];
    for (const change of changes) {
      lines.push({ ...(await insertChange(acting, { ...change, revisionId }, trx)), reason: change.reason });
    }
    await examineRevision(revisionId, "edit", trx);
    const [only] = lines;
    record({
      act: "revision.line-written",
      objectId: revisionId,
      detail: lines.length === 1 && only ? { ...only } : { lines },
    });
  });
}

/** What the record says of a line that got a new version. */
interface WrittenChange {
  line: string;
  version: number;
  before: LineContent;
  after: LineContent;
}

async function insertChange(acting: Acting, change: LineChange, trx: ActScope["trx"]): Promise<WrittenChange> {
  demandReason(change.reason, "Say why the line is changed.");
  const line = await findOwnLine(change.revisionId, change.lineId, trx);
  if (line.version !== change.expectedVersion) {
    throw new Refused("This line was edited in the meantime. Look at what it says now, then change it.");
  }
  if (change.content.kind !== line.kind) throw new Invalid("A line keeps its kind; take it out and write another.");
  if (contentHash(change.content).equals(line.contentHash)) {
    throw new Invalid("Nothing would change: the line says this already.");
  }
  const version = line.version + 1;
  await insertLineVersion(
    { id: line.id, version, content: change.content, madeBy: acting.person.id, reason: change.reason },
    trx,
  );
  return { line: line.id, version, before: line.content, after: change.content };
}

function demandReason(reason: string, sentence: string): void {
  if (!reason.trim()) throw new Invalid(sentence, [{ pointer: "/reason", detail: sentence }]);
}

/** Whether a line still proposes something: declined, dropped and published ones do not. */
function isProposing(line: Pick<LineRow, "state">): boolean {
  return line.state === "open" || line.state === "accepted";
}

/** Takes a line out of a draft or returned revision; it stays on record. */
export async function takeLineOut(acting: Acting, revisionId: number, lineId: string, reason: string): Promise<void> {
  demandReason(reason, "Say why the line is taken out.");
  await act(acting, async ({ trx, record }) => {
    await findWritable(acting, revisionId, trx);
    const line = await findOwnLine(revisionId, lineId, trx);
    await updateLinesDropped([line.id], trx);
    await examineRevision(revisionId, "edit", trx);
    record({
      act: "revision.line-taken-out",
      objectId: revisionId,
      detail: { line: line.id, content: line.content, reason },
    });
  });
}

/** Whether something else stands or waits now in a line's place than what it was written against. */
export function isOvertaken(line: Pick<LineRow, "againstRow" | "againstVersion">, base: LineBase | undefined): boolean {
  const standingRow = base?.standingRow ?? null;
  const waiting = base?.waitingVersion ?? null;
  if (waiting) return waiting !== line.againstVersion;
  if (line.againstVersion) return base?.standingVersion !== line.againstVersion;
  return standingRow !== line.againstRow;
}

/** What restating came to. */
export interface Restated {
  restated: number;
  /** Overtaken lines left as they are, because what stands now says the same, or nothing is left to withdraw. */
  idle: number;
}

/**
 * Writes overtaken lines of a revision anew against what stands or waits now, and examines it again: the difference and
 * the findings are renewed, and a decision on the line before is void. A line that would change nothing any more is left.
 *
 * @param lineId the one line to restate; null for all that are overtaken
 * @throws Refused where no line is overtaken, or none of them would change anything
 */
export async function restateLines(
  acting: Acting,
  revisionId: number,
  lineId: string | null = null,
): Promise<Restated> {
  return act(acting, async ({ trx, record }) => {
    await findWritable(acting, revisionId, trx);
    if (lineId !== null) await findOwnLine(revisionId, lineId, trx);
    const lines = (await findLines(revisionId, trx)).filter((line) => lineId === null || line.id === lineId);
    const bases = await findLineBases(
      lines.map((line) => line.id),
      trx,
    );
    const overtaken = lines.filter((line) => isProposing(line) && isOvertaken(line, bases.get(line.id)));
    if (overtaken.length === 0) {
      throw new Refused(
        lineId === null
          ? "No line of this revision is overtaken."
          : "This line is not overtaken: what it was written against still stands.",
      );
    }
    const currentVersions = overtaken.flatMap((line) => versionAt(bases.get(line.id)) ?? []);
    const current = new Map((await findVersionContents(currentVersions, trx)).map((one) => [one.id, one.content]));
    const changing = overtaken.filter((line) => {
      const now = current.get(versionAt(bases.get(line.id)) ?? "");
      if (line.content.kind === "withdrawal") return now !== undefined && now.kind !== "withdrawal";
      return now === undefined || !saysTheSame(line.content, now);
    });
    if (changing.length === 0) {
      throw new Refused(
        overtaken.length === 1
          ? "Nothing would change any more: what stands or waits now says the same as this line. Take it out."
          : "Nothing would change any more: what stands or waits now says the same as these lines. Take them out.",
      );
    }
    for (const line of changing) {
      const base = bases.get(line.id);
      await updateLineBase(
        line.id,
        {
          againstRow: base?.waitingVersion ? null : (base?.standingRow ?? null),
          againstVersion: base?.waitingVersion ?? null,
        },
        trx,
      );
      await insertLineVersion(
        {
          id: line.id,
          version: line.version + 1,
          content: line.content,
          madeBy: acting.person.id,
          reason: base?.waitingRevision
            ? `restated against what waits in revision ${base.waitingRevision}`
            : "restated against what stands now",
        },
        trx,
      );
    }
    await examineRevision(revisionId, "edit", trx);
    record({
      act: "revision.lines-restated",
      objectId: revisionId,
      detail: { lines: changing.map((line) => ({ line: line.id, version: line.version + 1 })) },
    });
    return { restated: changing.length, idle: overtaken.length - changing.length };
  });
}

/** The version that stands or waits in a place now. */
const versionAt = (base: LineBase | undefined): string | null => base?.waitingVersion ?? base?.standingVersion ?? null;

/** Changes what a draft or returned revision is called. */
export async function describeRevision(
  acting: Acting,
  id: number,
  text: { title: string; summary: string },
): Promise<void> {
  await act(acting, async ({ trx, record }) => {
    const before = await findWritable(acting, id, trx);
    await updateRevisionText(id, text, trx);
    record({
      act: "revision.described",
      objectId: id,
      detail: { before: { title: before.title, summary: before.summary }, after: text },
    });
  });
}

/** Sends a draft or returned revision to review and writes to the reviewers. */
export async function sendToReview(acting: Acting, id: number, remark: string): Promise<void> {
  await act(acting, async ({ trx, record }) => {
    const revision = await findWritable(acting, id, trx);
    if (!mayMove(revision.state, "in_review")) throw new Refused(`Revision ${id} cannot be sent to review now.`);
    const lines = await findLines(id, trx);
    if (lines.length === 0)
      throw new Refused("A revision without lines has nothing to review. Add a line, then send it.");
    const { findings } = await examineRevision(id, "send", trx);
    const comments = await findComments(id, trx);
    const threads = threadsOf(comments, await findMoves(id, trx), revision.madeBy);
    const unanswered = threads.filter((thread) => thread.waits).length;
    const round = revision.round + 1;
    await updateRevisionState({ id, from: revision.state, to: "in_review", round, by: acting.person.id, remark }, trx);
    if (remark.trim()) {
      await insertComment({ revisionId: id, lineId: null, round, body: remark, writtenBy: acting.person.id }, trx);
    }
    for (const reviewer of await findPeopleWithRole("reviewer", trx)) {
      if (reviewer.id === acting.person.id) continue;
      await enqueueLetter(
        {
          kind: "revision-sent",
          toPerson: reviewer.id,
          toAddress: reviewer.email,
          ...revisionSentLetter({
            id,
            title: revision.title,
            round,
            by: acting.person.name,
            lines: lines.length,
            blocks: findings.filter((one) => one.severity === "block").length,
            unanswered,
            remark,
          }),
        },
        trx,
      );
    }
    record({ act: "revision.sent", objectId: id, detail: { round, lines: lines.length, unanswered, remark } });
  });
}

/** Withdraws a revision; its lines are dropped and stay on record. */
export async function withdrawRevision(acting: Acting, id: number, reason: string): Promise<void> {
  demandReason(reason, "Say why the revision is withdrawn.");
  await act(acting, async ({ trx, record }) => {
    demand(acting, "revision:write");
    const revision = await findRevisionForUpdate(id, trx);
    if (!revision) throw new NotFound(`There is no revision ${id}.`);
    if (!mayMove(revision.state, "withdrawn")) {
      throw new Refused(`Revision ${id} is ${revisionStateWords[revision.state]} and cannot be withdrawn.`);
    }
    const lines = await findLines(id, trx);
    await updateLinesDropped(
      lines.map((line) => line.id),
      trx,
    );
    await updateRevisionState(
      { id, from: revision.state, to: "withdrawn", round: revision.round, by: acting.person.id, remark: reason },
      trx,
    );
    record({ act: "revision.withdrawn", objectId: id, detail: { reason, lines: lines.length } });
  });
}

/** Begins a revision with hand-written lines. */
export function beginRevision(acting: Acting, draft: Omit<RevisionDraft, "sheetId">): Promise<number> {
  demand(acting, "revision:write");
  return act(acting, (scope) => insertRevisionWithLines(acting, { ...draft, sheetId: null }, scope));
}

/** The lines with what stands and waits in their places. */
export async function findLinesWithBases(revisionId: number) {
  const lines = await findLines(revisionId, database());
  const bases = await findLineBases(
    lines.map((line) => line.id),
    database(),
  );
  return lines.map((line) => ({
    ...line,
    base: bases.get(line.id),
    overtaken: line.state !== "published" && isOvertaken(line, bases.get(line.id)),
  }));
}
