/** One run of a typeset text: plain, lowered, raised, or set in italics. */
export interface Piece {
  text: string;
  as?: "sub" | "sup" | "italic";
}

/** True minus in place of the keyboard's hyphen. */
export const trueMinus = (text: string): string => text.replaceAll("-", "−");

/**
 * Cuts a printed formula ("SO4-2", "CuSO4·5H2O", "Fe0.947O", "Al(OH)4-") into runs for sub- and superscripts. Counts after
 * an element or a bracket are lowered, counts in front of a part ("·5H2O", "·8/3H2O") stand on the line, the charge is
 * raised with its sign last, as the Green Book prints it (section 2.10.1).
 */
export function formulaPieces(printed: string): Piece[] {
  const pieces: Piece[] = [];
  const push = (text: string, as?: Piece["as"]) => {
    const last = pieces.at(-1);
    if (last && last.as === as) last.text += text;
    else pieces.push(as ? { text, as } : { text });
  };
  const charge = /([+\-−])(\d*)$/.exec(printed);
  const body = charge ? printed.slice(0, charge.index) : printed;
  const parts = body.split(/[·*]/);
  parts.forEach((part, index) => {
    if (index > 0) push("·");
    const lead = /^\d+(?:\/\d+|\.\d+)?/.exec(part)?.[0] ?? "";
    if (lead) push(lead);
    for (const [run] of part.slice(lead.length).matchAll(/\d+(?:\.\d+)?(?:\/\d+)?|[^\d]+/g)) {
      push(run, /^\d/.test(run) ? "sub" : undefined);
    }
  });
  if (charge) push((charge[2] === "1" ? "" : (charge[2] ?? "")) + trueMinus(charge[1] ?? ""), "sup");
  return pieces;
}

/** A species key cut into formula, phase and label: "C(cr,graphite)" is ["C", "cr", "graphite"]. */
export function keyParts(key: string): { formula: string; phase: string | null; label: string | null } {
  const found = /^(.+)\((g|l|s|cr|am|vit|lc|aq)(?:,([^()]+))?\)$/.exec(key);
  if (!found) return { formula: key, phase: null, label: null };
  return { formula: found[1] ?? "", phase: found[2] ?? null, label: found[3] ?? null };
}

/** The state in brackets as it is printed: "(cr, graphite)". */
export function statePrinted(phase: string, label: string | null): string {
  return label ? `(${phase}, ${label})` : `(${phase})`;
}
