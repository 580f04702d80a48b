import type { SendMailOptions } from "nodemailer";
import { afterAll, beforeAll, beforeEach } from "vitest";
import { useMailTransport } from "#app/notify/transport.server.ts";

/** A letter as its reader gets it. */
export interface ReadLetter {
  to: string;
  subject: string;
  text: string;
}

/** The letters that were sent while a test ran, oldest first. */
export interface Outbox {
  readonly sent: readonly SendMailOptions[];
  /** The newest letter to an address. @throws when there is none */
  newestTo(address: string): ReadLetter;
}

function addressOf(mail: SendMailOptions): string {
  const { to } = mail;
  if (typeof to === "object" && "address" in to && to.address) return to.address;
  throw new Error("A letter has one recipient, given as an address.");
}

/** The address of the service in letters of tests. */
export const SITE = "http://localhost:3000";

/** Puts an outbox in the place of the mail server for a test file; it is emptied before each test. */
export function useOutbox(): Outbox {
  const sent: SendMailOptions[] = [];
  beforeAll(() => {
    // Sending reads the settings, which in a test nobody has set; the database is the test's own whatever stands here.
    Object.assign(process.env, {
      DATABASE_URL: "postgres://nobody@localhost/nothing",
      SESSION_SECRET: "only for tests, only for tests, only",
      PUBLIC_URL: SITE,
    });
  });
  beforeEach(() => {
    sent.length = 0;
    useMailTransport({ sendMail: async (mail) => sent.push(mail) });
  });
  afterAll(() => useMailTransport(undefined));
  return {
    sent,
    newestTo(address) {
      const mail = sent.findLast((one) => addressOf(one) === address);
      if (!mail) throw new Error(`No letter was sent to ${address}; there are ${sent.length} to others.`);
      return { to: address, subject: String(mail.subject), text: String(mail.text) };
    },
  };
}

/** The path of the first link to this site in a letter. */
export function linkIn(letter: ReadLetter): string {
  const address = /^https?:\/\/\S+$/m.exec(letter.text)?.[0];
  if (!address) throw new Error(`The letter "${letter.subject}" holds no link.`);
  return new URL(address).pathname;
}
