import { Link, redirect } from "react-router";
import type { HistoryEntry } from "#app/editions/speciesPage.ts";
import { findSpeciesPage, type SpeciesPage } from "#app/editions/speciesPage.server.ts";
import { resolveSpecies } from "#app/editions/resolve.server.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { permissions } from "#app/people/permissions.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import { propertyInfo } from "#app/thermo/property.ts";
import { Caution } from "#app/ui/Caution.tsx";
import { ClosurePlot } from "#app/ui/ClosurePlot.tsx";
import { type Column, DataTable } from "#app/ui/DataTable.tsx";
import { EmptyPage } from "#app/ui/EmptyPage.tsx";
import { HistoryPlot } from "#app/ui/HistoryPlot.tsx";
import { Leaf } from "#app/ui/Leaf.tsx";
import { Notice } from "#app/ui/Notice.tsx";
import { Prose } from "#app/ui/Prose.tsx";
import { QuantityHead } from "#app/ui/QuantityHead.tsx";
import { Columns, Fine, Lede, Section } from "#app/ui/Section.tsx";
import { Sign } from "#app/ui/Signs.tsx";
import { SpeciesName } from "#app/ui/SpeciesName.tsx";
import { Symbol } from "#app/ui/Symbol.tsx";
import { Table } from "#app/ui/Table.tsx";
import { UnitText } from "#app/ui/UnitText.tsx";
import { useRootData } from "#app/ui/useRootData.ts";
import { Figures } from "#app/ui/ValueCell.tsx";
import type { Route } from "./+types/species";
import { useEditionFrame, useNewest, WithdrawnNotice } from "./edition/Frame.tsx";
import { keptByAddress } from "./edition/kept.ts";
import { pinnedEdition } from "./edition/pin.server.ts";

export const meta: Route.MetaFunction = ({ loaderData, params }) => [
  { title: `${loaderData?.species.key ?? params.key}, edition ${params.edition} · Tablewright` },
];

export const loader = forPage(async ({ request, params }: Route.LoaderArgs): Promise<SpeciesPage> => {
  const acting = await requireActing(request, "table:read");
  const edition = await pinnedEdition(request, params.edition);
  const detail = await resolveSpecies(edition.number, params.key);
  // Another spelling, or a key of an earlier edition, leads to the key as of this one.
  if (detail.key !== params.key) throw redirect(paths.species(edition.number, detail.key), 308);
  return findSpeciesPage(acting, edition, detail);
});

export async function clientLoader({ request, serverLoader }: Route.ClientLoaderArgs) {
  return keptByAddress(request, serverLoader);
}

export default function SpeciesRoute({ loaderData: page }: Route.ComponentProps) {
  const { frame, species, also, plots, history } = page;
  const { bookmark, ribbon } = useEditionFrame(frame, { from: species.since });
  return (
    <Leaf
      heading={<SpeciesName speciesKey={species.key} printed={species.printed} />}
      headingKind="species"
      section="table"
      bookmark={bookmark}
      ribbon={ribbon}
      lede={<Identity page={page} />}
    >
      <WithdrawnNotice frame={frame} />
      {page.sources
        .filter((source) => source.notice !== null)
        .map((source) => (
          <Notice key={source.sourceId} word="source" text={`${source.short}: ${source.notice ?? ""}`} />
        ))}
      <Values page={page} />
      <ProposeLink page={page} />
      {also.length > 0 && <Also page={page} />}
      <Columns>
        <Closure page={page} />
        {plots.map(({ property, points }) => {
          const { symbol, unit } = propertyInfo[property];
          return (
            <Section
              key={property}
              head={
                <>
                  <Symbol of={symbol} /> through the editions
                </>
              }
            >
              <HistoryPlot
                points={points}
                newest={frame.number}
                what={`${symbol} of ${species.key} in ${unit}`}
                decimals={Math.max(...points.map((point) => point.places))}
              />
            </Section>
          );
        })}
      </Columns>
      <Section head="What the editions did to it">
        <History entries={history} page={page} />
      </Section>
      <Caution />
    </Leaf>
  );
}

function Identity({ page: { species, also, frame } }: { page: SpeciesPage }) {
  const phases = also.filter((other) => other.sameSubstance);
  return (
    <>
      {[species.name, species.cas && `CAS ${species.cas}`]
        .filter(Boolean)
        .map((text) => `${text} · `)
        .join("")}
      {species.molarMass !== null && (
        <>
          {species.molarMass} g mol<sup>−1</sup>
        </>
      )}
      {species.synonyms.length > 0 && ` · also called ${species.synonyms.join(", ")}`}
      {phases.length > 0 && (
        <>
          {" · also as "}
          {phases.map((other, index) => (
            <span key={other.key}>
              {index > 0 && ", "}
              <SpeciesName speciesKey={other.key} to={paths.species(frame.number, other.key)} />
            </span>
          ))}
        </>
      )}
    </>
  );
}

/** Species of the same formula that are other compounds: easily mistaken for this one. */
function Also({ page: { also, frame } }: { page: SpeciesPage }) {
  const others = also.filter((other) => !other.sameSubstance);
  if (others.length === 0) return null;
  return (
    <Fine>
      Of the same formula, under another name or CAS number:{" "}
      {others.map((other, index) => (
        <span key={other.key}>
          {index > 0 && ", "}
          <SpeciesName speciesKey={other.key} to={paths.species(frame.number, other.key)} /> {other.name}
        </span>
      ))}
    </Fine>
  );
}

function Values({ page }: { page: SpeciesPage }) {
  const { values, follows, frame, species, sources } = page;
  if (values.length === 0) {
    return (
      <EmptyPage>
        Edition {frame.number} has no value of <SpeciesName speciesKey={species.key} />.
      </EmptyPage>
    );
  }
  const shortOf = (sourceId: string): string => sources.find((one) => one.sourceId === sourceId)?.short ?? sourceId;
  return (
    <Table caption={`Values of ${species.key} in edition ${frame.number}`} className="max-w-4xl min-w-[40rem]" even>
      <thead>
        <tr>
          <th scope="col">Property</th>
          <th scope="col" className="figure">
            Value
          </th>
          <th scope="col">Unit</th>
          <th scope="col">Origin</th>
          <th scope="col">Source</th>
          <th scope="col">Since</th>
        </tr>
      </thead>
      <tbody>
        {values.map((value) => {
          const { symbol, name, unit } = propertyInfo[value.property];
          return (
            <tr key={value.property}>
              <th scope="row">
                <Symbol of={symbol} /> <span className="font-normal">{name.replace(/^standard /, "")}</span>
                <Asides value={value} />
              </th>
              <td className="figure">
                <Figures digits={value.digits} uncertainty={value.uncertainty} />
              </td>
              <td className="tight">
                <UnitText unit={unit} />
              </td>
              <td>{value.origin}</td>
              <td>
                <Link to={paths.sourceIn(frame.number, value.sourceId)}>{shortOf(value.sourceId)}</Link>
                <SourceNotice notice={sources.find((one) => one.sourceId === value.sourceId)?.notice ?? null} />
              </td>
              <td className="tight">
                <Link to={paths.edition(value.since)}>edition {value.since}</Link>
              </td>
            </tr>
          );
        })}
        {follows !== null && (
          <tr>
            <th scope="row">
              <Symbol of="ΔfG°" /> <span className="font-normal">Gibbs energy of formation</span>
            </th>
            <td className="figure">
              <Figures digits={follows} uncertainty={null} derived />
            </td>
            <td className="tight">
              <UnitText unit="kJ/mol" />
            </td>
            <td>follows</td>
            <td>
              from <Symbol of="ΔfH°" /> and <Symbol of="S°" />
            </td>
            <td />
          </tr>
        )}
      </tbody>
    </Table>
  );
}

/** What its source is warned of, beside the value that leans on it. */
function SourceNotice({ notice }: { notice: string | null }) {
  if (notice === null) return null;
  return (
    <span className="fine is-look block">
      <Sign kind="look" size={10} /> <Prose text={notice} />
    </span>
  );
}

/** What the record keeps beside the number: what the sheet said, how it was obtained, what the source remarks. */
function Asides({ value: { given, basis, method, remark } }: { value: SpeciesPage["values"][number] }) {
  const asides = [
    given && `given as ${given.text} ${given.unit}${given.note ? ` (${given.note})` : ""}`,
    basis && (basis === "molality" ? "solute at 1 mol/kg" : "solute at 1 mol/L"),
    method,
    remark,
  ].filter((one): one is string => typeof one === "string" && one !== "");
  if (asides.length === 0) return null;
  return (
    <span className="fine block font-normal">
      <Prose text={asides.join("; ")} />
    </span>
  );
}

/** The way to a change, for those who may propose one. It is always proposed against the newest edition. */
function ProposeLink({ page: { frame, species } }: { page: SpeciesPage }) {
  const { visitor } = useRootData();
  const newest = useNewest(frame);
  const writers: readonly string[] = permissions["revision:write"];
  if (frame.number !== newest || !visitor?.roles.some((role) => writers.includes(role))) return null;
  return (
    <p className="actions">
      <Link to={paths.propose({ species: species.key })}>Propose a change</Link>
    </p>
  );
}

function Closure({ page }: { page: SpeciesPage }) {
  const { closure, closureNotMade, aboveTranslation } = page;
  if (!closure && !closureNotMade && aboveTranslation === null) return null;
  return (
    <Section head={closure || closureNotMade ? "Does it close?" : "Against the floor"}>
      {closure && (
        <>
          <ClosurePlot {...closure} />
          <Lede>
            <Prose text={closure.sentence} />
          </Lede>
          <details className="disclosure" id="arithmetic">
            <summary>the arithmetic</summary>
            <ul className="fine mt-2">
              {closure.arithmetic.map((line) => (
                <li key={line}>
                  <Prose text={line} />
                </li>
              ))}
            </ul>
          </details>
        </>
      )}
      {closureNotMade && (
        <Lede>
          <Prose text={`The closure is not made: ${closureNotMade}`} />
        </Lede>
      )}
      {aboveTranslation !== null && (
        <Lede>
          <Prose text={`Its entropy stands ${aboveTranslation} J/(mol K) above the floor of translation alone.`} />{" "}
          <Link to={paths.conventions()}>How it is reckoned</Link>
        </Lede>
      )}
    </Section>
  );
}

const WHAT: Record<HistoryEntry["what"], string> = {
  came: "came in",
  changed: "changed",
  withdrawn: "withdrawn",
  called: "called otherwise",
};

function historyColumns(page: SpeciesPage): Column<HistoryEntry>[] {
  const shortOf = (id: string): string => page.sources.find((one) => one.sourceId === id)?.short ?? id;
  return [
    {
      id: "edition",
      head: "Edition",
      cell: ({ edition }) => <Link to={paths.edition(edition)}>{edition}</Link>,
    },
    {
      id: "property",
      head: "Property",
      cell: ({ property }) => property && <QuantityHead property={property} />,
    },
    { id: "what", head: "What", cell: ({ what }) => WHAT[what] },
    {
      id: "before",
      head: "Stood",
      figure: true,
      cell: ({ before }) =>
        before && (
          <del>
            <Figures {...before} />
          </del>
        ),
    },
    {
      id: "after",
      head: "Stands",
      figure: true,
      cell: ({ after, before }) => {
        if (!after) return null;
        return before ? (
          <ins>
            <Figures {...after} />
          </ins>
        ) : (
          <Figures {...after} />
        );
      },
    },
    {
      id: "difference",
      head: "Difference",
      figure: true,
      cell: ({ difference }) =>
        difference !== null ? <Figures digits={difference} uncertainty={null} sign="plus" /> : null,
    },
    {
      id: "why",
      head: "Source or reason",
      wraps: "wide",
      cell: ({ sourceId, sentence }) =>
        sentence !== null ? (
          <Prose text={sentence} />
        ) : (
          sourceId && <Link to={paths.sourceIn(page.frame.number, sourceId)}>{shortOf(sourceId)}</Link>
        ),
    },
    {
      id: "who",
      head: "Who",
      wraps: "wide",
      cell: ({ revisionId, writer, decider }) => (
        <>
          <Link to={paths.revision(revisionId)}>revision {revisionId}</Link>
          {writer && `, ${writer}`}
          {decider && `; accepted by ${decider}`}
        </>
      ),
    },
  ];
}

function History({ entries, page }: { entries: readonly HistoryEntry[]; page: SpeciesPage }) {
  return (
    <DataTable
      caption={`What each edition up to ${page.frame.number} did to ${page.species.key}`}
      rows={entries}
      columns={historyColumns(page)}
      rowKey={(entry) => `${entry.edition} ${entry.what} ${entry.property ?? ""}`}
      className="min-w-[56rem]"
      empty={<EmptyPage>No edition has touched it yet.</EmptyPage>}
    />
  );
}
