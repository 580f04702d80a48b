import { Fragment } from "react";
import { Link } from "react-router";
import { paths } from "#app/paths.ts";
import type { LineGroup, LineView, RevisionPage, TextChange } from "#app/review/revisionPage.ts";
import { propertyInfo } from "#app/thermo/property.ts";
import { Button } from "#app/ui/Button.tsx";
import { concise } from "#app/ui/concise.ts";
import { count, tailOf } from "#app/ui/figure.ts";
import { InlineMark, MarginHead, MarginMark } from "#app/ui/MarginMark.tsx";
import { Prose } from "#app/ui/Prose.tsx";
import { SpeciesName } from "#app/ui/SpeciesName.tsx";
import { Symbol } from "#app/ui/Symbol.tsx";
import { Table } from "#app/ui/Table.tsx";
import { UnitText } from "#app/ui/UnitText.tsx";
import { Figures } from "#app/ui/ValueCell.tsx";
import { ActForm, OpenLink, useDesk } from "./desk.tsx";
import { LineUnder } from "./LineUnder.tsx";
import { formKey } from "./outcome.ts";

/** Columns of the table with the one in the margin. */
const COLUMNS = 8;

/** What is read as text stays in view while a wide table is scrolled sideways. */
const WITHIN_PAGE =
  "sticky left-[calc(var(--spacing-margin)+var(--spacing-gutter))] max-w-[min(46rem,calc(100vw-var(--spacing-margin)-var(--spacing-gutter)-1.75rem))]";

/** Room after the decimal points, so that figures of a column stand under each other. */
interface Tails {
  stood: number;
  proposed: number;
  difference: number;
}

function tailsOf(groups: readonly LineGroup[]): Tails {
  const lines = groups.flatMap((group) => group.lines);
  const texts = (pick: (line: LineView) => { digits: string; uncertainty: Parameters<typeof concise>[1] } | null) =>
    lines.flatMap((line) => {
      const figure = pick(line);
      return figure ? [concise(figure.digits, figure.uncertainty).text] : [];
    });
  return {
    stood: tailOf(texts((line) => line.stood)),
    proposed: tailOf(texts((line) => line.proposed)),
    difference: tailOf(
      texts((line) => (line.difference === null ? null : { digits: line.difference, uncertainty: null })),
    ),
  };
}

/** Every line of the page: what stands, what is proposed, what the checks found, and what can be done with it. */
export function Lines({ page }: { page: RevisionPage }) {
  const tails = tailsOf(page.groups);
  return (
    <Table caption={`Lines of revision ${page.revision.id}`} marked even>
      <thead>
        <tr>
          <MarginHead />
          <th scope="col">Species</th>
          <th scope="col">Property</th>
          <th scope="col" className="figure">
            Stands{page.newest > 0 && <span className="max-sm:sr-only"> in edition {page.newest}</span>}
          </th>
          <th scope="col" className="figure">
            Proposed
          </th>
          <th scope="col" className="figure">
            Difference
          </th>
          <th scope="col" className="figure">
            <Symbol of="E_n" />
          </th>
          <th scope="col" className="max-sm:hidden">
            {page.may.decide ? "Decision" : page.may.write ? "Work" : "State"}
          </th>
        </tr>
      </thead>
      {page.groups.map((group, index) => {
        const before = page.groups[index - 1];
        return (
          <Fragment key={group.id}>
            {group.rank === "clean" && before && before.rank !== "clean" && <CleanHead page={page} />}
            <tbody>
              {group.lines.map((line, at) => (
                <Line
                  key={line.id}
                  line={line}
                  group={group}
                  last={at === group.lines.length - 1}
                  page={page}
                  tails={tails}
                />
              ))}
            </tbody>
          </Fragment>
        );
      })}
    </Table>
  );
}

function CleanHead({ page }: { page: RevisionPage }) {
  return (
    <tbody>
      <tr className="under">
        <td className="margin-cell" />
        <td colSpan={COLUMNS - 1}>
          <p className="mt-3 border-b border-rule pb-1 text-fine text-soft">
            {page.counts.clean === 1 ? "One clean line" : `${count(page.counts.clean)} clean lines`}: nothing blocks and
            nothing asks to be looked at.
          </p>
        </td>
      </tr>
    </tbody>
  );
}

interface LineProps {
  line: LineView;
  group: LineGroup;
  last: boolean;
  page: RevisionPage;
  tails: Tails;
}

function Line({ line, group, last, page, tails }: LineProps) {
  const { open } = useDesk();
  const info = line.property ? propertyInfo[line.property] : null;
  const undecided = line.mayAccept && line.state === "open";
  const isOpen = ["more", "decline", "comment", "rewrite", "take-out"].some((form) => open === formKey(form, line.id));
  const speaks =
    line.findings.length > 0 ||
    line.threads.length > 0 ||
    line.versions.length > 0 ||
    line.voided.length > 0 ||
    line.overtaken !== null ||
    line.behind !== null ||
    line.withdrawalReason !== null ||
    line.decision?.decision === "decline" ||
    line.cameFrom !== null ||
    (last && group.inPart !== null) ||
    (last && group.together.length > 0 && group.rank !== "clean");
  return (
    <>
      <tr
        id={`line-${line.id}`}
        tabIndex={-1}
        data-row=""
        data-line={line.id}
        data-open={undecided ? "yes" : "no"}
        data-decline={line.mayDecline ? "yes" : "no"}
        data-comment={page.may.comment ? "yes" : "no"}
      >
        <Mark line={line} />
        <th scope="row" className="tight">
          {line.speciesKey ? (
            <SpeciesName
              speciesKey={line.speciesKey}
              to={group.stands && page.newest > 0 ? paths.species(page.newest, line.speciesKey) : undefined}
            />
          ) : (
            "source"
          )}
        </th>
        <td className="tight">
          {info ? (
            <>
              <Symbol of={info.symbol} />
              <span className="text-fine text-soft max-sm:hidden">
                {" "}
                / <UnitText unit={info.unit} />
              </span>
            </>
          ) : (
            <span className="text-soft">{line.kind === "source" ? "citation" : "what it is called"}</span>
          )}
        </td>
        {info ? (
          <Figured line={line} tails={tails} />
        ) : (
          <td colSpan={4}>
            <Changes changes={line.changes} />
          </td>
        )}
        <td className="tight max-sm:hidden">
          <LineActions line={line} page={page} />
        </td>
      </tr>
      {/* On a narrow page the last column would lie beyond its edge, so what can be done stands under the line. */}
      <tr className="under sm:hidden" data-line={line.id}>
        <td className="margin-cell" />
        <td colSpan={COLUMNS - 2}>
          <div className={WITHIN_PAGE}>
            <LineActions line={line} page={page} />
          </div>
        </td>
      </tr>
      {(speaks || isOpen) && (
        <tr className="under" data-line={line.id}>
          <td className="margin-cell" />
          <td colSpan={COLUMNS - 1}>
            <div className={WITHIN_PAGE}>
              <LineUnder line={line} group={group} last={last} page={page} />
            </div>
          </td>
        </tr>
      )}
    </>
  );
}

function Mark({ line }: { line: LineView }) {
  if (line.overtaken !== null && line.state === "open") return <MarginMark kind="look" word="overtaken" />;
  if (line.behind !== null) return <MarginMark kind="remark" word="waits" />;
  if (line.mark === "block" || line.mark === "look") return <MarginMark kind={line.mark} />;
  if (line.hasSetAside) return <MarginMark kind="remark" word="set aside" />;
  return <MarginMark kind={line.mark === "remark" ? "remark" : null} />;
}

function Figured({ line, tails }: { line: LineView; tails: Tails }) {
  // What was declined or fell with the revision changes nothing: the proposal is struck out, and what stands stays.
  const off = line.state === "declined" || line.state === "dropped";
  return (
    <>
      <td className="figure">
        {line.stood ? (
          <Figures {...line.stood} tail={tails.stood} proof={off ? undefined : "del"} />
        ) : (
          <span className="text-soft">new</span>
        )}
        {line.stoodWaitsIn !== null && (
          <span className="block text-fine text-soft">
            waits in <a href={paths.revision(line.stoodWaitsIn)}>revision {line.stoodWaitsIn}</a>
          </span>
        )}
      </td>
      <td className="figure">
        {line.proposed ? (
          <Figures {...line.proposed} tail={tails.proposed} proof={off ? "del" : "ins"} />
        ) : (
          <span className="text-soft">taken out</span>
        )}
      </td>
      <td className="figure">
        {line.difference !== null && (
          <Figures digits={line.difference} uncertainty={null} sign="plus" tail={tails.difference} />
        )}
      </td>
      <td className="figure">
        {line.normalizedError !== null && (
          <span className={line.normalizedError > 1 ? "font-medium" : undefined}>
            {line.normalizedError.toFixed(1)}
          </span>
        )}
      </td>
    </>
  );
}

/** What is said in words: what stood struck out, what shall stand underlined. */
function Changes({ changes }: { changes: readonly TextChange[] }) {
  if (changes.length === 0) return <span className="text-soft">as it stands</span>;
  return changes.map(({ label, before, after, runs }, index) => (
    <span key={label}>
      {index > 0 && <span className="text-soft"> · </span>}
      {label !== "name" && label !== "citation" && <span className="text-soft">{label} </span>}
      {runs?.map(({ kind, text }, at) => {
        if (kind === "went") return <del key={at}>{text}</del>;
        return kind === "came" ? <ins key={at}>{text}</ins> : <span key={at}>{text}</span>;
      })}
      {!runs && before !== null && (
        <>
          <del>
            <Words label={label} text={before} />
          </del>{" "}
        </>
      )}
      {!runs && after !== null && (
        <ins>
          <Words label={label} text={after} />
        </ins>
      )}
    </span>
  ));
}

function Words({ label, text }: { label: string; text: string }) {
  return label === "key" ? <Prose text={text} /> : <>{text}</>;
}

const STATE_WORDS: Record<LineView["state"], string> = {
  open: "open",
  accepted: "accepted",
  declined: "declined",
  dropped: "fell with the revision",
  published: "published",
};

function LineActions({ line, page }: { line: LineView; page: RevisionPage }) {
  const anchor = `line-${line.id}`;
  const seen = `${line.id}:${line.versionId}`;
  return (
    <span className="flex items-baseline gap-x-3 text-fine">
      {line.state === "accepted" && <InlineMark kind="clean">accepted</InlineMark>}
      {line.state === "published" && (
        <InlineMark kind="clean">
          in <a href={paths.edition(line.publishedIn ?? "current")}>edition {line.publishedIn}</a>
        </InlineMark>
      )}
      {line.state === "declined" && <InlineMark kind="block">declined</InlineMark>}
      {(line.state === "dropped" ||
        (line.state === "open" && !line.mayAccept && !line.mayDecline && !line.mayTakeOut)) && (
        <span className="text-soft">{line.own && page.may.decide ? "your own hand" : STATE_WORDS[line.state]}</span>
      )}
      {line.mayAccept && line.state === "open" && (
        <ActForm intent="accept" subject={line.id} fields={[["seen", seen]]}>
          {({ pending }) => (
            <Button
              kind="text"
              type="submit"
              pending={pending}
              pendingLabel="Accepting…"
              aria-label={`Accept line: ${line.about}`}
            >
              Accept
            </Button>
          )}
        </ActForm>
      )}
      {line.mayDecline && line.state === "open" && (
        <OpenLink form={formKey("decline", line.id)} anchor={anchor}>
          Decline<span className="said"> line: {line.about}</span>
        </OpenLink>
      )}
      {line.mayEdit && (
        <OpenLink form={formKey("rewrite", line.id)} anchor={anchor}>
          Change<span className="said"> {line.about}</span>
        </OpenLink>
      )}
      {line.mayTakeOut && !line.mayEdit && (
        <Link to={paths.revisionLine(page.revision.id, line.id)}>
          Change<span className="said"> {line.about}</span>
        </Link>
      )}
      {line.mayTakeOut && (
        <OpenLink form={formKey("take-out", line.id)} anchor={anchor}>
          Take out<span className="said"> {line.about}</span>
        </OpenLink>
      )}
      <OpenLink form={formKey("more", line.id)} anchor={anchor}>
        More<span className="said"> of {line.about}</span>
      </OpenLink>
    </span>
  );
}
