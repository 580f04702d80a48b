import { expect, test } from "vitest";
import { csvRecord, fileDescription, fileHead } from "./tableFile.ts";

test("a field is quoted where RFC 4180 asks for it and nowhere else", () => {
  expect(csvRecord(["H2O(l)", "C(cr,graphite)", 'a "b"', "two\nlines", "-285.830", ""])).toBe(
    'H2O(l),"C(cr,graphite)","a ""b""","two\nlines",-285.830,\r\n',
  );
});

test("the description names every column of the file in order, and the key of a line", () => {
  const described = fileDescription(
    {
      number: 3,
      publishedAt: new Date("2026-03-12T09:00:00Z"),
      licence: "CC-BY-4.0",
      digest: Buffer.alloc(32),
      previousDigest: null,
    },
    { sources: [], speciesWithoutValues: [] },
  );
  expect(described.tableSchema.columns.map((column) => column.name).join(",")).toBe(fileHead().trimEnd());
  expect(described.tableSchema.primaryKey).toEqual(["species", "property"]);
  expect(described).toMatchObject({ "dc:license": "https://spdx.org/licenses/CC-BY-4.0.html", url: "table.csv" });
});
