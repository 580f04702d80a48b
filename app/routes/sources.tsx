import { Link } from "react-router";
import { findSourcesPage } from "#app/editions/sourcesPage.server.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import { fullCitation } from "#app/sources/citation.ts";
import { type Column, DataTable } from "#app/ui/DataTable.tsx";
import { EmptyPage } from "#app/ui/EmptyPage.tsx";
import { count } from "#app/ui/figure.ts";
import { Leaf } from "#app/ui/Leaf.tsx";
import type { Route } from "./+types/sources";
import { sourceKindWords } from "./source/words.ts";

export const meta: Route.MetaFunction = () => [{ title: "Sources · Tablewright" }];

export const loader = forPage(async ({ request }: Route.LoaderArgs) =>
  findSourcesPage(await requireActing(request, "table:read")),
);

type Source = Route.ComponentProps["loaderData"]["sources"][number];

const columns: Column<Source>[] = [
  {
    id: "citation",
    head: "Source",
    rowHead: true,
    wraps: true,
    cell: (source) => (
      <Link to={paths.source(source.sourceId)}>{fullCitation(source.citation) || source.sourceId}</Link>
    ),
  },
  { id: "kind", head: "Kind", cell: (source) => sourceKindWords[source.kind] },
  { id: "values", head: "Values", figure: true, cell: (source) => count(source.values) },
];

export default function SourcesPage({ loaderData: { sources } }: Route.ComponentProps) {
  return (
    <Leaf heading="Sources" section="sources" lede="Where the numbers of the newest edition come from.">
      <DataTable
        caption="Sources of the newest edition"
        rows={sources}
        columns={columns}
        rowKey={(source) => source.sourceId}
        even
        empty={
          <EmptyPage>No edition holds a source yet. A source comes in with the sheet that brings its values.</EmptyPage>
        }
      />
    </Leaf>
  );
}
