import { Link } from "react-router";
import { sheetStateWords } from "#app/intake/states.ts";
import { paths } from "#app/paths.ts";
import { ButtonLink } from "#app/ui/Button.tsx";
import { EmptyPage } from "#app/ui/EmptyPage.tsx";
import { count } from "#app/ui/figure.ts";
import { FindingCounts } from "#app/ui/FindingCounts.tsx";
import { InlineMark } from "#app/ui/MarginMark.tsx";
import { Section } from "#app/ui/Section.tsx";
import { RowUnder, Table } from "#app/ui/Table.tsx";
import { Time } from "#app/ui/Time.tsx";
import type { Home } from "../home.tsx";

type Sheet = NonNullable<Home["sheets"]>[number];
type Own = NonNullable<Home["own"]>[number];

/** This steward's sheets that no revision was built from yet; `alone` when there are no revisions either. */
export function OwnSheets({ sheets, alone }: { sheets: readonly Sheet[]; alone: boolean }) {
  if (sheets.length === 0) {
    const bring = <ButtonLink to={paths.newSheet()}>Bring a sheet</ButtonLink>;
    if (!alone) return <div className="actions">{bring}</div>;
    return (
      <EmptyPage start={bring}>
        No sheet of yours is under way. One that you bring waits here until its revision is built.
      </EmptyPage>
    );
  }
  return (
    <Section head="Your sheets">
      <Table caption="Your sheets without a revision, the newest first" even className="max-w-[56rem]">
        <thead>
          <tr>
            <th scope="col">Sheet</th>
            <th scope="col">State</th>
            <th scope="col">Needs you to</th>
            <th scope="col">Received</th>
          </tr>
        </thead>
        <tbody>
          {sheets.map((sheet) => (
            <tr key={sheet.id}>
              <th scope="row">
                <Link to={paths.sheet(sheet.id)}>
                  {sheet.id} · {sheet.name}
                </Link>
              </th>
              <td className="tight">
                <SheetState sheet={sheet} />
              </td>
              <td>{sheet.need ?? <span className="text-soft">nothing now</span>}</td>
              <td className="tight">
                <Time at={sheet.receivedAt} />
              </td>
            </tr>
          ))}
        </tbody>
      </Table>
    </Section>
  );
}

function SheetState({ sheet }: { sheet: Sheet }) {
  if (sheet.state === "reading") return `${count(sheet.rowsDone)} of ${count(sheet.rowsTotal)} read`;
  if (sheet.state === "read" && sheet.refused > 0) {
    return <InlineMark kind="block">{count(sheet.refused)} refused</InlineMark>;
  }
  if (sheet.state === "failed") return <InlineMark kind="look">{sheetStateWords.failed}</InlineMark>;
  return sheetStateWords[sheet.state];
}

/** This steward's revisions: what came back stands first, with the reviewer's words under it. */
export function OwnRevisions({ revisions, next }: { revisions: readonly Own[]; next: number }) {
  if (revisions.length === 0) return null;
  return (
    <Section head="Your revisions">
      <Table caption="Your revisions: returned, drafts, in review, decided of late" even className="max-w-[56rem]">
        <thead>
          <tr>
            <th scope="col">Revision</th>
            <th scope="col">State</th>
            <th scope="col" className="figure max-sm:hidden">
              Lines
            </th>
            <th scope="col">Findings</th>
            <th scope="col">Since</th>
          </tr>
        </thead>
        <tbody>
          {revisions.map((revision) => [
            <tr key={revision.id}>
              <th scope="row">
                <Link to={paths.revision(revision.id)}>
                  {revision.id} · {revision.title}
                </Link>
              </th>
              <td>
                <State revision={revision} next={next} />
              </td>
              <td className="figure max-sm:hidden">{count(revision.lines)}</td>
              <td>
                {revision.state === "decided" ? null : (
                  <FindingCounts blocks={revision.blocks} looks={revision.looks} />
                )}
              </td>
              <td className="tight">{revision.when}</td>
            </tr>,
            revision.state === "returned" && revision.newest?.remark ? (
              <RowUnder key={`${revision.id} under`} columns={5}>
                <p className="max-w-[68ch]">
                  <span className="text-soft">{revision.newest.by} writes: </span>“{revision.newest.remark}”
                </p>
              </RowUnder>
            ) : null,
          ])}
        </tbody>
      </Table>
    </Section>
  );
}

function State({ revision, next }: { revision: Own; next: number }) {
  switch (revision.state) {
    case "returned":
      return <InlineMark kind="look">returned</InlineMark>;
    case "draft":
      return "draft, not sent";
    case "in_review":
      return "in review";
    case "withdrawn":
      return "withdrawn";
    case "decided":
      if (revision.waiting > 0) {
        return `${count(revision.waiting)} accepted, for edition ${next}`;
      }
      if (revision.publishedIn === null) return "nothing accepted";
      return <Link to={paths.edition(revision.publishedIn)}>in edition {revision.publishedIn}</Link>;
  }
}
