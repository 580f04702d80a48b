import { z } from "zod";
import { newSource } from "#app/sources/sourceForm.ts";

/** The source of a sheet's values: one that the table knows, or a new one. */
export const sourceChoice = z.discriminatedUnion("kind", [
  z.strictObject({ kind: z.literal("known"), sourceId: z.string().min(1) }),
  z.strictObject({ kind: z.literal("new"), source: newSource }),
]);
export type SourceChoice = z.infer<typeof sourceChoice>;
