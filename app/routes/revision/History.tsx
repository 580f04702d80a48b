import type { HistoryEntry, HistoryRound } from "#app/review/revisionPageHistory.ts";
import { Prose } from "#app/ui/Prose.tsx";
import { Section } from "#app/ui/Section.tsx";
import { Time } from "#app/ui/Time.tsx";
import { Figures } from "#app/ui/ValueCell.tsx";
import { OpenLink, useDesk } from "./desk.tsx";
import { ReasonForm } from "./Reason.tsx";

const ORDINALS = ["Draft", "First round", "Second round", "Third round", "Fourth round", "Fifth round", "Sixth round"];

/** How a round is called; the time before the first sending is the draft. */
export function roundInWords(round: number): string {
  return ORDINALS[round] ?? `Round ${round}`;
}

/** Everything that happened to the revision, round by round, and the place to write to each other. */
export function History({ rounds, comments }: { rounds: readonly HistoryRound[]; comments: boolean }) {
  const { open } = useDesk();
  return (
    <Section head="How it went" id="history">
      <div className="max-w-[60rem] border-b-2 border-ink pb-2">
        {rounds.map(({ round, entries }) => (
          <div key={round} className="border-t border-rule py-2 sm:grid sm:grid-cols-[8.5rem_minmax(0,1fr)]">
            <h3 className="font-medium" id={`round-${round}`}>
              {roundInWords(round)}
            </h3>
            <ol>
              {entries.map((entry, index) => (
                <li key={`${String(entry.at)} ${index}`} className="py-0.5">
                  <Entry entry={entry} />
                </li>
              ))}
            </ol>
          </div>
        ))}
      </div>
      {comments &&
        (open === "comment" ? (
          <ReasonForm
            intent="comment"
            name="body"
            label="Comment on the revision"
            act="Write the comment"
            pendingLabel="Writing…"
            anchor="history"
          />
        ) : (
          <p className="mt-2">
            <OpenLink form="comment" anchor="history">
              Comment on the revision
            </OpenLink>
          </p>
        ))}
    </Section>
  );
}

function Entry({ entry }: { entry: HistoryEntry }) {
  return (
    <>
      <p>
        {entry.by} <Prose text={entry.did} />
        {entry.lines.length > 0 && (
          <span className="text-soft">
            {entry.did === "wrote" || entry.did === "answered" ? " on " : entry.did === "changed" ? " " : ": "}
            {entry.lines.map(({ id, about }, index) => (
              <span key={id}>
                {index > 0 && ", "}
                <a href={`#line-${id}`} className="text-inherit no-underline hover:underline">
                  <Prose text={about} />
                </a>
              </span>
            ))}
            {entry.more > 0 && ` and ${entry.more} more`}
          </span>
        )}
        {(entry.before ?? entry.after) && (
          <>
            {" "}
            {entry.before && <Figures {...entry.before} proof="del" />}{" "}
            {entry.after && <Figures {...entry.after} proof="ins" />}
          </>
        )}
        {entry.voided > 0 && (
          <span className="is-look"> ({entry.voided === 1 ? "one" : entry.voided} void: edited afterwards)</span>
        )}
        <span className="text-fine text-soft">
          {" "}
          · <Time at={entry.at} withTime />
        </span>
      </p>
      {entry.words && (
        <p className="max-w-[68ch] border-l-2 border-rule pl-3.5 whitespace-pre-line">
          <Prose text={entry.words} />
        </p>
      )}
    </>
  );
}
