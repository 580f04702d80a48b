import { markWords, Sign, type MarkKind } from "./Signs.tsx";

/**
 * The first cell of a row in a marked table (`<Table marked>`): the mark stands in the leaf's margin, sign over word. A
 * row without one still needs the empty cell, which keeps the columns in step.
 */
export function MarginMark({ kind, word }: { kind?: MarkKind | null | undefined; word?: string | undefined }) {
  return (
    <td className="margin-cell">
      {kind && (
        <span className={`mark is-${kind}`}>
          <Sign kind={kind} />
          <span className="mark-word">{word ?? markWords[kind]}</span>
        </span>
      )}
    </td>
  );
}

/** The head over the marks, named for readers only. */
export function MarginHead() {
  return (
    <th scope="col" className="margin-cell">
      <span className="said">Mark</span>
    </th>
  );
}

/** Sign and word in a line of text: "■ 3 block". */
export function InlineMark({ kind, children }: { kind: MarkKind; children?: React.ReactNode }) {
  return (
    <span className={`is-${kind} whitespace-nowrap`}>
      <Sign kind={kind} size={10} /> {children ?? markWords[kind]}
    </span>
  );
}
