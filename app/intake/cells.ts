/** Cells that say that there is no value; an empty cell is never a zero. */
export function isAbsent(cell: string): boolean {
  return /^(?:|[-–—−]+|\.{2,}|…|n[./]?\s?[ad]\.?)$/i.test(cell.trim());
}
