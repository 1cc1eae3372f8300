import { line } from "d3-shape";
import { type ReactNode, useId, useMemo } from "react";
import type { FigurePoint, LoadLineData } from "#shared/bias/figure-data";
import { useElementWidth } from "../ui/use-element-width";
import { LoadLineAxes } from "./load-line-axes";
import { labelLoadLine } from "./load-line-labels";
import { excursionOf, type LoadLineLayout, layOutLoadLine } from "./load-line-layout";
import { ProbeReadout } from "./load-line-readout";
import { LoadLineWave } from "./load-line-wave";
import { axisNames, describeLoadLine } from "./load-line-words";
import { useLineProbe } from "./use-line-probe";

type LoadLineFigureProps = {
  data: LoadLineData;
  /** A control for the drive of the wave, shown under the figure. */
  driveControl?: ReactNode;
  /** Words under the figure: what is hatched, a link to the table. */
  caption?: ReactNode;
};

/** Stands in where nothing can be measured, such as before the first layout of a hidden page. */
const FALLBACK_WIDTH = 720;

/**
 * The output plane of a stage: characteristics, both load lines, the edge of saturation, the Q-point with its
 * excursion and spread, and the output wave below on the same axis of VDS. Draws itself anew for the width it has.
 */
export function LoadLineFigure({ data, driveControl, caption }: LoadLineFigureProps) {
  const [ref, width] = useElementWidth();
  return (
    <figure className="m-0 min-w-0" data-keep-together="">
      <div ref={ref} className="relative min-h-64">
        {width !== null && <Drawing data={data} width={width || FALLBACK_WIDTH} />}
      </div>
      {driveControl && (
        <div data-no-print="" className="pt-1">
          {driveControl}
        </div>
      )}
      {caption && <figcaption className="pt-3 text-quiet text-sm">{caption}</figcaption>}
    </figure>
  );
}

function Drawing({ data, width }: { data: LoadLineData; width: number }) {
  const layout = useMemo(() => layOutLoadLine(data, width), [data, width]);
  const labels = useMemo(() => labelLoadLine(data, layout), [data, layout]);
  const { probe, sliderProps } = useLineProbe(data, layout);
  const titleId = useId();
  const { plot, height } = layout;
  const { before, drain, after } = axisNames(data.polarity);
  return (
    <>
      <svg
        // A new drawing for a new width: marks glide when values change, not when the window does.
        key={width}
        viewBox={`0 0 ${width} ${height}`}
        role="img"
        aria-labelledby={titleId}
        fontSize={layout.fontSize}
        className="block h-auto w-full overflow-visible fill-ink font-sans"
      >
        <title id={titleId}>{describeLoadLine(data)}</title>
        <LoadLineAxes data={data} layout={layout} />
        <Plane data={data} layout={layout} />
        <LoadLineWave data={data} layout={layout} />
        <Marks data={data} layout={layout} />
        {labels.map(({ id, text, at, anchor }) => (
          <text
            key={id}
            data-label={id}
            x={at.x}
            y={at.y}
            textAnchor={anchor}
            className={LABEL_CLASSES[id]}
            paintOrder="stroke"
            strokeWidth="3"
            strokeLinejoin="round"
          >
            {text}
          </text>
        ))}
        {probe && <ProbeReadout probe={probe} data={data} layout={layout} />}
      </svg>
      {data.acLine && (
        <div
          role="slider"
          tabIndex={0}
          aria-valuenow={(probe ?? data.q).vds}
          aria-label={`Point on the a.c. line, by ${before}${drain}${after}`}
          data-no-print=""
          {...sliderProps}
          className="absolute cursor-crosshair touch-pan-y"
          style={{
            left: `${(100 * plot.left) / width}%`,
            width: `${(100 * (plot.right - plot.left)) / width}%`,
            top: `${(100 * plot.top) / height}%`,
            height: `${(100 * (plot.bottom - plot.top)) / height}%`,
          }}
        />
      )}
    </>
  );
}

const LABEL_CLASSES: Record<string, string> = {
  q: "fill-ink stroke-paper font-semibold",
  "ac-line": "fill-ink stroke-paper",
  "dc-line": "fill-quiet stroke-paper",
  edge: "fill-saturation-ink stroke-paper",
  "room-ohmic": "fill-ohmic stroke-paper",
  "room-cutoff": "fill-cutoff-ink stroke-paper",
};

type PartProps = { data: LoadLineData; layout: LoadLineLayout };

/** The lines of the plane, cut off at its frame. */
function Plane({ data, layout }: PartProps) {
  const clipId = useId();
  const hatchId = useId();
  const { plot, toPx } = layout;
  const draw = line<FigurePoint>()
    .x((point) => toPx(point).x)
    .y((point) => toPx(point).y);
  const path = (points: FigurePoint[]) => draw(points) ?? undefined;
  const excursion = excursionOf(data);
  return (
    <>
      <clipPath id={clipId}>
        <rect
          x={plot.left - 1}
          y={plot.top - 1}
          width={plot.right - plot.left + 2}
          height={plot.bottom - plot.top + 2}
        />
      </clipPath>
      <pattern id={hatchId} width="6" height="6" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">
        <path d="M0 0V6" className="stroke-ember" strokeWidth="1" opacity="0.5" />
      </pattern>
      <g clipPath={`url(#${clipId})`} fill="none">
        {data.characteristics.map(({ vgs, points }) => (
          <path
            key={vgs}
            d={path(points)}
            strokeWidth={vgs === data.q.vgs ? 1.25 : 1}
            className={`figure-move stroke-cutoff ${vgs === data.q.vgs ? "opacity-70" : "opacity-30"}`}
          />
        ))}
        {excursion && (
          <path
            data-part="excursion"
            d={path(excursion)}
            strokeWidth="9"
            className="figure-move stroke-ember opacity-25"
          />
        )}
        {data.spread && (
          <path
            data-part="spread"
            d={`${path(data.spread)}Z`}
            fill={`url(#${hatchId})`}
            strokeWidth="1"
            className="figure-move stroke-ember/60"
          />
        )}
        <path data-part="dc-line" d={path(data.dcLine)} className="figure-move stroke-quiet/80" />
        {data.acLine && (
          <path
            data-part="ac-line"
            d={path(data.acLine)}
            strokeWidth="2"
            className="figure-move stroke-ink"
          />
        )}
        <path
          data-part="edge"
          d={path(data.edge)}
          strokeWidth="1.75"
          strokeDasharray="5 4"
          className="figure-move stroke-saturation"
        />
      </g>
    </>
  );
}

/** The points that carry meaning, over everything else. */
function Marks({ data, layout }: PartProps) {
  const { toPx } = layout;
  const q = toPx(data.q);
  return (
    <>
      {data.corners.map(toPx).map(({ x, y }) => (
        <circle key={`${x} ${y}`} data-part="corner" cx={x} cy={y} r="1.75" className="fill-ember/60" />
      ))}
      {data.transition && <OpenPoint at={toPx(data.transition)} part="transition" className="stroke-ohmic" />}
      {data.cutoff && <OpenPoint at={toPx(data.cutoff)} part="cutoff" className="stroke-cutoff" />}
      <circle
        data-part="q"
        cx={q.x}
        cy={q.y}
        r="6.5"
        strokeWidth="1.5"
        className="figure-move fill-ember stroke-paper"
      />
    </>
  );
}

function OpenPoint({
  at,
  part,
  className,
}: {
  at: { x: number; y: number };
  part: string;
  className: string;
}) {
  return (
    <circle
      data-part={part}
      cx={at.x}
      cy={at.y}
      r="4.5"
      strokeWidth="2"
      className={`figure-move fill-paper ${className}`}
    />
  );
}
