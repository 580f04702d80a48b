import { expect, test } from "vitest";
import { NOT_READ, READ } from "#app/thermo/spellings.ts";
import { speltPieces } from "./spelt.ts";

test("raised and lowered characters are set in their place, unseen ones are named", () => {
  expect(speltPieces("SO₄²⁻")).toEqual([{ text: "SO" }, { text: "4", as: "sub" }, { text: "2−", as: "sup" }]);
  expect(speltPieces("1\u2009675.7")).toEqual([{ text: "1" }, { named: "thin space" }, { text: "675.7" }]);
  expect(speltPieces("１２．５")).toEqual([{ named: "full-width 12.5" }]);
  expect(speltPieces("Н2О")).toEqual([{ named: "Cyrillic letter" }, { text: "2" }, { named: "Cyrillic letter" }]);
});

test("no spelling of the table needs a character that the shipped font files lack", () => {
  const texts = [...Object.values(READ), ...Object.values(NOT_READ)].flatMap((groups) =>
    groups.flatMap(({ rows }) => rows.map(([text]) => text)),
  );
  const shown = texts.flatMap(speltPieces).map((piece) => ("named" in piece ? piece.named : piece.text));
  // The unicode-range lists of app/styles/typeface.css.
  expect(shown.join("").replace(/[\u0000-\u024f\u0370-\u03ff\u2000-\u206f\u2212]/g, "")).toBe("");
});
