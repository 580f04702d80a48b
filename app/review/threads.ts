import type { PageComment, PageMove } from "./revisionPage.ts";

/*
 * What people wrote to each other about a revision, as threads: a comment with its answers, and whether it still waits for
 * one. Pure.
 */

export interface Answer {
  id: string;
  body: string;
  by: string;
  at: Date;
}

export interface Thread extends Answer {
  /** The line it is about; null where it is about the revision. */
  lineId: string | null;
  answers: readonly Answer[];
  /** Whether it waits for an answer. */
  waits: boolean;
}

/**
 * Whether a comment is the remark with which the revision was sent, returned or withdrawn, kept as a comment beside the
 * step. The step tells it, and mending and sending again answers it.
 */
export function isRemark(
  comment: Pick<PageComment, "lineId" | "by" | "body" | "at">,
  moves: readonly Pick<PageMove, "by" | "remark" | "at">[],
): boolean {
  return moves.some(
    (move) =>
      comment.lineId === null &&
      move.by === comment.by &&
      move.remark === comment.body &&
      Math.abs(move.at.getTime() - comment.at.getTime()) < 5000,
  );
}

/**
 * Threads in the order they were opened. A comment waits for an answer when somebody else than the revision's author
 * opened it and nobody but that person wrote in it since.
 */
export function threadsOf(
  comments: readonly PageComment[],
  moves: readonly Pick<PageMove, "by" | "remark" | "at">[],
  authorId: string,
): Thread[] {
  const answers = new Map<string, PageComment[]>();
  for (const comment of comments) {
    if (comment.answers === null) continue;
    answers.set(comment.answers, [...(answers.get(comment.answers) ?? []), comment]);
  }
  return comments
    .filter((comment) => comment.answers === null && !isRemark(comment, moves))
    .map((comment) => {
      const given = answers.get(comment.id) ?? [];
      return {
        id: comment.id,
        lineId: comment.lineId,
        body: comment.body,
        by: comment.by,
        at: comment.at,
        answers: given.map(({ id, body, by, at }) => ({ id, body, by, at })),
        waits: comment.byId !== authorId && given.every((one) => one.byId === comment.byId),
      };
    });
}
