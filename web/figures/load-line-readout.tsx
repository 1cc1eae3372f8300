import type { LoadLineData } from "#shared/bias/figure-data";
import { formatQuantity } from "#shared/values/engineering";
import type { LoadLineLayout } from "./load-line-layout";
import { axisNames, outputAt, signedVolts } from "./load-line-words";
import type { Probe } from "./use-line-probe";

type ProbeReadoutProps = { probe: Probe; data: LoadLineData; layout: LoadLineLayout };

const WIDTH = 148;
const LINE = 17;

/** The values at the point under the pointer or the keyboard, in a small box in the corner. */
export function ProbeReadout({ probe, data, layout }: ProbeReadoutProps) {
  const { plot, toPx } = layout;
  const { x, y } = toPx(probe);
  const { before, drain, after } = axisNames(data.polarity);
  const rows: [string, string][] = [
    [`${before}${drain}${after}`, formatQuantity(probe.vds, "V")],
    ["ID", formatQuantity(probe.id, "A")],
  ];
  if (probe.onLine && data.room) rows.push(["output", signedVolts(outputAt(data, probe.vds))]);
  const height = LINE * (rows.length + (probe.name ? 1 : 0)) + 12;
  // The lines of a stage fall to the right, so the upper right corner is free, and the box doesn't chase the pointer.
  const left = plot.right - WIDTH - 8;
  const top = plot.top + 8;
  const first = top + 19;
  return (
    <g className="pointer-events-none" data-part="readout">
      <path
        d={`M${plot.left} ${y}H${x}V${plot.bottom}`}
        fill="none"
        className="stroke-quiet/60"
        strokeDasharray="2 3"
      />
      <circle cx={x} cy={y} r="8.5" fill="none" strokeWidth="1.5" className="stroke-ink" />
      <rect x={left} y={top} width={WIDTH} height={height} rx="3" className="fill-raised stroke-rule" />
      {probe.name && (
        <text x={left + 10} y={first} className="fill-ink font-semibold">
          {probe.name}
        </text>
      )}
      {rows.map(([name, value], index) => {
        const row = first + LINE * (index + (probe.name ? 1 : 0));
        return (
          <g key={name}>
            <text x={left + 10} y={row} className="fill-quiet">
              {name}
            </text>
            <text x={left + WIDTH - 10} y={row} textAnchor="end" className="fill-ink font-mono tabular">
              {value}
            </text>
          </g>
        );
      })}
    </g>
  );
}
