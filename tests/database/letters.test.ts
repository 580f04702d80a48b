import { sql } from "kysely";
import nodemailer from "nodemailer";
import { describe, expect, test } from "vitest";
import { enqueueLetter, enqueueWaitingLetters, type NewLetter } from "#app/notify/letters.server.ts";
import { compose, sendLetter } from "#app/notify/sendLetter.server.ts";
import { useMailTransport } from "#app/notify/transport.server.ts";
import { LINK_LINE } from "#app/notify/texts.ts";
import { changeAccount, switchOff } from "#app/people/people.server.ts";
import { makeLinkOf } from "#app/people/links.server.ts";
import { useDatabase } from "#tests/support/database.ts";
import { runJobs } from "#tests/support/jobs.ts";
import { linkIn, SITE, useOutbox } from "#tests/support/mail.ts";
import { makePerson } from "#tests/support/people.ts";

const database = useDatabase();
const outbox = useOutbox();
const letter = (change: Partial<NewLetter> = {}): NewLetter => ({
  kind: "revision-sent",
  toAddress: "reviewer@calderpoint.example",
  subject: "Revision 12 waits for review",
  body: "Ines Halvard sent revision 12 to review.",
  path: "/revisions/12",
  ...change,
});
const enqueue = (change?: Partial<NewLetter>) =>
  database.app.transaction().execute((trx) => enqueueLetter(letter(change), trx));
const noLink = () => Promise.resolve(null);

describe("a letter", () => {
  test("goes out after its act, once, with the address of what it tells of", async () => {
    await enqueue();
    expect(outbox.sent).toHaveLength(0);
    await runJobs(database);
    await runJobs(database);
    expect(outbox.sent).toHaveLength(1);
    const sent = outbox.newestTo("reviewer@calderpoint.example");
    expect(sent.subject).toBe("Revision 12 waits for review");
    expect(linkIn(sent)).toBe("/revisions/12");
  });

  test("is not sent when its act does not stand", async () => {
    await expect(
      database.app.transaction().execute(async (trx) => {
        await enqueueLetter(letter(), trx);
        throw new Error("the act fails");
      }),
    ).rejects.toThrow("the act fails");
    await runJobs(database);
    expect(outbox.sent).toHaveLength(0);
  });

  test("waits when the mail server refuses it, with what it said", async () => {
    await enqueue({ subject: "Refused at first" });
    const { id } = await database.owner
      .selectFrom("letter")
      .select("id")
      .where("subject", "=", "Refused at first")
      .executeTakeFirstOrThrow();
    const works = { sendMail: async () => undefined };
    useMailTransport({ sendMail: () => Promise.reject(new Error("451 try again later")) });
    await expect(sendLetter(id, noLink)).rejects.toThrow("451");
    const state = () =>
      database.owner
        .selectFrom("letter")
        .select(["sent_at", "attempts", "last_error"])
        .where("id", "=", id)
        .executeTakeFirstOrThrow();
    expect(await state()).toEqual({ sent_at: null, attempts: 1, last_error: "451 try again later" });
    useMailTransport(works);
    await sendLetter(id, noLink);
    expect(await state()).toMatchObject({ attempts: 2, last_error: null, sent_at: expect.any(Date) as unknown });
  });

  test("that the queue gave up goes out once there is a mail server", async () => {
    await runJobs(database);
    await enqueue({ subject: "Given up" });
    // What many failures in a row come to: the queue no longer tries.
    await sql`
      update graphile_worker._private_jobs set attempts = max_attempts, last_error = 'no mail server'
    `.execute(database.owner);
    await expect(runJobs(database)).rejects.toThrow("no mail server");
    expect(outbox.sent).toHaveLength(0);
    expect(await enqueueWaitingLetters()).toBe(1);
    await enqueueWaitingLetters();
    // The one given up stays in the queue as it is; there is a new one beside it.
    await sql`delete from graphile_worker._private_jobs where last_error is not null`.execute(database.owner);
    await runJobs(database);
    expect(outbox.sent.map(({ subject }) => subject)).toEqual(["Given up"]);
    expect(await enqueueWaitingLetters()).toBe(0);
  });

  test("with a secret link is not sent once the account is switched off", async () => {
    const admin = await makePerson("Letter Admin", "administrator");
    const { person } = await makePerson("Letter Off", "analyst");
    await enqueue({
      kind: "password-reset",
      toAddress: person.email,
      toPerson: person.id,
      body: LINK_LINE,
      path: null,
    });
    await switchOff(admin, person.id);
    await runJobs(database);
    expect(outbox.sent.map(({ subject }) => subject)).not.toContain(letter().subject);
    const asked = { kind: "password-reset", toPerson: person.id, toAddress: person.email, fromPerson: null };
    expect(await makeLinkOf(asked)).toBeNull();
  });

  test("with a secret link is not sent to an address that the account no longer has", async () => {
    const admin = await makePerson("Moving Admin", "administrator");
    const { person } = await makePerson("Moved Away", "analyst");
    await enqueue({
      kind: "password-reset",
      toAddress: person.email,
      toPerson: person.id,
      body: LINK_LINE,
      path: null,
    });
    await changeAccount(admin, person.id, { name: person.name, email: "elsewhere@calderpoint.example" });
    await runJobs(database);
    // The old address hears of the change, and gets nothing that opens the account.
    const toOld = outbox.sent.filter(({ to }) => JSON.stringify(to).includes(person.email));
    expect(toOld.map(({ subject }) => subject)).toEqual(["The address of your account was changed"]);
  });
});

/** What goes over the line: the whole mail as nodemailer writes it. */
async function written(change: Partial<NewLetter>): Promise<string> {
  const { toAddress, subject, body, path = null } = letter(change);
  const mail = compose({ id: "letter-1", toAddress, subject, body, path }, path, {
    site: SITE,
    from: "tablewright@localhost",
  });
  const { message } = await nodemailer.createTransport({ streamTransport: true, buffer: true }).sendMail(mail);
  return String(message);
}
const headOf = (mail: string): string => mail.slice(0, mail.indexOf("\r\n\r\n"));

describe("the mail a letter becomes", () => {
  test("is plain text, names itself and says that a program wrote it", async () => {
    const head = headOf(await written({}));
    // RFC 3834, section 5.
    expect(head).toMatch(/^Auto-Submitted: auto-generated\r?$/m);
    expect(head).toMatch(/^Message-ID: <letter-1@localhost>\r?$/m);
    expect(head).toMatch(/^Content-Type: text\/plain; charset=utf-8\r?$/m);
    expect(head).toMatch(/^From: Tablewright <tablewright@localhost>\r?$/m);
  });

  test("has one recipient and no header that a title brought along", async () => {
    await enqueue({ subject: "Title\r\nBcc: thief@calderpoint.example\u2028more" });
    const { subject } = await database.owner
      .selectFrom("letter")
      .select("subject")
      .where("subject", "like", "Title%")
      .executeTakeFirstOrThrow();
    expect(subject).toBe("Title Bcc: thief@calderpoint.example more");
    const head = headOf(await written({ subject }));
    expect(head).not.toMatch(/^Bcc:/m);
    expect(head.match(/^To: .*$/gm)).toEqual([expect.stringMatching(/^To: reviewer@calderpoint\.example\r?$/)]);
  });

  test("never takes an address apart: two in one are refused or sent to neither", async () => {
    const head = headOf(await written({ toAddress: "a@calderpoint.example,b@calderpoint.example" })).toLowerCase();
    expect(head).not.toMatch(/^to: a@calderpoint\.example, b@calderpoint\.example/m);
  });

  test("keeps a long subject whole up to 200 characters and shortens it beyond", async () => {
    await enqueue({ subject: `Long ${"s".repeat(400)}` });
    const { subject } = await database.owner
      .selectFrom("letter")
      .select("subject")
      .where("subject", "like", "Long %")
      .executeTakeFirstOrThrow();
    expect(subject).toHaveLength(200);
  });
});
