import { useId } from "react";
import { scale } from "./scale.ts";

interface ClosurePlotProps {
  /** What ΔfH° and S° require, and what is stated, in kJ/mol; as numbers for drawing and as they are printed. */
  follows: number;
  stated: number;
  tolerance: number;
  printed: { follows: string; stated: string; low: string; high: string; gap: string; tolerance: string };
  verdict: "closes" | "look" | "block";
}

const colours = { closes: "text-verdigris", look: "text-ochre", block: "text-madder" };
const words = { closes: "it closes", look: "look at it", block: "it does not close" };

/** "Does it close?": where the stated ΔfG° lies against what follows from ΔfH° and S°, with the tolerance as a band. */
export function ClosurePlot({ follows, stated, tolerance, printed, verdict }: ClosurePlotProps) {
  const titleId = useId();
  const half = Math.max(tolerance * 2.6, Math.abs(stated - follows) * 1.2, 1e-9);
  const x = scale([follows - half, follows + half], [6, 94]);
  const percent = (value: number) => `${x(value).toFixed(2)}%`;
  const low = x(follows - tolerance);
  const high = x(follows + tolerance);
  const roomForEnds = high - low > 22;
  const side = stated < follows ? "end" : "start";
  return (
    <svg className="drawing max-w-xl" width="100%" height="118" role="img" aria-labelledby={titleId}>
      <title id={titleId}>
        {`Closure in kJ per mole: ${printed.follows} follows, ${printed.stated} is stated, ${printed.gap} apart, tolerance ${printed.tolerance}; ${words[verdict]}.`}
      </title>
      <line x1="6%" x2="94%" y1="68" y2="68" stroke="currentColor" strokeWidth="1.4" />
      <rect
        x={`${low.toFixed(2)}%`}
        y="56"
        width={`${(high - low).toFixed(2)}%`}
        height="24"
        className="fill-verdigris-wash stroke-verdigris"
      />
      <line x1={percent(follows)} x2={percent(follows)} y1="38" y2="98" stroke="currentColor" strokeWidth="2" />
      <text x={percent(follows)} y="29" textAnchor="middle">
        follows {printed.follows}
      </text>
      {roomForEnds && (
        <>
          <text x={`${low.toFixed(2)}%`} y="49" textAnchor="middle" className="drawing-soft">
            {printed.low}
          </text>
          <text x={`${high.toFixed(2)}%`} y="49" textAnchor="middle" className="drawing-soft">
            {printed.high}
          </text>
        </>
      )}
      <g className={colours[verdict]}>
        <line x1={percent(stated)} x2={percent(stated)} y1="52" y2="84" stroke="currentColor" strokeWidth="3" />
        <text
          x={percent(stated)}
          y="113"
          textAnchor={Math.abs(x(stated) - 50) < 14 ? "middle" : side === "end" ? "start" : "end"}
          className="fill-current"
        >
          stated {printed.stated}
        </text>
      </g>
    </svg>
  );
}
