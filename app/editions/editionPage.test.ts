import { describe, expect, test } from "vitest";
import { catalogueRecord, citationRecord, citationText, firstLine, readComparison } from "./editionPage.ts";

const cited = {
  number: 7,
  // Late in the evening of the laboratory, the next day in UTC.
  publishedAt: new Date("2026-03-12T23:30:00-05:00"),
  publisher: "Ruth Amsel",
  licence: "CC-BY-4.0",
  digest: "ab".repeat(32),
  address: "https://tables.calderpoint.example/editions/7",
};

test("a list has the first line of the notes", () => {
  expect(firstLine("\nAmmonia anew.\r\nAnd silver chloride.")).toBe("Ammonia anew.");
  expect(firstLine("  ")).toBe("");
});

test("a citation names number, publisher, day in UTC, address, licence and digest", () => {
  const text = citationText(cited);
  const parts = ["edition 7", "Ruth Amsel", "2026-03-13", cited.address, "CC-BY-4.0", cited.digest];
  for (const part of parts) expect(text).toContain(part);
  expect(citationRecord(cited)).toMatchObject({
    type: "dataset",
    version: "7",
    issued: { "date-parts": [[2026, 3, 13]] },
    URL: cited.address,
  });
});

test("a catalogue's record leads to the edition before, the one that withdrew it, and the file", () => {
  const shared = { ...cited, notes: "Ammonia anew.", speciesCount: 151, valueCount: 428, download: "https://x/t.csv" };
  const first = catalogueRecord({ ...shared, previous: null, withdrawnBy: null });
  expect(first).not.toHaveProperty("dcat:previousVersion");
  expect(first).not.toHaveProperty("dct:isReplacedBy");
  expect(catalogueRecord({ ...shared, previous: "https://x/6", withdrawnBy: "https://x/8" })).toMatchObject({
    "@id": cited.address,
    "dct:issued": { "@value": "2026-03-13T04:30:00.000Z" },
    "dct:license": { "@id": "https://spdx.org/licenses/CC-BY-4.0.html" },
    "dcat:version": "7",
    "dcat:previousVersion": { "@id": "https://x/6" },
    "dct:isReplacedBy": { "@id": "https://x/8" },
    "dcat:distribution": { "dcat:downloadURL": { "@id": "https://x/t.csv" } },
  });
});

describe("the form that asks for a comparison", () => {
  const read = (query: string, numbers = [3, 2, 1]) => readComparison(new URLSearchParams(query), numbers);

  test("is silent on an address without it", () => {
    expect(read("")).toEqual({ kind: "none" });
    expect(read("from=&to=")).toEqual({ kind: "none" });
    expect(read("sort=number")).toEqual({ kind: "none" });
  });

  test.each([
    ["from=1&to=3", 1, 3],
    ["from=3&to=1", 3, 1],
    ["from=%202&to=current", 2, 3],
  ])("%s asks for %i against %i", (query, from, to) => {
    expect(read(query)).toEqual({ kind: "asked", from, to });
  });

  test.each([
    ["from=2&to=2", "does not differ from itself"],
    ["from=current&to=3", "does not differ from itself"],
    ["from=1", "Choose both"],
    ["to=1", "Choose both"],
    ["from=1&to=4", "no edition “4”"],
    ["from=01&to=2", "no edition “01”"],
    ["from=-1&to=2", "no edition “-1”"],
    [`from=1&to=${"9".repeat(400)}`, "no edition “9999"],
    ["from=1&to=%00", "no edition"],
  ])("%s is refused with a sentence: %s", (query, sentence) => {
    const asked = read(query);
    expect(asked).toMatchObject({ kind: "refused", remark: expect.stringContaining(sentence) });
  });

  test("says so where there is nothing to compare", () => {
    expect(read("from=current&to=1", [])).toMatchObject({
      kind: "refused",
      remark: expect.stringMatching(/^No edition is published yet/),
    });
  });
});
