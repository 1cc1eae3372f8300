import type { FigurePoint, LoadLineData } from "#shared/bias/figure-data";
import { formatQuantity } from "#shared/values/engineering";
import { axisNames, outputAt, signedVolts } from "./load-line-words";

type Row = { name: string; point: FigurePoint; output: number | null };

/** The load-line figure as a table: every point that it marks, with its values. */
export function LoadLineTable({ data }: { data: LoadLineData }) {
  const { before, drain, after } = axisNames(data.polarity);
  const cell = "border-rule border-b py-1.5 pl-4";
  const head = "border-ink border-b pb-1.5 pl-4 text-right font-normal text-quiet";
  return (
    <div className="overflow-x-auto">
      <table className="w-full max-w-2xl border-separate border-spacing-0 text-sm">
        <caption className="pb-2 text-left text-quiet">
          Points of the load-line figure{data.polarity === "p" ? ", in magnitudes" : ""}
        </caption>
        <thead>
          <tr>
            <th scope="col" className="border-ink border-b pb-1.5 text-left font-normal text-quiet">
              point
            </th>
            <th scope="col" className={head}>
              {before}
              <sub>{drain}</sub>
              {after}
            </th>
            <th scope="col" className={head}>
              I<sub>D</sub>
            </th>
            <th scope="col" className={head}>
              output from rest
            </th>
          </tr>
        </thead>
        <tbody>
          {rowsOf(data).map(({ name, point, output }) => (
            <tr key={name}>
              <th scope="row" className="border-rule border-b py-1.5 text-left font-normal">
                {name}
              </th>
              <td className={`${cell} value text-right`}>{formatQuantity(point.vds, "V")}</td>
              <td className={`${cell} value text-right`}>{formatQuantity(point.id, "A")}</td>
              <td className={`${cell} value text-right`}>{output === null ? "—" : signedVolts(output)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}

function rowsOf(data: LoadLineData): Row[] {
  const { q, transition, cutoff, dcLine, corners } = data;
  const onLine = (name: string, point: FigurePoint): Row => ({
    name,
    point,
    output: outputAt(data, point.vds),
  });
  return [
    ...(transition ? [onLine("transition point, edge of saturation", transition)] : []),
    onLine("Q-point", q),
    ...(cutoff ? [onLine("cutoff end of the a.c. line", cutoff)] : []),
    { name: "d.c. line, full current", point: dcLine[0], output: null },
    { name: "d.c. line, no current", point: dcLine[1], output: null },
    ...corners.map((point, index) => ({ name: `corner ${index + 1} of the spread`, point, output: null })),
  ];
}
