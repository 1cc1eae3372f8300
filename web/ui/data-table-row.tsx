import type { RowData } from "@tanstack/react-table";
import type { KeyboardEvent, MouseEvent, ReactNode } from "react";
import { classNames } from "./class-names";
import { alignmentOf, type DataTableColumn, type DataTableRow } from "./data-table-model";
import { Icon } from "./icon";

type DataTableRowViewProps<T extends RowData> = {
  row: DataTableRow<T>;
  index: number;
  columns: readonly DataTableColumn<T>[];
  expandable: boolean;
  active: boolean;
  marked: boolean;
  /** Left out for a table that is only read. */
  rowProps?: {
    ref: (element: HTMLElement | null) => void;
    tabIndex: number;
    onFocus: () => void;
    onKeyDown: (event: KeyboardEvent<HTMLElement>) => void;
  };
  onOpen?: () => void;
  expandedContent?: (row: T) => ReactNode;
  /** The row's margin note where there is no margin. */
  foldedNote?: ReactNode;
};

const CONTROLS = "a, button, input, select, textarea, label, [role='menuitem']";

/** One ruled row, and what stands under it when it is expanded. */
export function DataTableRowView<T extends RowData>(props: DataTableRowViewProps<T>) {
  const { row, columns, expandable, active, marked, rowProps, onOpen, expandedContent } = props;
  const expanded = expandable && row.getIsExpanded();
  const canExpand = expandable && row.getCanExpand();
  const lit = marked || active;

  const onClick = (event: MouseEvent<HTMLElement>) => {
    const onControl = event.target instanceof Element && event.target.closest(CONTROLS) !== null;
    // A click that ends a text selection is reading, not choosing.
    if (onControl || window.getSelection()?.type === "Range") return;
    if (onOpen) onOpen();
    else if (canExpand) row.toggleExpanded();
  };

  return (
    <>
      <tr
        {...rowProps}
        onClick={rowProps && onClick}
        data-margin-anchor={row.id}
        aria-rowindex={rowProps ? props.index + 2 : undefined}
        aria-level={expandable ? row.depth + 1 : undefined}
        aria-expanded={canExpand ? expanded : undefined}
        aria-selected={rowProps && marked ? true : undefined}
        className={classNames(
          "group/row scroll-mt-12",
          rowProps && "cursor-default hover:[&>*]:bg-panel",
          lit && "[&>*]:bg-panel",
        )}
      >
        {columns.map((column, position) => (
          <Cell
            key={column.id}
            heading={position === 0}
            className={classNames(
              "border-rule border-b bg-paper px-2.5 py-1.5 font-normal",
              column.numeric && "value text-sm",
              position === 0 && "sticky left-0 z-1",
              alignmentOf(column),
              column.className,
            )}
          >
            {position === 0 && expandable ? (
              <span className="flex items-center gap-2" style={{ paddingLeft: `${row.depth * 1.25}rem` }}>
                {canExpand ? (
                  <button
                    type="button"
                    tabIndex={-1}
                    aria-label={expanded ? "Fold" : "Expand"}
                    onClick={() => row.toggleExpanded()}
                    className="-ml-1 rounded-sm p-0.5 text-quiet hover:text-ink"
                  >
                    <Icon name={expanded ? "chevron-down" : "chevron-right"} />
                  </button>
                ) : (
                  <span className="w-4" />
                )}
                <span className="min-w-0">{column.cell(row.original)}</span>
              </span>
            ) : (
              column.cell(row.original)
            )}
          </Cell>
        ))}
      </tr>
      {props.foldedNote && (
        <tr>
          <td colSpan={columns.length} className="border-rule border-b py-2 pl-4">
            {/* Stays in sight while the table under it scrolls sideways. */}
            <div className="sticky left-4 max-w-[calc(100vw-4rem)]">{props.foldedNote}</div>
          </td>
        </tr>
      )}
      {expanded && expandedContent && (
        <tr>
          <td colSpan={columns.length} className="border-rule border-b px-2.5 py-4">
            {expandedContent(row.original)}
          </td>
        </tr>
      )}
    </>
  );
}

type CellProps = { heading: boolean; className: string; children: ReactNode };

function Cell({ heading, className, children }: CellProps) {
  return heading ? (
    <th scope="row" className={className}>
      {children}
    </th>
  ) : (
    <td className={className}>{children}</td>
  );
}
