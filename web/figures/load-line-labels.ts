import { min, pairs } from "d3-array";
import type { FigurePoint, LoadLineData } from "#shared/bias/figure-data";
import { formatQuantity } from "#shared/values/engineering";
import {
  type Box,
  type Label,
  type LabelCandidate,
  type Obstacle,
  type PlacedLabel,
  type Px,
  placeLabels,
} from "./label-placement";
import type { LoadLineLayout } from "./load-line-layout";

/** Below this distance in pixels the eye takes two lines for one. */
const SAME_LINE_PX = 5;

const WEIGHTS = { acLine: 6, dcLine: 4, edge: 4, spread: 2, wave: 6, guide: 1.5, characteristic: 0.15 };

/** Where the figure's words stand, so that none lies on another or on a line where that can be helped. */
export function labelLoadLine(data: LoadLineData, layout: LoadLineLayout): PlacedLabel[] {
  const { plot, width, height, fontSize } = layout;
  const bounds: Box = { left: 2, right: width - 2, top: 2, bottom: height - 2 };
  const labels = [
    qLabel(data, layout),
    ...lineLabels(data, layout),
    edgeLabel(data, layout),
    ...roomLabels(data, layout),
  ];
  const axisWords: Box[] = [
    { left: 0, right: plot.left - 2, top: 0, bottom: plot.bottom + 20 },
    { left: plot.right + 2, right: width, top: 0, bottom: plot.bottom + 20 },
    { left: plot.left, right: plot.right, top: plot.bottom + 4, bottom: plot.bottom + 22 },
  ];
  return placeLabels(
    labels.filter((label) => label !== null),
    obstaclesOf(data, layout),
    bounds,
    fontSize,
    axisWords,
  );
}

function obstaclesOf(data: LoadLineData, layout: LoadLineLayout): Obstacle[] {
  const { toPx, plot, x, time, height } = layout;
  const path = (points: FigurePoint[]) => points.map(toPx);
  const around = ({ x: cx, y: cy }: Px, radius: number): Px[] => [
    { x: cx - radius, y: cy - radius },
    { x: cx + radius, y: cy + radius },
    { x: cx - radius, y: cy + radius },
    { x: cx + radius, y: cy - radius },
  ];
  const guides = [data.transition, data.q, data.cutoff].filter((point) => point !== null);
  return [
    ...(data.acLine ? [{ path: path(data.acLine), weight: WEIGHTS.acLine }] : []),
    { path: path(data.dcLine), weight: WEIGHTS.dcLine },
    { path: path(data.edge), weight: WEIGHTS.edge },
    ...(data.spread ? [{ path: path([...data.spread, data.spread[0]]), weight: WEIGHTS.spread }] : []),
    ...data.characteristics.map(({ points }) => ({ path: path(points), weight: WEIGHTS.characteristic })),
    ...guides.map((point) => ({ path: around(toPx(point), 6), weight: WEIGHTS.acLine })),
    ...(layout.wave
      ? [
          { path: data.wave.map((point) => ({ x: x(point.vds), y: time(point.t) })), weight: WEIGHTS.wave },
          ...guides.map((point) => ({
            path: [
              { x: x(point.vds), y: Math.max(plot.top, toPx(point).y) },
              { x: x(point.vds), y: height },
            ],
            weight: WEIGHTS.guide,
          })),
        ]
      : []),
  ];
}

function qLabel(data: LoadLineData, { toPx }: LoadLineLayout): Label {
  const { x, y } = toPx(data.q);
  const text = `Q ${formatQuantity(data.q.vds, "V")}, ${formatQuantity(data.q.id, "A")}`;
  const candidates = [
    [14, -10],
    [22, -18],
    [14, -26],
    [30, -30],
    [-14, 22],
    [-22, 32],
    [14, 24],
    [-14, -12],
    [-24, -28],
    [40, -44],
    [-40, 44],
    [60, -60],
  ].map(([dx, dy]) => beside(x, y, dx, dy));
  return { id: "q", text, candidates };
}

function beside(x: number, y: number, dx: number, dy: number): LabelCandidate {
  return { at: { x: x + dx, y: y + dy }, anchor: dx < 0 ? "end" : "start" };
}

/** The words beside the two load lines; one label where they run together. */
function lineLabels(data: LoadLineData, layout: LoadLineLayout): Label[] {
  const { acLine, dcLine } = data;
  if (!acLine)
    return [{ id: "dc-line", text: "d.c. line", candidates: along(dcLine, [0.8, 0.6, 0.4, 0.2], layout) }];
  const acFractions = [0.72, 0.62, 0.82, 0.9, 0.5, 0.3, 0.2, 0.12];
  if (runTogether(acLine, dcLine, layout)) {
    const text = "a.c. and d.c. line";
    return [{ id: "ac-line", text, candidates: along(acLine, acFractions, layout) }];
  }
  return [
    { id: "ac-line", text: "a.c. line", candidates: along(acLine, acFractions, layout) },
    {
      id: "dc-line",
      text: "d.c. line",
      candidates: along(dcLine, [0.84, 0.76, 0.9, 0.66, 0.55, 0.94, 0.4, 0.28, 0.18, 0.1], layout),
    },
  ];
}

function runTogether(
  a: [FigurePoint, FigurePoint],
  b: [FigurePoint, FigurePoint],
  layout: LoadLineLayout,
): boolean {
  const near = (p: Px, q: Px) => Math.hypot(p.x - q.x, p.y - q.y) < SAME_LINE_PX;
  return near(layout.toPx(a[0]), layout.toPx(b[0])) && near(layout.toPx(a[1]), layout.toPx(b[1]));
}

/** Places above right and below left of a falling line, at fractions of its length on show. */
function along(
  [from, to]: [FigurePoint, FigurePoint],
  fractions: number[],
  { toPx, plot }: LoadLineLayout,
): LabelCandidate[] {
  const a = toPx(from);
  const b = toPx(to);
  return fractions
    .map((fraction) => ({ x: a.x + (b.x - a.x) * fraction, y: a.y + (b.y - a.y) * fraction }))
    .filter((point) => point.y >= plot.top)
    .flatMap(({ x, y }) => [
      beside(x, y, 9, -7),
      beside(x, y, -9, 16),
      beside(x, y, 14, -14),
      beside(x, y, -14, 26),
    ]);
}

function edgeLabel({ edge }: LoadLineData, { toPx, plot }: LoadLineLayout): Label | null {
  const points = edge.map(toPx).filter((point) => point.y >= plot.top - 1);
  const last = points[points.length - 1];
  if (!last) return null;
  const lower = [0.85, 0.7, 0.5, 0.3].map((fraction) => points[Math.floor((points.length - 1) * fraction)]);
  const candidates = [
    ...(last.y < plot.top + 14
      ? [beside(last.x, plot.top, 8, -9), beside(last.x, plot.top, -4, -9)]
      : [beside(last.x, last.y, 8, -4)]),
    ...lower.flatMap(({ x, y }) => [beside(x, y, 10, 0), beside(x, y, -10, 0)]),
    // Where the edge lies flat at the foot, as with a device of little gain, the words go well above it.
    ...lower.flatMap(({ x, y }) => [20, 36, 52, 68].map((rise) => beside(x, y, -8, -rise))),
  ];
  return { id: "edge", text: "edge of saturation", candidates };
}

function roomLabels(data: LoadLineData, { wave, x }: LoadLineLayout): Label[] {
  if (!wave || !data.room || !data.transition || !data.cutoff) return [];
  const words = (volts: number, clipped: boolean) =>
    `${formatQuantity(volts, "V")} of room${clipped ? ", clips" : ""}`;
  const left = x(data.transition.vds);
  const right = x(data.cutoff.vds);
  const rows = [wave.bottom - 22, wave.bottom + 10, wave.bottom + 28];
  return [
    {
      id: "room-ohmic",
      text: words(data.room.towardOhmic, data.clipped.towardOhmic),
      candidates: [...rows.map((y) => beside(left, y, -8, 0)), ...rows.map((y) => beside(left, y, 8, 0))],
    },
    {
      id: "room-cutoff",
      text: words(data.room.towardCutoff, data.clipped.towardCutoff),
      candidates: [...rows.map((y) => beside(right, y, 8, 0)), ...rows.map((y) => beside(right, y, -8, 0))],
    },
  ];
}

export type CurveLabel = { text: string; y: number; atQ: boolean };

/** The VGS at the right end of each characteristic on show; crowded ones give way, the Q-point's own never. */
export function labelCharacteristics(data: LoadLineData, { plot, x, y }: LoadLineLayout): CurveLabel[] {
  const decimals = decimalsOf(data.characteristics.map(({ vgs }) => vgs));
  const ends = data.characteristics
    .map(({ vgs, points }) => ({ vgs, end: points[points.length - 1] }))
    .filter(({ end }) => end !== undefined && y(end.id) >= plot.top - 1 && x(end.vds) >= plot.right - 4)
    .map(({ vgs, end }) => ({ text: vgs.toFixed(decimals), y: y(end.id), atQ: vgs === data.q.vgs }));
  const kept: CurveLabel[] = [];
  for (const label of [...ends].sort((a, b) => Number(b.atQ) - Number(a.atQ) || a.y - b.y)) {
    if (kept.every((other) => Math.abs(other.y - label.y) >= 14)) kept.push(label);
  }
  return kept;
}

/** Enough decimals to tell neighbouring gate voltages apart; two at least. */
function decimalsOf(voltages: number[]): number {
  const steps = pairs(voltages, (a, b) => Math.abs(b - a)).filter((step) => step > 0);
  const smallest = min(steps) ?? 1;
  return Math.min(4, Math.max(2, Math.ceil(-Math.log10(smallest))));
}
