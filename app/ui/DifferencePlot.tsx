import { SpeciesName } from "./SpeciesName.tsx";
import { Table } from "./Table.tsx";
import { scale, tickLabel, ticks } from "./scale.ts";
import { cutFigure, tailOf } from "./figure.ts";
import { InlineMark } from "./MarginMark.tsx";

export interface Difference {
  speciesKey: string;
  to?: string | undefined;
  difference: number;
  /** As printed, "+0.36". */
  printed: string;
  /** The joined expanded uncertainty √(Ua² + Ub²); null where one is missing. */
  expanded: number | null;
}

/**
 * Differences of one property between two editions, each against its joined expanded uncertainty: a bar that does not
 * reach zero is a difference larger than both uncertainties allow. A table with a drawing in it, so it reads as one.
 */
export function DifferencePlot({
  caption,
  differences,
  head,
}: {
  caption: string;
  differences: readonly Difference[];
  head: React.ReactNode;
}) {
  const reach = Math.max(
    ...differences.map(({ difference, expanded }) => Math.abs(difference) + (expanded ?? 0)),
    1e-9,
  );
  const tail = tailOf(differences.map(({ printed }) => printed));
  // The cell is narrow: three or so labels keep apart.
  const marks = ticks(-reach, reach, 3);
  // 1000 units wide and stretched to the cell; strokes keep their width.
  const x = scale([-reach, reach], [20, 980]);
  return (
    <Table caption={caption} className="drawing-table" even>
      <thead>
        <tr>
          <th scope="col">Species</th>
          <th scope="col">
            <span className="said">Drawing of the difference and its uncertainty</span>
          </th>
          <th scope="col" className="figure">
            {head}
          </th>
          <th scope="col">Both uncertainties</th>
        </tr>
      </thead>
      <tbody>
        {differences.map(({ speciesKey, to, difference, printed, expanded }) => {
          const beyond = expanded !== null && expanded > 0 && Math.abs(difference) > expanded;
          return (
            <tr key={speciesKey}>
              <th scope="row" className="tight">
                <SpeciesName speciesKey={speciesKey} to={to} />
              </th>
              <td className="drawing-cell">
                <svg
                  height="28"
                  viewBox="0 0 1000 28"
                  preserveAspectRatio="none"
                  aria-hidden="true"
                  className={beyond ? "text-ochre" : undefined}
                >
                  <path d="M500 0V28" className="stroke-ink" vectorEffect="non-scaling-stroke" />
                  {expanded !== null && expanded > 0 && (
                    <path
                      d={`M${x(difference - expanded).toFixed(1)} 14H${x(difference + expanded).toFixed(1)}`}
                      className={beyond ? "stroke-ochre" : "stroke-slate"}
                      strokeWidth="2"
                      vectorEffect="non-scaling-stroke"
                    />
                  )}
                  <path
                    d={`M${x(difference).toFixed(1)} 14h.01`}
                    stroke="currentColor"
                    strokeWidth="8"
                    strokeLinecap="square"
                    vectorEffect="non-scaling-stroke"
                  />
                </svg>
              </td>
              <td className="figure">
                <Aligned text={printed} tail={tail} />
              </td>
              <td className="tight">
                {expanded === null ? (
                  <span className="text-soft">not known</span>
                ) : beyond ? (
                  <InlineMark kind="look">beyond</InlineMark>
                ) : (
                  <span className="text-soft">within</span>
                )}
              </td>
            </tr>
          );
        })}
        <tr className="under" aria-hidden="true">
          <td />
          <td className="drawing-cell">
            <svg className="drawing" height="22">
              {marks.values.map((value) => (
                <text
                  key={value}
                  x={`${(x(value) / 10).toFixed(2)}%`}
                  y="15"
                  textAnchor="middle"
                  className="drawing-soft"
                >
                  {tickLabel(value, marks.decimals)}
                </text>
              ))}
            </svg>
          </td>
          <td />
          <td />
        </tr>
      </tbody>
    </Table>
  );
}

function Aligned({ text, tail }: { text: string; tail: number }) {
  const { whole, fraction } = cutFigure(text);
  return (
    <span className="value">
      {whole}
      <span className={`value-tail tail-${tail}`}>{fraction}</span>
    </span>
  );
}
