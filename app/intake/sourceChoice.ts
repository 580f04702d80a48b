import { z } from "zod";

const line = z.string().trim().max(500);

/** A source that is new to the table, as the steward describes it. */
export const newSource = z.strictObject({
  title: line.min(1, "Give the title, or what the notebook is called."),
  /** One author a line, family name first. */
  authors: z.string().trim().max(2000),
  year: z
    .string()
    .trim()
    .regex(/^(?:\d{4})?$/, "Give the year with four digits, or leave it empty."),
  container: line,
  publisher: line,
  doi: z
    .string()
    .trim()
    .transform((text) => text.replace(/^(?:https?:\/\/(?:dx\.)?doi\.org\/|doi:\s*)/i, ""))
    .pipe(z.string().regex(/^(?:10\.\d{4,9}\/\S+)?$/, "A DOI begins with 10., as in 10.1063/1.555845.")),
  sourceKind: z.enum(["measurement", "evaluation", "calculation", "estimate"], "Say how the values came about."),
  /** What a reader should know of the source, such as that its numbers are invented. */
  note: z.string().trim().max(1000),
});
export type NewSource = z.infer<typeof newSource>;

/** The source of a sheet's values: one that the table knows, or a new one. */
export const sourceChoice = z.discriminatedUnion("kind", [
  z.strictObject({ kind: z.literal("known"), sourceId: z.string().min(1) }),
  z.strictObject({ kind: z.literal("new"), source: newSource }),
]);
export type SourceChoice = z.infer<typeof sourceChoice>;

/** The citation as CSL-JSON: authors with family and given names, what is empty left out. */
export function cslOf(source: NewSource): Record<string, unknown> {
  const author = source.authors
    .split(/\n|;/)
    .map((name) => name.trim())
    .filter((name) => name !== "")
    .map((name) => {
      const [family = "", ...given] = name.split(",").map((part) => part.trim());
      return given.length > 0 ? { family, given: given.join(", ") } : { literal: name };
    });
  return {
    type: source.container !== "" ? "article-journal" : source.publisher !== "" ? "book" : "report",
    title: source.title,
    ...(author.length > 0 ? { author } : {}),
    ...(source.year !== "" ? { issued: { "date-parts": [[Number(source.year)]] } } : {}),
    ...(source.container !== "" ? { "container-title": source.container } : {}),
    ...(source.publisher !== "" ? { publisher: source.publisher } : {}),
    ...(source.doi !== "" ? { DOI: source.doi } : {}),
    ...(source.note !== "" ? { note: source.note } : {}),
  };
}
