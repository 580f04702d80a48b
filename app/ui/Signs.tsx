import type { DrawnSign } from "./typeset.ts";

/** How severe a finding is; `clean` is a line without one. */
export type MarkKind = "block" | "look" | "remark" | "clean";

/** The word that goes with each mark. Colour and shape only repeat it. */
export const markWords: Record<MarkKind, string> = { block: "blocks", look: "look", remark: "remark", clean: "clean" };

/** The sign of a severity: a square blocks, a triangle asks for a look, a dot remarks, a tick is clean. */
export function Sign({ kind, size = 11 }: { kind: MarkKind; size?: number }) {
  return (
    <svg className="sign" width={size} height={size} viewBox="0 0 12 12" aria-hidden="true" fill="currentColor">
      {kind === "block" && <path d="M1 1h10v10H1z" />}
      {kind === "look" && <path d="M6 .8 11.6 11H.4z" />}
      {kind === "remark" && <circle cx="6" cy="6" r="2.6" />}
      {kind === "clean" && <path d="M1.5 6.4 4.6 9.6 10.6 2.4" fill="none" stroke="currentColor" strokeWidth="1.8" />}
    </svg>
  );
}

const signs: Record<DrawnSign, { label: string; plain: string; width: number; path: string }> = {
  arrow: { label: "gives", plain: "->", width: 20, path: "M1 8h17M14 4.5 18 8l-4 3.5" },
  equilibrium: { label: "in equilibrium with", plain: "<=>", width: 20, path: "M1 6.5h17L14 3M19 9.5H2L6 13" },
  atMost: { label: "at most", plain: "<=", width: 11, path: "M9.5 3 2 7l7.5 4M2 13.5h7.5" },
  atLeast: { label: "at least", plain: ">=", width: 11, path: "M1.5 3 9 7l-7.5 4M1.5 13.5H9" },
  root: { label: "square root of", plain: "sqrt", width: 10, path: "M1 9l2-1 2.5 6L9 2" },
  about: { label: "about", plain: "~", width: 11, path: "M1.5 7c2-2.2 4 1.6 8-1M1.5 11c2-2.2 4 1.6 8-1" },
  notEqual: { label: "is not", plain: "!=", width: 11, path: "M1.5 6h8M1.5 10h8M8 3 3 13" },
};

/** A small drawing in a line of text for a sign the font files lack. Read aloud by its label, copied as plain ASCII. */
export function Drawn({ sign }: { sign: DrawnSign }) {
  const { label, plain, width, path } = signs[sign];
  return (
    <svg
      className="sign-drawn"
      role="img"
      aria-label={label}
      data-plain={plain}
      viewBox={`0 0 ${width} 16`}
      height="1em"
      width={`${width / 16}em`}
      fill="none"
      stroke="currentColor"
      strokeWidth="1.3"
    >
      <path d={path} />
    </svg>
  );
}

/** The reaction arrow. */
export const Arrow = () => <Drawn sign="arrow" />;

/** The two half-arrows of an equilibrium. */
export const Equilibrium = () => <Drawn sign="equilibrium" />;
