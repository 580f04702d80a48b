import { Link } from "react-router";
import type { EditionFrame } from "#app/editions/frame.server.ts";
import { paths } from "#app/paths.ts";
import type { RevisionBehind } from "#app/review/editionPage.ts";
import { type Column, DataTable } from "#app/ui/DataTable.tsx";
import { EmptyPage } from "#app/ui/EmptyPage.tsx";
import { count } from "#app/ui/figure.ts";
import { Lede, Section } from "#app/ui/Section.tsx";
import { Time } from "#app/ui/Time.tsx";

const columns: readonly Column<RevisionBehind>[] = [
  {
    id: "revision",
    head: "Revision",
    rowHead: true,
    wraps: "wide",
    cell: ({ id, title }) => (
      <Link to={paths.revision(id)}>
        {id} · {title}
      </Link>
    ),
  },
  { id: "lines", head: "Lines", figure: true, cell: ({ lines }) => count(lines) },
  { id: "written", head: "Written by", wraps: true, cell: ({ writtenBy }) => writtenBy.join(", ") },
  {
    id: "reviewed",
    head: "Reviewed and accepted by",
    wraps: true,
    cell: ({ reviewedBy, lines }) =>
      reviewedBy.map((one) => (
        <span key={one.name} className="block">
          {one.name}, <Time at={one.at} withTime />
          {one.lines < lines && `, ${one.lines === 1 ? "1 line" : `${count(one.lines)} lines`}`}
        </span>
      )),
  },
];

/** The people behind an edition's numbers: who wrote, who reviewed, who published, and when. */
export function Behind({ revisions, frame }: { revisions: readonly RevisionBehind[]; frame: EditionFrame }) {
  return (
    <Section head="Who stands behind it">
      <Lede>
        Every line was accepted by somebody without a hand in it. The whole was published by {frame.publisher},{" "}
        <Time at={frame.publishedAt} withTime />.
      </Lede>
      <DataTable
        caption={`The revisions that edition ${frame.number} holds`}
        rows={revisions}
        columns={columns}
        rowKey={({ id }) => String(id)}
        even
        className="max-w-[60rem]"
        empty={<EmptyPage>No revision is on record for this edition.</EmptyPage>}
      />
    </Section>
  );
}
