import { Link } from "react-router";
import { paths } from "#app/paths.ts";
import type { RevisionPage, Show, TextChange } from "#app/review/revisionPage.ts";
import type { EditedLine, FindingText, Round, RoundChanges } from "#app/review/roundChanges.ts";
import { count } from "#app/ui/figure.ts";
import { InlineMark } from "#app/ui/MarginMark.tsx";
import { Prose } from "#app/ui/Prose.tsx";
import { Section } from "#app/ui/Section.tsx";
import { Time } from "#app/ui/Time.tsx";
import { Figures } from "#app/ui/ValueCell.tsx";
import { linesAddress } from "./desk.tsx";
import { roundInWords } from "./History.tsx";

const OUTCOMES: Record<NonNullable<Round["outcome"]>, string> = {
  returned: "returned",
  decided: "closed",
  withdrawn: "withdrawn",
};

/** The rounds in one line, each leading to what happened in it. Shown once there is more than one to tell apart. */
export function RoundsStrip({ rounds }: { rounds: readonly Round[] }) {
  if (rounds.length === 0 || (rounds.length === 1 && rounds[0]?.outcome === null)) return null;
  return (
    <ol aria-label="Rounds" className="mb-4 flex flex-wrap gap-x-6 gap-y-1 border-y border-rule py-1.5 text-fine">
      {rounds.map((round) => (
        <li key={round.round}>
          <a href={`#round-${round.round}`} className="font-medium">
            {roundInWords(round.round)}
          </a>
          <span className="text-soft">
            : sent <Time at={round.sentAt} /> by {round.by}
            {round.outcome && round.endedAt && (
              <>
                , {OUTCOMES[round.outcome]} <Time at={round.endedAt} />
                {round.endedBy !== round.by && ` by ${round.endedBy ?? ""}`}
              </>
            )}
          </span>
        </li>
      ))}
    </ol>
  );
}

/** What changed since the round before: shown first to who has seen that round. */
export function Changed({ page }: { page: RevisionPage }) {
  const { changed, revision } = page;
  if (!changed) return null;
  const { edited, added, takenOut, answers, findings, kept } = changed;
  const nothing = [edited, added, takenOut, answers, findings.gone, findings.come].every((list) => list.length === 0);
  const since = roundInWords(changed.since).toLowerCase();
  return (
    <Section head={`What changed since the ${since}`} id="changed">
      <div className="mb-5 max-w-[60rem] border-b border-rule pb-3">
        {nothing && (
          <p>
            {revision.state === "returned"
              ? "Nothing yet. What is mended here is shown to the reviewers first when the revision is sent again."
              : "Nothing: no line, no finding and no answer."}
          </p>
        )}
        <dl className="sm:grid sm:grid-cols-[8.5rem_minmax(0,1fr)] sm:gap-x-2">
          <Part head="Edited" items={edited} of={(line) => <Edited line={line} />} />
          <Part
            head="Added"
            items={added}
            of={(line) => (
              <>
                <LineLink {...line} /> {line.figure && <Figures {...line.figure} proof="ins" />}
                {line.from !== null && (
                  <span className="text-soft">
                    {" "}
                    from <Link to={paths.revision(line.from)}>revision {line.from}</Link>
                  </span>
                )}
              </>
            )}
          />
          <Part
            head="Taken out"
            items={takenOut}
            of={(line) => (
              <>
                <Prose text={line.about} /> {line.figure && <Figures {...line.figure} proof="del" />}
                <span className="text-soft"> by {line.by}</span>: <Prose text={line.reason} />
              </>
            )}
          />
          <Part
            head="Answered"
            items={answers}
            of={(thread) => (
              <>
                {thread.about && thread.lineId !== null ? (
                  <LineLink id={thread.lineId} about={thread.about} />
                ) : (
                  <a href={`#comment-${thread.id}`}>the revision</a>
                )}
                <span className="text-soft">: {shortened(thread.body)} </span>
                {shortened(thread.answers.at(-1)?.body ?? "")}
              </>
            )}
          />
          <Findings changed={changed} />
          {kept > 0 && (
            <>
              <dt className="font-medium max-sm:mt-2">Untouched</dt>
              <dd>
                {kept === 1 ? "One line was" : `${count(kept)} lines were`} decided before and{" "}
                {kept === 1 ? "stays" : "stay"} decided.
              </dd>
            </>
          )}
        </dl>
      </div>
    </Section>
  );
}

/** Most entries of one kind that are told one by one; the lines below show the rest. */
const MOST_TOLD = 40;

interface PartProps<Item> {
  head: string;
  items: readonly Item[];
  of: (item: Item) => React.ReactNode;
}

function Part<Item extends { id: string }>({ head, items, of }: PartProps<Item>) {
  if (items.length === 0) return null;
  return (
    <>
      <dt className="font-medium max-sm:mt-2">{head}</dt>
      <dd>
        <ul>
          {items.slice(0, MOST_TOLD).map((item) => (
            <li key={item.id} className="py-0.5">
              {of(item)}
            </li>
          ))}
        </ul>
        {items.length > MOST_TOLD && <p className="text-soft">and {count(items.length - MOST_TOLD)} more</p>}
      </dd>
    </>
  );
}

function LineLink({ id, about }: { id: string; about: string }) {
  return (
    <a href={`#line-${id}`}>
      <Prose text={about} />
    </a>
  );
}

function Edited({ line }: { line: EditedLine }) {
  return (
    <>
      <LineLink {...line} />{" "}
      {line.restated ? (
        "restated against what stands or waits now"
      ) : (
        <>
          {line.before && <Figures {...line.before} proof="del" />}{" "}
          {line.after && <Figures {...line.after} proof="ins" />}
          <WordChanges changes={line.changes} />
        </>
      )}
      <span className="text-soft"> by {line.by}</span>
      {line.reason && !line.restated && (
        <>
          : <Prose text={line.reason} />
        </>
      )}
      {line.decided && (
        <span className="ml-3">
          <InlineMark kind="look">
            {line.decided.decision === "accept" ? "accepted" : "declined"} in round {line.decided.round}, edited since
          </InlineMark>
        </span>
      )}
    </>
  );
}

function WordChanges({ changes }: { changes: readonly TextChange[] }) {
  return changes.map(({ label, before, after }) => (
    <span key={label}>
      <span className="text-soft"> {label} </span>
      {before !== null && <del>{before}</del>} {after !== null && <ins>{after}</ins>}
    </span>
  ));
}

function Findings({ changed: { findings } }: { changed: RoundChanges }) {
  const keyed = (list: readonly FindingText[]) => list.map((one, index) => ({ ...one, id: `${one.check} ${index}` }));
  return (
    <>
      <Part
        head="Found no more"
        items={keyed(findings.gone)}
        of={(finding) => (
          <del>
            <Prose text={finding.sentence} />
          </del>
        )}
      />
      <Part
        head="Newly found"
        items={keyed(findings.come)}
        of={(finding) => (
          <>
            <InlineMark kind={finding.severity}>{finding.title}</InlineMark> <Prose text={finding.sentence} />
          </>
        )}
      />
    </>
  );
}

function shortened(text: string): string {
  const line = text.replace(/\s+/g, " ").trim();
  return line.length > 140 ? `“${line.slice(0, 139)}…”` : `“${line}”`;
}

const SHOW_WORDS: Record<Show, (n: number) => string> = {
  all: (n) => (n === 1 ? "the one line" : `all ${count(n)} lines`),
  open: (n) => `${count(n)} open`,
  changed: (n) => `${count(n)} changed since the round before`,
  overtaken: (n) => `${count(n)} overtaken`,
  unanswered: (n) => `${count(n)} with a comment that waits for an answer`,
};

/** Narrows the lines; the choices that hold nothing, or everything, are left away. */
export function ShowLines({ page }: { page: RevisionPage }) {
  const { shows, show, revision } = page;
  const choices = (Object.keys(SHOW_WORDS) as Show[]).filter(
    (choice) =>
      choice === "all" || choice === show || (shows[choice] > 0 && (choice !== "open" || shows.open < shows.all)),
  );
  if (choices.length === 1) return null;
  return (
    <nav aria-label="Which lines" className="mb-2 flex flex-wrap items-baseline gap-x-4 text-fine" id="lines">
      <span className="text-soft">Showing</span>
      {choices.map((choice) => (
        <Link
          key={choice}
          to={`${linesAddress(revision.id, 1, choice)}#lines`}
          preventScrollReset
          aria-current={choice === show ? "true" : undefined}
          className={choice === show ? "font-medium text-ink no-underline" : undefined}
        >
          {SHOW_WORDS[choice](shows[choice])}
        </Link>
      ))}
    </nav>
  );
}

/** Which comments still wait for an answer. */
export function Unanswered({ page: { unanswered } }: { page: RevisionPage }) {
  if (unanswered.length === 0) return null;
  const places = [...new Map(unanswered.map((one) => [one.lineId ?? "", one])).values()];
  return (
    <p className="mb-3 max-w-[68ch]">
      <InlineMark kind="look">
        {unanswered.length === 1 ? "One comment waits" : `${unanswered.length} comments wait`} for an answer
      </InlineMark>
      :{" "}
      {places.map(({ lineId, about }, index) => (
        <span key={lineId ?? "revision"}>
          {index > 0 && ", "}
          {lineId !== null && about !== null ? (
            <LineLink id={lineId} about={about} />
          ) : (
            <a href="#comments">on the revision</a>
          )}
        </span>
      ))}
    </p>
  );
}
