import type { SendMailOptions } from "nodemailer";
import { config } from "#app/config.server.ts";
import { database } from "#app/db/database.server.ts";
import { findLetter, type Letter, updateFailed, updateSent } from "./letters.queries.server.ts";
import { LINK_LINE } from "./texts.ts";
import { mailTransport, senderAddress } from "./transport.server.ts";

/** Makes the secret link of a letter and stores its hash. Gives its path, or null when the link has become pointless. */
export type LinkMaker = (
  letter: Pick<Letter, "kind" | "toPerson" | "toAddress" | "fromPerson">,
) => Promise<string | null>;

/**
 * Sends one letter of the outbox, unless it was sent before. A crash between the mail server's yes and ours sends it
 * twice, with the same Message-ID.
 * @throws when the mail server refuses or cannot be reached; the queue then tries again, later and later
 */
export async function sendLetter(letterId: string, makeLink: LinkMaker): Promise<void> {
  const letter = await findLetter(letterId, database());
  if (!letter || letter.sentAt) return;
  const needsLink = letter.body.split("\n").includes(LINK_LINE);
  try {
    const transport = mailTransport();
    const path = needsLink ? await makeLink(letter) : letter.path;
    // Nobody is left to use the link: the account was switched off or has another address meanwhile.
    if (needsLink && path === null) {
      await updateFailed(letter.id, "The account was changed before the letter was sent.", database());
      await updateSent(letter.id, new Date(), database());
      return;
    }
    await transport.sendMail(compose(letter, path, { site: config().publicUrl, from: senderAddress() }));
  } catch (error) {
    await updateFailed(letter.id, error instanceof Error ? error.message : String(error), database());
    throw error;
  }
  await updateSent(letter.id, new Date(), database());
}

/**
 * Puts a letter into the form of a mail: plain text, one recipient given as an address and never parsed from text, marked
 * as written by a program (RFC 3834), so that nobody's absence notice answers it.
 */
export function compose(
  letter: Pick<Letter, "id" | "toAddress" | "subject" | "body" | "path">,
  path: string | null,
  { site, from }: { site: string; from: string },
): SendMailOptions {
  const address = path === null ? null : new URL(path, site).href;
  const lines = letter.body.split("\n").map((line) => (line === LINK_LINE ? (address ?? "") : line));
  const text = letter.path !== null && address !== null ? [...lines, "", address] : lines;
  return {
    from: { name: "Tablewright", address: from },
    to: { name: "", address: letter.toAddress },
    envelope: { from, to: [letter.toAddress] },
    subject: letter.subject,
    text: `${text.join("\n")}\n\n-- \nTablewright, ${site}\n`,
    messageId: `<${letter.id}@${new URL(site).hostname}>`,
    headers: { "Auto-Submitted": "auto-generated", "X-Auto-Response-Suppress": "All" },
  };
}
