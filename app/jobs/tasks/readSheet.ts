/** Reads the rows of a sheet whose plan was confirmed. */
export async function readSheetTask({ sheetId }: { sheetId: number }): Promise<void> {
  // Loaded with the first sheet: a worker that only sends letters does without the readers.
  const { readSheet } = await import("#app/intake/readSheet.server.ts");
  await readSheet(sheetId);
}
