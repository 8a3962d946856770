"use client";

import {
  columnFilteringFeature,
  createFilteredRowModel,
  createSortedRowModel,
  filterFn_includesString,
  globalFilteringFeature,
  rowSortingFeature,
  sortFn_alphanumeric,
  sortFn_basic,
  tableFeatures,
  useTable,
} from "@tanstack/react-table";
import { useId, useMemo, useState, type ReactNode } from "react";
import { Button } from "@/components/ui/button";
import { classNames } from "@/components/ui/class-names";
import { saveTextAs, writeCsv, type CsvValue } from "@/components/ui/write-csv";

const features = tableFeatures({
  rowSortingFeature,
  columnFilteringFeature,
  globalFilteringFeature,
  sortedRowModel: createSortedRowModel(),
  filteredRowModel: createFilteredRowModel(),
  sortFns: { alphanumeric: sortFn_alphanumeric, basic: sortFn_basic },
  filterFns: { includesString: filterFn_includesString },
});

export interface DataColumn<Row> {
  id: string;
  header: string;
  /** What sorting, filtering and the CSV file use; undefined where it is missing (sorted last). */
  value: (row: Row) => string | number | undefined;
  /** What is shown; the value itself if left out. */
  cell?: (row: Row) => ReactNode;
  /** Numbers stand right, in tabular figures. */
  numeric?: boolean;
  /** Not shown, but written to the CSV file. */
  fileOnly?: boolean;
  /** Dropped from the phone's cards. */
  wideOnly?: boolean;
}

export interface DataTableProps<Row> {
  caption: string;
  rows: Row[];
  columns: DataColumn<Row>[];
  rowId: (row: Row) => string;
  /** Name of the CSV file, without its ending. */
  fileName: string;
  /** Buttons or links at the end of each row. */
  actions?: (row: Row) => ReactNode;
  /** Said when the filter leaves nothing. */
  nothingWords?: string;
  initialSort?: { id: string; desc: boolean };
  /** The first column stays in sight where the table scrolls sideways. */
  stickyFirst?: boolean;
  /** The rest of a list that comes a page at a time. */
  more?: { hasMore: boolean; isLoading: boolean; load: () => void };
}

/** A table that sorts, filters and leaves as a CSV file. On a phone each row becomes a card of label and value. */
export function DataTable<Row extends object>(props: DataTableProps<Row>) {
  const { rows, columns, caption, fileName, initialSort } = props;
  const [filter, setFilter] = useState("");
  const shown = columns.filter((column) => !column.fileOnly);
  const definitions = useMemo(
    () =>
      columns.map((column) => ({
        id: column.id,
        accessorFn: column.value,
        header: column.header,
        sortFn: column.numeric ? ("basic" as const) : ("alphanumeric" as const),
        sortUndefined: "last" as const,
      })),
    [columns],
  );
  const table = useTable({
    features,
    columns: definitions,
    data: rows,
    state: { globalFilter: filter },
    onGlobalFilterChange: setFilter,
    globalFilterFn: "includesString",
    getColumnCanGlobalFilter: () => true,
    initialState: { sorting: initialSort ? [initialSort] : [] },
  });
  const visible = table.getRowModel().rows.map((row) => row.original);

  const saveCsv = () => {
    const cells = visible.map((row) => columns.map((column): CsvValue => column.value(row)));
    saveTextAs(
      `${fileName}.csv`,
      writeCsv(
        columns.map((column) => column.header),
        cells,
      ),
    );
  };

  return (
    <div className="space-y-3">
      <TableTools filter={filter} onFilter={(text) => table.setGlobalFilter(text)} onSave={saveCsv} />
      <table className="w-full border-collapse text-table max-md:block">
        <caption className="sr-only">{caption}</caption>
        <thead className="border-b border-ink max-md:hidden">
          <tr>
            {shown.map((column, index) => (
              <HeadCell
                key={column.id}
                sticky={props.stickyFirst === true && index === 0}
                header={column.header}
                numeric={column.numeric ?? false}
                sort={table.state.sorting.find((entry) => entry.id === column.id)}
                onSort={(down) => table.getColumn(column.id)?.toggleSorting(down)}
              />
            ))}
            {props.actions ? (
              <th scope="col">
                <span className="sr-only">Actions</span>
              </th>
            ) : null}
          </tr>
        </thead>
        <tbody className="max-md:block">
          {visible.map((row) => (
            <BodyRow
              key={props.rowId(row)}
              row={row}
              columns={shown}
              actions={props.actions}
              stickyFirst={props.stickyFirst}
            />
          ))}
        </tbody>
      </table>
      {visible.length === 0 ? (
        <p className="py-4 text-ink-soft" role="status">
          {filter ? `Nothing here contains “${filter}”.` : (props.nothingWords ?? "Nothing here yet.")}
        </p>
      ) : null}
      {props.more?.hasMore ? <ShowMore count={rows.length} more={props.more} /> : null}
    </div>
  );
}

/** There is more than was asked for; what finding, sorting and the file go by is said. */
function ShowMore({ count, more }: { count: number; more: NonNullable<DataTableProps<object>["more"]> }) {
  return (
    <div className="flex flex-wrap items-center gap-3">
      <Button onClick={more.load} disabled={more.isLoading}>
        {more.isLoading ? "Asking for more…" : "Show more"}
      </Button>
      <p className="text-table text-ink-soft" role="status">
        The first {count} are here. Finding, sorting and the CSV file go by these.
      </p>
    </div>
  );
}

function SortMark({ direction }: { direction: "ascending" | "descending" | "none" }) {
  if (direction === "none") return <span className="w-2" />;
  return (
    <svg viewBox="0 0 8 8" width="8" height="8" aria-hidden="true">
      <path d={direction === "ascending" ? "M4 1 7.5 7h-7Z" : "M4 7 .5 1h7Z"} fill="#1E2430" />
    </svg>
  );
}

function TableTools(props: { filter: string; onFilter: (text: string) => void; onSave: () => void }) {
  const filterId = useId();
  return (
    <div className="flex flex-wrap items-center justify-between gap-2">
      <div className="flex items-center gap-2">
        <label htmlFor={filterId} className="text-table text-ink-soft">
          Find
        </label>
        <input
          id={filterId}
          type="search"
          value={props.filter}
          onChange={(event) => props.onFilter(event.target.value)}
          className="min-h-11 w-44 rounded border border-edge bg-sheet px-3 md:min-h-9"
        />
      </div>
      <Button kind="quiet" onClick={props.onSave}>
        Save as CSV
      </Button>
    </div>
  );
}

interface HeadCellProps {
  header: string;
  numeric: boolean;
  sticky: boolean;
  sort: { desc: boolean } | undefined;
  onSort: (down: boolean) => void;
}

function HeadCell({ header, numeric, sticky, sort, onSort }: HeadCellProps) {
  const direction = sort ? (sort.desc ? "descending" : "ascending") : "none";
  return (
    <th
      scope="col"
      aria-sort={direction}
      className={classNames(
        "p-0 font-semibold",
        numeric ? "text-right" : "text-left",
        sticky && "md:sticky md:left-0 md:z-10 md:bg-paper",
      )}
    >
      <button
        type="button"
        className={classNames(
          "inline-flex min-h-9 items-center gap-1 px-2 hover:underline",
          numeric && "flex-row-reverse",
        )}
        onClick={() => onSort(sort ? !sort.desc : false)}
      >
        {header}
        <SortMark direction={direction} />
      </button>
    </th>
  );
}

interface BodyRowProps<Row> {
  row: Row;
  columns: DataColumn<Row>[];
  actions?: (row: Row) => ReactNode;
  stickyFirst?: boolean;
}

function BodyRow<Row>({ row, columns, actions, stickyFirst }: BodyRowProps<Row>) {
  return (
    <tr className="border-b border-rule bg-sheet max-md:mb-3 max-md:block max-md:border max-md:p-3">
      {columns.map((column, index) => (
        <td
          key={column.id}
          className={classNames(
            "px-2 py-2 align-middle max-md:flex max-md:justify-between max-md:gap-4 max-md:px-0 max-md:py-1",
            column.numeric && "md:text-right",
            column.wideOnly && "max-md:hidden",
            index === 0 && "max-md:pb-2 max-md:text-text",
            index === 0 && stickyFirst && "md:sticky md:left-0 md:z-10 md:bg-sheet",
          )}
        >
          {index === 0 ? null : <span className="max-w-1/2 shrink-0 text-ink-soft md:hidden">{column.header}</span>}
          <span className={classNames("min-w-0 break-words max-md:wrap-anywhere", index > 0 && "max-md:text-right")}>
            {column.cell ? column.cell(row) : column.value(row)}
          </span>
        </td>
      ))}
      {actions ? (
        <td className="px-2 py-1 text-right max-md:block max-md:px-0 max-md:pt-2">
          <span className="inline-flex flex-wrap justify-end gap-1">{actions(row)}</span>
        </td>
      ) : null}
    </tr>
  );
}
