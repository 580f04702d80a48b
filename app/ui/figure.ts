/** A printed figure cut at its decimal point: "−285.830(20)" is −285 | .830 | (20). */
export interface Figure {
  whole: string;
  /** With its point; empty for a whole number. */
  fraction: string;
  /** With its brackets; empty where no uncertainty is printed. */
  bracket: string;
}

const thinSpace = "\u2009";

/** Thin spaces in groups of three, for whole parts of five digits or more (SI Brochure, 9th edition, 5.4.4). */
export function groupWhole(whole: string): string {
  const digits = /\d+/.exec(whole)?.[0] ?? "";
  if (digits.length < 5) return whole;
  return whole.replace(digits, digits.replace(/\B(?=(\d{3})+$)/g, thinSpace));
}

/** Cuts a figure in plain notation ("-285.830(20)", "0", "12345.6") for setting on the decimal point. */
export function cutFigure(text: string): Figure {
  const found = /^([+\-−]?\d+)(\.\d+)?(\(\d+(?:\.\d+)?\))?$/.exec(text.trim());
  if (!found) return { whole: text, fraction: "", bracket: "" };
  const [, whole = "", fraction = "", bracket = ""] = found;
  return { whole: groupWhole(whole.replace("-", "−")), fraction, bracket };
}

/** A count for people: thin spaces from five digits on ("3842", "12 074"). */
export function count(n: number): string {
  return groupWhole(String(n));
}

/**
 * How wide the part after the whole number is in the widest figure of a column, in digits, so that all points of the
 * column stand under each other. At most 10 (the stylesheet's range).
 */
export function tailOf(figures: readonly string[]): number {
  let widest = 0;
  for (const text of figures) {
    const { fraction, bracket } = cutFigure(text);
    // A pair of brackets is about as wide as one digit; the point is allowed for in the stylesheet.
    widest = Math.max(widest, fraction.replace(".", "").length + (bracket ? bracket.length - 1 : 0));
  }
  return Math.min(widest, 10);
}
