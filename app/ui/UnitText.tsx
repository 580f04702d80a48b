import { Pieces } from "./Pieces.tsx";
import { unitPieces } from "./typeset.ts";

/** A unit from its plain spelling: "kJ/mol" is set as kJ mol−1. */
export function UnitText({ unit }: { unit: string }) {
  return (
    <span className="whitespace-nowrap" data-plain={unit}>
      <Pieces pieces={unitPieces(unit)} />
    </span>
  );
}
