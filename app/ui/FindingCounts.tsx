import { count } from "./figure.ts";
import { InlineMark } from "./MarginMark.tsx";

/** How many findings of a revision block and how many ask to be looked at, in a table's cell. */
export function FindingCounts({ blocks, looks }: { blocks: number; looks: number }) {
  if (blocks === 0 && looks === 0) return <span className="text-soft">all clean</span>;
  return (
    <span className="inline-flex flex-wrap gap-x-3">
      {blocks > 0 && <InlineMark kind="block">{count(blocks)} block</InlineMark>}
      {looks > 0 && <InlineMark kind="look">{count(looks)} to look at</InlineMark>}
    </span>
  );
}
