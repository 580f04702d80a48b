import { Link } from "react-router";
import { paths } from "#app/paths.ts";
import { ButtonLink } from "#app/ui/Button.tsx";
import { Caution } from "#app/ui/Caution.tsx";
import { Leaf } from "#app/ui/Leaf.tsx";
import { Section } from "#app/ui/Section.tsx";

/** The first page of somebody who is not signed in: what Tablewright is, and the ways on. */
export function Stranger() {
  return (
    <Leaf
      heading="One table, kept in editions"
      lede="Tablewright keeps a laboratory’s thermochemical reference values: every number with its source, its uncertainty and the edition it stands in."
    >
      <div className="actions mb-8">
        <ButtonLink kind="main" to={paths.signIn()}>
          Sign in
        </ButtonLink>
        <Link to={paths.conventions()}>Conventions</Link>
        <Link to={paths.apiGuide()}>For programs</Link>
      </div>
      <Section head="How a number gets into the table">
        <ol className="max-w-[68ch] list-decimal space-y-2 pl-5">
          <li>
            A steward brings a property sheet as it is. It is read row by row, and cells that cannot be read are mended
            on the page; the original stays untouched.
          </li>
          <li>
            Every proposed value is examined against physics and against what stands: whether the enthalpy, the entropy
            and the Gibbs energy of formation agree, whether a unit slipped, whether a change is larger than the stated
            uncertainties allow.
          </li>
          <li>A reviewer who had no hand in it decides each line: accept, decline, or return with comments.</li>
          <li>
            Accepted lines are published together as the next numbered edition. An edition never changes afterwards, so
            what was computed from it can be computed again.
          </li>
        </ol>
      </Section>
      <Section head="Who reads it">
        <p className="max-w-[68ch]">
          People of the laboratory, signed in; and their programs, with a key, pinned to the edition they were written
          for. An administrator of the laboratory invites people.
        </p>
      </Section>
      <Caution />
    </Leaf>
  );
}
