import type { ReactNode } from "react";
import { Link } from "react-router-dom";

type CompactTableProps = {
  title: string;
  /** The entry of the method page that explains it. */
  anchor: string;
  /** The columns by key; the first is that of the rows' names. */
  columns: Readonly<Record<string, ReactNode>>;
  /** What stands in each column, by the same keys. */
  rows: readonly { id: string; cells: Readonly<Record<string, ReactNode>> }[];
};

/** A few ruled lines of figures, small enough to stand beside another: names at the left, figures at the right. */
export function CompactTable({ title, anchor, columns, rows }: CompactTableProps) {
  const [nameKey, ...keys] = Object.keys(columns);
  return (
    <table className="w-full text-sm print:text-xs" data-keep-together="">
      <caption className="pb-0.5 text-left font-semibold">
        <Link to={`/method#${anchor}`} className="hover:underline hover:underline-offset-3">
          {title}
        </Link>
      </caption>
      <thead>
        <tr className="text-quiet text-xs">
          <th scope="col" className="border-ink border-b py-0.5 text-left align-bottom font-normal">
            {columns[nameKey]}
          </th>
          {keys.map((key) => (
            <th
              key={key}
              scope="col"
              className="border-ink border-b py-0.5 pl-2.5 text-right align-bottom font-normal"
            >
              {columns[key]}
            </th>
          ))}
        </tr>
      </thead>
      <tbody>
        {rows.map(({ id, cells }) => (
          <tr key={id}>
            <th scope="row" className="border-rule border-b py-0.5 text-left font-normal">
              {cells[nameKey]}
            </th>
            {keys.map((key) => (
              <td key={key} className="value border-rule border-b py-0.5 pl-2.5 text-right">
                {cells[key]}
              </td>
            ))}
          </tr>
        ))}
      </tbody>
    </table>
  );
}
