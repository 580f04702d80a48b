/*
 * The record in words: what an act is called, and what its detail says. Pure. An act of any room can be printed without
 * knowing it here; the tables only mend what would read badly.
 */

const ACTS: Readonly<Record<string, string>> = {
  "person.made": "account made",
  "person.invitation-taken": "invitation taken up",
  "person.address-asked": "new address asked for",
  "person.password-reset-asked": "letter for a new password asked for",
  "person.sign-in-failed": "sign-in failed",
  "key.first-used": "used for the first time",
  "sheet.plan-confirmed": "columns confirmed",
  "sheet.planned": "columns planned",
  "sheet.built": "revision built",
  "revision.line-written": "line written",
  "revision.described": "title or summary written",
  "revision.sent": "sent to review",
};

/** How an act reads in the list: "lines accepted". */
export function actInWords(act: string): string {
  return ACTS[act] ?? act.slice(act.indexOf(".") + 1).replaceAll("-", " ");
}

/** One thing that the detail of an entry says. `body` is plain text. */
export interface DetailLine {
  label: string;
  body: string;
}

/** Members that read badly by their names. */
const LABELS: Readonly<Record<string, string>> = {
  by: "by way of",
  sha256: "SHA-256",
  cas: "CAS number",
  email: "address",
  endsAt: "good until",
  speciesId: "species",
  sourceId: "source",
  lineId: "line",
  request: "request",
};

/** Longest text of one member before it is cut; the export holds it whole. */
const LONGEST = 300;
/** Most lines for one entry; the export holds them all. */
const MOST_LINES = 24;

/**
 * What the detail of an entry says, line by line: before and after together, lists counted where they hold more than
 * words, nothing for what is empty.
 */
export function detailInWords(detail: Readonly<Record<string, unknown>>): DetailLine[] {
  const { before, after, ...rest } = detail;
  const lines: DetailLine[] = [];
  if (before !== undefined && after !== undefined) lines.push(...changeInWords(before, after));
  else if (before !== undefined) lines.push(...membersInWords({ before }));
  else if (after !== undefined) lines.push(...membersInWords({ after }));
  lines.push(...membersInWords(rest));
  if (lines.length <= MOST_LINES) return lines;
  return [...lines.slice(0, MOST_LINES), { label: "and more", body: `${lines.length - MOST_LINES} further lines` }];
}

function changeInWords(before: unknown, after: unknown): DetailLine[] {
  if (!isObject(before) || !isObject(after)) {
    return [{ label: "changed", body: `${textOf(before) || "none"} to ${textOf(after) || "none"}` }];
  }
  return [...new Set([...Object.keys(before), ...Object.keys(after)])].flatMap((name) => {
    const [was, is] = [textOf(before[name]), textOf(after[name])];
    return was === is ? [] : [{ label: labelOf(name), body: `${was || "none"} to ${is || "none"}` }];
  });
}

function membersInWords(members: Readonly<Record<string, unknown>>): DetailLine[] {
  return Object.entries(members).flatMap(([name, value]) => {
    const body = textOf(value);
    return body === "" ? [] : [{ label: labelOf(name), body }];
  });
}

function labelOf(name: string): string {
  // Details come from forms too: a member may be named like one of an object's own.
  if (Object.hasOwn(LABELS, name)) return LABELS[name] ?? name;
  return name.replace(/([a-z0-9])([A-Z])/g, (_pair, a: string, b: string) => `${a} ${b.toLowerCase()}`);
}

function isObject(value: unknown): value is Record<string, unknown> {
  return typeof value === "object" && value !== null && !Array.isArray(value);
}

/** A value as words; empty for null, false, empty texts, lists and objects. */
function textOf(value: unknown): string {
  if (value === null || value === undefined || value === false) return "";
  if (value === true) return "yes";
  if (typeof value === "string") return cut(value.trim());
  if (typeof value === "number") return String(value);
  if (Array.isArray(value)) return cut(value.map(itemOf).filter(Boolean).join(", "));
  if (isObject(value)) {
    return cut(
      Object.entries(value)
        .map(([name, member]) => [labelOf(name), textOf(member)] as const)
        .filter(([, text]) => text !== "")
        .map(([label, text]) => `${label} ${text}`)
        .join("; "),
    );
  }
  return "";
}

const itemOf = (item: unknown): string => (isObject(item) ? `(${textOf(item)})` : textOf(item));

function cut(text: string): string {
  return text.length > LONGEST ? `${text.slice(0, LONGEST).trimEnd()}…` : text;
}
