import type { RowData } from "@tanstack/react-table";
import { type ReactNode, useState } from "react";
import { Button } from "./button";
import { classNames } from "./class-names";
import { ColumnMenu } from "./column-menu";
import { DataTableHeader } from "./data-table-header";
import {
  type DataTableColumn,
  type DataTableRow,
  type DataTableSort,
  useDataTableModel,
} from "./data-table-model";
import { DataTableRowView } from "./data-table-row";
import { MarginColumn, WIDE_ENOUGH_FOR_MARGIN } from "./margin-column";
import { useElementWidth } from "./use-element-width";
import { useMediaQuery } from "./use-media-query";
import { useRowMovement } from "./use-row-movement";

export type DataTableProps<T extends RowData> = {
  /** What the table lists, for a screen reader. */
  label: string;
  columns: readonly DataTableColumn<T>[];
  rows: readonly T[];
  rowId: (row: T) => string;
  /** Enter on a row, or a click on it. */
  onOpen?: (row: T) => void;
  /** Rows under a row, shown when it is expanded. */
  subRows?: (row: T) => T[] | undefined;
  /** What stands under a row when it is expanded; null for a row that has nothing more. */
  renderExpanded?: (row: T) => ReactNode;
  canExpand?: (row: T) => boolean;
  /** With `onSortChange` the page holds the order (in its address); without, the table does, from `sort`. */
  sort?: DataTableSort | null;
  onSortChange?: (sort: DataTableSort | null) => void;
  /** The rows come in order already, so a header only asks for another. */
  sortedElsewhere?: boolean;
  /** The row that is marked as open or chosen. */
  markedId?: string | null;
  onActiveChange?: (row: T) => void;
  /** Shown at the left above the table, beside the column menu. */
  toolbar?: ReactNode;
  /** Shown in place of the rows when there are none. */
  empty?: ReactNode;
  /** Rows drawn at first and added by "Show more". */
  pageSize?: number;
  footer?: ReactNode;
  /** A note about a row for the margin at the right; null for a row that has none. It folds under its row on a phone. */
  marginNote?: (row: T) => ReactNode;
  className?: string;
};

/**
 * A ruled table: sortable headers, a menu for its columns, one active row moved by keyboard, rows that expand. On a
 * narrow screen it scrolls sideways in its own box with the first column standing still.
 */
export function DataTable<T extends RowData>(props: DataTableProps<T>) {
  const { label, columns, rows, onOpen, renderExpanded, subRows, pageSize = 100 } = props;
  const expandable = renderExpanded !== undefined || subRows !== undefined;
  const interactive = Boolean(onOpen || expandable || props.onActiveChange);
  const table = useDataTableModel({
    ...props,
    canExpand: props.canExpand ?? (renderExpanded && !subRows ? () => true : undefined),
  });
  const [limit, setLimit] = useState(pageSize);
  const allRows = table.getRowModel().rows;
  const shownRows = allRows.slice(0, limit);
  const byId = new Map(shownRows.map((row) => [row.id, row]));
  const showMore = () => setLimit(limit + pageSize);

  const expand = (row: DataTableRow<T> | undefined, expanded: boolean) => {
    if (row?.getCanExpand()) row.toggleExpanded(expanded);
  };
  const movement = useRowMovement({
    ids: shownRows.map((row) => row.id),
    onOpen: interactive
      ? (id) => {
          const row = byId.get(id);
          if (!row) return;
          if (onOpen) onOpen(row.original);
          else expand(row, !row.getIsExpanded());
        }
      : undefined,
    onExpand: expandable ? (id, expanded) => expand(byId.get(id), expanded) : undefined,
    isExpanded: (id) => byId.get(id)?.getIsExpanded() ?? false,
    onActiveChange: (id) => {
      const row = byId.get(id);
      if (row) props.onActiveChange?.(row.original);
    },
    onPastEnd: allRows.length > limit ? showMore : undefined,
  });

  const [boxRef, boxWidth] = useElementWidth();
  const [tableRef, tableWidth] = useElementWidth();
  const overflows = boxWidth !== null && tableWidth !== null && tableWidth > boxWidth + 1;
  const shownColumns = columns.filter((column) => table.getColumn(column.id)?.getIsVisible() ?? true);
  const wide = useMediaQuery(WIDE_ENOUGH_FOR_MARGIN);
  const notes = props.marginNote
    ? shownRows.map((row) => ({ id: row.id, content: props.marginNote?.(row.original) ?? null }))
    : null;
  const hasMenu = columns.some((column) => column.hideable);

  return (
    <div className={classNames("min-w-0", props.className)}>
      {(props.toolbar || hasMenu) && (
        <div className="flex flex-wrap items-baseline justify-between gap-x-6 gap-y-2 pb-2">
          <div className="min-w-0 grow">{props.toolbar}</div>
          {hasMenu && <ColumnMenu columns={columns} table={table} />}
        </div>
      )}
      {rows.length === 0 && props.empty ? (
        props.empty
      ) : (
        <MarginColumn notes={notes} shown={wide}>
          <section
            ref={boxRef}
            aria-label={overflows ? `${label}, scrolls sideways` : undefined}
            // A box that scrolls must be reachable by keyboard; rows that take the focus make it so already.
            tabIndex={overflows && !interactive ? 0 : undefined}
            // Positioned, so that what is hidden from sight inside it scrolls with it instead of widening the page.
            className={overflows ? "relative overflow-x-auto" : undefined}
          >
            <table
              ref={tableRef}
              role={interactive ? (expandable ? "treegrid" : "grid") : undefined}
              aria-rowcount={interactive ? allRows.length + 1 : undefined}
              className="w-full border-separate border-spacing-0"
            >
              <caption className="sr-only">{label}</caption>
              <DataTableHeader columns={shownColumns} table={table} sticky={!overflows} />
              <tbody>
                {shownRows.map((row, index) => (
                  <DataTableRowView
                    key={row.id}
                    row={row}
                    index={index}
                    columns={shownColumns}
                    expandable={expandable}
                    active={movement.activeId === row.id}
                    marked={props.markedId === row.id}
                    rowProps={interactive ? movement.rowProps(row.id) : undefined}
                    onOpen={interactive && onOpen ? () => onOpen(row.original) : undefined}
                    expandedContent={renderExpanded}
                    foldedNote={wide ? null : notes?.[index].content}
                  />
                ))}
              </tbody>
              {props.footer && <tfoot>{props.footer}</tfoot>}
            </table>
          </section>
        </MarginColumn>
      )}
      {allRows.length > shownRows.length && (
        <p className="flex items-baseline gap-4 pt-4 text-quiet">
          <span className="tabular">
            {shownRows.length} of {allRows.length.toLocaleString("en")}
          </span>
          <Button variant="link" onClick={showMore}>
            Show {Math.min(pageSize, allRows.length - shownRows.length)} more
          </Button>
        </p>
      )}
    </div>
  );
}
