import { expect, test } from "vitest";
import { checksRun, revisionsBehind } from "./editionPage.ts";

test("hands and acceptances stand under their own revision", () => {
  const at = new Date("2026-03-12T10:00:00Z");
  const behind = revisionsBehind(
    [
      { id: 3, title: "Oxides", lines: 5 },
      { id: 4, title: "Ions", lines: 1 },
    ],
    [
      { revisionId: 3, name: "Ines Halvard" },
      { revisionId: 3, name: "Tom Breckan" },
      { revisionId: 4, name: "Tom Breckan" },
    ],
    [{ revisionId: 3, name: "Ruth Amsel", lines: 5, at }],
  );
  expect(behind).toEqual([
    {
      id: 3,
      title: "Oxides",
      lines: 5,
      writtenBy: ["Ines Halvard", "Tom Breckan"],
      reviewedBy: [{ name: "Ruth Amsel", lines: 5, at }],
    },
    { id: 4, title: "Ions", lines: 1, writtenBy: ["Tom Breckan"], reviewedBy: [] },
  ]);
});

test("the checks that ran stand in today's order with what they found; a check that is gone keeps its code", () => {
  const titles = new Map([
    ["gibbs-closure", "Gibbs closure"],
    ["duplicate", "Proposed twice"],
  ]);
  const ran = checksRun(
    { "an-old-one": 2, duplicate: 1, "gibbs-closure": 3 },
    [
      { check: "gibbs-closure", severity: "block", n: 2 },
      { check: "gibbs-closure", severity: "look", n: 1 },
    ],
    titles,
  );
  expect(ran).toEqual([
    { code: "gibbs-closure", title: "Gibbs closure", version: 3, known: true, found: { block: 2, look: 1, remark: 0 } },
    { code: "duplicate", title: "Proposed twice", version: 1, known: true, found: { block: 0, look: 0, remark: 0 } },
    { code: "an-old-one", title: "an-old-one", version: 2, known: false, found: { block: 0, look: 0, remark: 0 } },
  ]);
});
