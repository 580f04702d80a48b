import { Link } from "react-router";
import type { Finding as FindingData, Suggestion } from "#app/checks/types.ts";
import { paths } from "#app/paths.ts";
import { Prose } from "./Prose.tsx";
import { markWords, Sign } from "./Signs.tsx";

type ShownSuggestion = Pick<Suggestion, "property" | "becomes" | "slip" | "sentence">;

interface FindingProps<S extends ShownSuggestion> {
  finding: Pick<FindingData, "check" | "severity" | "sentence" | "arithmetic"> & { suggestions: readonly S[] };
  /** The check's title; without it the code is read as words ("gibbs-closure" is "Gibbs closure"). */
  title?: string | undefined;
  /** Who set it aside and why, in a sentence; the note then stands back. */
  setAside?: string | undefined;
  /** What can be done with one suggestion, beside it. */
  suggestionAction?: ((suggestion: S) => React.ReactNode) | undefined;
  /** Links and buttons under the note. */
  children?: React.ReactNode;
}

/** What a check found: severity in sign and word, the sentence, its arithmetic, and what single slips would explain it. */
export function Finding<S extends ShownSuggestion>({
  finding,
  title,
  setAside,
  suggestionAction,
  children,
}: FindingProps<S>) {
  const { severity, check } = finding;
  return (
    <section
      className={`note is-${setAside ? "remark" : severity}`}
      aria-label={`${markWords[severity]}: ${title ?? checkTitle(check)}`}
    >
      <p className="note-word">
        <Sign kind={severity} size={10} />
        <span>{setAside ? `${markWords[severity]}, set aside` : markWords[severity]}</span>
        <Link to={paths.conventionsCheck(check)}>{title ?? checkTitle(check)}</Link>
      </p>
      <p className="font-medium">
        <Prose text={finding.sentence} />
      </p>
      {finding.arithmetic.map((line) => (
        <p key={line} className="arithmetic">
          <Prose text={line} />
        </p>
      ))}
      {finding.suggestions.length > 0 && (
        <ul className="mt-1">
          {finding.suggestions.map((suggestion) => (
            <li key={`${suggestion.slip}:${suggestion.becomes}:${suggestion.property ?? ""}`} className="my-0.5">
              <Prose text={suggestion.sentence} />
              {suggestionAction && <> {suggestionAction(suggestion)}</>}
            </li>
          ))}
        </ul>
      )}
      {setAside && (
        <p className="arithmetic">
          <Prose text={setAside} />
        </p>
      )}
      {children && <div className="actions">{children}</div>}
    </section>
  );
}

function checkTitle(code: string): string {
  const words = code.replaceAll("-", " ");
  return words.charAt(0).toUpperCase() + words.slice(1);
}
