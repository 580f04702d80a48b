import { act, type ActScope } from "#app/audit/act.server.ts";
import { Invalid, NotFound, Refused } from "#app/http/errors.ts";
import { enqueueLetter } from "#app/notify/letters.server.ts";
import { revisionCommentedLetter } from "#app/notify/reviewLetters.ts";
import { findAccount } from "#app/people/people.queries.server.ts";
import { demand } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { lineSays } from "./lineWords.ts";
import { findComment, findRevisionForUpdate, insertComment } from "./review.queries.server.ts";
import { findOwnLine } from "./revise.server.ts";

const LONGEST = 5000;

function demandBody(body: string): void {
  const sentence = !body.trim()
    ? "Write something first."
    : body.length > LONGEST
      ? "A comment holds at most 5 000 characters."
      : null;
  if (sentence) throw new Invalid(sentence, [{ pointer: "/body", detail: sentence }]);
}

async function findOpenRevision(id: number, trx: ActScope["trx"]) {
  const revision = await findRevisionForUpdate(id, trx);
  if (!revision) throw new NotFound(`There is no revision ${id}.`);
  return revision;
}

/**
 * Writes a comment on a revision or one of its lines, and tells the revision's author by letter.
 * @throws NotFound, Forbidden; Invalid with the field
 */
export async function commentOn(
  acting: Acting,
  comment: { revisionId: number; lineId: string | null; body: string },
): Promise<void> {
  demand(acting, "revision:comment");
  demandBody(comment.body);
  await act(acting, async ({ trx, record }) => {
    const revision = await findOpenRevision(comment.revisionId, trx);
    const about = await aboutIn(comment.revisionId, comment.lineId, trx);
    await insertComment({ ...comment, round: revision.round, writtenBy: acting.person.id }, trx);
    await tell(acting, { to: [revision.madeBy], revision, about, body: comment.body, isAnswer: false }, trx);
    record({
      act: "revision.commented",
      objectId: comment.revisionId,
      detail: { line: comment.lineId, body: comment.body },
    });
  });
}

/**
 * Answers a comment, and tells by letter who wrote it and the revision's author.
 * @throws NotFound for a comment that this revision does not have; Refused for an answer to an answer; Invalid with the
 *   field
 */
export async function answerComment(
  acting: Acting,
  answer: { revisionId: number; comment: string; body: string },
): Promise<void> {
  demand(acting, "revision:comment");
  demandBody(answer.body);
  await act(acting, async ({ trx, record }) => {
    const revision = await findOpenRevision(answer.revisionId, trx);
    const comment = await findComment(answer.comment, trx);
    if (!comment || (comment.lineId === null && comment.revisionId !== revision.id)) {
      throw new NotFound(`Revision ${revision.id} has no such comment.`);
    }
    if (comment.answers !== null) throw new Refused("This is an answer itself. Answer the comment it belongs to.");
    const about = await aboutIn(revision.id, comment.lineId, trx);
    await insertComment(
      {
        revisionId: revision.id,
        lineId: comment.lineId,
        round: revision.round,
        body: answer.body,
        writtenBy: acting.person.id,
        answers: comment.id,
      },
      trx,
    );
    await tell(
      acting,
      { to: [comment.byId, revision.madeBy], revision, about, body: answer.body, isAnswer: true },
      trx,
    );
    record({ act: "revision.answered", objectId: revision.id, detail: { comment: comment.id, body: answer.body } });
  });
}

/** What a comment is about: a line of the revision, or the whole. */
async function aboutIn(revisionId: number, lineId: string | null, trx: ActScope["trx"]) {
  if (lineId === null) return null;
  const line = await findOwnLine(revisionId, lineId, trx);
  return { lineId, says: lineSays(line.content, line.property) };
}

interface Telling {
  to: readonly string[];
  revision: { id: number; title: string };
  about: { lineId: string; says: string } | null;
  body: string;
  isAnswer: boolean;
}

/** Writes to these people, each once and never to who is acting. */
async function tell(acting: Acting, telling: Telling, trx: ActScope["trx"]): Promise<void> {
  const { revision, about, body, isAnswer } = telling;
  for (const id of new Set(telling.to)) {
    if (id === acting.person.id) continue;
    const person = await findAccount(id, trx);
    if (!person) continue;
    await enqueueLetter(
      {
        kind: isAnswer ? "revision-answered" : "revision-commented",
        toPerson: person.id,
        toAddress: person.email,
        fromPerson: acting.person.id,
        ...revisionCommentedLetter({ ...revision, by: acting.person.name, about, body, isAnswer }),
      },
      trx,
    );
  }
}
