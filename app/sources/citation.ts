/**
 * Printing a citation that is kept as CSL-JSON (the Citation Style Language's item format). Everything in it came from
 * outside, so every field is looked at before it is used; a field of the wrong form is left out, never guessed.
 */
export type Citation = Readonly<Record<string, unknown>>;

function text(value: unknown): string {
  return typeof value === "string" ? value.trim() : typeof value === "number" ? String(value) : "";
}

function isRecord(value: unknown): value is Record<string, unknown> {
  return typeof value === "object" && value !== null && !Array.isArray(value);
}

interface Name {
  family: string;
  given: string;
}

function authors(citation: Citation): Name[] {
  const list = Array.isArray(citation["author"]) ? citation["author"] : [];
  return list.filter(isRecord).flatMap((author) => {
    const literal = text(author["literal"]);
    const family = text(author["family"]);
    if (literal) return [{ family: literal, given: "" }];
    return family ? [{ family, given: text(author["given"]) }] : [];
  });
}

/** The year of publication as printed, "1989"; empty when the citation names none. */
export function yearOf(citation: Citation): string {
  const issued = isRecord(citation["issued"]) ? citation["issued"] : {};
  const parts = issued["date-parts"];
  const first: unknown = Array.isArray(parts) ? parts[0] : undefined;
  const year = Array.isArray(first) ? text(first[0]) : "";
  return year || (/\d{4}/.exec(text(issued["raw"]) || text(issued["literal"]))?.[0] ?? "");
}

/** Short form for a table cell: "Cox and others, 1989", "Pitzer and Mayorga, 1973"; the title where nobody signed. */
export function shortCitation(citation: Citation): string {
  const names = authors(citation).map((name) => name.family);
  const who =
    names.length > 2 ? `${names[0]} and others` : names.length > 0 ? names.join(" and ") : text(citation["title"]);
  const year = yearOf(citation);
  return year ? `${who}, ${year}` : who;
}

/** The whole citation in one line: who, title, where it appeared, publisher, year. */
export function fullCitation(citation: Citation): string {
  const who = authors(citation)
    .map(({ family, given }) => (given ? `${given} ${family}` : family))
    .join(", ");
  const journal = [
    text(citation["container-title"]),
    text(citation["volume"]),
    text(citation["issue"]) && `(${text(citation["issue"])})`,
  ]
    .filter((part) => part !== "")
    .join(" ");
  const parts = [
    who,
    text(citation["title"]),
    journal,
    text(citation["page"]),
    text(citation["publisher"]),
    text(citation["publisher-place"]),
    yearOf(citation),
  ].filter((part) => part !== "");
  return parts.join(", ");
}

/** What the source record itself remarks, such as "as remembered, compared with other tables where noted". */
export function noteOf(citation: Citation): string {
  return text(citation["note"]);
}
