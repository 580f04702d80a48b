import { Form, Link, useSubmit } from "react-router";
import { findTablePage, type TablePage, type TableRow } from "#app/editions/tablePage.server.ts";
import { readTableQuery } from "#app/editions/tableQuery.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths, queryString } from "#app/paths.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import { bracketForm } from "#app/thermo/notation.ts";
import { PHASES, phaseName } from "#app/thermo/phase.ts";
import { PROPERTIES, type Property, propertyInfo } from "#app/thermo/property.ts";
import { Button, ButtonLink } from "#app/ui/Button.tsx";
import { Caution } from "#app/ui/Caution.tsx";
import { type Column, DataTable } from "#app/ui/DataTable.tsx";
import { EmptyPage } from "#app/ui/EmptyPage.tsx";
import { InlineField, InlineSelect, Sentence } from "#app/ui/Field.tsx";
import { count, tailOf } from "#app/ui/figure.ts";
import { Leaf } from "#app/ui/Leaf.tsx";
import { InlineMark } from "#app/ui/MarginMark.tsx";
import { Note } from "#app/ui/Note.tsx";
import { PageTurner } from "#app/ui/PageTurner.tsx";
import { QuantityHead } from "#app/ui/QuantityHead.tsx";
import { Fine } from "#app/ui/Section.tsx";
import { SpeciesName } from "#app/ui/SpeciesName.tsx";
import { Symbol } from "#app/ui/Symbol.tsx";
import { Figures } from "#app/ui/ValueCell.tsx";
import { useRootData } from "#app/ui/useRootData.ts";
import type { Route } from "./+types/table";
import { useEditionFrame, WithdrawnNotice } from "./edition/Frame.tsx";
import { keptByAddress } from "./edition/kept.ts";
import { pinnedEditionOrNone } from "./edition/pin.server.ts";

export const meta: Route.MetaFunction = ({ params }) => [
  { title: /^\d+$/.test(params.edition) ? `Table, edition ${params.edition} · Tablewright` : "Table · Tablewright" },
];

export const loader = forPage(async ({ request, params }: Route.LoaderArgs): Promise<TablePage | null> => {
  const acting = await requireActing(request, "table:read");
  const edition = await pinnedEditionOrNone(request, params.edition);
  return edition && findTablePage(acting, edition, readTableQuery(new URL(request.url).searchParams));
});

export async function clientLoader({ request, serverLoader }: Route.ClientLoaderArgs) {
  return keptByAddress(request, serverLoader);
}

export default function TableRoute({ loaderData }: Route.ComponentProps) {
  return loaderData ? <TableOfEdition page={loaderData} /> : <NoEdition />;
}

const HEADING = "Table of standard formation properties";

function NoEdition() {
  const { opens } = useRootData();
  return (
    <Leaf heading={HEADING} section="table">
      <EmptyPage start={opens.includes("sheets") && <ButtonLink to={paths.sheets()}>Bring a sheet</ButtonLink>}>
        No edition is published yet. The table begins with the first sheet that a steward brings and a reviewer accepts.
      </EmptyPage>
    </Leaf>
  );
}

function TableOfEdition({ page }: { page: TablePage }) {
  const { frame, rows, columns, order, remarks, sources } = page;
  const { bookmark, ribbon } = useEditionFrame(frame, { counts: true });
  return (
    <Leaf heading={HEADING} section="table" bookmark={bookmark} ribbon={ribbon}>
      <WithdrawnNotice frame={frame} />
      <Filters page={page} />
      {remarks.map((remark) => (
        <Note key={remark} kind="look" word="not read">
          {remark}
        </Note>
      ))}
      <DataTable
        caption={`Standard formation properties at 298.15 K and 100 kPa, edition ${frame.number}`}
        rows={rows}
        columns={columnsFor(page)}
        rowKey={(row) => row.speciesId}
        sorting={{ column: order.by, direction: order.direction }}
        sortedAlready
        className="min-w-[48rem]"
        empty={
          <EmptyPage start={<ButtonLink to={paths.table(frame.number)}>Show all species</ButtonLink>}>
            No species of edition {frame.number} is like that.
          </EmptyPage>
        }
      />
      <PageTurner
        label="Pages of the table"
        page={page.page}
        pages={page.pages}
        pageSize={page.pageSize}
        rows={page.count}
      />
      {rows.length > 0 && (
        <Fine>
          Figures in parentheses are the standard uncertainty in the last digits. <Symbol of="ΔfG°" /> set in the
          lighter hand follows from the <Symbol of="ΔfH°" /> and <Symbol of="S°" /> beside it; it is not stated by a
          source.
        </Fine>
      )}
      {sources.length > 0 && (
        <ol className="fine mt-3" aria-label="Sources of this page">
          {sources.map(({ number, sourceId, citation, notice }) => (
            <li key={sourceId} id={`source-${number}`}>
              {number} · <Link to={paths.sourceIn(frame.number, sourceId)}>{citation}</Link>
              {notice && <span className="is-look"> · {notice}</span>}
            </li>
          ))}
        </ol>
      )}
      <Caution />
    </Leaf>
  );
}

/** The filters as a sentence. Every choice is in the address; the button works before scripts arrive. */
function Filters({ page }: { page: TablePage }) {
  const { typed, order, count: found, frame, columns } = page;
  const submit = useSubmit();
  return (
    <Form
      method="get"
      role="search"
      aria-label="Filter the table"
      // The address of a filtered table is made of these fields; the same fields have the same value in it.
      key={queryString(typed)}
      onChange={(event) => {
        if (event.target instanceof HTMLSelectElement) void submit(event.currentTarget, { preventScrollReset: true });
      }}
    >
      <Sentence>
        Showing species called{" "}
        <InlineField
          label="Name, formula or CAS number"
          name="q"
          placeholder="anything"
          defaultValue={typed.q}
          size={12}
        />{" "}
        with{" "}
        <InlineField label="Elements" name="element" placeholder="any element" defaultValue={typed.element} size={10} />{" "}
        in{" "}
        <InlineSelect
          label="Phase"
          name="phase"
          defaultValue={typed.phase}
          options={[["", "any phase"], ...PHASES.map((phase) => [phase, phaseName[phase]] as const)]}
        />
        , with{" "}
        <InlineSelect
          label="Properties present or missing"
          name="property"
          defaultValue={typed.property}
          options={[
            ["", "any property missing or not"],
            ...PROPERTIES.map((one) => [one, `a value of ${propertyInfo[one].symbol}`] as const),
            ...PROPERTIES.map((one) => [`-${one}`, `no value of ${propertyInfo[one].symbol}`] as const),
          ]}
        />
        , by{" "}
        <InlineSelect
          label="Order"
          name="sort"
          defaultValue={`${order.direction === "descending" ? "-" : ""}${order.by}`}
          options={ORDERS}
        />
        <Button kind="text">Show</Button> · {count(found)} of {count(frame.speciesCount)} ·{" "}
        <details className="disclosure relative inline-block" id="columns">
          <summary>columns</summary>
          <fieldset className="menu">
            <legend className="said">Columns shown</legend>
            {PROPERTIES.map((one) => (
              <label key={one} className="flex items-center gap-2 px-3 py-1">
                <input
                  className="check"
                  type="checkbox"
                  name="column"
                  value={one}
                  defaultChecked={columns.includes(one)}
                />
                <span>
                  <Symbol of={propertyInfo[one].symbol} />
                </span>
              </label>
            ))}
            <div className="px-3 py-2">
              <Button kind="plain">Show these</Button>
            </div>
          </fieldset>
        </details>
      </Sentence>
    </Form>
  );
}

const ORDERS: readonly (readonly [string, string])[] = [
  ["key", "formula"],
  ["-key", "formula, from the end"],
  ["name", "name"],
  ["-name", "name, from the end"],
  ...PROPERTIES.flatMap((one) => [
    [one, `${propertyInfo[one].symbol}, smallest first`] as const,
    [`-${one}`, `${propertyInfo[one].symbol}, largest first`] as const,
  ]),
];

/** Rows come sorted from the server; a column that can be sorted says so by having a comparison. */
const sortedByServer = (): number => 0;

function columnsFor({ frame, columns: shown, rows, sources }: TablePage): Column<TableRow>[] {
  const edition = frame.number;
  const noticed = new Set(sources.filter((source) => source.notice !== null).map((source) => source.number));
  return [
    {
      id: "key",
      head: "Species",
      rowHead: true,
      compare: sortedByServer,
      cell: (row) => <SpeciesName speciesKey={row.key} to={paths.species(edition, row.key)} />,
    },
    // Many published tables print no names; a column of blanks would only push the figures apart.
    ...(rows.some((row) => row.name !== "")
      ? [{ id: "name", head: "Name", wraps: true, compare: sortedByServer, cell: (row: TableRow) => row.name }]
      : []),
    ...shown.map((property): Column<TableRow> => {
      const tail = tailOf(
        rows.flatMap(({ values }) => {
          const value = values[property];
          return value ? [bracketForm(value.digits, value.uncertainty)] : [];
        }),
      );
      return {
        id: property,
        head: <QuantityHead property={property} />,
        figure: true,
        compare: sortedByServer,
        cell: ({ values }) => {
          const value = values[property];
          return value ? <Figures {...value} tail={tail} /> : null;
        },
      };
    }),
    {
      id: "source",
      head: "Source",
      cell: (row) =>
        row.sources.map((number, index) => (
          <span key={number}>
            {index > 0 && ", "}
            <a href={`#source-${number}`}>{number}</a>
            {noticed.has(number) && (
              <>
                {" "}
                <InlineMark kind="look">notice</InlineMark>
              </>
            )}
          </span>
        )),
    },
  ];
}
