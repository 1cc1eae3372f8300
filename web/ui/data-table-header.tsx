import type { RowData } from "@tanstack/react-table";
import { classNames } from "./class-names";
import { alignmentOf, type DataTableColumn, type DataTableModel, nameOf } from "./data-table-model";
import { Icon } from "./icon";

type DataTableHeaderProps<T extends RowData> = {
  columns: readonly DataTableColumn<T>[];
  table: DataTableModel<T>;
  sticky: boolean;
};

const ARIA_SORT = { asc: "ascending", desc: "descending" } as const;

/** The head of the table: quiet words over an ink rule; a sortable column's words are a button. */
export function DataTableHeader<T extends RowData>({ columns, table, sticky }: DataTableHeaderProps<T>) {
  return (
    <thead>
      <tr>
        {columns.map((column, position) => {
          const model = table.getColumn(column.id);
          const sortable = model?.getCanSort() ?? false;
          const sorted = model?.getIsSorted() || null;
          return (
            <th
              key={column.id}
              scope="col"
              aria-sort={sorted ? ARIA_SORT[sorted] : sortable ? "none" : undefined}
              className={classNames(
                "border-ink border-b bg-paper px-2.5 pt-2 pb-2.5 align-bottom font-normal text-quiet text-sm leading-4.5",
                sticky && "sticky top-0 z-10",
                position === 0 && "left-0 z-20",
                position === 0 && !sticky && "sticky",
                alignmentOf(column),
                column.className,
              )}
            >
              {sortable ? (
                <button
                  type="button"
                  onClick={() => model?.toggleSorting()}
                  className={classNames(
                    "group relative inline-flex items-end gap-1 rounded-sm hover:text-ink",
                    sorted && "text-ink",
                    alignmentOf(column),
                  )}
                >
                  {column.header}
                  <span className="sr-only">, sort</span>
                  <Icon
                    name={sorted === "desc" ? "arrow-down" : "arrow-up"}
                    className={classNames(
                      "absolute top-[3px] text-xs",
                      alignmentOf(column) === "text-right" ? "-left-4" : "-right-4",
                      !sorted && "opacity-0 group-hover:opacity-50 group-focus-visible:opacity-50",
                    )}
                  />
                </button>
              ) : (
                column.header || <span className="sr-only">{nameOf(column)}</span>
              )}
            </th>
          );
        })}
      </tr>
    </thead>
  );
}
