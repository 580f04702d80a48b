import { Link } from "react-router";
import { pageError } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import { findRevisionsPage } from "#app/review/revisionsPage.server.ts";
import type { ListName, RevisionItem } from "#app/review/revisionsPage.ts";
import { ButtonLink } from "#app/ui/Button.tsx";
import { type Column, DataTable } from "#app/ui/DataTable.tsx";
import { EmptyPage } from "#app/ui/EmptyPage.tsx";
import { count } from "#app/ui/figure.ts";
import { Leaf } from "#app/ui/Leaf.tsx";
import { InlineMark } from "#app/ui/MarginMark.tsx";
import { Lede, Section } from "#app/ui/Section.tsx";
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

function Findings({ item }: { item: RevisionItem }) {
  if (item.blocks === 0 && item.looks === 0) return <span className="text-soft">all clean</span>;
  return (
    <span className="inline-flex gap-x-3">
      {item.blocks > 0 && <InlineMark kind="block">{count(item.blocks)} block</InlineMark>}
      {item.looks > 0 && <InlineMark kind="look">{count(item.looks)} to look at</InlineMark>}
    </span>
  );
}

const columnsOf = (name: ListName): Column<RevisionItem>[] => [
  {
    id: "revision",
    head: "Revision",
    rowHead: true,
    wraps: true,
    cell: (item) => (
      <Link to={paths.revision(item.id)}>
        {item.id} · {item.title}
      </Link>
    ),
  },
  { id: "from", head: "From", cell: (item) => item.madeByName },
  {
    id: "lines",
    head: "Lines",
    figure: true,
    cell: (item) => (name === "withdrawn" ? "" : count(item.lines)),
  },
  {
    id: "findings",
    head: name === "published" ? "Edition" : name === "waiting" ? "Accepted" : "Findings",
    cell: (item) => {
      if (name === "published" && item.publishedIn !== null) {
        return <Link to={paths.edition(item.publishedIn)}>edition {item.publishedIn}</Link>;
      }
      if (name === "waiting") return count(item.waiting);
      return name === "withdrawn" || name === "declined" ? "" : <Findings item={item} />;
    },
  },
  { id: "since", head: SINCE[name], cell: (item) => <Time at={since(item)} /> },
];

const columns: Record<ListName, Column<RevisionItem>[]> = {
  inReview: columnsOf("inReview"),
  returned: columnsOf("returned"),
  drafts: columnsOf("drafts"),
  waiting: columnsOf("waiting"),
  published: columnsOf("published"),
  declined: columnsOf("declined"),
  withdrawn: columnsOf("withdrawn"),
};

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
          <DataTable
            caption={`Revisions: ${head.toLowerCase()}`}
            rows={items}
            columns={columns[name]}
            rowKey={(item) => String(item.id)}
            className="max-w-[60rem]"
            even
          />
        </Section>
      ))}
      {may.publish && waiting === 0 && lists.length > 0 && (
        <p className="fine mt-8">Nothing waits for edition {(currentEdition ?? 0) + 1} yet.</p>
      )}
    </Leaf>
  );
}
