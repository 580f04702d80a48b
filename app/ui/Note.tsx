import { markWords, Sign, type MarkKind } from "./Signs.tsx";

/** A note in the hand of a finding, for anything else that blocks, asks for a look or is worth a remark. */
export function Note({
  kind,
  word,
  children,
}: {
  kind: MarkKind;
  word?: string | undefined;
  children: React.ReactNode;
}) {
  return (
    <div className={`note is-${kind}`}>
      <p className="note-word">
        <Sign kind={kind} size={10} />
        <span>{word ?? markWords[kind]}</span>
      </p>
      <div>{children}</div>
    </div>
  );
}
