import { useEffect, useId, useRef, useState } from "react";

interface TableProps {
  /** What the table holds, in a few words. Read aloud; printed above the table with `captionShown`. */
  caption: string;
  captionShown?: boolean | undefined;
  /** Rows begin with a `<MarginMark>` and the head with a `<MarginHead>`: marks stand in the leaf's margin. */
  marked?: boolean | undefined;
  /** No breath after every fifth row: for short tables of unlike rows. */
  even?: boolean | undefined;
  /** Utility classes for the table, such as a greatest width ("max-w-4xl"). */
  className?: string | undefined;
  /** `<thead>` and `<tbody>`; head cells carry `scope="col"`, the row's own head `scope="row"`. */
  children: React.ReactNode;
}

/**
 * A table between two strong rules. Where it is wider than the leaf it scrolls sideways in a labelled region that can be
 * reached by keyboard; the page itself never does.
 */
export function Table({ caption, captionShown, marked, even, className, children }: TableProps) {
  const captionId = useId();
  const region = useRef<HTMLDivElement>(null);
  const fits = useFits(region);
  return (
    <div
      ref={region}
      className={`table-region${marked ? " table-marked" : ""}`}
      role="region"
      aria-labelledby={captionId}
      // Focusable only while it scrolls: a table that fits is no stop on the way through the page.
      tabIndex={fits ? undefined : 0}
      data-fits={fits ? "" : undefined}
    >
      <table className={`table${even ? " table-even" : ""}${className ? ` ${className}` : ""}`}>
        <caption id={captionId} className={captionShown ? undefined : "said"}>
          {caption}
        </caption>
        {children}
      </table>
    </div>
  );
}

/** Whether the table inside a region is no wider than it. Before scripts arrive: unknown, so it may scroll. */
function useFits(region: React.RefObject<HTMLDivElement | null>): boolean {
  const [fits, setFits] = useState(false);
  useEffect(() => {
    const element = region.current;
    const table = element?.querySelector("table");
    if (!element || !table) return;
    const observer = new ResizeObserver(() => setFits(table.offsetWidth <= element.clientWidth));
    observer.observe(element);
    observer.observe(table);
    return () => observer.disconnect();
  }, [region]);
  return fits;
}

/** A row under its line, across all columns: findings, comments, a form. `columns` counts the margin cell of a marked table. */
export function RowUnder({
  columns,
  marked,
  children,
}: {
  columns: number;
  marked?: boolean | undefined;
  children: React.ReactNode;
}) {
  return (
    <tr className="under">
      {marked && <td className="margin-cell" />}
      <td colSpan={marked ? columns - 1 : columns}>
        <div className="under-text">{children}</div>
      </td>
    </tr>
  );
}
