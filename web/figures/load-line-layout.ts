import { extent, max } from "d3-array";
import { type ScaleLinear, scaleLinear } from "d3-scale";
import type { FigurePoint, LoadLineData } from "#shared/bias/figure-data";
import type { Box, Px } from "./label-placement";

export type Tick = { at: number; label: string };

export type LoadLineLayout = {
  width: number;
  height: number;
  fontSize: number;
  /** The output plane's frame, pixels. */
  plot: Box;
  /** Where the wave runs, under the plane; null where there is none. */
  wave: Box | null;
  x: ScaleLinear<number, number>;
  y: ScaleLinear<number, number>;
  /** Periods to pixels, downward. */
  time: ScaleLinear<number, number>;
  xTicks: Tick[];
  yTicks: Tick[];
  currentUnit: string;
  toPx: (point: FigurePoint) => Px;
};

const NARROW = 560;
/** Under the wave, for two lines of words where they find no room beside it. */
const WAVE_FOOT = 36;
const CURRENT_UNITS = [
  { unit: "A", size: 1 },
  { unit: "mA", size: 1e-3 },
  { unit: "µA", size: 1e-6 },
  { unit: "nA", size: 1e-9 },
] as const;

/**
 * Scales and frames of the load-line figure at a width.
 *
 * @param width pixels of the box it is drawn in
 */
export function layOutLoadLine(data: LoadLineData, width: number): LoadLineLayout {
  const narrow = width < NARROW;
  const plotHeight = Math.min(400, Math.max(210, Math.round(width * 0.42)));
  const plot: Box = {
    left: narrow ? 36 : 64,
    right: width - (narrow ? 40 : 56),
    top: narrow ? 38 : 42,
    bottom: (narrow ? 38 : 42) + plotHeight,
  };
  const hasWave = data.wave.length > 1;
  const waveTop = plot.bottom + 32;
  const wave: Box | null = hasWave
    ? { left: plot.left, right: plot.right, top: waveTop, bottom: waveTop + (narrow ? 96 : 120) }
    : null;
  const height = wave ? wave.bottom + WAVE_FOOT : plot.bottom + 30;

  const x = scaleLinear([0, mostVolts(data)], [plot.left, plot.right]);
  const y = scaleLinear([0, mostAmperes(data)], [plot.bottom, plot.top]).nice(narrow ? 4 : 5);
  const [timeFrom, timeTo] = extent(data.wave, (point) => point.t);
  const time = scaleLinear([timeFrom ?? 0, timeTo ?? 1], wave ? [wave.top, wave.bottom] : [0, 0]);
  const topCurrent = y.domain()[1];
  const prefix =
    CURRENT_UNITS.find(({ size }) => topCurrent >= size) ?? CURRENT_UNITS[CURRENT_UNITS.length - 1];

  return {
    width,
    height,
    fontSize: narrow ? 12 : 13,
    plot,
    wave,
    x,
    y,
    time,
    xTicks: ticksOf(x, narrow ? 5 : 7, 1),
    yTicks: ticksOf(y, narrow ? 4 : 5, prefix.size),
    currentUnit: prefix.unit,
    toPx: (point) => ({ x: x(point.vds), y: y(point.id) }),
  };
}

/** The rail, or beyond it where a build with a higher rail may come to rest. */
function mostVolts({ vdd, spread, corners, cutoff }: LoadLineData): number {
  const points = [...(spread ?? []), ...corners, ...(cutoff ? [cutoff] : [])];
  return Math.max(vdd, max(points, (point) => point.vds) ?? 0);
}

/**
 * High enough for all that matters: the transition point and the spread with some air, the load lines' upper ends
 * where they aren't far above. A steep a.c. line runs out at the top instead of flattening everything below it.
 */
function mostAmperes({ q, transition, acLine, dcLine, spread, corners }: LoadLineData): number {
  const needed = Math.max(
    transition?.id ?? 0,
    q.id * 1.3,
    max([...(spread ?? []), ...corners], (point) => point.id) ?? 0,
  );
  const upperEnds = [acLine?.[0].id ?? 0, dcLine[0].id].filter((current) => current <= needed * 1.5);
  const most = Math.max(needed * 1.1, ...upperEnds.map((current) => current * 1.02));
  // A transistor that is off leaves only the d.c. line to show.
  return most > 0 ? most : dcLine[0].id || 1e-3;
}

function ticksOf(scale: ScaleLinear<number, number>, count: number, unit: number): Tick[] {
  const inUnit = scaleLinear(
    scale.domain().map((value) => value / unit),
    scale.range(),
  );
  const format = inUnit.tickFormat(count);
  return inUnit.ticks(count).map((value) => ({ at: inUnit(value), label: format(value) }));
}

/**
 * The ends of the symmetric excursion: as far each way along the a.c. line as the nearer limit allows.
 *
 * @returns the end toward the ohmic region, then the end toward cutoff; null without a signal
 */
export function excursionOf({ q, transition, cutoff }: LoadLineData): [FigurePoint, FigurePoint] | null {
  if (!transition || !cutoff) return null;
  const swing = Math.min(transition.id - q.id, q.id);
  const voltsPerAmpere = (cutoff.vds - q.vds) / q.id;
  return [
    { id: q.id + swing, vds: q.vds - swing * voltsPerAmpere },
    { id: q.id - swing, vds: q.vds + swing * voltsPerAmpere },
  ];
}
