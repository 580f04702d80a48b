import { Form, Link, redirect } from "react-router";
import { readComparison } from "#app/editions/editionPage.ts";
import { findEditionsPage, type ListedEdition } from "#app/editions/editionPage.server.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import { findNextEditionCount, type NextEditionCount } from "#app/review/editionPage.server.ts";
import { countsInWords } from "#app/review/publishPage.ts";
import { Button, ButtonLink } from "#app/ui/Button.tsx";
import { EmptyPage } from "#app/ui/EmptyPage.tsx";
import { InlineSelect, Sentence } from "#app/ui/Field.tsx";
import { count } from "#app/ui/figure.ts";
import { Leaf } from "#app/ui/Leaf.tsx";
import { Note } from "#app/ui/Note.tsx";
import { Prose } from "#app/ui/Prose.tsx";
import { Fine, Section } from "#app/ui/Section.tsx";
import { RowUnder, Table } from "#app/ui/Table.tsx";
import { Time } from "#app/ui/Time.tsx";
import { useRootData } from "#app/ui/useRootData.ts";
import type { Route } from "./+types/editions";

export const meta: Route.MetaFunction = () => [{ title: "Editions · Tablewright" }];

export const loader = forPage(async ({ request }: Route.LoaderArgs) => {
  const acting = await requireActing(request, "table:read");
  const editions = await findEditionsPage(acting);
  const numbers = editions.map((edition) => edition.number);
  const asked = readComparison(new URL(request.url).searchParams, numbers);
  // The form of this page without scripts: a comparison has an address of its own.
  if (asked.kind === "asked") throw redirect(paths.compare(asked.from, asked.to));
  return { editions, asked, next: await findNextEditionCount(acting) };
});

const LEDE =
  "An edition is the whole table as it stood on one day, under a number. Nothing in it is changed afterwards: what turns out to be wrong is put right by the next one, and the older ones stay readable.";

export default function EditionsPage({ loaderData: { editions, asked, next } }: Route.ComponentProps) {
  return (
    <Leaf heading="Editions" section="editions" lede={LEDE}>
      {next && next.counts.lines > 0 && <Waiting next={next} />}
      {editions.length === 0 ? (
        <NoEdition next={next} />
      ) : (
        <>
          <List editions={editions} />
          {next && next.counts.lines === 0 && (
            <Fine>
              Nothing is accepted for edition {next.number} yet. <Link to={paths.publish()}>The next edition</Link>
            </Fine>
          )}
          <Compare editions={editions} asked={asked} />
        </>
      )}
    </Leaf>
  );
}

/** What the reviewer can publish now. */
function Waiting({ next: { number, counts, revisions } }: { next: NextEditionCount }) {
  return (
    <div className="mb-6 flex max-w-[68ch] flex-wrap items-baseline gap-x-4 gap-y-2">
      <p>
        <b>Ready for edition {number}:</b> {countsInWords(counts)}, from{" "}
        {revisions === 1 ? "one revision" : `${count(revisions)} revisions`}.
      </p>
      <ButtonLink to={paths.publish()}>See edition {number} as it would be</ButtonLink>
    </div>
  );
}

function NoEdition({ next }: { next: NextEditionCount | null }) {
  const { opens } = useRootData();
  return (
    <EmptyPage start={opens.includes("revisions") && <ButtonLink to={paths.revisions()}>See the revisions</ButtonLink>}>
      No edition is published yet.{" "}
      {next && next.counts.lines > 0
        ? "The first can be published now."
        : "The first is published once a reviewer has accepted the lines of a revision."}
    </EmptyPage>
  );
}

/** How many columns the table has, for what stands under a row. */
const COLUMNS = 8;

function List({ editions }: { editions: readonly ListedEdition[] }) {
  return (
    <Table caption="Every edition, the newest first" even className="max-w-[60rem]">
      <thead>
        <tr>
          <th scope="col">Edition</th>
          <th scope="col">Published</th>
          <th scope="col">By</th>
          <th scope="col" className="figure">
            Species
          </th>
          <th scope="col" className="figure">
            Values
          </th>
          <th scope="col" className="figure">
            Came
          </th>
          <th scope="col" className="figure">
            Changed
          </th>
          <th scope="col" className="figure">
            Went
          </th>
        </tr>
      </thead>
      <tbody>
        {editions.map((edition) => [
          <tr key={edition.number}>
            <th scope="row" className="tight">
              <Link to={paths.edition(edition.number)} className="font-medium">
                Edition {edition.number}
              </Link>
            </th>
            <td className="tight">
              <Time at={edition.publishedAt} />
            </td>
            <td className="tight">{edition.publisher}</td>
            <td className="figure">{count(edition.speciesCount)}</td>
            <td className="figure">{count(edition.valueCount)}</td>
            <td className="figure">{count(edition.came)}</td>
            <td className="figure">{count(edition.changed)}</td>
            <td className="figure">{count(edition.went)}</td>
          </tr>,
          <RowUnder key={`${edition.number} under`} columns={COLUMNS}>
            <About edition={edition} />
          </RowUnder>,
        ])}
      </tbody>
    </Table>
  );
}

/** The ways on from one edition. What they lead to is said in full to those who hear them one by one. */
function WaysOn({ number }: { number: number }) {
  return (
    <p className="flex flex-wrap gap-x-4 [&>a]:min-h-6">
      <Link to={paths.table(number)}>
        read the table<span className="said"> of edition {number}</span>
      </Link>
      {number > 1 && (
        <Link to={paths.compare(number - 1, number)}>
          compare <span className="said">edition {number} </span>with edition {number - 1}
        </Link>
      )}
      <a href={paths.tableDownload(number)} download>
        download<span className="said"> edition {number}</span>
      </a>
      <Link to={`${paths.edition(number)}#cite`}>
        cite<span className="said"> edition {number}</span>
      </Link>
    </p>
  );
}

function About({ edition: { number, note, withdraws, withdrawn } }: { edition: ListedEdition }) {
  return (
    <div className="max-w-[68ch] text-soft">
      <p>
        <Prose text={note} />
      </p>
      {withdraws && (
        <p>
          It withdraws <Link to={paths.edition(withdraws.edition)}>edition {withdraws.edition}</Link>.
        </p>
      )}
      {withdrawn && (
        <p className="is-look">
          Withdrawn by <Link to={paths.edition(withdrawn.edition)}>edition {withdrawn.edition}</Link>:{" "}
          <Prose text={withdrawn.reason} />
        </p>
      )}
      <WaysOn number={number} />
    </div>
  );
}

/** Which two editions to hold against each other. It works before scripts arrive: the page sends its caller on. */
function Compare({
  editions,
  asked,
}: {
  editions: readonly ListedEdition[];
  asked: Route.ComponentProps["loaderData"]["asked"];
}) {
  const [newest, before] = editions;
  const refused = asked.kind === "refused" ? asked : null;
  if (!newest || (!before && !refused)) return null;
  const options = editions.map(({ number }) => [String(number), String(number)] as const);
  const chosen = (text: string | undefined, otherwise: number): string =>
    options.some(([value]) => value === text) ? (text ?? "") : String(otherwise);
  return (
    <Section head="Compare two editions">
      {refused && (
        <div role="alert">
          <Note kind="look" word="not compared">
            <p>{refused.remark}</p>
          </Note>
        </div>
      )}
      {before && (
        <Form method="get" action={paths.editions()} key={`${refused?.from} ${refused?.to}`}>
          <Sentence>
            What lies between edition{" "}
            <InlineSelect
              label="From edition"
              name="from"
              options={options}
              defaultValue={chosen(refused?.from, before.number)}
            />{" "}
            and edition{" "}
            <InlineSelect
              label="To edition"
              name="to"
              options={options}
              defaultValue={chosen(refused?.to, newest.number)}
            />
            <Button kind="text">Compare</Button>
          </Sentence>
        </Form>
      )}
    </Section>
  );
}
