import { Link } from "react-router";
import { pageError } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import { findRevisionsPage } from "#app/review/revisionsPage.server.ts";
import type { ListName, RevisionItem } from "#app/review/revisionsPage.ts";
import { ButtonLink } from "#app/ui/Button.tsx";
import { EmptyPage } from "#app/ui/EmptyPage.tsx";
import { count } from "#app/ui/figure.ts";
import { FindingCounts } from "#app/ui/FindingCounts.tsx";
import { Leaf } from "#app/ui/Leaf.tsx";
import { Lede, Section } from "#app/ui/Section.tsx";
import { Table } from "#app/ui/Table.tsx";
import { Time } from "#app/ui/Time.tsx";
import { useRootData } from "#app/ui/useRootData.ts";
import type { Route } from "./+types/revisions";

export const meta: Route.MetaFunction = () => [{ title: "Revisions · Tablewright" }];

export async function loader({ request }: Route.LoaderArgs) {
  try {
    return await findRevisionsPage(await requireActing(request, "revision:read"));
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

export default function RevisionsPage({ loaderData: { lists, may, waiting } }: Route.ComponentProps) {
  const { currentEdition } = useRootData();
  return (
    <Leaf
      heading="Revisions"
      section="revisions"
      lede="A revision is a set of proposed changes to the table. Nothing enters an edition without one, and nobody decides their own."
    >
      {lists.length === 0 && (
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
