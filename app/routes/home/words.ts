import type { SheetState } from "#app/intake/states.ts";

/*
 * The sentences of the first page. Pure: the moment they are said at is an argument, so that server and browser say the same.
 */

const DAY = 24 * 60 * 60 * 1000;
const NUMBERS = "no one two three four five six seven eight nine ten eleven twelve".split(" ");
const MONTHS = "January February March April May June July August September October November December".split(" ");

/** A count as a sentence says it: in letters up to twelve. */
export function inLetters(n: number): string {
  return NUMBERS[n] ?? String(n);
}

/** Days of the calendar (UTC) between two moments. */
function daysBetween(from: Date, to: Date): number {
  return Math.floor(to.getTime() / DAY) - Math.floor(from.getTime() / DAY);
}

/** For how long something has been waiting: "since today", "since yesterday", "6 days". */
export function waitingInWords(since: Date, now: Date): string {
  const days = daysBetween(since, now);
  if (days <= 0) return "since today";
  return days === 1 ? "since yesterday" : `${days} days`;
}

/** The day of something that happened: "today", "yesterday", "28 March", with its year when that is over. */
export function dayInWords(at: Date, now: Date): string {
  const days = daysBetween(at, now);
  if (days <= 0) return "today";
  if (days === 1) return "yesterday";
  const day = `${at.getUTCDate()} ${MONTHS[at.getUTCMonth()]}`;
  return at.getUTCFullYear() === now.getUTCFullYear() ? day : `${day} ${at.getUTCFullYear()}`;
}

/** What an unfinished sheet needs of its steward; null while the service is at work on it. */
export function sheetNeed(sheet: { state: SheetState; refused: number }): string | null {
  switch (sheet.state) {
    case "planned":
      return "confirm what its columns mean";
    case "read":
      return sheet.refused === 0
        ? "build its revision"
        : `mend ${sheet.refused === 1 ? "one row" : `${sheet.refused} rows`} or leave them out`;
    case "failed":
      return "look why it stopped";
    case "received":
    case "reading":
    case "built":
      return null;
  }
}

export interface Waiting {
  /** Sent dates of the revisions that wait for this person's decision; null unless they decide. */
  toDecide: readonly Date[] | null;
  /** Sheets that need something, revisions that came back, drafts; null unless they bring sheets. */
  own: { sheets: number; returned: number; drafts: number } | null;
}

/** The sentence under the head: what waits, in a few words. */
export function waitingSentence({ toDecide, own }: Waiting, now: Date): string {
  const sentences: string[] = [];
  if (own) {
    const parts = [
      [own.sheets, "sheet needs you", "sheets need you"],
      [own.returned, "revision came back", "revisions came back"],
      [own.drafts, "draft is not sent", "drafts are not sent"],
    ] as const;
    const said = parts.filter(([n]) => n > 0).map(([n, one, many]) => `${inLetters(n)} ${n === 1 ? one : many}`);
    if (said.length > 0)
      sentences.push(said.length > 1 ? `${said.slice(0, -1).join(", ")} and ${said.at(-1)}` : said[0]!);
    else if (!toDecide) sentences.push("nothing of yours waits for you");
  }
  if (toDecide) sentences.push(decisionSentence(toDecide, now));
  return sentences.map((sentence) => `${sentence.charAt(0).toUpperCase()}${sentence.slice(1)}.`).join(" ");
}

function decisionSentence(sent: readonly Date[], now: Date): string {
  if (sent.length === 0) return "no revision waits for a decision";
  const head =
    sent.length === 1 ? "one revision needs a decision" : `${inLetters(sent.length)} revisions need a decision`;
  const days = Math.max(...sent.map((at) => daysBetween(at, now)));
  if (days < 2) return head;
  return sent.length === 1
    ? `${head} and has been waiting for ${inLetters(days)} days`
    : `${head}; one has been waiting for ${inLetters(days)} days`;
}

/** What an edition changed, in a few words: "41 values changed, 3 came". */
export function changesInWords({ came, changed, went }: { came: number; changed: number; went: number }): string {
  const parts = [
    [changed, "changed"],
    [came, "came"],
    [went, "went"],
  ] as const;
  const said = parts.filter(([n]) => n > 0);
  if (said.length === 0) return "no value changed";
  return said
    .map(([n, verb], index) => (index === 0 ? `${n} ${n === 1 ? "value" : "values"} ${verb}` : `${n} ${verb}`))
    .join(", ");
}
