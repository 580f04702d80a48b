import { Link } from "react-router";
import { formulaPieces, keyParts, statePrinted } from "./formulaPieces.ts";
import { Pieces } from "./Pieces.tsx";

interface SpeciesNameProps {
  /** The species key, "C(cr,graphite)". */
  speciesKey: string;
  /** The formula in the order its source gave, where it differs from the key's. */
  printed?: string | undefined;
  /** Where the name leads; plain text without one. */
  to?: string | undefined;
}

/** A species: its formula, then state and form in softer ink. Copies as its key. */
export function SpeciesName({ speciesKey, printed, to }: SpeciesNameProps) {
  const { formula, phase, label } = keyParts(speciesKey);
  const inside = (
    <>
      <Pieces pieces={formulaPieces(printed ?? formula)} />
      {phase && <span className="species-phase">{statePrinted(phase, label)}</span>}
    </>
  );
  return to ? (
    <Link className="species" to={to} data-plain={speciesKey}>
      {inside}
    </Link>
  ) : (
    <span className="species" data-plain={speciesKey}>
      {inside}
    </span>
  );
}
