/** The words of the letters that tell of a revision or an edition. Pure: the act that sends them gives the facts. */
export interface LetterText {
  subject: string;
  body: string;
  /** The page the letter is about, as a path of this site; the sender puts PUBLIC_URL before it. */
  path: string;
}

function lines(...parts: (string | false)[]): string {
  return parts.filter((part) => part !== false).join("\n");
}

/** To the reviewers: a revision waits. */
export function revisionSentLetter(facts: {
  id: number;
  title: string;
  round: number;
  by: string;
  lines: number;
  blocks: number;
  /** Comments of earlier rounds that nobody answered. */
  unanswered: number;
  remark: string;
}): LetterText {
  return {
    subject: `Revision ${facts.id} waits for review: ${facts.title}`,
    body: lines(
      `${facts.by} sent revision ${facts.id}, "${facts.title}", to review${facts.round > 1 ? ` for the ${ordinal(facts.round)} time` : ""}.`,
      `It holds ${facts.lines} ${facts.lines === 1 ? "line" : "lines"}; ${facts.blocks === 0 ? "nothing blocks." : `${facts.blocks} ${facts.blocks === 1 ? "finding blocks" : "findings block"}.`}`,
      facts.unanswered > 0 &&
        `${facts.unanswered === 1 ? "One comment has" : `${facts.unanswered} comments have`} no answer yet.`,
      facts.remark.trim() !== "" && `\n${facts.remark.trim()}`,
    ),
    path: `/revisions/${facts.id}`,
  };
}

/** To the steward, and to who wrote the comment: somebody wrote about a revision. */
export function revisionCommentedLetter(facts: {
  id: number;
  title: string;
  by: string;
  /** The line it is about and what that says; null for the revision as a whole. */
  about: { lineId: string; says: string } | null;
  body: string;
  isAnswer: boolean;
}): LetterText {
  const did = facts.isAnswer ? "answered a comment" : "wrote a comment";
  return {
    subject: `${facts.isAnswer ? "An answer" : "A comment"} on revision ${facts.id}: ${facts.title}`,
    body: lines(
      `${facts.by} ${did} on ${facts.about ? `a line of revision ${facts.id}, "${facts.title}" (${facts.about.says})` : `revision ${facts.id}, "${facts.title}"`}:`,
      `\n${facts.body.trim()}`,
    ),
    path: `/revisions/${facts.id}${facts.about ? `#line-${facts.about.lineId}` : ""}`,
  };
}

/** To the steward of another draft: its lines were taken over. */
export function revisionTakenOverLetter(facts: {
  id: number;
  title: string;
  into: number;
  by: string;
  lines: number;
}): LetterText {
  return {
    subject: `The lines of revision ${facts.id} went into revision ${facts.into}: ${facts.title}`,
    body: lines(
      `${facts.by} took ${facts.lines === 1 ? "the line" : `${facts.lines} lines`} of your revision ${facts.id}, "${facts.title}", over into revision ${facts.into}.`,
      `The lines keep their history and your hand in them. What was not taken over stays on record with revision ${facts.id}.`,
    ),
    path: `/revisions/${facts.into}`,
  };
}

/** To the steward: a revision came back. */
export function revisionReturnedLetter(facts: { id: number; title: string; by: string; remark: string }): LetterText {
  return {
    subject: `Revision ${facts.id} was returned: ${facts.title}`,
    body: lines(
      `${facts.by} returned revision ${facts.id}, "${facts.title}", with these words:`,
      `\n${facts.remark.trim()}`,
    ),
    path: `/revisions/${facts.id}`,
  };
}

/** To the steward: every line of a revision is decided. */
export function revisionDecidedLetter(facts: {
  id: number;
  title: string;
  by: string;
  accepted: number;
  declined: number;
}): LetterText {
  return {
    subject: `Revision ${facts.id} is decided: ${facts.title}`,
    body: lines(
      `${facts.by} decided revision ${facts.id}, "${facts.title}": ${facts.accepted} accepted, ${facts.declined} declined.`,
      facts.accepted > 0 && "The accepted lines wait for the next edition.",
    ),
    path: `/revisions/${facts.id}`,
  };
}

/** To the stewards: an edition holds their lines. */
export function editionPublishedLetter(facts: {
  number: number;
  by: string;
  revisions: readonly number[];
}): LetterText {
  return {
    subject: `Edition ${facts.number} is published`,
    body: lines(
      `${facts.by} published edition ${facts.number}. It holds accepted lines of your ${facts.revisions.length === 1 ? "revision" : "revisions"} ${facts.revisions.join(", ")}.`,
    ),
    path: `/editions/${facts.number}`,
  };
}

function ordinal(n: number): string {
  const words = [
    "zeroth",
    "first",
    "second",
    "third",
    "fourth",
    "fifth",
    "sixth",
    "seventh",
    "eighth",
    "ninth",
    "tenth",
  ];
  return words[n] ?? `${n}th`;
}
