import { Link } from "react-router";
import { findSheetsPage } from "#app/intake/sheetPage.server.ts";
import type { ListedSheet } from "#app/intake/sheetPage.ts";
import { sheetStateWords } from "#app/intake/states.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import { type Column, DataTable } from "#app/ui/DataTable.tsx";
import { EmptyPage } from "#app/ui/EmptyPage.tsx";
import { count } from "#app/ui/figure.ts";
import { Leaf } from "#app/ui/Leaf.tsx";
import { InlineMark } from "#app/ui/MarginMark.tsx";
import { Section } from "#app/ui/Section.tsx";
import { Time } from "#app/ui/Time.tsx";
import type { Route } from "./+types/sheets";
import { UploadForm } from "./sheet/UploadForm.tsx";

export const meta: Route.MetaFunction = () => [{ title: "Sheets · Tablewright" }];

export const loader = forPage(async ({ request }: Route.LoaderArgs) =>
  findSheetsPage(await requireActing(request, "sheet:read")),
);

const columns: Column<ListedSheet>[] = [
  {
    id: "sheet",
    head: "Sheet",
    rowHead: true,
    wraps: true,
    cell: (sheet) => (
      <Link to={paths.sheet(sheet.id)}>
        {sheet.id} · {sheet.name}
      </Link>
    ),
  },
  { id: "state", head: "State", cell: (sheet) => <State sheet={sheet} /> },
  { id: "rows", head: "Rows", figure: true, cell: (sheet) => count(sheet.rowsTotal) },
  { id: "by", head: "Brought by", cell: (sheet) => sheet.by },
  { id: "received", head: "Received", cell: (sheet) => <Time at={sheet.receivedAt} /> },
];

function State({ sheet }: { sheet: ListedSheet }) {
  if (sheet.state === "built" && sheet.revisionId !== null) {
    return <Link to={paths.revision(sheet.revisionId)}>revision {sheet.revisionId}</Link>;
  }
  if (sheet.state === "reading") return `${count(sheet.rowsDone)} of ${count(sheet.rowsTotal)} read`;
  if (sheet.state === "read" && sheet.refused > 0) {
    return <InlineMark kind="block">{count(sheet.refused)} refused</InlineMark>;
  }
  if (sheet.state === "failed") return <InlineMark kind="look">{sheetStateWords.failed}</InlineMark>;
  return sheetStateWords[sheet.state];
}

export default function SheetsPage({ loaderData: { sheets, mayWork } }: Route.ComponentProps) {
  return (
    <Leaf
      heading="Sheets"
      section="sheets"
      lede="A property sheet comes in as it is, is read row by row, and becomes a revision. Its bytes are kept untouched."
    >
      {mayWork && (
        <Section head="Bring a sheet">
          <UploadForm />
        </Section>
      )}
      <Section head="Sheets received">
        <DataTable
          caption="Sheets received, the newest first"
          rows={sheets}
          columns={columns}
          rowKey={(sheet) => String(sheet.id)}
          className="max-w-[60rem]"
          even
          empty={
            <EmptyPage>
              No sheet has been received yet. A steward brings one as a file of comma, semicolon or tab separated
              values.
            </EmptyPage>
          }
        />
      </Section>
    </Leaf>
  );
}
