import { formulaPieces } from "./formulaPieces.ts";
import { Pieces } from "./Pieces.tsx";

/** A printed formula ("SO4-2", "CuSO4·5H2O") with lowered counts and a raised charge. Copies as written in keys. */
export function Formula({ printed }: { printed: string }) {
  return (
    <span data-plain={printed}>
      <Pieces pieces={formulaPieces(printed)} />
    </span>
  );
}
