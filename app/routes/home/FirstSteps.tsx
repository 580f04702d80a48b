import { Link } from "react-router";
import { paths } from "#app/paths.ts";
import { ButtonLink } from "#app/ui/Button.tsx";
import { EmptyPage } from "#app/ui/EmptyPage.tsx";
import { Section } from "#app/ui/Section.tsx";

/** Before the first edition: what would be here, and the way to it. */
export function FirstSteps({ mayBring }: { mayBring: boolean }) {
  return (
    <Section head="Before the first edition">
      <EmptyPage start={mayBring ? <ButtonLink to={paths.newSheet()}>Bring a sheet</ButtonLink> : undefined}>
        <p>No edition is published yet; the newest one, and what it changed, will stand here.</p>
        <ol className="mt-3 list-decimal space-y-1 pl-5">
          <li>A steward brings the first property sheet and builds a revision from it.</li>
          <li>A reviewer, somebody else, decides its lines.</li>
          <li>
            A reviewer publishes edition 1. From then on the <Link to={paths.table()}>table</Link> can be read.
          </li>
        </ol>
      </EmptyPage>
    </Section>
  );
}
