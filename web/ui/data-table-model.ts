import {
  type ColumnDef,
  columnVisibilityFeature,
  createExpandedRowModel,
  createSortedRowModel,
  type ExpandedState,
  type Row,
  type RowData,
  rowExpandingFeature,
  rowSortingFeature,
  type SortingState,
  tableFeatures,
  useTable,
} from "@tanstack/react-table";
import { type ReactNode, useMemo, useState } from "react";

type SortValue = number | string | null | undefined;

/** One column: how it is headed, what a cell shows, and how it sorts. */
export type DataTableColumn<T> = {
  id: string;
  header: ReactNode;
  /** The column's name in words, for the column menu and the sort button; needed where `header` isn't a string. */
  name?: string;
  cell: (row: T) => ReactNode;
  /** Makes the column sortable by this value; missing values come last either way. */
  sortValue?: (row: T) => SortValue;
  /** Figures: mono, tabular, aligned right. */
  numeric?: boolean;
  align?: "left" | "right" | "center";
  /** Classes for the column's cells, such as a width. */
  className?: string;
  /** May be left out through the column menu. */
  hideable?: boolean;
  /** Left out until somebody chooses it. */
  hidden?: boolean;
};

export type DataTableSort = { column: string; descending: boolean };

const features = tableFeatures({
  rowSortingFeature,
  columnVisibilityFeature,
  rowExpandingFeature,
  sortedRowModel: createSortedRowModel(),
  expandedRowModel: createExpandedRowModel(),
  sortFns: {},
});

export type DataTableRow<T extends RowData> = Row<typeof features, T>;

type ModelOptions<T extends RowData> = {
  columns: readonly DataTableColumn<T>[];
  rows: readonly T[];
  rowId: (row: T) => string;
  subRows?: (row: T) => T[] | undefined;
  canExpand?: (row: T) => boolean;
  sort?: DataTableSort | null;
  onSortChange?: (sort: DataTableSort | null) => void;
  /** The rows come already in order. */
  sortedElsewhere?: boolean;
};

/** The table's rows in order, with what is sorted, shown and expanded. */
export function useDataTableModel<T extends RowData>(options: ModelOptions<T>) {
  const { columns, rows, rowId, subRows, canExpand, sort, onSortChange, sortedElsewhere = false } = options;
  const [ownSort, setOwnSort] = useState<DataTableSort | null>(sort ?? null);
  const [expanded, setExpanded] = useState<ExpandedState>({});
  const [visibility, setVisibility] = useState(() =>
    Object.fromEntries(columns.filter((column) => column.hidden).map((column) => [column.id, false])),
  );
  const definitions = useMemo(() => columns.map((column) => toDefinition(column)), [columns]);
  const data = useMemo(() => [...rows], [rows]);
  const shownSort = onSortChange ? (sort ?? null) : ownSort;
  const sorting = useMemo(() => toSortingState(shownSort), [shownSort]);

  const table = useTable({
    features,
    columns: definitions,
    data,
    getRowId: rowId,
    getSubRows: subRows,
    getRowCanExpand: canExpand && ((row) => canExpand(row.original)),
    manualSorting: sortedElsewhere,
    autoResetExpanded: false,
    enableMultiSort: false,
    state: { sorting, expanded, columnVisibility: visibility },
    onSortingChange: (update) => {
      const next = fromSortingState(typeof update === "function" ? update(sorting) : update);
      if (onSortChange) onSortChange(next);
      else setOwnSort(next);
    },
    onExpandedChange: setExpanded,
    onColumnVisibilityChange: setVisibility,
  });
  return table;
}

export type DataTableModel<T extends RowData> = ReturnType<typeof useDataTableModel<T>>;

function toDefinition<T extends RowData>(column: DataTableColumn<T>): ColumnDef<typeof features, T, unknown> {
  const { id, sortValue, hideable = false } = column;
  return {
    id,
    accessorFn: (row: T) => sortValue?.(row) ?? undefined,
    enableSorting: sortValue !== undefined,
    sortUndefined: "last",
    sortFn: (a, b, columnId) => compare(a.getValue(columnId), b.getValue(columnId)),
    enableHiding: hideable,
  };
}

const words = new Intl.Collator("en", { numeric: true, sensitivity: "base" });

function compare(a: unknown, b: unknown): number {
  if (typeof a === "number" && typeof b === "number") return a - b;
  return words.compare(String(a), String(b));
}

function toSortingState(sort: DataTableSort | null): SortingState {
  return sort ? [{ id: sort.column, desc: sort.descending }] : [];
}

function fromSortingState(state: SortingState): DataTableSort | null {
  const [first] = state;
  return first ? { column: first.id, descending: first.desc } : null;
}

/** A column's name in words. */
export function nameOf<T>(column: DataTableColumn<T>): string {
  return column.name ?? (typeof column.header === "string" ? column.header : column.id);
}

const ALIGNMENTS = { left: "text-left", right: "text-right", center: "text-center" } as const;

/** The class that aligns a column's cells. */
export function alignmentOf<T>(column: DataTableColumn<T>) {
  return ALIGNMENTS[column.align ?? (column.numeric ? "right" : "left")];
}
