import { findSourcePage } from "#app/editions/sourcesPage.server.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import { fullCitation, noteOf, shortCitation } from "#app/sources/citation.ts";
import { type Column, DataTable } from "#app/ui/DataTable.tsx";
import { Leaf } from "#app/ui/Leaf.tsx";
import { Notice } from "#app/ui/Notice.tsx";
import { Section } from "#app/ui/Section.tsx";
import { SpeciesName } from "#app/ui/SpeciesName.tsx";
import { Symbol } from "#app/ui/Symbol.tsx";
import { Figures } from "#app/ui/ValueCell.tsx";
import { propertyInfo } from "#app/thermo/property.ts";
import type { Route } from "./+types/source";
import { sourceKindWords } from "./source/words.ts";

export const meta: Route.MetaFunction = ({ loaderData }) => [
  { title: `${loaderData ? shortCitation(loaderData.source.citation) : "Source"} · Tablewright` },
];

export const loader = forPage(async ({ request, params }: Route.LoaderArgs) =>
  findSourcePage(await requireActing(request, "table:read"), params.source),
);

type Row = Route.ComponentProps["loaderData"]["species"][number];

const columns = (edition: number): Column<Row>[] => [
  {
    id: "species",
    head: "Species",
    rowHead: true,
    cell: (row) => <SpeciesName speciesKey={row.key} to={paths.species(edition, row.key)} />,
  },
  {
    id: "values",
    head: "Values that rest on it",
    wraps: true,
    cell: (row) =>
      row.values.map((value) => (
        <span key={value.property} className="mr-4 whitespace-nowrap">
          <Symbol of={propertyInfo[value.property].symbol} />{" "}
          <Figures digits={value.digits} uncertainty={value.uncertainty} />
        </span>
      )),
  },
];

export default function SourcePage({ loaderData: { source, species, edition } }: Route.ComponentProps) {
  const { citation } = source;
  const note = noteOf(citation);
  return (
    <Leaf heading={shortCitation(citation) || source.sourceId} section="sources" lede={fullCitation(citation)}>
      {source.notice && <Notice word="notice" text={source.notice} />}
      <p>
        {sourceKindWords[source.kind]}, in the table since edition {source.since}
        {source.doi && (
          <>
            {" "}
            · DOI <a href={`https://doi.org/${encodeURI(source.doi)}`}>{source.doi}</a>
          </>
        )}
      </p>
      {note && <p className="lede">{note}</p>}
      <Section head="Species">
        <DataTable
          caption="Species whose values rest on this source"
          rows={species}
          columns={columns(edition)}
          rowKey={(row) => row.key}
        />
      </Section>
    </Leaf>
  );
}
