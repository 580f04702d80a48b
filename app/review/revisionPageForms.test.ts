import { describe, expect, test } from "vitest";
import { publishForm, readFields, revisionForm } from "./revisionPageForms.ts";

function form(fields: Record<string, string | readonly string[]>): FormData {
  const data = new FormData();
  for (const [name, value] of Object.entries(fields)) {
    for (const one of typeof value === "string" ? [value] : value) data.append(name, one);
  }
  return data;
}
const read = (fields: Record<string, string | readonly string[]>) => readFields(form(fields), revisionForm);

describe("the forms of a revision", () => {
  test("lines come with the versions that were seen, one or several", () => {
    expect(read({ intent: "accept", seen: ["417:902", "418:903"] })).toEqual({
      ok: true,
      value: {
        intent: "accept",
        mixtureReason: "",
        seen: [
          { lineId: "417", versionId: "902" },
          { lineId: "418", versionId: "903" },
        ],
      },
    });
  });

  test.each([
    ["decline", { seen: "1:2" }, "reason"],
    ["set-aside", { finding: "3" }, "reason"],
    ["take-out", { line: "3" }, "reason"],
    ["withdraw", {}, "reason"],
    ["return", {}, "remark"],
    ["comment", {}, "body"],
    ["rewrite", { line: "1", version: "1", value: "1", unit: "kJ/mol", kind: "none" }, "reason"],
    ["describe", {}, "title"],
  ])("%s without its words is wrong at its field, blank or missing", (intent, rest, field) => {
    for (const words of [{}, { [field]: "  \n " }]) {
      const reading = read({ intent, ...rest, ...words });
      if (reading.ok) throw new Error("it was read");
      expect(Object.keys(reading.errors)).toEqual([field]);
    }
  });

  test.each([
    ["nothing", {}],
    ["an unknown intent", { intent: "erase" }],
    ["a name of the language", { intent: "__proto__" }],
    ["a line that is no number", { intent: "accept", seen: "x:1" }],
    ["a line beyond every number", { intent: "accept", seen: `${"9".repeat(40)}:1` }],
    ["no line", { intent: "accept" }],
    ["a digest of another form", { intent: "accept-clean", digest: "0" }],
    ["fields named like members of every object", { __proto__: "x", constructor: "y", intent: "accept" }],
  ])("%s is refused and nothing is thrown", (_what, fields) => {
    expect(read(fields).ok).toBe(false);
  });

  test("a remark longer than the column is refused, not cut", () => {
    expect(read({ intent: "send", remark: "x".repeat(5001) }).ok).toBe(false);
    expect(read({ intent: "send", remark: "x".repeat(5000) }).ok).toBe(true);
  });
});

describe("the form of a publication", () => {
  const whole = {
    intent: "publish",
    expectedPrevious: "7",
    listDigest: "a".repeat(64),
    notes: "Oxides.",
    licence: "CC-BY-4.0",
  };
  const publication = (rest: Record<string, string>) => readFields(form({ ...whole, ...rest }), publishForm);

  test("is read whole", () => {
    expect(publication({})).toMatchObject({ ok: true, value: { expectedPrevious: 7, withdrawalReason: "" } });
  });

  test.each([
    ["no notes", { notes: " " }, "notes"],
    ["a licence that is no identifier", { licence: "all rights" }, "licence"],
    ["a withdrawal without reason", { withdraws: "3" }, "withdrawalReason"],
    ["a reason without an edition", { withdrawalReason: "wrong unit" }, "withdraws"],
    ["an edition that is no number", { withdraws: "three", withdrawalReason: "x" }, "withdraws"],
  ])("%s is wrong at its field", (_what, rest, field) => {
    const reading = publication(rest);
    if (reading.ok) throw new Error("it was read");
    expect(Object.keys(reading.errors)).toEqual([field]);
  });
});
