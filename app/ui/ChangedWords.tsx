/** A run of a text that both have, or that only the older or the newer has. */
interface Run {
  kind: "same" | "went" | "came";
  text: string;
}

/** What a record says otherwise than before, field by field and word by word. */
export function ChangedWords({ texts }: { texts: readonly { field: string; runs: readonly Run[] }[] }) {
  return texts.map(({ field, runs }) => (
    <div key={field}>
      <span className="text-soft">{field}: </span>
      {runs.map(({ kind, text }, index) => {
        if (kind === "went") return <del key={index}>{text}</del>;
        if (kind === "came") return <ins key={index}>{text}</ins>;
        return <span key={index}>{text}</span>;
      })}
    </div>
  ));
}
