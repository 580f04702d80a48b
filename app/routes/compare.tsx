import { Link, redirect } from "react-router";
import { type ComparePage, findComparePage } from "#app/editions/comparePage.server.ts";
import type { ShownChange } from "#app/editions/comparePage.ts";
import type { EditionFrame } from "#app/editions/frame.server.ts";
import { resolveEdition } from "#app/editions/resolve.server.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import { propertyInfo } from "#app/thermo/property.ts";
import { Caution } from "#app/ui/Caution.tsx";
import { ChangedWords } from "#app/ui/ChangedWords.tsx";
import { type Column, DataTable } from "#app/ui/DataTable.tsx";
import { DifferencePlot } from "#app/ui/DifferencePlot.tsx";
import { Ribbon } from "#app/ui/EditionLine.tsx";
import { EmptyPage } from "#app/ui/EmptyPage.tsx";
import { count } from "#app/ui/figure.ts";
import { Leaf } from "#app/ui/Leaf.tsx";
import { InlineMark } from "#app/ui/MarginMark.tsx";
import { PageTurner } from "#app/ui/PageTurner.tsx";
import { QuantityHead } from "#app/ui/QuantityHead.tsx";
import { Columns, Fine, Section } from "#app/ui/Section.tsx";
import { SpeciesName } from "#app/ui/SpeciesName.tsx";
import { Table } from "#app/ui/Table.tsx";
import { Time } from "#app/ui/Time.tsx";
import { Figures } from "#app/ui/ValueCell.tsx";
import type { Route } from "./+types/compare";
import { useNewest, WithdrawnNotice } from "./edition/Frame.tsx";
import { keptByAddress } from "./edition/kept.ts";

export const meta: Route.MetaFunction = ({ params: { a, b } }) => [{ title: `Editions ${a} and ${b} · Tablewright` }];

export const loader = forPage(async ({ request, params }: Route.LoaderArgs): Promise<ComparePage> => {
  const acting = await requireActing(request, "table:read");
  const a = await resolveEdition(params.a);
  const b = await resolveEdition(params.b);
  const { searchParams, search } = new URL(request.url);
  if (a.isCurrent || b.isCurrent) throw redirect(paths.compare(a.edition.number, b.edition.number) + search);
  const page = Number(/^[1-9]\d{0,5}$/.exec(searchParams.get("page") ?? "")?.[0] ?? 1);
  return findComparePage(acting, a.edition, b.edition, page);
});

export async function clientLoader({ request, serverLoader }: Route.ClientLoaderArgs) {
  return keptByAddress(request, serverLoader);
}

export default function CompareRoute({ loaderData: page }: Route.ComponentProps) {
  const { from, to, changes, drawn, counts } = page;
  const newest = useNewest(to);
  const same = changes.length === 0 && page.species.length === 0 && page.sources.length === 0;
  return (
    <Leaf
      heading={heading(from, to)}
      section="editions"
      lede={<Summary page={page} />}
      bookmark={{
        kind: Math.max(from.number, to.number) >= newest ? "newest" : "older",
        label: "Editions",
        mark: `${from.number}·${to.number}`,
      }}
      ribbon={<CompareRibbon from={from} to={to} newest={newest} />}
    >
      <WithdrawnNotice frame={from} />
      {from.number !== to.number && <WithdrawnNotice frame={to} />}
      {same && (
        <EmptyPage>
          {from.number === to.number
            ? "An edition and itself are the same."
            : `Editions ${from.number} and ${to.number} hold the same values, species and sources.`}
        </EmptyPage>
      )}
      {drawn.length > 0 && (
        <Columns>
          {drawn.map(({ property, differences, left }) => (
            <Section
              key={property}
              head={
                <>
                  Differences in <QuantityHead property={property} />
                </>
              }
            >
              <DifferencePlot
                caption={`Differences in ${propertyInfo[property].symbol}, each with its joined expanded uncertainty`}
                head={<QuantityHead property={property} />}
                differences={differences.map(({ key, difference, printed, expanded }) => ({
                  speciesKey: key,
                  to: paths.species(to.number, key),
                  difference,
                  printed,
                  expanded,
                }))}
              />
              {left > 0 && <Fine>{count(left)} more stand in the table below.</Fine>}
            </Section>
          ))}
        </Columns>
      )}
      {changes.length > 0 && (
        <Section head="What came, went and changed">
          <DataTable
            caption={`Values that came, went or changed from edition ${from.number} to edition ${to.number}`}
            rows={changes}
            columns={changeColumns(page)}
            rowKey={(change) => `${change.speciesId} ${change.property}`}
            className="min-w-[60rem]"
          />
          <PageTurner
            label="Pages of the changes"
            page={page.page}
            pages={page.pages}
            pageSize={page.pageSize}
            rows={counts.came + counts.went + counts.changed}
          />
          <Fine>
            The difference is what stands less what stood. <i>E</i>
            <sub>n</sub> is its size over the joined expanded uncertainties of both; above 1 it is larger than both
            allow. Where one of them states none it is not defined. {count(counts.unchanged)} values are the same.
          </Fine>
        </Section>
      )}
      <Texts page={page} />
      <Caution />
    </Leaf>
  );
}

function heading(from: EditionFrame, to: EditionFrame): string {
  return to.number === from.number + 1
    ? `What edition ${to.number} changed`
    : `From edition ${from.number} to edition ${to.number}`;
}

function Summary({ page: { counts, digitsOnly, beyond, species, sources } }: { page: ComparePage }) {
  const values = (n: number, what: string): string => `${count(n)} ${n === 1 ? "value" : "values"} ${what}`;
  const renamed = species.filter((one) => one.what === "changed").length;
  const mended = sources.filter((one) => one.what === "changed").length;
  return (
    <>
      {values(counts.changed, "changed")}, {count(counts.came)} came, {count(counts.went)} went;{" "}
      {count(counts.unchanged)} are the same.
      {digitsOnly > 0 && ` In ${count(digitsOnly)} only the printed digits differ.`}
      {beyond > 0 && ` ${values(beyond, "moved beyond what both uncertainties allow")}.`}
      {renamed > 0 && ` ${count(renamed)} species ${renamed === 1 ? "is" : "are"} called otherwise.`}
      {mended > 0 && ` ${count(mended)} ${mended === 1 ? "source is" : "sources are"} cited otherwise.`}
    </>
  );
}

function CompareRibbon({ from, to, newest }: { from: EditionFrame; to: EditionFrame; newest: number }) {
  const others = to.editions.filter((number) => number !== from.number && number !== to.number);
  return (
    <Ribbon
      end={
        <>
          {Math.max(from.number, to.number) < newest && (
            <span className="is-look">
              edition {newest} stands: <Link to={paths.compare(from.number, newest)}>compare with it</Link>
            </span>
          )}
          {others.length > 0 && (
            <details className="disclosure relative" id="other-comparisons">
              <summary>other editions</summary>
              <ul className="menu right-0">
                {others.map((number) => (
                  <li key={number}>
                    <Link to={paths.compare(Math.min(number, to.number), Math.max(number, to.number))}>
                      edition {Math.min(number, to.number)} with {Math.max(number, to.number)}
                    </Link>
                  </li>
                ))}
              </ul>
            </details>
          )}
          <Link to={paths.compare(to.number, from.number)}>turn round</Link>
        </>
      }
    >
      <span>
        <b>
          <Link to={paths.edition(from.number)}>Edition {from.number}</Link>
        </b>
        , <Time at={from.publishedAt} />, against{" "}
        <b>
          <Link to={paths.edition(to.number)}>edition {to.number}</Link>
        </b>
        , <Time at={to.publishedAt} />
      </span>
    </Ribbon>
  );
}

function changeColumns({ from, to, citations }: ComparePage): Column<ShownChange>[] {
  const cited = (sourceId: string, edition = to.number) => (
    <Link to={paths.sourceIn(edition, sourceId)}>{citations[sourceId] ?? sourceId}</Link>
  );
  return [
    {
      id: "species",
      head: "Species",
      rowHead: true,
      cell: ({ key, what }) => (
        <SpeciesName speciesKey={key} to={paths.species(what === "went" ? from.number : to.number, key)} />
      ),
    },
    { id: "property", head: "Property", cell: ({ property }) => <QuantityHead property={property} /> },
    { id: "what", head: "What", cell: ({ what }) => what },
    {
      id: "before",
      head: `Edition ${from.number}`,
      figure: true,
      cell: ({ before }) =>
        before && (
          <del>
            <Figures digits={before.digits} uncertainty={before.uncertainty} />
          </del>
        ),
    },
    {
      id: "after",
      head: `Edition ${to.number}`,
      figure: true,
      cell: ({ after }) =>
        after && (
          <ins>
            <Figures digits={after.digits} uncertainty={after.uncertainty} />
          </ins>
        ),
    },
    {
      id: "difference",
      head: "Difference",
      figure: true,
      cell: ({ difference }) => difference !== null && <Figures digits={difference} uncertainty={null} sign="plus" />,
    },
    { id: "relative", head: "in %", figure: true, cell: ({ relative }) => relative },
    {
      id: "normalizedError",
      head: (
        <>
          <i>E</i>
          <sub>n</sub>
        </>
      ),
      figure: true,
      cell: ({ normalizedError, beyond }) =>
        normalizedError !== null && (beyond ? <InlineMark kind="look">{normalizedError}</InlineMark> : normalizedError),
    },
    { id: "remark", head: "Also differs", wraps: true, cell: ({ remark }) => remark },
    {
      id: "source",
      head: "Source",
      wraps: "wide",
      cell: ({ before, after }) =>
        before && after && before.sourceId !== after.sourceId ? (
          <>
            {cited(after.sourceId)}
            <span className="fine block">was {citations[before.sourceId] ?? before.sourceId}</span>
          </>
        ) : (
          cited((after ?? before)?.sourceId ?? "", after ? to.number : from.number)
        ),
    },
  ];
}

/** Species and sources that came, went or are called otherwise, word by word. */
function Texts({ page: { species, sources, from, to } }: { page: ComparePage }) {
  return (
    <>
      {species.length > 0 && (
        <Section head="Species">
          <Table caption="Species that came, went or are called otherwise" even>
            <thead>
              <tr>
                <th scope="col">Species</th>
                <th scope="col">What</th>
                <th scope="col">In words</th>
              </tr>
            </thead>
            <tbody>
              {species.map(({ id, what, before, after, name, texts }) => (
                <tr key={id}>
                  <th scope="row" className="tight">
                    <SpeciesName
                      speciesKey={after ?? before ?? ""}
                      to={paths.species(after ? to.number : from.number, after ?? before ?? "")}
                    />
                  </th>
                  <td className="tight">{what === "changed" ? "called otherwise" : what}</td>
                  <td>{texts.length > 0 ? <ChangedWords texts={texts} /> : name}</td>
                </tr>
              ))}
            </tbody>
          </Table>
        </Section>
      )}
      {sources.length > 0 && (
        <Section head="Sources">
          <Table caption="Sources that came, went or are cited otherwise" even>
            <thead>
              <tr>
                <th scope="col">Source</th>
                <th scope="col">What</th>
                <th scope="col">In words</th>
              </tr>
            </thead>
            <tbody>
              {sources.map(({ id, what, after, citation, texts }) => (
                <tr key={id}>
                  <th scope="row">
                    <Link to={paths.sourceIn(after ? to.number : from.number, id)}>{citation}</Link>
                  </th>
                  <td className="tight">{what === "changed" ? "cited otherwise" : what}</td>
                  <td>
                    <ChangedWords texts={texts} />
                  </td>
                </tr>
              ))}
            </tbody>
          </Table>
        </Section>
      )}
    </>
  );
}
