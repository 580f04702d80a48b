import { Form, Link } from "react-router";
import { SOURCE_KINDS, SOURCES_PAGE, readSourceQuery } from "#app/editions/sourceList.ts";
import { findSourcesPage, type SourcesPage } from "#app/editions/sourcesPage.server.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths, queryString } from "#app/paths.ts";
import { may } from "#app/people/permissions.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import { citationPieces, noteOf, shortCitation, yearOf } from "#app/sources/citation.ts";
import { Button, ButtonLink } from "#app/ui/Button.tsx";
import { type Column, DataTable } from "#app/ui/DataTable.tsx";
import { EmptyPage } from "#app/ui/EmptyPage.tsx";
import { InlineField, InlineSelect, Sentence } from "#app/ui/Field.tsx";
import { count } from "#app/ui/figure.ts";
import { Leaf } from "#app/ui/Leaf.tsx";
import { PageTurner } from "#app/ui/PageTurner.tsx";
import { Reference } from "#app/ui/Reference.tsx";
import { Sign } from "#app/ui/Signs.tsx";
import type { Route } from "./+types/edition.sources";
import { useEditionFrame, WithdrawnNotice } from "./edition/Frame.tsx";
import { keptByAddress } from "./edition/kept.ts";
import { pinnedEdition } from "./edition/pin.server.ts";
import { sourceKindWords } from "./source/words.ts";

export const meta: Route.MetaFunction = ({ params }) => [
  {
    title: /^\d+$/.test(params.edition) ? `Sources, edition ${params.edition} · Tablewright` : "Sources · Tablewright",
  },
];

export const loader = forPage(async ({ request, params }: Route.LoaderArgs) => {
  const acting = await requireActing(request, "table:read");
  const edition = await pinnedEdition(request, params.edition);
  const query = readSourceQuery(new URL(request.url).searchParams);
  return {
    page: await findSourcesPage(acting, edition, query),
    writes: may(acting.person.roles, "revision:write"),
  };
});

export async function clientLoader({ request, serverLoader }: Route.ClientLoaderArgs) {
  return keptByAddress(request, serverLoader);
}

type Source = SourcesPage["rows"][number];

/** Rows come sorted from the server; a column that can be sorted says so by having a comparison. */
const sortedByServer = (): number => 0;

const columnsFor = (edition: number): Column<Source>[] => [
  {
    id: "name",
    head: "Source",
    rowHead: true,
    compare: sortedByServer,
    cell: ({ sourceId, citation }) => (
      <Link to={paths.sourceIn(edition, sourceId)}>{shortCitation(citation) || sourceId}</Link>
    ),
  },
  {
    id: "reference",
    head: "In full",
    wraps: "wide",
    cell: ({ citation, doi, notice }) => (
      <>
        <Reference pieces={citationPieces(citation, doi)} />
        {notice !== null && (
          <span className="is-look block">
            <Sign kind="look" size={10} /> {notice}
          </span>
        )}
        {noteOf(citation) !== "" && <span className="fine block">{noteOf(citation)}</span>}
      </>
    ),
  },
  { id: "kind", head: "Kind", cell: ({ kind }) => sourceKindWords[kind] },
  { id: "year", head: "Year", compare: sortedByServer, cell: ({ citation }) => yearOf(citation) },
  { id: "values", head: "Values", figure: true, compare: sortedByServer, cell: ({ values }) => count(values) },
];

export default function SourcesRoute({ loaderData: { page, writes } }: Route.ComponentProps) {
  const { frame, rows, query } = page;
  const { bookmark, ribbon } = useEditionFrame(frame);
  return (
    <Leaf
      heading="Sources"
      section="sources"
      bookmark={bookmark}
      ribbon={ribbon}
      lede={`Where the numbers of edition ${frame.number} come from, as it cites them.`}
    >
      <WithdrawnNotice frame={frame} />
      <Filters page={page} />
      <DataTable
        caption={`Sources of edition ${frame.number}`}
        rows={rows}
        columns={columnsFor(frame.number)}
        rowKey={(source) => source.sourceId}
        sorting={query.order}
        sortedAlready
        even
        className="min-w-[40rem]"
        empty={<Nothing page={page} />}
      />
      <PageTurner
        label="Pages of the sources"
        page={page.page}
        pages={page.pages}
        pageSize={SOURCES_PAGE}
        rows={page.count}
      />
      {writes && (
        <div className="actions pt-4">
          <ButtonLink to={paths.newSource()}>Add a source</ButtonLink>
        </div>
      )}
    </Leaf>
  );
}

function Nothing({ page: { frame, all } }: { page: SourcesPage }) {
  if (all === 0) return <EmptyPage>Edition {frame.number} has no source.</EmptyPage>;
  return (
    <EmptyPage start={<ButtonLink to={paths.sourcesIn(frame.number)}>Show all sources</ButtonLink>}>
      No source of edition {frame.number} is like that.
    </EmptyPage>
  );
}

/** The filters as a sentence, in the address; the button works before scripts arrive. */
function Filters({ page: { frame, query, count: found, all } }: { page: SourcesPage }) {
  const { q, kind, noticed, order } = query;
  return (
    <Form
      method="get"
      role="search"
      aria-label="Filter the sources"
      action={paths.sourcesIn(frame.number)}
      // Another address has other fields filled in.
      key={queryString({ q, kind, noticed: String(noticed), sort: order.column })}
    >
      <Sentence>
        Showing sources that say{" "}
        <InlineField label="Author, title, year or DOI" name="q" placeholder="anything" defaultValue={q} size={16} />{" "}
        <InlineSelect
          label="Kind"
          name="kind"
          defaultValue={noticed ? "notice" : (kind ?? "")}
          options={[
            ["", "of any kind"],
            ...SOURCE_KINDS.map((one) => [one, sourceKindWords[one]] as const),
            ["notice", "with a notice"],
          ]}
        />
        <input
          type="hidden"
          name="sort"
          value={`${order.direction === "descending" ? "-" : ""}${order.column}`}
          readOnly
        />
        <Button kind="text">Show</Button> · {count(found)} of {count(all)}
      </Sentence>
    </Form>
  );
}
