import { describe, expect, test } from "vitest";
import { acts } from "./acts.ts";
import { actInWords, detailInWords } from "./words.ts";

test("every kind of act reads as words, without its code", () => {
  for (const act of Object.keys(acts)) expect(actInWords(act)).toMatch(/^[a-z][a-z -]+$/);
  expect(actInWords("revision.lines-accepted")).toBe("lines accepted");
});

describe("the detail of an entry", () => {
  const words = (detail: Record<string, unknown>) =>
    detailInWords(detail).map(({ label, body }) => `${label}: ${body}`);

  test("says what was before and after in one line", () => {
    expect(words({ before: ["analyst", "steward"], after: ["reviewer"] })).toEqual([
      "changed: analyst, steward to reviewer",
    ]);
    expect(words({ before: [], after: ["reviewer"] })).toEqual(["changed: none to reviewer"]);
  });

  test("says of two states only what differs", () => {
    const before = { title: "Water", summary: "Third run" };
    expect(words({ before, after: { title: "Steam", summary: "Third run" } })).toEqual(["title: Water to Steam"]);
  });

  test("leaves out what is empty, and writes names as words", () => {
    expect(words({ sheet: null, leftOut: 0, again: true, note: "", sha256: "ab", nothing: {} })).toEqual([
      "left out: 0",
      "again: yes",
      "SHA-256: ab",
    ]);
  });

  test("reads lists of lines", () => {
    expect(
      words({
        lines: [
          { line: 3, version: 1 },
          { line: 4, version: 2 },
        ],
        reason: "Typed wrongly.",
      }),
    ).toEqual(["lines: (line 3; version 1), (line 4; version 2)", "reason: Typed wrongly."]);
  });

  test("is cut where it would fill the page", () => {
    const many = Object.fromEntries(Array.from({ length: 100 }, (_none, n) => [`member${n}`, "x".repeat(1000)]));
    const lines = detailInWords(many);
    expect(lines).toHaveLength(25);
    expect(lines[0]?.body).toHaveLength(301);
    expect(lines.at(-1)?.body).toBe("76 further lines");
  });

  test("of a hostile name stays text", () => {
    expect(words({ __proto__: null, constructor: "<b>", name: "</script>" })).toEqual([
      "constructor: <b>",
      "name: </script>",
    ]);
  });
});
