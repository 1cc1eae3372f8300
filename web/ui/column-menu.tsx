import type { RowData } from "@tanstack/react-table";
import { type DataTableColumn, type DataTableModel, nameOf } from "./data-table-model";
import { Icon } from "./icon";
import { Menu, MenuCheckboxItem, MenuLabel } from "./menu";

type ColumnMenuProps<T extends RowData> = {
  columns: readonly DataTableColumn<T>[];
  table: DataTableModel<T>;
};

/** Chooses which columns a table shows. */
export function ColumnMenu<T extends RowData>({ columns, table }: ColumnMenuProps<T>) {
  return (
    <Menu
      align="end"
      trigger={
        <button
          type="button"
          data-no-print=""
          className="inline-flex items-center gap-1.5 rounded-sm text-quiet text-sm hover:text-ink"
        >
          <Icon name="columns" />
          Columns
        </button>
      }
    >
      <MenuLabel>Show</MenuLabel>
      {columns
        .filter((column) => column.hideable)
        .map((column) => {
          const model = table.getColumn(column.id);
          return (
            <MenuCheckboxItem
              key={column.id}
              checked={model?.getIsVisible() ?? true}
              onCheckedChange={(checked) => model?.toggleVisibility(checked)}
            >
              {nameOf(column)}
            </MenuCheckboxItem>
          );
        })}
    </Menu>
  );
}
