import { decodeSheet, type DecodedSheet } from "#app/intake/decode.ts";
import { type MatchOutcome, matchSpecies, settleRows } from "#app/intake/match.ts";
import { checkPlan, NO_CONTEXT, planColumns, type PlanGuess, type SheetSettings } from "#app/intake/plan.ts";
import { readRows, type RowOutcome, type SheetFrame } from "#app/intake/readRows.ts";

/** What became of a row: read and matched, refused or skipped. */
export type FinalOutcome = MatchOutcome | Exclude<RowOutcome, { outcome: "read" }>;

export interface PureReading {
  sheet: DecodedSheet;
  guess: PlanGuess;
  errors: ReturnType<typeof checkPlan>;
  /** By row number. */
  final: Map<number, FinalOutcome>;
}

/**
 * A sheet read the whole pure way as its guessed plan has it, into an empty table: bytes, columns, rows, species. Values
 * are taken to be at 298.15 K, and at 100 kPa unless the sheet says otherwise.
 */
export function readPurely(
  bytes: Uint8Array,
  said: Partial<SheetSettings> = {},
  more: Pick<SheetFrame, "sourceKeys"> & { missingUnit?: "cal/(mol K)" } = {},
): PureReading {
  const decoding = decodeSheet(bytes);
  if (decoding.outcome === "refused") throw new Error(decoding.sentence);
  const { sheet } = decoding;
  const guess = planColumns(sheet, NO_CONTEXT);
  const settings: SheetSettings = {
    ...guess.settings,
    temperature: "298.15",
    standardPressure: guess.settings.standardPressure ?? "100000",
    ...said,
  };
  if (more.missingUnit) {
    for (const column of guess.plan) if (column.means === "value") column.unit ??= more.missingUnit;
  }
  const frame: SheetFrame = {
    heads: sheet.heads,
    headRow: sheet.headRow,
    plan: guess.plan,
    settings,
    ...(more.sourceKeys ? { sourceKeys: more.sourceKeys } : {}),
  };
  const outcomes = readRows(
    sheet.rows.map((row) => ({ ...row, answer: null })),
    frame,
  );
  const read = sheet.rows.flatMap((row, index) => {
    const outcome = outcomes[index];
    return outcome?.outcome === "read" ? [{ number: row.number, answer: null, reading: outcome.reading }] : [];
  });
  const matched = matchSpecies(read, [], frame);
  const toSettle = matched.flatMap((outcome, index) =>
    outcome.outcome === "read" ? [{ number: read[index]?.number ?? 0, reading: outcome.reading }] : [],
  );
  const settled = settleRows(toSettle, frame);
  const settledOf = new Map(toSettle.map((row, index) => [row.number, settled[index]]));
  const matchOf = new Map(read.map((row, index) => [row.number, matched[index]]));
  const final = new Map<number, FinalOutcome>();
  for (const [index, row] of sheet.rows.entries()) {
    const outcome = settledOf.get(row.number) ?? matchOf.get(row.number) ?? outcomes[index];
    if (!outcome || !("problems" in outcome || "match" in outcome.reading)) throw new Error("a row was lost");
    final.set(row.number, outcome as FinalOutcome);
  }
  return { sheet, guess, errors: checkPlan(guess.plan, settings), final };
}
