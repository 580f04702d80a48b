import { useId } from "react";
import { scale, tickLabel, ticks } from "./scale.ts";

export interface HistoryPoint {
  /** The edition in which the value came in. */
  since: number;
  /** The edition in which it went out; null while it stands. */
  until: number | null;
  value: number;
  /** Half the length of the error bar: the expanded uncertainty (k = 2). Null draws none. */
  expanded: number | null;
}

interface HistoryPlotProps {
  points: readonly HistoryPoint[];
  /** The newest edition shown. */
  newest: number;
  /** For the title: "ΔfH° of NH3(g) in kJ/mol". */
  what: string;
  /** Decimals of the values, for the title's words. */
  decimals: number;
}

/** One value through the editions: a step line with an error bar where the value came in. */
export function HistoryPlot({ points, newest, what, decimals }: HistoryPlotProps) {
  const titleId = useId();
  if (points.length === 0) return null;
  const lows = points.map((point) => point.value - (point.expanded ?? 0));
  const highs = points.map((point) => point.value + (point.expanded ?? 0));
  let [low, high] = [Math.min(...lows), Math.max(...highs)];
  if (high - low < 1e-12) {
    const room = Math.max(Math.abs(high) * 1e-3, 10 ** -decimals);
    [low, high] = [low - room, high + room];
  }
  const room = (high - low) * 0.12;
  const y = scale([low - room, high + room], [136, 10]);
  const across = scale([1, Math.max(newest + 0.6, 2)], [16, 97]);
  const x = (edition: number) => `${across(edition).toFixed(2)}%`;
  const marks = ticks(low - room, high + room, 3);
  const every = Math.ceil(newest / 8);
  const said = points.map((point) => `edition ${point.since}: ${tickLabel(point.value, decimals)}`).join(", ");
  return (
    <svg className="drawing max-w-xl" width="100%" height="176" role="img" aria-labelledby={titleId}>
      <title id={titleId}>{`${what} through the editions. ${said}.`}</title>
      {marks.values.map((value) => (
        <g key={value}>
          <line x1="14%" x2="99%" y1={y(value)} y2={y(value)} className="stroke-rule" />
          <text x="12.5%" y={y(value) + 4} textAnchor="end" className="drawing-soft">
            {tickLabel(value, marks.decimals)}
          </text>
        </g>
      ))}
      {Array.from({ length: newest }, (_, index) => index + 1)
        .filter((edition) => edition === newest || (edition - 1) % every === 0)
        .map((edition) => (
          <text key={edition} x={x(edition)} y="156" textAnchor="middle" className="drawing-soft">
            {edition}
          </text>
        ))}
      <text x="99%" y="172" textAnchor="end" className="drawing-soft">
        edition
      </text>
      {points.map((point, index) => {
        const end = point.until ?? newest + 0.5;
        const next = points[index + 1];
        return (
          <g key={point.since} stroke="currentColor" strokeWidth="1.8">
            <line x1={x(point.since)} x2={x(end)} y1={y(point.value)} y2={y(point.value)} />
            {next && next.since === point.until && (
              <line x1={x(end)} x2={x(end)} y1={y(point.value)} y2={y(next.value)} />
            )}
            {point.expanded !== null && point.expanded > 0 && (
              <g className="stroke-slate" strokeWidth="1.4">
                <line
                  x1={x(point.since)}
                  x2={x(point.since)}
                  y1={y(point.value - point.expanded)}
                  y2={y(point.value + point.expanded)}
                />
                {[-1, 1].map((sign) => (
                  <svg
                    key={sign}
                    x={x(point.since)}
                    y={y(point.value + sign * (point.expanded ?? 0))}
                    overflow="visible"
                  >
                    <line x1="-4.5" x2="4.5" />
                  </svg>
                ))}
              </g>
            )}
            <circle cx={x(point.since)} cy={y(point.value)} r="4" fill="currentColor" stroke="none" />
          </g>
        );
      })}
    </svg>
  );
}
