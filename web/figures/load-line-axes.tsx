import type { LoadLineData } from "#shared/bias/figure-data";
import { labelCharacteristics } from "./load-line-labels";
import type { LoadLineLayout } from "./load-line-layout";
import { axisNames } from "./load-line-words";

type LoadLineAxesProps = { data: LoadLineData; layout: LoadLineLayout };

/** The quiet grid, its figures, and the gate voltage of each characteristic at the right. */
export function LoadLineAxes({ data, layout }: LoadLineAxesProps) {
  const { plot, xTicks, yTicks, currentUnit } = layout;
  const { before, drain, gate, after } = axisNames(data.polarity);
  const lastTick = xTicks[xTicks.length - 1];
  // Mono figures are 0.6 em wide and stand centred under their tick.
  const afterLastTick = Math.max(
    plot.right + 6,
    lastTick ? lastTick.at + lastTick.label.length * 0.3 * layout.fontSize + 5 : 0,
  );
  return (
    <>
      <g className="stroke-rule" strokeWidth="1">
        {xTicks.map(({ at }) => (
          <path key={at} d={`M${at} ${plot.top}V${plot.bottom}`} />
        ))}
        {yTicks.map(({ at }) => (
          <path key={at} d={`M${plot.left} ${at}H${plot.right}`} />
        ))}
        <path d={`M${plot.right} ${plot.top}V${plot.bottom}`} />
      </g>
      <g className="fill-quiet font-mono tabular">
        {xTicks.map(({ at, label }) => (
          <text key={at} data-tick="volts" x={at} y={plot.bottom + 17} textAnchor="middle">
            {label}
          </text>
        ))}
        {yTicks.map(({ at, label }) => (
          <text key={at} data-tick="current" x={plot.left - 8} y={at} dy="0.33em" textAnchor="end">
            {label}
          </text>
        ))}
        {labelCharacteristics(data, layout).map(({ text, y, atQ }) => (
          <text
            key={text}
            data-label="vgs"
            x={plot.right + 6}
            y={y}
            dy="0.33em"
            className={atQ ? "fill-ink" : undefined}
          >
            {text}
          </text>
        ))}
      </g>
      <g className="fill-quiet">
        <text x={plot.left - 8} y={plot.top - 22} textAnchor="end">
          {currentUnit}
        </text>
        <AxisName x={plot.right + 6} y={plot.top - 22} before={before} sub={gate} after={after} />
        <AxisName x={afterLastTick} y={plot.bottom + 17} before={before} sub={drain} after={after} />
      </g>
    </>
  );
}

type AxisNameProps = { x: number; y: number; before: string; sub: string; after: string };

function AxisName({ x, y, before, sub, after }: AxisNameProps) {
  return (
    <text x={x} y={y}>
      {before}
      <tspan dy="4" fontSize="0.78em">
        {sub}
      </tspan>
      <tspan dy="-4">{after}</tspan>
    </text>
  );
}
