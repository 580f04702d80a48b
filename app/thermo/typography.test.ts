import { describe, expect, it } from "vitest";
import { markedText, plainText } from "./typography.ts";

describe("typesetting undone", () => {
  it.each([
    ["SO₄²⁻", "SO4^{2-}", "SO42-"],
    ["SO<sub>4</sub><SUP>2−</SUP>", "SO4^{2-}", "SO42-"],
    ["mol⁻¹", "mol^{-1}", "mol-1"],
    ["−1\u2009675", "-1 675", "-1 675"],
    ["a–b—c", "a-b-c", "a-b-c"],
    ["½", "1/2", "1/2"],
    ["X • Y ⋅ Z", "X · Y · Z", "X · Y · Z"],
    ["&minus;5&nbsp;&middot;&#8722;", "-5 ·-", "-5 ·-"],
    ["&constructor;", "&constructor;", "&constructor;"],
    ["zero\u200bwidth", "zerowidth", "zerowidth"],
  ])("%j", (text, marked, plain) => {
    expect(markedText(text).replace(/_\{(\d)\}/g, "$1")).toBe(marked);
    expect(plainText(text)).toBe(plain);
  });

  it("keeps the level of a lowered digit", () => {
    expect([markedText("O₂"), markedText("O<sub>2</sub>"), markedText("O2")]).toEqual(["O_{2}", "O_{2}", "O2"]);
  });
});
