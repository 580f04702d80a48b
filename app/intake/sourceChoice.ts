import { z } from "zod";
import { newSource } from "#app/sources/sourceForm.ts";

const known = z.strictObject({ kind: z.literal("known"), sourceId: z.string().min(1) });
const described = z.strictObject({ kind: z.literal("new"), source: newSource });

/** One source: one that the table knows, or a new one. */
const oneSource = z.discriminatedUnion("kind", [known, described]);
export type OneSource = z.infer<typeof oneSource>;

/**
 * Where a sheet's values come from: one source for all of them, or one for each key of a column. A key without an answer
 * has its rows refused; `otherwise` is the source of rows whose cell is empty.
 */
export const sourceChoice = z.discriminatedUnion("kind", [
  known,
  described,
  z.strictObject({
    kind: z.literal("byKey"),
    keys: z.array(z.strictObject({ key: z.string().min(1), choice: oneSource.nullable() })),
    otherwise: oneSource.nullable(),
  }),
]);
export type SourceChoice = z.infer<typeof sourceChoice>;

/** The keys that were answered; the empty one stands for rows without a key. Undefined where one source holds for all. */
export function answeredKeys(choice: SourceChoice | null): ReadonlySet<string> | undefined {
  if (choice?.kind !== "byKey") return undefined;
  const keys = choice.keys.flatMap((one) => (one.choice === null ? [] : [one.key]));
  return new Set(choice.otherwise === null ? keys : [...keys, ""]);
}

/** Every source that was chosen, with the key it was chosen for; null is the sheet as a whole or the rows without a key. */
export function chosenSources(choice: SourceChoice | null): { key: string | null; choice: OneSource }[] {
  if (choice === null) return [];
  if (choice.kind !== "byKey") return [{ key: null, choice }];
  const ofKeys = choice.keys.flatMap((one) => (one.choice === null ? [] : [{ key: one.key, choice: one.choice }]));
  return choice.otherwise === null ? ofKeys : [...ofKeys, { key: null, choice: choice.otherwise }];
}
