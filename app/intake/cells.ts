/** Cells that say that there is no value; an empty cell is never a zero. */
export function isAbsent(cell: string): boolean {
  return /^(?:|[-–—−]+|\.{2,}|…|n[./]?\s?[ad]\.?)$/i.test(cell.trim());
}

/** A row that begins with `#` is a comment of whoever wrote the sheet, whatever stands behind it. */
export function isComment(cells: readonly string[]): boolean {
  return (
    cells
      .find((cell) => cell.trim() !== "")
      ?.trimStart()
      .startsWith("#") === true
  );
}

/** A first line such as `sep=;`, by which spreadsheets tell each other the delimiter. */
export function namesDelimiter(cells: readonly string[]): boolean {
  return /^"?sep=/i.test(cells[0] ?? "");
}
