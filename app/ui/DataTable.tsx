import {
  columnVisibilityFeature,
  createSortedRowModel,
  rowSortingFeature,
  tableFeatures,
  useTable,
  type ColumnDef,
} from "@tanstack/react-table";
import { useMemo, type ReactNode } from "react";
import { EmptyPage } from "./EmptyPage.tsx";
import { MarginHead, MarginMark } from "./MarginMark.tsx";
import type { MarkKind } from "./Signs.tsx";
import { SortHead, type Sorting } from "./SortHead.tsx";
import { RowUnder, Table } from "./Table.tsx";

/** One column: its head, what a cell shows, and, where it can be sorted by, how two rows compare. */
export interface Column<Row> {
  id: string;
  head: ReactNode;
  /** What stands in the cell; it is wrapped in `<td>` (or the row's `<th>`). */
  cell: (row: Row) => ReactNode;
  /** Figures stand at the right and do not break. */
  figure?: boolean;
  /** The cell that names its row; one a table. */
  rowHead?: boolean;
  /** Text of the cell may break over lines; "wide" for sentences. Without it cells keep to one line. */
  wraps?: boolean | "wide";
  /** Negative, zero or positive, as for `Array.sort`. Rows without a value: use `missing`. */
  compare?: (a: Row, b: Row) => number;
  /** True for rows that have nothing in this column: they stand last in both directions. */
  missing?: (row: Row) => boolean;
}

interface DataTableProps<Row> {
  caption: string;
  rows: readonly Row[];
  columns: readonly Column<Row>[];
  rowKey: (row: Row) => string;
  /** From the address, through `readSorting`. Without it rows keep their order and heads are plain. */
  sorting?: Sorting | undefined;
  /** The rows come sorted from the loader; heads only show and change the order. */
  sortedAlready?: boolean | undefined;
  /** Columns left out, by id. */
  hidden?: readonly string[] | undefined;
  /** The mark in the margin of a row. Giving this function makes the table a marked one. */
  mark?: ((row: Row) => MarkKind | null) | undefined;
  /** What stands under a row, across the columns. */
  under?: ((row: Row) => ReactNode) | undefined;
  even?: boolean | undefined;
  className?: string | undefined;
  /** What to say when there are no rows. */
  empty?: ReactNode;
}

const features = tableFeatures({ columnVisibilityFeature, rowSortingFeature, sortedRowModel: createSortedRowModel() });

/** A table from rows and columns: sorting from the address, columns to leave out, marks in the margin, notes under rows. */
export function DataTable<Row extends object>(props: DataTableProps<Row>) {
  const { caption, rows, columns, rowKey, sorting, sortedAlready, hidden, mark, under, even, className, empty } = props;
  const definitions = useMemo(() => columns.map((column) => definition(column, sorting)), [columns, sorting]);
  const data = useMemo(() => [...rows], [rows]);
  const state = useMemo(
    () => ({
      sorting: sorting ? [{ id: sorting.column, desc: sorting.direction === "descending" }] : [],
      columnVisibility: Object.fromEntries((hidden ?? []).map((id) => [id, false])),
    }),
    [sorting, hidden],
  );
  const table = useTable({
    features,
    columns: definitions,
    data,
    getRowId: rowKey,
    state,
    manualSorting: sortedAlready ?? false,
  });
  const byId = new Map(columns.map((column) => [column.id, column]));
  const shown = table.getVisibleLeafColumns().flatMap((column) => byId.get(column.id) ?? []);
  const width = shown.length + (mark ? 1 : 0);

  if (rows.length === 0) return <>{empty ?? <EmptyPage>Nothing here.</EmptyPage>}</>;
  return (
    <Table caption={caption} marked={mark !== undefined} even={even} className={className}>
      <thead>
        <tr>
          {mark && <MarginHead />}
          {shown.map((column) =>
            sorting && column.compare ? (
              <SortHead key={column.id} column={column.id} sorting={sorting} figure={column.figure}>
                {column.head}
              </SortHead>
            ) : (
              <th key={column.id} scope="col" className={column.figure ? "figure" : undefined}>
                {column.head}
              </th>
            ),
          )}
        </tr>
      </thead>
      <tbody>
        {table.getRowModel().rows.map((row) => {
          const below = under?.(row.original);
          return [
            <tr key={row.id}>
              {mark && <MarginMark kind={mark(row.original)} />}
              {shown.map((column) => {
                const cellClass = column.figure
                  ? "figure"
                  : column.wraps === "wide"
                    ? "wide"
                    : column.wraps
                      ? undefined
                      : "tight";
                return column.rowHead ? (
                  <th key={column.id} scope="row" className={cellClass}>
                    {column.cell(row.original)}
                  </th>
                ) : (
                  <td key={column.id} className={cellClass}>
                    {column.cell(row.original)}
                  </td>
                );
              })}
            </tr>,
            below ? (
              <RowUnder key={`${row.id} under`} columns={width} marked={mark !== undefined}>
                {below}
              </RowUnder>
            ) : null,
          ];
        })}
      </tbody>
    </Table>
  );
}

function definition<Row extends object>(
  column: Column<Row>,
  sorting: Sorting | undefined,
): ColumnDef<typeof features, Row> {
  const { compare, missing } = column;
  const turn = sorting?.direction === "descending" ? -1 : 1;
  return {
    id: column.id,
    accessorFn: (row) => row,
    enableSorting: compare !== undefined,
    // The library turns the result round for a downward sort; rows with nothing to show stay last either way.
    sortFn: (a, b) => {
      const [first, second] = [a.original, b.original];
      const lacks = Number(missing?.(first) ?? false) - Number(missing?.(second) ?? false);
      return lacks !== 0 ? lacks * turn : (compare?.(first, second) ?? 0);
    },
  };
}
