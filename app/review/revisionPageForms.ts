import { z } from "zod";
import { UNITS } from "#app/thermo/unit.ts";
import { UNCERTAINTY_CHOICES } from "./writtenValue.ts";

/*
 * What the forms of the review pages send. Every form names its intent; the sentences stand at the field that lacks
 * something. Limits are those of the database.
 */

const LONGEST_REMARK = 5000;
const LONGEST_TITLE = 200;

const required = (sentence: string, most: number = LONGEST_REMARK) =>
  z.string({ error: sentence }).trim().min(1, sentence).max(most, `At most ${most} characters; this is longer.`);
const optional = (most: number = LONGEST_REMARK) =>
  z.string().trim().max(most, `At most ${most} characters; this is longer.`).default("");
const identifier = z
  .string({ error: "The form does not say which line it is about. Load the page again." })
  .regex(/^[1-9]\d{0,17}$/, "The form does not say which line it is about. Load the page again.");
const counted = z.coerce
  .number({ error: "The form is damaged. Load the page again." })
  .int("The form is damaged. Load the page again.")
  .min(0)
  .max(1_000_000_000);

/** A line with the version of it that the person saw, "417:902". */
const seenLine = z
  .string({ error: "The form does not say which line it is about. Load the page again." })
  .regex(/^[1-9]\d{0,17}:[1-9]\d{0,17}$/, "The form does not say which line it is about. Load the page again.")
  .transform((text) => {
    const [lineId = "", versionId = ""] = text.split(":");
    return { lineId, versionId };
  });

/** The answer to what the checks found in the mixture that a decision would leave. */
const mixtureAnswer = {
  mixture: z
    .string()
    .regex(/^[0-9a-f]{64}$/, "The form is damaged. Load the page again.")
    .optional(),
  mixtureReason: optional(),
};

/** What a person may do on the page of a revision. */
export const revisionForm = z.discriminatedUnion(
  "intent",
  [
    z.object({
      intent: z.literal("accept"),
      seen: z.array(seenLine).min(1, "Choose at least one line."),
      ...mixtureAnswer,
    }),
    z.object({
      intent: z.literal("accept-clean"),
      digest: z
        .string({ error: "The form is damaged. Load the page again." })
        .regex(/^[0-9a-f]{64}$/, "The form is damaged. Load the page again."),
      ...mixtureAnswer,
    }),
    z.object({
      intent: z.literal("decline"),
      seen: z.array(seenLine).min(1, "Choose at least one line."),
      reason: required("Say why the line is declined."),
      ...mixtureAnswer,
    }),
    z.object({
      intent: z.literal("set-aside"),
      finding: identifier,
      reason: required("Say why the finding is set aside."),
    }),
    z.object({
      intent: z.literal("comment"),
      line: identifier.optional(),
      body: required("Write something first."),
    }),
    z.object({ intent: z.literal("answer"), comment: identifier, body: required("Write something first.") }),
    z.object({ intent: z.literal("return"), remark: required("Say what should be mended.") }),
    z.object({ intent: z.literal("close"), password: z.string().max(LONGEST_REMARK).default("") }),
    z.object({
      intent: z.literal("rewrite"),
      line: identifier,
      version: counted,
      value: required("Write the value.", 100),
      unit: z.enum(UNITS as readonly [string, ...string[]], { error: "Choose a unit." }),
      uncertainty: optional(100),
      kind: z.enum(UNCERTAINTY_CHOICES, { error: "Choose the kind of uncertainty." }),
      reason: required("Say why the value is changed."),
    }),
    z.object({
      intent: z.literal("take-suggestion"),
      finding: identifier,
      index: counted,
      seen: z.array(seenLine).min(1, "The form is damaged. Load the page again."),
    }),
    z.object({ intent: z.literal("take-out"), line: identifier, reason: required("Say why the line is taken out.") }),
    z.object({
      intent: z.literal("describe"),
      title: required("Give the revision a title.", LONGEST_TITLE).refine(
        (title) => !/\p{Cc}/u.test(title),
        "A title stands on one line.",
      ),
      summary: optional(),
    }),
    z.object({ intent: z.literal("send"), remark: optional() }),
    z.object({ intent: z.literal("restate"), line: identifier.optional() }),
    z.object({ intent: z.literal("withdraw"), reason: required("Say why the revision is withdrawn.") }),
  ],
  { error: "The form does not say what to do. Load the page again." },
);

export type RevisionForm = z.infer<typeof revisionForm>;

/** What the forms of the publishing page send. */
export const publishForm = z
  .object({
    intent: z.enum(["look", "change", "publish"], { error: "The form does not say what to do. Load the page again." }),
    expectedPrevious: counted,
    listDigest: z
      .string({ error: "The form is damaged. Load the page again." })
      .regex(/^[0-9a-f]{64}$/, "The form is damaged. Load the page again."),
    notes: required("Say what this edition brings.", 20_000),
    licence: required("Give an SPDX identifier such as CC-BY-4.0.", 64).refine(
      (text) => /^[A-Za-z0-9.+-]*$/.test(text),
      "An SPDX identifier holds letters, digits, points, plus and minus signs, such as CC-BY-4.0.",
    ),
    withdraws: z.coerce.number({ error: "Choose an edition of the list." }).int().min(1).max(1_000_000_000).optional(),
    withdrawalReason: optional(),
    password: z.string().max(LONGEST_REMARK).default(""),
  })
  .refine((form) => form.withdraws === undefined || form.withdrawalReason !== "", {
    error: "Say why that edition is withdrawn.",
    path: ["withdrawalReason"],
  })
  .refine((form) => form.withdraws !== undefined || form.withdrawalReason === "", {
    error: "Choose the edition that this reason is about, or leave the reason empty.",
    path: ["withdraws"],
  });

export type PublishForm = z.infer<typeof publishForm>;

/** What a form came to: its values, or what is wrong, by field; "" is the form as a whole. */
export type FormReading<T> = { ok: true; value: T } | { ok: false; errors: Record<string, string[]> };

/** Fields that may come several times. */
const LISTS = ["seen"];

/**
 * Reads a form by its schema. An empty field counts as one that was not sent; of a field sent twice the last counts, but
 * for the lists.
 */
export function readFields<Schema extends z.ZodType>(form: FormData, schema: Schema): FormReading<z.output<Schema>> {
  const fields: Record<string, string | string[]> = Object.create(null) as Record<string, string | string[]>;
  for (const [name, value] of form) {
    if (typeof value !== "string" || value === "") continue;
    if (LISTS.includes(name)) fields[name] = [...(fields[name] ?? []), value];
    else fields[name] = value;
  }
  const result = schema.safeParse({ ...fields });
  if (result.success) return { ok: true, value: result.data };
  const errors: Record<string, string[]> = {};
  for (const issue of result.error.issues) {
    const name = String(issue.path[0] ?? "");
    (errors[name] ??= []).push(issue.message);
  }
  return { ok: false, errors };
}
