import type { Piece } from "#app/ui/formulaPieces.ts";

/** A run of a spelling: as it is set, or the name of a character that nobody could see or the typeface lacks. */
export type SpeltPiece = Piece | { named: string };

const RAISED: Readonly<Record<string, string>> = levels("⁰¹²³⁴⁵⁶⁷⁸⁹⁺⁻⁼⁽⁾ᵃ", "0123456789+−=()a");
const LOWERED: Readonly<Record<string, string>> = levels("₀₁₂₃₄₅₆₇₈₉₊₋₌₍₎ₗ", "0123456789+−=()l");

const UNSEEN: Readonly<Record<string, string>> = {
  "\u00a0": "no-break space",
  "\u00ad": "soft hyphen",
  "\u2007": "figure space",
  "\u2009": "thin space",
  "\u202f": "narrow no-break space",
  "‐": "hyphen, U+2010",
  "‑": "no-break hyphen",
  "‒": "figure dash",
  "≥": "at least",
  "≈": "about",
  "∞": "infinity",
  "⋅": "dot operator",
  ℓ: "script l",
  "－": "full-width minus",
};

const WIDE = "full-width ";

/** The characters of the shipped font files (app/styles/typeface.css), less those that cannot be told apart. */
const SHIPPED = /[ -~¡-ɏͰ-Ͽ–-⁄−]/u;

/**
 * A spelling as a page can show it: raised and lowered characters in their place, and in words whatever a reader could
 * not see (kinds of spaces and dashes) or the typeface lacks.
 */
export function speltPieces(text: string): SpeltPiece[] {
  const pieces: SpeltPiece[] = [];
  const push = (piece: SpeltPiece): void => {
    const last = pieces.at(-1);
    if (last && "text" in last && "text" in piece && last.as === piece.as) last.text += piece.text;
    else if (
      last &&
      "named" in last &&
      "named" in piece &&
      [last, piece].every(({ named }) => named.startsWith(WIDE))
    ) {
      last.named += piece.named.slice(WIDE.length);
    } else pieces.push(piece);
  };
  for (const character of text) {
    const raised = RAISED[character];
    const lowered = LOWERED[character];
    const named = UNSEEN[character];
    if (raised !== undefined) push({ text: raised, as: "sup" });
    else if (lowered !== undefined) push({ text: lowered, as: "sub" });
    else if (named !== undefined) push({ named });
    else if (SHIPPED.test(character)) push({ text: character });
    else push({ named: nameOf(character) });
  }
  return pieces;
}

function nameOf(character: string): string {
  const plain = character.normalize("NFKC");
  if (plain !== character && SHIPPED.test(plain)) return `${WIDE}${plain}`;
  if (/\p{Script=Cyrillic}/u.test(character)) return "Cyrillic letter";
  return `U+${(character.codePointAt(0) ?? 0).toString(16).toUpperCase().padStart(4, "0")}`;
}

function levels(from: string, to: string): Readonly<Record<string, string>> {
  return Object.fromEntries(Array.from(from, (character, index) => [character, to[index] ?? character]));
}
