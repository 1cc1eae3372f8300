import { line } from "d3-shape";
import type { LoadLineData, WavePoint } from "#shared/bias/figure-data";
import type { LoadLineLayout } from "./load-line-layout";

type LoadLineWaveProps = { data: LoadLineData; layout: LoadLineLayout };

/** The output wave in time, drawn downward along the axis of VDS, with guides from the points that bound it. */
export function LoadLineWave({ data, layout }: LoadLineWaveProps) {
  const { wave, x, time, toPx, height } = layout;
  if (!wave || !data.transition || !data.cutoff) return null;
  const draw = line<WavePoint>()
    .x((point) => x(point.vds))
    .y((point) => time(point.t));
  const foot = height - 4;
  const guides = [
    { from: data.transition, className: "stroke-ohmic", part: "guide-transition" },
    { from: data.q, className: "stroke-ember", part: "guide-q" },
    { from: data.cutoff, className: "stroke-cutoff", part: "guide-cutoff" },
  ];
  return (
    <g fill="none">
      {guides.map(({ from, className, part }) => (
        <path
          key={part}
          data-part={part}
          d={`M${x(from.vds)} ${toPx(from).y}V${foot}`}
          strokeDasharray="1.5 4.5"
          strokeLinecap="round"
          strokeWidth="1.25"
          className={`figure-move opacity-60 ${className}`}
        />
      ))}
      <path
        data-part="wave"
        d={draw(data.wave) ?? undefined}
        strokeWidth="2"
        strokeLinejoin="round"
        className="figure-move stroke-ember"
      />
    </g>
  );
}
