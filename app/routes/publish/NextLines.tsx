import { Link } from "react-router";
import { paths } from "#app/paths.ts";
import type { NextLine, NextRevision } from "#app/review/publishPage.ts";
import { propertyInfo } from "#app/thermo/property.ts";
import { concise } from "#app/ui/concise.ts";
import { count, tailOf } from "#app/ui/figure.ts";
import { SpeciesName } from "#app/ui/SpeciesName.tsx";
import { Symbol } from "#app/ui/Symbol.tsx";
import { Table } from "#app/ui/Table.tsx";
import { UnitText } from "#app/ui/UnitText.tsx";
import { Figures } from "#app/ui/ValueCell.tsx";

/** What one revision brings into the next edition: every accepted line beside what it replaces. */
export function NextLines({ revision, previous }: { revision: NextRevision; previous: number }) {
  const { lines, more } = revision;
  const tail = (pick: (line: NextLine) => NextLine["stood"]): number =>
    tailOf(
      lines.flatMap((line) => {
        const figure = pick(line);
        return figure ? [concise(figure.digits, figure.uncertainty).text] : [];
      }),
    );
  const tails = {
    stood: tail((line) => line.stood),
    proposed: tail((line) => line.proposed),
    difference: tail((line) => (line.difference === null ? null : { digits: line.difference, uncertainty: null })),
  };
  return (
    <>
      <Table caption={`What revision ${revision.id} brings`}>
        <thead>
          <tr>
            <th scope="col">Species</th>
            <th scope="col">Property</th>
            <th scope="col" className="figure">
              Stands{previous > 0 && <span className="max-sm:sr-only"> in edition {previous}</span>}
            </th>
            <th scope="col" className="figure">
              Will stand
            </th>
            <th scope="col" className="figure">
              Difference
            </th>
          </tr>
        </thead>
        <tbody>
          {lines.map((line) => (
            <tr key={line.id}>
              <th scope="row" className="tight">
                {line.speciesKey ? <SpeciesName speciesKey={line.speciesKey} /> : "source"}
              </th>
              {line.property ? (
                <ValueCells line={line} property={line.property} tails={tails} />
              ) : (
                <td colSpan={4}>
                  <span className="text-soft">
                    {line.what}
                    {line.changes.length > 0 && ": "}
                  </span>
                  {line.changes.map(({ label, before, after }, index) => (
                    <span key={label}>
                      {index > 0 && <span className="text-soft"> · </span>}
                      {label !== "name" && label !== "citation" && <span className="text-soft">{label} </span>}
                      {before !== null && <del>{before}</del>} {after !== null && <ins>{after}</ins>}
                    </span>
                  ))}
                </td>
              )}
            </tr>
          ))}
        </tbody>
      </Table>
      {more > 0 && (
        <p className="fine mt-2">
          And {count(more)} more lines, all on the page of{" "}
          <Link to={paths.revision(revision.id)}>revision {revision.id}</Link>.
        </p>
      )}
    </>
  );
}

interface ValueCellsProps {
  line: NextLine;
  property: keyof typeof propertyInfo;
  tails: { stood: number; proposed: number; difference: number };
}

function ValueCells({ line, property, tails }: ValueCellsProps) {
  const { symbol, unit } = propertyInfo[property];
  return (
    <>
      <td className="tight">
        <Symbol of={symbol} />
        <span className="text-fine text-soft max-sm:hidden">
          {" "}
          / <UnitText unit={unit} />
        </span>
      </td>
      <td className="figure">
        {line.stood ? (
          <Figures {...line.stood} tail={tails.stood} proof="del" />
        ) : (
          <span className="text-soft">new</span>
        )}
      </td>
      <td className="figure">
        {line.proposed ? (
          <Figures {...line.proposed} tail={tails.proposed} proof="ins" />
        ) : (
          <span className="text-soft" title={line.reason ?? undefined}>
            taken out
          </span>
        )}
      </td>
      <td className="figure">
        {line.difference !== null && (
          <Figures digits={line.difference} uncertainty={null} sign="plus" tail={tails.difference} />
        )}
      </td>
    </>
  );
}
