import type { ActScope } from "#app/audit/act.server.ts";
import { act } from "#app/audit/act.server.ts";
import { database } from "#app/db/database.server.ts";
import { Invalid, NotFound, Refused } from "#app/http/errors.ts";
import { enqueueLetter } from "#app/notify/letters.server.ts";
import { revisionSentLetter } from "#app/notify/reviewLetters.ts";
import { demand } from "#app/people/permissions.ts";
import { findPeopleWithRole } from "#app/people/people.queries.server.ts";
import type { Acting } from "#app/people/person.ts";
import { contentHash, type LineContent } from "./content.ts";
import { examineRevision } from "./examine.server.ts";
import {
  findLine,
  findLineBases,
  findLines,
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
import { isWritable, mayMove, revisionStateWords } from "./states.ts";

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

async function findOwnLine(revisionId: number, lineId: string, trx: ActScope["trx"]): Promise<LineRow> {
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
  demandReason(change.reason, "Say why the line is changed.");
  await findWritable(acting, change.revisionId, trx);
  const line = await findOwnLine(change.revisionId, change.lineId, trx);
  if (line.version !== change.expectedVersion) {
    throw new Refused("This line was edited in the meantime. Look at what it says now, then change it.");
  }
  if (change.content.kind !== line.kind) throw new Invalid("A line keeps its kind; take it out and write another.");
  if (contentHash(change.content).equals(line.contentHash)) {
    throw new Invalid("Nothing would change: the line says this already.");
  }
  await insertLineVersion(
    {
      id: line.id,
      version: line.version + 1,
      content: change.content,
      madeBy: acting.person.id,
      reason: change.reason,
    },
    trx,
  );
  await examineRevision(change.revisionId, "edit", trx);
  record({
    act: "revision.line-written",
    objectId: change.revisionId,
    detail: {
      line: line.id,
      version: line.version + 1,
      before: line.content,
      after: change.content,
      reason: change.reason,
    },
  });
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

/** Writes every overtaken line of a revision anew against what stands or waits now, and examines it again. */
export async function restateLines(acting: Acting, revisionId: number): Promise<number> {
  return act(acting, async ({ trx, record }) => {
    await findWritable(acting, revisionId, trx);
    const lines = await findLines(revisionId, trx);
    const bases = await findLineBases(
      lines.map((line) => line.id),
      trx,
    );
    const overtaken = lines.filter((line) => isProposing(line) && isOvertaken(line, bases.get(line.id)));
    for (const line of overtaken) {
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
          reason: "restated against what stands now",
        },
        trx,
      );
    }
    if (overtaken.length === 0) throw new Refused("No line of this revision is overtaken.");
    await examineRevision(revisionId, "edit", trx);
    record({
      act: "revision.line-written",
      objectId: revisionId,
      detail: { restated: overtaken.map((line) => line.id) },
    });
    return overtaken.length;
  });
}

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
            remark,
          }),
        },
        trx,
      );
    }
    record({ act: "revision.sent", objectId: id, detail: { round, lines: lines.length, remark } });
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

/** Writes a comment on a revision or one of its lines. */
export async function commentOn(
  acting: Acting,
  comment: { revisionId: number; lineId: string | null; body: string },
): Promise<void> {
  demand(acting, "revision:comment");
  if (!comment.body.trim())
    throw new Invalid("Write something first.", [{ pointer: "/body", detail: "Write something first." }]);
  if (comment.body.length > 5000)
    throw new Invalid("A comment holds at most 5 000 characters.", [
      { pointer: "/body", detail: "At most 5 000 characters." },
    ]);
  await act(acting, async ({ trx, record }) => {
    const revision = await findRevisionForUpdate(comment.revisionId, trx);
    if (!revision) throw new NotFound(`There is no revision ${comment.revisionId}.`);
    if (comment.lineId) await findOwnLine(comment.revisionId, comment.lineId, trx);
    await insertComment({ ...comment, round: revision.round, writtenBy: acting.person.id }, trx);
    record({
      act: "revision.commented",
      objectId: comment.revisionId,
      detail: { line: comment.lineId, body: comment.body },
    });
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
