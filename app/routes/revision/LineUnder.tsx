import { Link } from "react-router";
import { paths } from "#app/paths.ts";
import { showDigits } from "#app/thermo/notation.ts";
import { readDigits } from "#app/thermo/digits.ts";
import type { FindingView, LineGroup, LineView, RevisionPage, SuggestionView } from "#app/review/revisionPage.ts";
import { propertyInfo } from "#app/thermo/property.ts";
import { Button } from "#app/ui/Button.tsx";
import { Finding } from "#app/ui/Finding.tsx";
import { Note } from "#app/ui/Note.tsx";
import { Prose } from "#app/ui/Prose.tsx";
import { Time } from "#app/ui/Time.tsx";
import { Figures } from "#app/ui/ValueCell.tsx";
import { ActForm, OpenLink, useDesk } from "./desk.tsx";
import { formKey } from "./outcome.ts";
import { ReasonForm } from "./Reason.tsx";
import { ThreadView } from "./Threads.tsx";
import { ValueForm } from "./Value.tsx";

interface LineUnderProps {
  line: LineView;
  group: LineGroup;
  last: boolean;
  page: RevisionPage;
}

/** What stands under a line: what happened to its base, findings, the versions it had, comments, and the form that is open. */
export function LineUnder({ line, group, last, page }: LineUnderProps) {
  const { open } = useDesk();
  const anchor = `line-${line.id}`;
  const seen = `${line.id}:${line.versionId}`;
  const isOpen = (form: string): boolean => open === formKey(form, line.id);
  return (
    <>
      {line.overtaken !== null && (
        <Note kind="look" word="overtaken">
          <p>
            <Prose text={line.overtaken} /> It cannot be accepted until the steward restates it.
          </p>
          <Overtaken line={line} />
        </Note>
      )}
      {line.behind !== null && (
        <Note kind="remark" word="waits">
          <p>
            Another line for this place is accepted and waits in{" "}
            <Link to={paths.revision(line.behind)}>revision {line.behind}</Link>. This one can be accepted once that is
            published.
          </p>
        </Note>
      )}
      {line.withdrawalReason !== null && (
        <p>
          <span className="text-soft">Why it is taken out:</span> {line.withdrawalReason}
        </p>
      )}
      {line.findings.map((finding, index) => (
        <LineFinding key={finding.id} finding={finding} first={index === 0} line={line} page={page} />
      ))}
      {line.cameFrom !== null && (
        <p className="text-fine text-soft">
          Taken over from <Link to={paths.revision(line.cameFrom)}>revision {line.cameFrom}</Link>, with its history.
        </p>
      )}
      {line.versions.length > 0 && <Versions line={line} />}
      <Decisions line={line} />
      {line.threads.map((thread) => (
        <ThreadView key={thread.id} thread={thread} anchor={anchor} may={page.may.comment} />
      ))}
      {last && group.inPart && <InPart group={group} />}
      {last && group.together.length > 0 && (group.rank !== "clean" || isOpen("more")) && (
        <ActForm
          intent="accept"
          subject={group.id}
          line={line.id}
          fields={group.together.map((one) => ["seen", one] as const)}
          className="my-2"
        >
          {({ pending }) => (
            <Button kind="text" type="submit" pending={pending} pendingLabel="Accepting…">
              Accept the {group.together.length} open lines of <Prose text={group.speciesKey ?? group.name} /> together
            </Button>
          )}
        </ActForm>
      )}
      {isOpen("more") && <More line={line} page={page} anchor={anchor} />}
      {isOpen("decline") && (
        <ReasonForm
          intent="decline"
          subject={line.id}
          fields={[["seen", seen]]}
          name="reason"
          label="Why it is declined"
          hint="It stays on record with the line."
          act="Decline line"
          pendingLabel="Declining…"
          anchor={anchor}
        />
      )}
      {isOpen("comment") && (
        <ReasonForm
          intent="comment"
          subject={line.id}
          fields={[["line", line.id]]}
          name="body"
          label="Comment on this line"
          act="Write the comment"
          pendingLabel="Writing…"
          anchor={anchor}
        />
      )}
      {isOpen("rewrite") && line.property && <ValueForm line={line} property={line.property} />}
      {isOpen("take-out") && (
        <ReasonForm
          intent="take-out"
          subject={line.id}
          fields={[["line", line.id]]}
          name="reason"
          label="Why it is taken out"
          hint="The line leaves this revision and stays on record."
          act="Take the line out"
          pendingLabel="Taking out…"
          anchor={anchor}
        />
      )}
    </>
  );
}

/** What an overtaken line was written against beside what is there now, and the way to write it against that. */
function Overtaken({ line }: { line: LineView }) {
  const { now } = line;
  const against =
    now?.waitsIn != null
      ? `revision ${now.waitsIn}`
      : now?.since != null
        ? `edition ${now.since}`
        : "the table as it is";
  return (
    <>
      {(line.stood ?? now?.figure) && (
        <p>
          <span className="text-soft">Written against </span>
          {line.stood ? <Figures {...line.stood} proof="del" /> : "nothing"}
          <span className="text-soft">; now {now?.waitsIn != null ? "waits" : "stands"} </span>
          {now?.figure ? <Figures {...now.figure} /> : "nothing"}
        </p>
      )}
      {line.mayRestate && (
        <ActForm intent="restate" subject={line.id} fields={[["line", line.id]]}>
          {({ pending }) => (
            <Button kind="text" type="submit" pending={pending} pendingLabel="Restating…">
              Restate against {against}
            </Button>
          )}
        </ActForm>
      )}
    </>
  );
}

/** A set of which only part was accepted says so under its last line. */
function InPart({ group }: { group: LineGroup }) {
  if (!group.inPart) return null;
  const { accepted, declined, open } = group.inPart;
  const rest = [open > 0 && `${open} open`, declined > 0 && `${declined} declined`].filter(Boolean).join(", ");
  return (
    <p className="text-fine text-soft">
      Part of this set is accepted: {accepted} of {group.lines.length} lines of{" "}
      <Prose text={group.speciesKey ?? group.name} />, {rest}.
    </p>
  );
}

interface LineFindingProps {
  finding: FindingView;
  /** The line's first finding: the comment is offered once. */
  first: boolean;
  line: LineView;
  page: RevisionPage;
}

function LineFinding({ finding, first, line, page }: LineFindingProps) {
  const { open } = useDesk();
  const comments = first && page.may.comment;
  const anchor = `line-${line.id}`;
  const setAside = finding.setAside;
  return (
    <Finding
      finding={finding}
      title={finding.title}
      setAside={setAside ? `Set aside by ${setAside.by}: ${setAside.reason}` : undefined}
      suggestionAction={(suggestion) => (
        <SuggestionAction suggestion={suggestion} finding={finding} line={line} page={page} />
      )}
    >
      {(finding.maySetAside || comments) && (
        <>
          {finding.maySetAside && (
            <OpenLink form={formKey("set-aside", finding.id)} anchor={anchor}>
              Set the finding aside, with a reason
            </OpenLink>
          )}
          {comments && (
            <OpenLink form={formKey("comment", line.id)} anchor={anchor}>
              Comment
            </OpenLink>
          )}
          {open === formKey("set-aside", finding.id) && (
            <div className="basis-full">
              <ReasonForm
                intent="set-aside"
                subject={finding.id}
                line={line.id}
                fields={[["finding", finding.id]]}
                name="reason"
                label="Why the finding does not hold here"
                hint="It stays on record, and counts again as soon as the finding says something else."
                act="Set the finding aside"
                pendingLabel="Setting aside…"
                anchor={anchor}
              />
            </div>
          )}
        </>
      )}
    </Finding>
  );
}

interface SuggestionActionProps {
  suggestion: SuggestionView;
  finding: FindingView;
  line: LineView;
  page: RevisionPage;
}

function SuggestionAction({ suggestion, finding, line, page }: SuggestionActionProps) {
  if (page.may.decide && !line.own) {
    return (
      <OpenLink form="return" anchor="decide" text={suggestion.asRemark}>
        return with this repair
      </OpenLink>
    );
  }
  if (!suggestion.takes) return null;
  const becomes = readDigits(suggestion.becomes);
  return (
    <ActForm
      intent="take-suggestion"
      subject={`${finding.id}-${suggestion.takes.index}`}
      line={line.id}
      fields={[
        ["finding", finding.id],
        ["index", suggestion.takes.index],
        ...suggestion.takes.seen.map((one) => ["seen", one] as const),
      ]}
      className="inline"
    >
      {({ pending }) => (
        <Button kind="text" type="submit" pending={pending} pendingLabel="Examining…">
          Take {becomes ? showDigits(becomes) : "this"}
        </Button>
      )}
    </ActForm>
  );
}

/** What the line said before and what it says now: who, when, why. */
function Versions({ line }: { line: LineView }) {
  return (
    <ol className="my-2 border-l-2 border-rule pl-3.5 text-fine">
      {line.versions.map((version, index) => {
        const isLast = index === line.versions.length - 1;
        return (
          <li key={version.version} className="my-0.5">
            {version.figure && (
              <>
                <Figures {...version.figure} proof={isLast ? "ins" : "del"} />{" "}
              </>
            )}
            <span className="text-soft">
              {index === 0 ? "first written" : "written"} by {version.by}, <Time at={version.at} withTime />
            </span>
            {version.reason && (
              <>
                : <Prose text={version.reason} />
              </>
            )}
          </li>
        );
      })}
    </ol>
  );
}

function Decisions({ line }: { line: LineView }) {
  const words = { accept: "Accepted", decline: "Declined" } as const;
  return (
    <>
      {line.voided.map((one) => (
        <p key={`${one.version} ${String(one.at)}`} className="text-fine text-soft">
          <del>
            {words[one.decision]} by {one.by}, <Time at={one.at} withTime />
            {one.reason && `: ${one.reason}`}
          </del>{" "}
          {one.round > 0 ? `decided in round ${one.round}, edited since` : "void: the line was edited afterwards"}
        </p>
      ))}
      {line.decision?.decision === "decline" && (
        <p className="text-fine">
          <span className="text-soft">
            Declined by {line.decision.by}, <Time at={line.decision.at} withTime />:
          </span>{" "}
          {line.decision.reason}
        </p>
      )}
    </>
  );
}

/** Where the line comes from and what else can be done with it. */
function More({ line, page, anchor }: { line: LineView; page: RevisionPage; anchor: string }) {
  const unit = line.property ? propertyInfo[line.property].unit : "";
  const facts: (readonly [string, React.ReactNode])[] = [];
  if (line.source) {
    facts.push([
      "Source",
      <>
        {line.sourceBefore && (
          <>
            <del>{line.sourceBefore}</del>{" "}
          </>
        )}
        {line.source.full}
      </>,
    ]);
  }
  if (line.given && (line.given.unit !== unit || line.given.note)) {
    facts.push([
      "As given",
      <Prose
        key="given"
        text={`${line.given.text} ${line.given.unit}${line.given.note ? `, ${line.given.note}` : ""}`}
      />,
    ]);
  }
  if (line.method) facts.push(["Method", line.method]);
  if (line.remark) facts.push(["Remark of the source", line.remark]);
  if (line.rowNumber !== null) facts.push(["Row of the sheet", String(line.rowNumber)]);
  if (line.decision?.decision === "accept") {
    facts.push([
      "Accepted",
      <>
        by {line.decision.by}, <Time at={line.decision.at} withTime />
      </>,
    ]);
  }
  return (
    <div className="my-2">
      {facts.length > 0 && (
        <dl className="grid grid-cols-[max-content_minmax(0,1fr)] gap-x-4 text-fine">
          {facts.map(([term, said]) => (
            <div key={term} className="contents">
              <dt className="text-soft">{term}</dt>
              <dd>{said}</dd>
            </div>
          ))}
        </dl>
      )}
      {line.own && page.may.decide && (
        <p className="mt-1 text-fine">You had a hand in this line, so somebody else decides it.</p>
      )}
      <p className="actions text-fine">
        {line.mayDecline && (
          <OpenLink form={formKey("decline", line.id)} anchor={anchor}>
            Decline, with a reason
          </OpenLink>
        )}
        {line.mayAccept && line.state === "declined" && (
          <ActForm
            intent="accept"
            subject={line.id}
            fields={[["seen", `${line.id}:${line.versionId}`]]}
            className="inline"
          >
            {({ pending }) => (
              <Button kind="text" type="submit" pending={pending} pendingLabel="Accepting…">
                Accept after all
              </Button>
            )}
          </ActForm>
        )}
        {page.may.comment && (
          <OpenLink form={formKey("comment", line.id)} anchor={anchor}>
            Comment
          </OpenLink>
        )}
        {line.mayEdit && (
          <Link to={paths.revisionLine(page.revision.id, line.id)}>Change source, method or remark</Link>
        )}
      </p>
    </div>
  );
}
