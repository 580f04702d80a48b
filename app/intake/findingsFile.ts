import Papa from "papaparse";

/** One finding of the reading, as the file of findings holds it. */
export interface FindingLine {
  row: number;
  column: string;
  cell: string;
  wrong: string;
  cure: string;
}

/**
 * The findings of the reading as CSV. A cell that begins like a formula of a spreadsheet is quoted off with an apostrophe,
 * unless it is a number: a minus sign is the rule there and not an attack.
 */
export function findingsAsCsv(findings: readonly FindingLine[]): string {
  const guarded = (text: string): string =>
    /^[=+\-@\t\r]/.test(text) && !/^[-+]?\d[\d.,\s]*$/.test(text) ? `'${text}` : text;
  return `${Papa.unparse(
    {
      fields: ["row", "column", "cell", "what is wrong", "what would mend it"],
      data: findings.map((one) => [
        one.row,
        guarded(one.column),
        guarded(one.cell),
        guarded(one.wrong),
        guarded(one.cure),
      ]),
    },
    { newline: "\r\n" },
  )}\r\n`;
}
