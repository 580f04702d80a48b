import { useId } from "react";
import { Form, useSearchParams } from "react-router";

export type SortDirection = "ascending" | "descending";

/** The sorting a page's address asks for: "name" upwards, "-name" downwards. */
export interface Sorting {
  column: string;
  direction: SortDirection;
}

/** Reads `?sort=`; an address without it, or with a column that is not there, gets the first choice. */
export function readSorting(text: string | null, columns: readonly string[], otherwise: Sorting): Sorting {
  if (!text) return otherwise;
  const column = text.replace(/^-/, "");
  return columns.includes(column)
    ? { column, direction: text.startsWith("-") ? "descending" : "ascending" }
    : otherwise;
}

interface SortHeadProps {
  column: string;
  sorting: Sorting;
  /** The head is over figures and stands at the right. */
  figure?: boolean | undefined;
  children: React.ReactNode;
}

/**
 * A column head that sorts: a button in the head cell, `aria-sort` on the cell. It sends `?sort=` with everything else the
 * address holds, so it works before scripts arrive and a sorted table can be sent to a colleague.
 */
export function SortHead({ column, sorting, figure, children }: SortHeadProps) {
  const [search] = useSearchParams();
  const hintId = useId();
  const sorted = sorting.column === column ? sorting.direction : undefined;
  const next = sorted === "ascending" ? `-${column}` : column;
  return (
    <th scope="col" aria-sort={sorted ?? "none"} className={figure ? "figure" : undefined}>
      <Form method="get" preventScrollReset className="contents">
        {[...search]
          .filter(([name]) => name !== "sort" && name !== "page")
          .map(([name, value], index) => (
            <input key={`${name}${index}`} type="hidden" name={name} value={value} />
          ))}
        <button className="sort" name="sort" value={next} aria-describedby={hintId}>
          <span>{children}</span>
          <SortSign direction={sorted} />
        </button>
        <span id={hintId} hidden>
          {sorted === "ascending" ? "sort downwards" : "sort upwards"}
        </span>
      </Form>
    </th>
  );
}

function SortSign({ direction }: { direction: SortDirection | undefined }) {
  if (!direction) return null;
  return (
    <svg width="8" height="8" viewBox="0 0 8 8" aria-hidden="true" className="self-center">
      <path d={direction === "ascending" ? "M4 1 7.5 7h-7z" : "M4 7 .5 1h7z"} fill="currentColor" />
    </svg>
  );
}
