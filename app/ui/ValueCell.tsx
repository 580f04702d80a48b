import type { Digits } from "#app/thermo/digits.ts";
import type { Uncertainty } from "#app/thermo/uncertainty.ts";
import { concise } from "./concise.ts";
import { cutFigure } from "./figure.ts";

export interface ShownValue {
  /** Canonical digits, "-285.830". */
  digits: Digits | string;
  /** Null where none is stated. */
  uncertainty: Uncertainty | null;
  /** Set in the lighter hand when the value follows from others. */
  derived?: boolean | undefined;
}

interface FiguresProps extends ShownValue {
  /** Width of the part after the whole number, from `tailOf`; lets points of a column stand under each other. */
  tail?: number | undefined;
  /** "plus" prints the sign of a positive difference. */
  sign?: "plus" | undefined;
  /** A proof mark: what stood ("del"), what shall stand ("ins"). The mark covers the figure and not the room after it. */
  proof?: "del" | "ins" | undefined;
}

/**
 * A value as it is printed: true minus, thin spaces in long numbers, the standard uncertainty of the last digits in
 * brackets. Its title says the same in words; it carries no unit (the column head does).
 */
export function Figures({ digits, uncertainty, derived, tail, sign, proof }: FiguresProps) {
  const printed = concise(digits, uncertainty);
  const { whole, fraction, bracket } = cutFigure(printed.text);
  const shown = sign === "plus" && !whole.startsWith("−") && /[1-9]/.test(printed.text) ? `+${whole}` : whole;
  const on = proof && "proof-on";
  const figure = (
    <span className={derived ? "value value-derived" : "value"} title={printed.words + (derived ? "; derived" : "")}>
      {proof ? <span className={on}>{shown}</span> : shown}
      <span className={tail === undefined ? undefined : `value-tail tail-${tail}`}>
        <span className={on}>
          {fraction}
          {bracket && <span className="value-uncertainty">{bracket}</span>}
        </span>
      </span>
      {derived && <span className="said"> derived</span>}
    </span>
  );
  if (proof === "del") return <del className="proof">{figure}</del>;
  if (proof === "ins") return <ins className="proof">{figure}</ins>;
  return figure;
}

/** A table cell holding a value, or a softly printed word where there is none. */
export function ValueCell({
  value,
  tail,
  sign,
  none = "",
}: {
  value: ShownValue | null | undefined;
  tail?: number | undefined;
  sign?: "plus" | undefined;
  /** What stands in an empty cell: nothing, "new", "none". */
  none?: string | undefined;
}) {
  return (
    <td className="figure">
      {value ? <Figures {...value} tail={tail} sign={sign} /> : none && <span className="text-soft">{none}</span>}
    </td>
  );
}
