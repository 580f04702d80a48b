import { Link } from "react-router";
import { paths } from "#app/paths.ts";
import { propertyInfo } from "#app/thermo/property.ts";
import { ButtonLink } from "#app/ui/Button.tsx";
import { signed } from "#app/ui/concise.ts";
import { count } from "#app/ui/figure.ts";
import { Prose } from "#app/ui/Prose.tsx";
import { Section } from "#app/ui/Section.tsx";
import { SpeciesName } from "#app/ui/SpeciesName.tsx";
import { Symbol } from "#app/ui/Symbol.tsx";
import { Table } from "#app/ui/Table.tsx";
import { Time } from "#app/ui/Time.tsx";
import { UnitText } from "#app/ui/UnitText.tsx";
import { Figures } from "#app/ui/ValueCell.tsx";
import type { Home } from "../home.tsx";

/** The newest edition: who published it and when, what it changed, and how programs read it. */
export function EditionSection({ edition, keysInUse }: { edition: NonNullable<Home["edition"]>; keysInUse: number }) {
  const { number, previous, publishedAt, publisher, notes, withdraws, changes, changed, words } = edition;
  return (
    <Section head={`Edition ${number}`}>
      <p className="lede">
        Published <Time at={publishedAt} /> by {publisher}: {count(edition.valueCount)} values of{" "}
        {count(edition.speciesCount)} species
        {previous === null ? ", the first of this table." : `; ${words} since edition ${previous}.`}
      </p>
      {withdraws && (
        <p className="mb-3 max-w-[68ch]">
          It withdraws <Link to={paths.edition(withdraws.edition)}>edition {withdraws.edition}</Link>:{" "}
          <Prose text={withdraws.reason} />
        </p>
      )}
      {notes && (
        <p className="mb-3 max-w-[68ch] whitespace-pre-line">
          <Prose text={notes} />
        </p>
      )}
      {changes.length > 0 && previous !== null && (
        <>
          <Table caption={`Values that edition ${number} changed`} even className="max-w-[56rem]">
            <thead>
              <tr>
                <th scope="col">Changed</th>
                <th scope="col">
                  <span className="said">Property</span>
                </th>
                <th scope="col" className="figure">
                  Edition {previous}
                </th>
                <th scope="col" className="figure">
                  Edition {number}
                </th>
                <th scope="col" className="figure">
                  Difference
                </th>
              </tr>
            </thead>
            <tbody>
              {changes.map((change) => (
                <tr key={`${change.key} ${change.property}`}>
                  <th scope="row">
                    <SpeciesName speciesKey={change.key} to={paths.species(number, change.key)} />
                  </th>
                  <td className="tight">
                    <Symbol of={propertyInfo[change.property].symbol} />{" "}
                    <span className="text-soft">
                      <UnitText unit={propertyInfo[change.property].unit} />
                    </span>
                  </td>
                  <td className="figure">
                    <Figures digits={change.before.digits} uncertainty={change.before.uncertainty} />
                  </td>
                  <td className="figure">
                    <Figures digits={change.after.digits} uncertainty={change.after.uncertainty} />
                  </td>
                  <td className="figure">{change.difference === null ? "" : signed(change.difference)}</td>
                </tr>
              ))}
            </tbody>
          </Table>
          {changed > changes.length && (
            <p className="fine mt-3">
              The {count(changes.length)} furthest beyond their uncertainties, of {count(changed)}.
            </p>
          )}
        </>
      )}
      <div className="actions mt-4">
        <ButtonLink to={paths.table(number)}>Read the table</ButtonLink>
        {previous !== null && <Link to={paths.compare(previous, number)}>Compare with edition {previous}</Link>}
        <Link to={paths.edition(number)}>Notes, download, cite</Link>
      </div>
      <p className="fine mt-4">
        Programs read it with a key:{" "}
        {keysInUse === 0 ? (
          <Link to={paths.keys()}>make one</Link>
        ) : (
          <>
            you hold <Link to={paths.keys()}>{keysInUse === 1 ? "one" : keysInUse}</Link>
          </>
        )}
        , then read <Link to={paths.apiGuide()}>for programs</Link>.
      </p>
    </Section>
  );
}
