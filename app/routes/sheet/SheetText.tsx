const PIECES = /([⁰¹²³⁴-⁹⁺⁻]+)|([₀-₉₊₋]+)/u;
const RAISED = "⁰¹²³⁴⁵⁶⁷⁸⁹⁺⁻";
const LOWERED = "₀₁₂₃₄₅₆₇₈₉₊₋";
const LEVEL = "0123456789+−";

const level = (text: string, from: string): string =>
  Array.from(text, (character) => LEVEL[from.indexOf(character)] ?? character).join("");

/**
 * A text of the sheet to the letter: nothing is read into it. Only raised and lowered characters, which the font lacks,
 * are set as what they mean, and a number's minus is a true one.
 */
export function SheetText({ text }: { text: string }) {
  const parts = text.replace(/^-(?=[\d.,])/, "−").split(PIECES);
  return parts.map((part, index) => {
    if (!part) return null;
    // The split keeps its two groups: text, raised, lowered, text …
    if (index % 3 === 1) return <sup key={index}>{level(part, RAISED)}</sup>;
    if (index % 3 === 2) return <sub key={index}>{level(part, LOWERED)}</sub>;
    return part;
  });
}
