import { Form, Link } from "react-router";
import { BadRequest } from "#app/http/errors.ts";
import { pageError, readQuery } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import { findRevisionsPage } from "#app/review/revisionsPage.server.ts";
import { LIST_NAMES, type ListName, type RevisionItem, type RevisionsFilter } from "#app/review/revisionsPage.ts";
import { Button, ButtonLink, usePending } from "#app/ui/Button.tsx";
import { EmptyPage } from "#app/ui/EmptyPage.tsx";
import { InlineSelect, Sentence } from "#app/ui/Field.tsx";
import { count } from "#app/ui/figure.ts";
import { FindingCounts } from "#app/ui/FindingCounts.tsx";
import { Leaf } from "#app/ui/Leaf.tsx";
import { Lede, Section } from "#app/ui/Section.tsx";
import { Table } from "#app/ui/Table.tsx";
import { Time } from "#app/ui/Time.tsx";
import { useRootData } from "#app/ui/useRootData.ts";
import type { Route } from "./+types/revisions";

export const meta: Route.MetaFunction = () => [{ title: "Revisions · Tablewright" }];

/** Which revisions an address asks for; what is not a choice is said and shows nothing else. */
function filterIn(request: Request): RevisionsFilter {
  const query = readQuery(request, ["show", "by"]);
  const list = query.show ?? "";
  const person = query.by ?? "";
  const name = LIST_NAMES.find((one) => one === list);
  if (list !== "" && !name) throw new BadRequest(`There is no list “${list.slice(0, 40)}”. Choose one on the page.`);
  return { list: name ?? null, person: person === "" ? null : person };
}

export async function loader({ request }: Route.LoaderArgs) {
  try {
    const acting = await requireActing(request, "revision:read");
    const filter = filterIn(request);
    return { ...(await findRevisionsPage(acting, filter)), filter };
  } catch (error) {
    throw pageError(error);
  }
}

/** What the date in the last column says, by list. */
const SINCE: Record<ListName, string> = {
  inReview: "Sent",
  returned: "Sent last",
  drafts: "Begun",
  waiting: "Decided",
  published: "Decided",
  declined: "Decided",
  withdrawn: "Begun",
};

function since(item: RevisionItem): Date {
  if (item.state === "decided") return item.decidedAt ?? item.madeAt;
  if (item.state === "in_review" || item.state === "returned") return item.sentAt ?? item.madeAt;
  return item.madeAt;
}

/** One list. All lists have the same columns in the same places, so that the page reads as one table. */
function List({ name, head, items }: { name: ListName; head: string; items: readonly RevisionItem[] }) {
  const fell = name === "withdrawn";
  return (
    <Table caption={`Revisions: ${head.toLowerCase()}`} even className="max-w-[60rem] sm:min-w-[40rem] sm:table-fixed">
      <colgroup>
        <col className="sm:w-[45%]" />
        <col className="sm:w-[15%]" />
        <col className="sm:w-[6%]" />
        <col className="sm:w-[19%]" />
        <col className="sm:w-[15%]" />
      </colgroup>
      <thead>
        <tr>
          <th scope="col">Revision</th>
          <th scope="col" className="max-sm:hidden">
            From
          </th>
          <th scope="col" className="figure max-sm:hidden">
            {!fell && "Lines"}
          </th>
          <th scope="col">{fell ? "" : (THIRD[name] ?? "Findings")}</th>
          <th scope="col">{SINCE[name]}</th>
        </tr>
      </thead>
      <tbody>
        {items.map((item) => (
          <tr key={item.id}>
            <th scope="row">
              <Link to={paths.revision(item.id)}>
                {item.id} · {item.title}
              </Link>
              <span className="block text-fine text-soft sm:hidden">
                {item.madeByName}
                {!fell && `, ${item.lines === 1 ? "1 line" : `${count(item.lines)} lines`}`}
              </span>
            </th>
            <td className="max-sm:hidden">{item.madeByName}</td>
            <td className="figure max-sm:hidden">{!fell && count(item.lines)}</td>
            <td className="sm:whitespace-nowrap">{!fell && <Outcome name={name} item={item} />}</td>
            <td className="sm:whitespace-nowrap">
              <Time at={since(item)} />
            </td>
          </tr>
        ))}
      </tbody>
    </Table>
  );
}

/** The head of the column that says how far a revision has come. */
const THIRD: Partial<Record<ListName, string>> = { published: "Edition", waiting: "Accepted", declined: "Accepted" };

function Outcome({ name, item }: { name: ListName; item: RevisionItem }) {
  if (name === "published" && item.publishedIn !== null) {
    return <Link to={paths.edition(item.publishedIn)}>edition {item.publishedIn}</Link>;
  }
  if (name === "waiting") return item.waiting === item.lines ? "all" : count(item.waiting);
  if (name === "declined") return "none";
  return <FindingCounts blocks={item.blocks} looks={item.looks} />;
}

type Shown = Route.ComponentProps["loaderData"];

/** The filter as a sentence, with how many each choice lists. */
function Filter({ page: { choices, filter } }: { page: Shown }) {
  const pending = usePending();
  return (
    <Form method="get" action={paths.revisions()} key={`${filter.list ?? ""} ${filter.person ?? ""}`}>
      <Sentence>
        <span>Showing</span>
        <InlineSelect
          label="State"
          name="show"
          defaultValue={filter.list ?? ""}
          options={[
            ["", "every state"],
            ...choices.lists.map(({ name, head, n }) => [name, `${head.toLowerCase()} (${count(n)})`] as const),
          ]}
        />
        <span>begun by</span>
        <InlineSelect
          label="Person"
          name="by"
          defaultValue={filter.person ?? ""}
          options={[
            ["", "anybody"],
            ...choices.people.map(({ id, name, n }) => [id, `${name} (${count(n)})`] as const),
          ]}
        />
        <Button kind="text" type="submit" pending={pending}>
          Show
        </Button>
      </Sentence>
    </Form>
  );
}

export default function RevisionsPage({ loaderData: page }: Route.ComponentProps) {
  const { lists, may, waiting, total } = page;
  const { currentEdition } = useRootData();
  return (
    <Leaf
      heading="Revisions"
      section="revisions"
      lede="A revision is a set of proposed changes to the table. Nothing enters an edition without one, and nobody decides their own."
    >
      {total > 0 && <Filter page={page} />}
      {total > 0 && lists.length === 0 && (
        <EmptyPage start={<ButtonLink to={paths.revisions()}>Show all revisions</ButtonLink>}>
          No revision is of this state and begun by this person.
        </EmptyPage>
      )}
      {total === 0 && (
        <EmptyPage start={may.write ? <ButtonLink to={paths.newSheet()}>Bring a sheet</ButtonLink> : undefined}>
          No revision has been begun. One comes from a property sheet, or from a change on the page of a species.
        </EmptyPage>
      )}
      {lists.map(({ name, head, lede, items }) => (
        <Section key={name} head={head}>
          <Lede>
            {lede}
            {name === "waiting" && may.publish && (
              <>
                {" "}
                <Link to={paths.publish()}>See edition {(currentEdition ?? 0) + 1} as it would be</Link>
              </>
            )}
          </Lede>
          <List name={name} head={head} items={items} />
        </Section>
      ))}
      {may.write && (
        <p className="actions mt-8">
          <Link to={paths.propose()}>Propose a species that the table does not have</Link>
        </p>
      )}
      {may.publish && waiting === 0 && lists.length > 0 && (
        <p className="fine mt-8">Nothing waits for edition {(currentEdition ?? 0) + 1} yet.</p>
      )}
    </Leaf>
  );
}
