import { Fragment } from "react";
import type { Piece } from "./formulaPieces.ts";

/** Sets runs of text with real `<sub>`, `<sup>` and `<i>`. */
export function Pieces({ pieces }: { pieces: readonly Piece[] }) {
  return pieces.map((piece, index) => {
    if (piece.as === "sub") return <sub key={index}>{piece.text}</sub>;
    if (piece.as === "sup") return <sup key={index}>{piece.text}</sup>;
    if (piece.as === "italic") return <i key={index}>{piece.text}</i>;
    return <Fragment key={index}>{piece.text}</Fragment>;
  });
}
