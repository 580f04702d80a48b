/**
 * The label of a species: the form of a solid or the name of an isomer, as the key holds it. No spaces, so that a key
 * is one word; Greek letters are spelled out, so that `α` and `alpha` are one form.
 */

const LONGEST_LABEL = 60;

const GREEK: Readonly<Record<string, string>> = {
  α: "alpha",
  β: "beta",
  γ: "gamma",
  δ: "delta",
  ε: "epsilon",
  ζ: "zeta",
  η: "eta",
  θ: "theta",
  κ: "kappa",
  λ: "lambda",
  ω: "omega",
};

/**
 * Brings a label to the one spelling a key uses: `Alpha quartz` becomes `alpha-quartz`, `α` becomes `alpha`.
 * Short words keep their capitals, since they may mean something (`II`, `D`, `L`).
 *
 * @returns undefined when nothing is left or a character cannot stand in a key
 */
export function normalizeLabel(text: string): string | undefined {
  const label = text
    .normalize("NFC")
    .trim()
    .replace(/[α-ω]/gu, (letter) => GREEK[letter] ?? letter)
    .replace(/[\s_‐‑–—]+/g, "-")
    .replace(/-*,-*/g, ",")
    .replace(/^[-,]+|[-,]+$/g, "")
    .replace(/\p{L}{4,}/gu, (word) => word.toLowerCase());
  return label.length <= LONGEST_LABEL && /^[\p{L}\p{N}'+.,-]+$/u.test(label) ? label : undefined;
}
