import { createHash } from "node:crypto";
import canonicalize from "canonicalize";
import { z } from "zod";
import type { Digits } from "#app/thermo/digits.ts";
import { readDigits } from "#app/thermo/digits.ts";

/** A decimal in canonical form, digits kept. */
const digitsText = z
  .string()
  .refine((text) => readDigits(text) === text, "Not a plain decimal number.")
  .transform((text) => text as Digits);

export const uncertaintyContent = z.strictObject({
  digits: digitsText,
  kind: z.enum(["exact", "standard", "expanded", "unstated"]),
  coverageFactor: z.number().positive().nullable(),
});

/** A proposed value, in the unit of its property, with what the sheet said beside it. */
export const valueContent = z.strictObject({
  kind: z.literal("value"),
  digits: digitsText,
  uncertainty: uncertaintyContent.nullable(),
  /** In kelvin. */
  temperature: digitsText,
  /** In pascal. */
  standardPressure: digitsText,
  basis: z.enum(["molality", "concentration"]).nullable(),
  origin: z.literal("stated"),
  method: z.string().nullable(),
  given: z.strictObject({ text: z.string(), unit: z.string(), note: z.string().nullable() }),
  /** A remark of the source that checks heed, such as a constraint its compilers relaxed. */
  remark: z.string().nullable(),
  sourceId: z.string(),
});

/** The proposal to take a value out of the table. */
export const withdrawalContent = z.strictObject({ kind: z.literal("withdrawal"), reason: z.string().min(1) });

/** What a species is called: its key (unique in an edition), printed formula, label, names and numbers. */
export const detailContent = z.strictObject({
  kind: z.literal("detail"),
  key: z.string().min(1),
  printed: z.string().min(1),
  label: z.string().nullable(),
  name: z.string(),
  cas: z.string().nullable(),
  inchikey: z.string().nullable(),
  synonyms: z.array(z.string()),
});

/** A source: CSL-JSON citation, DOI, kind, and a notice such as a retraction. */
export const sourceContent = z.strictObject({
  kind: z.literal("source"),
  citation: z.record(z.string(), z.unknown()),
  doi: z.string().nullable(),
  sourceKind: z.enum(["measurement", "evaluation", "calculation", "estimate"]),
  notice: z.string().nullable(),
});

export const lineContent = z.discriminatedUnion("kind", [
  valueContent,
  withdrawalContent,
  detailContent,
  sourceContent,
]);

export type UncertaintyContent = z.infer<typeof uncertaintyContent>;
export type ValueContent = z.infer<typeof valueContent>;
export type WithdrawalContent = z.infer<typeof withdrawalContent>;
export type DetailContent = z.infer<typeof detailContent>;
export type SourceContent = z.infer<typeof sourceContent>;
export type LineContent = z.infer<typeof lineContent>;

/** SHA-256 of the content's RFC 8785 JSON: what a decision is bound to. */
export function contentHash(content: LineContent): Buffer {
  return createHash("sha256")
    .update(canonicalize(content) ?? "")
    .digest();
}

/** Whether two contents say the same. How a number was typed is no part of what it says. */
export function saysTheSame(one: LineContent, other: LineContent): boolean {
  const said = (content: LineContent): string | undefined =>
    canonicalize(content.kind === "value" ? { ...content, given: null } : content);
  return said(one) === said(other);
}
