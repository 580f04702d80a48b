import { Link } from "react-router";
import { actInWords } from "#app/audit/words.ts";
import { paths } from "#app/paths.ts";
import { ButtonLink } from "#app/ui/Button.tsx";
import { Section } from "#app/ui/Section.tsx";
import { Table } from "#app/ui/Table.tsx";
import { Time } from "#app/ui/Time.tsx";
import type { Home } from "../home.tsx";

/** The accounts, counted, for an administrator. */
export function PeopleSection({ people }: { people: NonNullable<Home["people"]> }) {
  const { inUse, invited, switchedOff } = people;
  return (
    <Section head="People">
      <p className="lede">
        {inUse === 1 ? "One account is" : `${inUse} accounts are`} in use.
        {invited > 0 &&
          ` ${invited === 1 ? "One person was invited and has" : `${invited} people were invited and have`} not chosen a password yet.`}
        {switchedOff > 0 && ` ${switchedOff === 1 ? "One is" : `${switchedOff} are`} switched off.`}
      </p>
      <ButtonLink to={paths.people()}>People and roles</ButtonLink>
    </Section>
  );
}

/** The newest entries of the record, for an administrator. */
export function RecordSection({ entries }: { entries: NonNullable<Home["record"]> }) {
  return (
    <Section head="The record">
      <Table caption="The newest entries of the record" even className="max-w-[56rem]">
        <thead>
          <tr>
            <th scope="col">When</th>
            <th scope="col">Who</th>
            <th scope="col">What</th>
          </tr>
        </thead>
        <tbody>
          {entries.map((entry) => (
            <tr key={entry.number}>
              <td className="tight">
                <Time at={entry.at} withTime />
              </td>
              <td>{entry.who ?? "the service"}</td>
              <td>
                {entry.objectKind}: {actInWords(entry.act)}
              </td>
            </tr>
          ))}
        </tbody>
      </Table>
      <p className="fine mt-3">
        <Link to={paths.record()}>The whole record</Link>
      </p>
    </Section>
  );
}
