/** The states of a sheet and the moves between them; the trigger `sheet_moves` keeps the same list. */
export const SHEET_STATES = ["received", "planned", "reading", "read", "built", "failed"] as const;
export type SheetState = (typeof SHEET_STATES)[number];

export const sheetMoves: Record<SheetState, readonly SheetState[]> = {
  received: ["planned", "failed"],
  planned: ["reading", "failed"],
  reading: ["read", "failed"],
  read: ["planned", "built"],
  failed: ["planned"],
  built: [],
};

/** How each state is called on a page. */
export const sheetStateWords: Record<SheetState, string> = {
  received: "received",
  planned: "columns to confirm",
  reading: "being read",
  read: "read",
  built: "revision built",
  failed: "stopped",
};

/** Whether a sheet may go from one state to another. */
export function mayMove(from: SheetState, to: SheetState): boolean {
  return sheetMoves[from].includes(to);
}
