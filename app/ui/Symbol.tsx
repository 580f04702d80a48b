import { Pieces } from "./Pieces.tsx";
import { symbolPieces } from "./typeset.ts";

/** A quantity's symbol from its plain spelling: "ΔfH°", "S°", "Cp°", "E_n", "log10K". */
export function Symbol({ of }: { of: string }) {
  return (
    <span className="whitespace-nowrap" data-plain={of}>
      <Pieces pieces={symbolPieces(of)} />
    </span>
  );
}
