import { sendLetter } from "#app/notify/sendLetter.server.ts";
import { makeLinkOf } from "#app/people/links.server.ts";

/** Hands one letter of the outbox to the mail server. */
export async function sendLetterTask({ letterId }: { letterId: string }): Promise<void> {
  await sendLetter(letterId, makeLinkOf);
}
