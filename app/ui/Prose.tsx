import { Fragment } from "react";
import { Drawn } from "./Signs.tsx";
import { Pieces } from "./Pieces.tsx";
import { formulaPieces, keyParts, statePrinted } from "./formulaPieces.ts";
import { typeset } from "./typeset.ts";

/**
 * A plain sentence of the data, typeset: `ΔfH°`, `kJ/mol`, `SO4-2(aq)` and `-12.3` get their sub- and superscripts and
 * true minus signs. It renders text only, never markup from the data.
 */
export function Prose({ text }: { text: string }) {
  return typeset(text).map((part, index) => {
    if (part.kind === "sign") return <Drawn key={index} sign={part.sign} />;
    if (part.kind === "species") {
      const { formula, phase, label } = keyParts(part.key);
      return (
        <span key={index} data-plain={part.key} className="whitespace-nowrap">
          <Pieces pieces={formulaPieces(formula)} />
          {phase && statePrinted(phase, label)}
        </span>
      );
    }
    if (part.pieces.length === 1 && !part.pieces[0]?.as) return <Fragment key={index}>{part.pieces[0]?.text}</Fragment>;
    return (
      <span key={index} data-plain={part.plain}>
        <Pieces pieces={part.pieces} />
      </span>
    );
  });
}
