import type { Database } from "#app/db/database.server.ts";

/** A letter of the outbox. */
export interface Letter {
  id: string;
  kind: string;
  toAddress: string;
  toPerson: string | null;
  fromPerson: string | null;
  subject: string;
  body: string;
  path: string | null;
  madeAt: Date;
  sentAt: Date | null;
}

function letters(db: Database) {
  return db
    .selectFrom("letter")
    .select([
      "id",
      "kind",
      "to_address as toAddress",
      "to_person as toPerson",
      "from_person as fromPerson",
      "subject",
      "body",
      "path",
      "made_at as madeAt",
      "sent_at as sentAt",
    ]);
}

export async function findLetter(id: string, db: Database): Promise<Letter | undefined> {
  return letters(db).where("id", "=", id).executeTakeFirst();
}

/** The ids of letters not sent yet, the oldest first. */
export async function findWaiting(limit: number, db: Database): Promise<string[]> {
  const rows = await db
    .selectFrom("letter")
    .select("id")
    .where("sent_at", "is", null)
    .orderBy("made_at")
    .limit(limit)
    .execute();
  return rows.map(({ id }) => id);
}

export async function insertLetter(letter: Omit<Letter, "id" | "madeAt" | "sentAt">, trx: Database): Promise<string> {
  const { id } = await trx
    .insertInto("letter")
    .values({
      kind: letter.kind,
      to_address: letter.toAddress,
      to_person: letter.toPerson,
      from_person: letter.fromPerson,
      subject: letter.subject,
      body: letter.body,
      path: letter.path,
    })
    .returning("id")
    .executeTakeFirstOrThrow();
  return id;
}

export async function updateSent(id: string, sentAt: Date, db: Database): Promise<void> {
  await db
    .updateTable("letter")
    .set(({ eb }) => ({ sent_at: sentAt, attempts: eb("attempts", "+", 1), last_error: null }))
    .where("id", "=", id)
    .execute();
}

/** @param error what the mail server said, shortened */
export async function updateFailed(id: string, error: string, db: Database): Promise<void> {
  await db
    .updateTable("letter")
    .set(({ eb }) => ({ attempts: eb("attempts", "+", 1), last_error: error.slice(0, 500) }))
    .where("id", "=", id)
    .execute();
}
