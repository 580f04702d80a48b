import { Note } from "./Note.tsx";
import { Prose } from "./Prose.tsx";

/** A notice that travels with what it is about: a withdrawn edition, a retracted source, a superseded value. */
export function Notice({ word, text, children }: { word: string; text: string; children?: React.ReactNode }) {
  return (
    <div role="note">
      <Note kind="look" word={word}>
        <p>
          <Prose text={text} />
        </p>
        {children}
      </Note>
    </div>
  );
}
