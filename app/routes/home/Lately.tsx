import { Link } from "react-router";
import { paths } from "#app/paths.ts";
import { Section } from "#app/ui/Section.tsx";
import { Table } from "#app/ui/Table.tsx";
import type { Home } from "../home.tsx";

/** The last steps of revisions and the last publications. */
export function Lately({ entries }: { entries: Home["lately"] }) {
  return (
    <Section head="Lately">
      <Table caption="What happened lately, the newest first" even className="max-w-[56rem]">
        <thead className="said">
          <tr>
            <th scope="col">Day</th>
            <th scope="col">What happened</th>
          </tr>
        </thead>
        <tbody>
          {entries.map((entry) => (
            <tr key={`${entry.kind} ${entry.at.toISOString()}`}>
              <th scope="row" className="tight w-20 font-normal sm:w-32 text-soft">
                <time dateTime={entry.at.toISOString()}>{entry.day}</time>
              </th>
              <td>
                {entry.kind === "edition" ? (
                  <>
                    {entry.by} published <Link to={paths.edition(entry.number)}>edition {entry.number}</Link>
                  </>
                ) : (
                  <>
                    {entry.by} {entry.did[0]} <Link to={paths.revision(entry.id)}>revision {entry.id}</Link>{" "}
                    {entry.did[1]}
                    <span className="text-soft"> · {entry.title}</span>
                  </>
                )}
              </td>
            </tr>
          ))}
        </tbody>
      </Table>
    </Section>
  );
}
