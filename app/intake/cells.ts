import { readUnit } from "#app/thermo/unit.ts";

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

/** The row of units that some sheets put below their heads: every filled cell is a unit, and one is of an energy. */
export function isUnitsRow(cells: readonly string[]): boolean {
  const filled = cells.map(bare).filter((cell) => cell !== "");
  const isUnit = (cell: string): boolean => readUnit(cell).outcome === "read";
  return filled.some(isUnit) && filled.every((cell) => isUnit(cell) || /^(?:K|°\s?C|g\/mol|g mol-1|[-–—])$/.test(cell));
}

/** Units below a head often stand in brackets. */
function bare(cell: string): string {
  return cell.trim().replace(/^[[(](.*)[\])]$/, "$1");
}
