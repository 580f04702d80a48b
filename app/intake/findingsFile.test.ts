import { expect, test } from "vitest";
import { findingsAsCsv } from "./findingsFile.ts";

test("findings as a file: texts that look like formulas are quoted off, negative numbers are not", () => {
  const finding = { row: 14, column: "S", wrong: "It cannot be negative.", cure: "Take 16,72" };
  expect(
    findingsAsCsv([
      { ...finding, cell: "-16,72" },
      { ...finding, cell: '=HYPERLINK("x")' },
      { ...finding, cell: "-2+3", column: "@S" },
    ]),
  ).toBe(
    [
      "row,column,cell,what is wrong,what would mend it",
      '14,S,"-16,72",It cannot be negative.,"Take 16,72"',
      `14,S,"'=HYPERLINK(""x"")",It cannot be negative.,"Take 16,72"`,
      `14,'@S,'-2+3,It cannot be negative.,"Take 16,72"`,
      "",
    ].join("\r\n"),
  );
});
