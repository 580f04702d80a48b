import { Link } from "react-router";
import { paths } from "#app/paths.ts";
import { countsInWords } from "#app/review/publishPage.ts";
import { ButtonLink } from "#app/ui/Button.tsx";
import { EmptyPage } from "#app/ui/EmptyPage.tsx";
import { count } from "#app/ui/figure.ts";
import { FindingCounts } from "#app/ui/FindingCounts.tsx";
import { Section } from "#app/ui/Section.tsx";
import { Table } from "#app/ui/Table.tsx";
import type { Home } from "../home.tsx";

/** Revisions that wait for this reviewer, the longest waiting first. */
export function ToDecide({ revisions }: { revisions: NonNullable<Home["toDecide"]> }) {
  if (revisions.length === 0) {
    return (
      <EmptyPage start={<Link to={paths.revisions()}>All revisions</Link>}>
        When a steward sends a revision to review, it waits here with its lines and findings.
      </EmptyPage>
    );
  }
  return (
    <Table caption="Revisions that wait for your decision, the longest waiting first" even className="max-w-[56rem]">
      <thead>
        <tr>
          <th scope="col">Revision</th>
          <th scope="col" className="max-sm:hidden">
            From
          </th>
          <th scope="col" className="figure">
            Lines
          </th>
          <th scope="col">Findings</th>
          <th scope="col">Waiting</th>
        </tr>
      </thead>
      <tbody>
        {revisions.map((revision) => (
          <tr key={revision.id}>
            <th scope="row">
              <Link to={paths.revision(revision.id)}>
                {revision.id} · {revision.title}
              </Link>
              <span className="block text-fine text-soft sm:hidden">{revision.madeByName}</span>
            </th>
            <td className="max-sm:hidden">{revision.madeByName}</td>
            <td className="figure">{count(revision.lines)}</td>
            <td>
              <FindingCounts blocks={revision.blocks} looks={revision.looks} />
            </td>
            <td>{revision.waits}</td>
          </tr>
        ))}
      </tbody>
    </Table>
  );
}

/** What is accepted and stands in no edition yet. */
export function NextEdition({ next }: { next: NonNullable<Home["next"]> }) {
  const { number, revisions, counts, mayPublish } = next;
  return (
    <Section head={`Ready for edition ${number}`}>
      <p className="lede">
        {revisions.length === 1 ? "Revision " : "Revisions "}
        {revisions.map((id, index) => (
          <span key={id}>
            {index > 0 && (index === revisions.length - 1 ? " and " : ", ")}
            <Link to={paths.revision(id)}>{id}</Link>
          </span>
        ))}
        {revisions.length === 1 ? " is decided: " : " are decided: "}
        {countsInWords(counts)}.
        {!mayPublish && (revisions.length === 1 ? " A reviewer publishes it." : " A reviewer publishes them.")}
      </p>
      {mayPublish && (
        <ButtonLink kind="main" to={paths.publish()}>
          See edition {number} as it would be
        </ButtonLink>
      )}
    </Section>
  );
}
