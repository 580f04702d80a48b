import { Form, Link, useSearchParams, useSubmit } from "react-router";
import { BARE, CHARGE_KINDS, ELEMENTS_HOW } from "#app/editions/search.ts";
import { findTablePage, type TablePage, type TableRow } from "#app/editions/tablePage.server.ts";
import { conditionInWords, HOW_WORDS, KIND_WORDS, readTableQuery } from "#app/editions/tableQuery.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths, queryString } from "#app/paths.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import { bracketForm } from "#app/thermo/notation.ts";
import { PHASES, phaseName } from "#app/thermo/phase.ts";
import { PROPERTIES, propertyInfo } from "#app/thermo/property.ts";
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
  const { frame, rows, order, remarks, sources } = page;
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
  const { typed, order, count: found, frame } = page;
  const submit = useSubmit();
  const sort = `${order.direction === "descending" ? "-" : ""}${order.by}`;
  return (
    <Form
      method="get"
      role="search"
      aria-label="Filter the table"
      // The address of a filtered table is made of these fields; the same fields have the same value in it.
      key={queryString({ ...typed, sort })}
      onChange={(event) => {
        if (event.target instanceof HTMLSelectElement)
          void submit(stated(event.currentTarget), { preventScrollReset: true });
      }}
      onSubmit={(event) => {
        event.preventDefault();
        void submit(stated(event.currentTarget), { preventScrollReset: true });
      }}
    >
      <Sentence>
        Showing{" "}
        <InlineSelect
          label="Kind of species"
          name="kind"
          defaultValue={typed.kind}
          options={[["", "species"], ...CHARGE_KINDS.map((kind) => [kind, KIND_WORDS[kind]] as const)]}
        />{" "}
        called{" "}
        <InlineField
          label="Name, formula or CAS number"
          name="q"
          placeholder="anything"
          defaultValue={typed.q}
          size={12}
        />{" "}
        with{" "}
        <InlineSelect
          label="How the elements are meant"
          name="how"
          defaultValue={typed.how}
          options={ELEMENTS_HOW.map((how) => [how === "all" ? "" : how, HOW_WORDS[how]] as const)}
        />{" "}
        <InlineField label="Elements" name="element" placeholder="any element" defaultValue={typed.element} size={10} />{" "}
        in{" "}
        {[...typed.phase, ""].map((phase, index) => (
          <span key={phase}>
            {index > 0 && " or "}
            <InlineSelect
              label={index === 0 ? "Phase" : `Or in, ${index + 1}`}
              name="phase"
              defaultValue={phase}
              options={[
                ["", index === 0 ? "any phase" : "no other"],
                ...PHASES.map((one) => [one, phaseName[one]] as const),
              ]}
            />
          </span>
        ))}
        with{" "}
        {[...typed.property, ""].map((condition, index) => (
          <span key={condition}>
            {index > 0 && " and "}
            <InlineSelect
              label={index === 0 ? "Properties present or missing" : `Present or missing, ${index + 1}`}
              name="property"
              defaultValue={condition}
              options={[["", index === 0 ? "any property missing or not" : "whatever else"], ...CONDITIONS]}
            />
          </span>
        ))}
        from <InlineField label="Source" name="source" placeholder="any source" defaultValue={typed.source} size={10} />{" "}
        by <InlineSelect label="Order" name="sort" defaultValue={sort} options={ORDERS} />{" "}
        <Button kind="text">Show</Button> ·{" "}
        <span role="status">
          {count(found)} of {count(frame.speciesCount)}
        </span>{" "}
        · <ColumnChoice page={page} /> · <DownloadChoice page={page} />
      </Sentence>
    </Form>
  );
}

/** What a form says, without the fields that say nothing: the address stays short enough to read. */
function stated(form: HTMLFormElement): URLSearchParams {
  const search = new URLSearchParams();
  for (const [name, value] of new FormData(form)) {
    if (typeof value === "string" && value !== "" && !(name === "sort" && value === "key")) search.append(name, value);
  }
  return search;
}

function ColumnChoice({ page: { columns } }: { page: TablePage }) {
  return (
    <details className="disclosure relative inline-block" id="columns">
      <summary>columns</summary>
      <fieldset className="menu">
        <legend className="said">Columns shown</legend>
        {PROPERTIES.map((one) => (
          <label key={one} className="flex items-center gap-2 px-3 py-1">
            <input className="check" type="checkbox" name="column" value={one} defaultChecked={columns.includes(one)} />
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
  );
}

/** What is shown, all its pages, as a file under the same filter; and the whole edition, which never changes. */
function DownloadChoice({ page: { frame, count: found } }: { page: TablePage }) {
  const [search] = useSearchParams();
  const kept = new URLSearchParams(search);
  kept.delete("page");
  const query = Object.fromEntries([...new Set(kept.keys())].map((name) => [name, kept.getAll(name)]));
  return (
    <details className="disclosure relative inline-block" id="download">
      <summary>download</summary>
      <div className="menu">
        <Link reloadDocument to={paths.tableShown(frame.number, "shown.csv", query)}>
          These {count(found)} species, CSV
        </Link>
        <Link reloadDocument to={paths.tableShown(frame.number, "shown.json", query)}>
          These {count(found)} species, JSON
        </Link>
        <Link reloadDocument to={paths.tableDownload(frame.number)}>
          The whole edition, CSV
        </Link>
      </div>
    </details>
  );
}

const CONDITIONS: readonly (readonly [string, string])[] = [
  ...PROPERTIES,
  ...PROPERTIES.map((one) => `-${one}`),
  ...BARE.map((what) => `-${what}`),
].map((condition) => [condition, conditionInWords(condition)]);

const ORDERS: readonly (readonly [string, string])[] = [
  ["key", "key"],
  ["-key", "key, from the end"],
  ["hill", "formula in Hill order"],
  ["-hill", "formula in Hill order, from the end"],
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
