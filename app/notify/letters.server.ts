import { type Database, database } from "#app/db/database.server.ts";
import { enqueueJob } from "#app/jobs/enqueue.server.ts";
import { findWaiting, insertLetter } from "./letters.queries.server.ts";

/** A letter as an act hands it in. */
export interface NewLetter {
  /** What it is about, for the outbox; the two kinds "invitation" and "password-reset" get a secret link on sending. */
  kind: string;
  toAddress: string;
  /** The person the address belongs to; null or left out for an address without account. */
  toPerson?: string | null;
  /** On whose act it is written. */
  fromPerson?: string | null;
  subject: string;
  body: string;
  /** The page it is about, as a path of this site; PUBLIC_URL is put before it on sending. */
  path?: string | null;
}

const LONGEST_SUBJECT = 200;

/**
 * Puts a letter into the outbox, in the transaction of the act it tells of: it is sent if and only if the act stands.
 * Line breaks in a subject (a title that somebody typed) become spaces, so that no header can be added.
 */
export async function enqueueLetter(letter: NewLetter, trx: Database): Promise<void> {
  const letterId = await insertLetter(
    {
      kind: letter.kind,
      toAddress: letter.toAddress,
      toPerson: letter.toPerson ?? null,
      fromPerson: letter.fromPerson ?? null,
      subject: oneLine(letter.subject),
      body: letter.body,
      path: letter.path ?? null,
    },
    trx,
  );
  await enqueueJob("sendLetter", { letterId }, trx, { jobKey: `letter:${letterId}` });
}

/** Most letters taken up at one start; far more than a laboratory writes while its mail server is away. */
const MOST_WAITING = 10_000;

/**
 * Hands every letter that was not sent yet to the worker again. The queue gives a letter up after some days without a
 * mail server; it goes out once there is one.
 *
 * @returns how many there were
 */
export async function enqueueWaitingLetters(): Promise<number> {
  const waiting = await findWaiting(MOST_WAITING, database());
  for (const letterId of waiting) {
    await enqueueJob("sendLetter", { letterId }, database(), { jobKey: `letter:${letterId}` });
  }
  return waiting.length;
}

function oneLine(text: string): string {
  const line = text.replace(/[\p{Cc}\u2028\u2029]+/gu, " ").trim();
  return line.length > LONGEST_SUBJECT ? `${line.slice(0, LONGEST_SUBJECT - 1).trimEnd()}…` : line;
}
