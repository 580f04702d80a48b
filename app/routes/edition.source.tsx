import { Link } from "react-router";
import { readPage } from "#app/editions/sourceList.ts";
import { findSourcePage, type SourcePage } from "#app/editions/sourcesPage.server.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { may } from "#app/people/permissions.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import { citationPieces, noteOf, plainCitation, shortCitation } from "#app/sources/citation.ts";
import { bracketForm } from "#app/thermo/notation.ts";
import { isProperty, propertyInfo } from "#app/thermo/property.ts";
import { ButtonLink } from "#app/ui/Button.tsx";
import { ChangedWords } from "#app/ui/ChangedWords.tsx";
import { type Column, DataTable } from "#app/ui/DataTable.tsx";
import { EmptyPage } from "#app/ui/EmptyPage.tsx";
import { count, tailOf } from "#app/ui/figure.ts";
import { Leaf } from "#app/ui/Leaf.tsx";
import { Notice } from "#app/ui/Notice.tsx";
import { PageTurner } from "#app/ui/PageTurner.tsx";
import { QuantityHead } from "#app/ui/QuantityHead.tsx";
import { Reference } from "#app/ui/Reference.tsx";
import { Fine, Section } from "#app/ui/Section.tsx";
import { SpeciesName } from "#app/ui/SpeciesName.tsx";
import { Symbol } from "#app/ui/Symbol.tsx";
import { useRootData } from "#app/ui/useRootData.ts";
import { Figures } from "#app/ui/ValueCell.tsx";
import type { Route } from "./+types/edition.source";
import { useEditionFrame, WithdrawnNotice } from "./edition/Frame.tsx";
import { keptByAddress } from "./edition/kept.ts";
import { pinnedEdition } from "./edition/pin.server.ts";
import { sourceKindSentence } from "./source/words.ts";

export const meta: Route.MetaFunction = ({ loaderData, params }) => [
  {
    title: `${loaderData ? shortCitation(loaderData.page.source.citation) || params.source : "Source"}, edition ${params.edition} · Tablewright`,
  },
];

export const loader = forPage(async ({ request, params }: Route.LoaderArgs) => {
  const acting = await requireActing(request, "table:read");
  const edition = await pinnedEdition(request, params.edition);
  const search = new URL(request.url).searchParams;
  const property = search.get("property") ?? "";
  return {
    page: await findSourcePage(acting, edition, params.source, {
      property: isProperty(property) ? property : null,
      page: readPage(search.get("page")),
    }),
    writes: may(acting.person.roles, "revision:write"),
  };
});

export async function clientLoader({ request, serverLoader }: Route.ClientLoaderArgs) {
  return keptByAddress(request, serverLoader);
}

export default function SourceRoute({ loaderData: { page, writes } }: Route.ComponentProps) {
  const { frame, source, counts } = page;
  const { citation, doi } = source;
  const { bookmark, ribbon } = useEditionFrame(frame, { from: source.since });
  const note = noteOf(citation);
  const all = counts.reduce((sum, one) => sum + one.values, 0);
  return (
    <Leaf
      heading={shortCitation(citation) || source.sourceId}
      section="sources"
      bookmark={bookmark}
      ribbon={ribbon}
      lede={<Reference pieces={citationPieces(citation, doi)} />}
    >
      <WithdrawnNotice frame={frame} />
      {source.notice !== null && <Notice word="notice" text={source.notice} />}
      <p className="my-3">
        {sourceKindSentence[source.kind]} {count(all)} {all === 1 ? "value" : "values"} of edition {frame.number}{" "}
        {all === 1 ? "leans" : "lean"} on it; it came in with{" "}
        <Link to={paths.edition(source.since)}>edition {source.since}</Link>.
      </p>
      {note !== "" && <p className="lede">{note}</p>}
      <div className="actions print:hidden">
        {writes && <ButtonLink to={paths.mendSource(source.sourceId)}>Mend the citation</ButtonLink>}
        {all > 0 && (
          <a href={paths.sourceValues(frame.number, source.sourceId)} download>
            Download its values
          </a>
        )}
        <Link to={paths.sourcesIn(frame.number)}>All sources of edition {frame.number}</Link>
      </div>
      <Section head="Values that lean on it" id="values">
        <Counts page={page} />
        <Values page={page} />
      </Section>
      <Section head="Through the editions">
        <History page={page} />
      </Section>
      {page.sheets.length > 0 && (
        <Section head="Sheets it came in by">
          <Sheets page={page} />
        </Section>
      )}
      <Section head="To cite it elsewhere">
        <blockquote className="max-w-[68ch] border-l border-rule pl-4 break-words select-all">
          {plainCitation(citation, doi)}
        </blockquote>
        <Fine>
          In addresses and programs it is {source.sourceId}, in every edition; edition {frame.number} cites it as above,
          for ever.
        </Fine>
      </Section>
    </Leaf>
  );
}

/** How many values of each property, and the way to see one property alone. */
function Counts({ page: { frame, source, counts, property } }: { page: SourcePage }) {
  if (counts.length < 2) return null;
  const link = (to: string, chosen: boolean, words: React.ReactNode) => (
    <Link to={to} aria-current={chosen ? "true" : undefined} className={chosen ? "font-semibold" : undefined}>
      {words}
    </Link>
  );
  return (
    <nav aria-label="Values by property" className="mb-3 flex flex-wrap gap-x-5 gap-y-1 print:hidden">
      {link(`${paths.sourceIn(frame.number, source.sourceId)}#values`, property === null, "all")}
      {counts.map((one) => (
        <span key={one.property}>
          {link(
            `${paths.sourceIn(frame.number, source.sourceId, { property: one.property })}#values`,
            property === one.property,
            <>
              {count(one.values)} <Symbol of={propertyInfo[one.property].symbol} />
            </>,
          )}
        </span>
      ))}
    </nav>
  );
}

type Row = SourcePage["species"][number];

function Values({ page }: { page: SourcePage }) {
  const { frame, species, counts, property } = page;
  const shown = counts.map((one) => one.property).filter((one) => property === null || one === property);
  const columns: Column<Row>[] = [
    {
      id: "species",
      head: "Species",
      rowHead: true,
      cell: (row) => <SpeciesName speciesKey={row.key} to={paths.species(frame.number, row.key)} />,
    },
    ...shown.map((one): Column<Row> => {
      const tail = tailOf(
        species.flatMap(({ values }) => {
          const value = values[one];
          return value ? [bracketForm(value.digits, value.uncertainty)] : [];
        }),
      );
      return {
        id: one,
        head: <QuantityHead property={one} />,
        figure: true,
        cell: ({ values }) => {
          const value = values[one];
          return value ? <Figures digits={value.digits} uncertainty={value.uncertainty} tail={tail} /> : null;
        },
      };
    }),
  ];
  return (
    <>
      <DataTable
        caption={`Values of edition ${frame.number} that lean on ${shortCitation(page.source.citation)}`}
        rows={species}
        columns={columns}
        rowKey={(row) => row.key}
        className="max-w-4xl"
        empty={
          <EmptyPage>
            No value of edition {frame.number} leans on it{property === null ? "" : " there"}.
          </EmptyPage>
        }
      />
      <PageTurner
        label="Pages of the values"
        page={page.page}
        pages={page.pages}
        pageSize={page.pageSize}
        rows={page.count}
      />
    </>
  );
}

type Change = SourcePage["history"][number];

const historyColumns: Column<Change>[] = [
  { id: "edition", head: "Edition", cell: ({ edition }) => <Link to={paths.edition(edition)}>{edition}</Link> },
  { id: "came", head: "Values came", figure: true, cell: ({ came }) => count(came) },
  { id: "went", head: "Values went", figure: true, cell: ({ went }) => count(went) },
  {
    id: "cited",
    head: "Citation",
    wraps: "wide",
    cell: ({ cited }) =>
      cited === null ? (
        "as before"
      ) : cited.texts === null ? (
        "came in"
      ) : cited.texts.length > 0 ? (
        <ChangedWords texts={cited.texts} />
      ) : (
        "kept otherwise, printed as before"
      ),
  },
  {
    id: "who",
    head: "Who",
    wraps: "wide",
    cell: ({ cited }) =>
      cited && (
        <>
          <Link to={paths.revision(cited.revisionId)}>revision {cited.revisionId}</Link>, {cited.writer}
          {cited.decider !== null && `; accepted by ${cited.decider}`}
        </>
      ),
  },
];

function History({ page }: { page: SourcePage }) {
  return (
    <DataTable
      caption={`What each edition up to ${page.frame.number} did to this source and to the values that lean on it`}
      rows={page.history}
      columns={historyColumns}
      rowKey={(row) => String(row.edition)}
      even
      className="min-w-[44rem]"
    />
  );
}

function Sheets({ page: { sheets } }: { page: SourcePage }) {
  const { opens } = useRootData();
  const columns: Column<SourcePage["sheets"][number]>[] = [
    {
      id: "name",
      head: "Sheet",
      rowHead: true,
      wraps: true,
      cell: ({ id, name }) => (opens.includes("sheets") ? <Link to={paths.sheet(id)}>{name}</Link> : name),
    },
    { id: "values", head: "Values", figure: true, cell: ({ values }) => count(values) },
    {
      id: "revision",
      head: "By",
      cell: ({ revisionId }) => <Link to={paths.revision(revisionId)}>revision {revisionId}</Link>,
    },
    { id: "edition", head: "Edition", cell: ({ edition }) => <Link to={paths.edition(edition)}>{edition}</Link> },
  ];
  return (
    <DataTable
      caption="Sheets that brought values from this source"
      rows={sheets}
      columns={columns}
      rowKey={({ id, edition }) => `${id} ${edition}`}
      even
      className="max-w-4xl"
    />
  );
}
