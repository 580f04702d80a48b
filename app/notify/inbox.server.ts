import { readdir, readFile } from "node:fs/promises";
import path from "node:path";
import { simpleParser } from "mailparser";

/** A letter that the demo's inbox received. */
export interface ReceivedLetter {
  id: string;
  to: string;
  subject: string;
  text: string;
  at: Date | null;
}

const MOST_SHOWN = 100;

/**
 * The newest letters in the folder where the demo's inbox keeps them, the newest first; at most 100.
 * @param folder it may not exist yet: then no letter has come
 */
export async function findReceivedLetters(folder: string): Promise<ReceivedLetter[]> {
  const files = await readdir(folder).catch(() => []);
  // A letter's file is named after the time it came, so names sort by time.
  const newest = files
    .filter((file) => file.endsWith(".eml"))
    .sort()
    .slice(-MOST_SHOWN)
    .reverse();
  return Promise.all(
    newest.map(async (file) => {
      const mail = await simpleParser(await readFile(path.join(folder, file)));
      return {
        id: path.basename(file, ".eml"),
        to: [mail.to ?? []]
          .flat()
          .map(({ text }) => text)
          .join(", "),
        subject: mail.subject ?? "",
        text: mail.text ?? "",
        at: mail.date ?? null,
      };
    }),
  );
}
