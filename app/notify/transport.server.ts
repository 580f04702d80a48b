import nodemailer, { type SendMailOptions } from "nodemailer";
import { config } from "#app/config.server.ts";

/** What hands a composed letter to a mail server. nodemailer's transports fit; tests give one that keeps the letters. */
export interface MailTransport {
  sendMail(mail: SendMailOptions): Promise<unknown>;
}

let given: MailTransport | undefined;

/** Thrown while there is no mail server to hand letters to; they wait in the outbox and the queue tries again. */
export class NoMailServer extends Error {}

/**
 * The mail server that SMTP_URL names. The demo's start sets it to its own inbox. Its certificate is checked; a limit on
 * time keeps a server that does not answer from holding the worker.
 * @throws NoMailServer when SMTP_URL is not set
 */
export function mailTransport(): MailTransport {
  if (given) return given;
  const { smtpUrl } = config();
  if (!smtpUrl) throw new NoMailServer("SMTP_URL is not set, so letters wait in the outbox.");
  given = nodemailer.createTransport({
    url: smtpUrl,
    pool: true,
    maxConnections: 2,
    connectionTimeout: 15_000,
    greetingTimeout: 15_000,
    socketTimeout: 30_000,
    // A letter is text we wrote: nothing in it may make the server read a file or fetch an address.
    disableFileAccess: true,
    disableUrlAccess: true,
  });
  return given;
}

/** Puts another transport in the place of the configured one; `undefined` takes it back. For tests. */
export function useMailTransport(transport: MailTransport | undefined): void {
  given = transport;
}

/** The address letters come from. */
export function senderAddress(): string {
  const { mailFrom, publicUrl } = config();
  return mailFrom ?? `tablewright@${new URL(publicUrl).hostname}`;
}
