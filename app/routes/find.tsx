import { Form, Link, redirect } from "react-router";
import { forPage } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import { findEverything, type Found } from "#app/review/findPage.server.ts";
import { revisionStateWords } from "#app/review/states.ts";
import { Button } from "#app/ui/Button.tsx";
import { EmptyPage } from "#app/ui/EmptyPage.tsx";
import { count } from "#app/ui/figure.ts";
import { Leaf } from "#app/ui/Leaf.tsx";
import { Prose } from "#app/ui/Prose.tsx";
import { Fine, Section } from "#app/ui/Section.tsx";
import { SpeciesName } from "#app/ui/SpeciesName.tsx";
import { Table } from "#app/ui/Table.tsx";
import { Time } from "#app/ui/Time.tsx";
import type { Route } from "./+types/find";
import { addressOf } from "./find/suggestions.ts";

export const meta: Route.MetaFunction = ({ loaderData }) => [
  { title: `${loaderData?.text ? `Find “${loaderData.text}”` : "Find"} · Tablewright` },
];

/** One thing named outright is gone to; anything else is listed. */
export const loader = forPage(async ({ request }: Route.LoaderArgs): Promise<Found> => {
  const acting = await requireActing(request, "table:read");
  const found = await findEverything(acting, new URL(request.url).searchParams.get("q") ?? "");
  if (found.exactly) throw redirect(addressOf(found.exactly));
  return found;
});

export default function FindPage({ loaderData: found }: Route.ComponentProps) {
  const { text, species, sources, revisions, editions, sheets, people } = found;
  const nothing = [species, sources, revisions, editions, sheets, people].every((list) => list.length === 0);
  return (
    <Leaf heading={text ? `Find “${text}”` : "Find"}>
      <Form method="get" action={paths.find()} role="search" aria-label="Find, on this page" className="mt-4 mb-6">
        <div className="flex max-w-[40rem] flex-wrap items-end gap-3">
          <div className="grow">
            <label className="field-label" htmlFor="find-text">
              A species, source, revision, edition or sheet
            </label>
            <input
              key={text}
              id="find-text"
              className="input"
              type="search"
              name="q"
              defaultValue={text}
              maxLength={200}
              autoComplete="off"
            />
          </div>
          <Button>Find</Button>
        </div>
      </Form>
      {text === "" && <Examples />}
      {text !== "" && nothing && <Nothing found={found} />}
      {species.length > 0 && <Species found={found} />}
      {sources.length > 0 && (
        <Section head="Sources">
          <ul className="max-w-[72ch] space-y-1">
            {sources.map((source) => (
              <li key={source.sourceId}>
                <Link to={paths.source(source.sourceId)}>{source.citation}</Link>
              </li>
            ))}
          </ul>
        </Section>
      )}
      {revisions.length > 0 && (
        <Section head="Revisions">
          <ul className="space-y-1">
            {revisions.map((revision) => (
              <li key={revision.id}>
                <Link to={paths.revision(revision.id)}>
                  {revision.id} · {revision.title}
                </Link>
                <span className="text-soft"> {revisionStateWords[revision.state]}</span>
              </li>
            ))}
          </ul>
        </Section>
      )}
      {editions.length > 0 && (
        <Section head="Editions">
          <ul>
            {editions.map((edition) => (
              <li key={edition.number}>
                <Link to={paths.edition(edition.number)}>Edition {edition.number}</Link>
                <span className="text-soft">
                  {" "}
                  published <Time at={edition.publishedAt} />
                </span>
              </li>
            ))}
          </ul>
        </Section>
      )}
      {sheets.length > 0 && (
        <Section head="Sheets">
          <ul className="space-y-1">
            {sheets.map((sheet) => (
              <li key={sheet.id}>
                <Link to={paths.sheet(sheet.id)}>
                  {sheet.id} · {sheet.name}
                </Link>
              </li>
            ))}
          </ul>
        </Section>
      )}
      {people.length > 0 && (
        <Section head="People">
          <ul className="space-y-1">
            {people.map((person) => (
              <li key={person.id}>
                <Link to={paths.person(person.id)}>{person.name}</Link>{" "}
                <span className="text-soft">{person.email}</span>
              </li>
            ))}
          </ul>
        </Section>
      )}
    </Leaf>
  );
}

interface SpeciesTableProps {
  caption: string;
  species: readonly (Found["species"][number] & { why?: string })[];
  edition: number;
}

function SpeciesTable({ caption, species, edition }: SpeciesTableProps) {
  const explained = species.some((one) => one.why !== undefined);
  return (
    <Table caption={caption} even className="max-w-[48rem]">
      <thead>
        <tr>
          <th scope="col">Species</th>
          <th scope="col">Name</th>
          <th scope="col">CAS</th>
          {explained && <th scope="col">Why</th>}
        </tr>
      </thead>
      <tbody>
        {species.map((one) => (
          <tr key={one.key}>
            <th scope="row" className="tight">
              <SpeciesName speciesKey={one.key} to={paths.species(edition, one.key)} />
            </th>
            <td>{one.name}</td>
            <td className="tight">{one.cas}</td>
            {explained && <td>{one.why}</td>}
          </tr>
        ))}
      </tbody>
    </Table>
  );
}

function Species({ found: { text, species, speciesCount, edition } }: { found: Found }) {
  if (edition === null) return null;
  return (
    <Section head="Species">
      <SpeciesTable caption={`Species of edition ${edition} that fit “${text}”`} species={species} edition={edition} />
      <Fine>
        {speciesCount > species.length && `${count(species.length)} of ${count(speciesCount)}. `}
        <Link to={paths.table(edition, { q: text })}>See {speciesCount === 1 ? "it" : "them"} with values</Link>
      </Fine>
    </Section>
  );
}

const EXAMPLES = [
  ["A species", "in any usual spelling: H2O(l), SO4 2-(aq), Na+ (aq)"],
  ["A formula", "for all its states: CO2, NH3"],
  ["A name", "or part of one: sulfate, ammonium"],
  ["A CAS number", "with its check digit: 7732-18-5"],
  ["A source", "by author, word of its title, year or DOI"],
  ["A revision", "by number or word of its title: revision 4"],
  ["An edition", "by number or a word of its notes: edition 2"],
  ["A sheet", "by number or name: sheet 3"],
] as const;

/** What can be typed. */
function Examples() {
  return (
    <Section head="What can be found">
      <dl className="max-w-[60ch] space-y-2">
        {EXAMPLES.map(([kind, how]) => (
          <div key={kind} className="flex flex-wrap gap-x-4">
            <dt className="w-32 font-medium">{kind}</dt>
            <dd className="text-soft">{how}</dd>
          </div>
        ))}
      </dl>
      <p className="mt-6">
        Or go through the <Link to={paths.table()}>table</Link>, the <Link to={paths.sources()}>sources</Link>, the{" "}
        <Link to={paths.revisions()}>revisions</Link> or the <Link to={paths.editions()}>editions</Link>.
      </p>
    </Section>
  );
}

function Nothing({ found: { text, edition, near, hint } }: { found: Found }) {
  return (
    <>
      <EmptyPage>
        <p>
          {edition === null
            ? "No edition is published yet, so there are no species or sources to find; no revision fits either."
            : `Nothing in edition ${edition}, and no revision, fits “${text}”.`}
        </p>
        {hint && (
          <p className="mt-3">
            <Prose text={hint} />
          </p>
        )}
        <ul className="mt-3 list-disc space-y-1 pl-5">
          <li>
            Write a formula as in H2SO4, a species with its state as in H2O(l), an ion with its charge as in SO4-2.
          </li>
          <li>Or take a part of the name, the CAS number, or a word of the source.</li>
          <li>
            Or go through the <Link to={paths.table()}>table</Link> by element and phase, the{" "}
            <Link to={paths.sources()}>sources</Link>, or the <Link to={paths.revisions()}>revisions</Link>.
          </li>
        </ul>
      </EmptyPage>
      {near.length > 0 && edition !== null && (
        <Section head="What comes near">
          <SpeciesTable caption={`Species of edition ${edition} near to “${text}”`} species={near} edition={edition} />
        </Section>
      )}
    </>
  );
}
