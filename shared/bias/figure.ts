import type { Brief } from "#shared/schemas/brief";
import type { Resistors } from "#shared/schemas/circuit";
import type { Part } from "#shared/schemas/part";
import { convexHull } from "./convex-hull";
import { drainCurrent, regionOf, type SquareLaw } from "./device";
import type { Characteristic, FigurePoint, LoadLineData, WavePoint } from "./figure-data";
import { boxOf, cornerQPoints } from "./spread";
import { figureStage, type StageFigures } from "./stage-sheet";
import { instantaneousCurrent } from "./wave";

/** Curves above and below the one through the Q-point. */
const CURVES_EACH_WAY = 3;
const CURVE_POINTS = 48;
const EDGE_POINTS = 40;
const WAVE_PERIODS = 1.5;
const WAVE_POINTS = 144;

/**
 * Lays out the load-line figure of a stage as plain data.
 *
 * @param celsius ambient temperature of the drawing, °C
 * @param outputPeak how far the signal drives the output, V peak in the small-signal sense; it is drawn clipped
 * where it would clip
 */
export function loadLineFigure(
  part: Part,
  brief: Brief,
  resistors: Resistors,
  celsius: number,
  outputPeak: number,
): LoadLineData {
  const figures = figureStage(part, brief, resistors, celsius);
  const { device, values, bias, network } = figures;
  const { slope } = network;
  const q = { vds: bias.vds, id: bias.id, vgs: bias.vgs };
  const swings = bias.swing !== null;
  const dcLine: LoadLineData["dcLine"] = [
    { vds: 0, id: network.supply / network.total },
    { vds: network.supply, id: 0 },
  ];
  const acLine: LoadLineData["acLine"] = swings
    ? [
        { vds: 0, id: q.id + q.vds / slope },
        { vds: q.vds + q.id * slope, id: 0 },
      ]
    : null;
  const spread = outline(cornerQPoints(boxOf(part, brief, values)));
  // Half as high again, so that the edge leaves the drawing at its frame and not in it.
  const top = 1.5 * Math.max(dcLine[0].id, acLine?.[0].id ?? 0);
  return {
    polarity: part.polarity,
    vdd: network.supply,
    dcLine,
    acLine,
    characteristics: characteristicsOf(device, q.vgs, bias.transition?.vds ?? null, network.supply),
    edge: edgeOfSaturation(device, top),
    q,
    transition: bias.transition,
    cutoff: acLine ? acLine[1] : null,
    room: bias.swing && { towardOhmic: bias.swing.towardOhmic, towardCutoff: bias.swing.towardCutoff },
    spread,
    corners: spread,
    ...drawWave(figures, outputPeak),
  };
}

/** The outline around the corners, with both axes brought to one scale first so that rounding treats them alike. */
function outline(corners: readonly FigurePoint[]): FigurePoint[] {
  const most = Math.max(...corners.map(({ id }) => id)) || 1;
  return convexHull(corners.map((point) => ({ x: point.vds, y: point.id / most, point }))).map(
    ({ point }) => point,
  );
}

/** Output characteristics around the Q-point's own, spaced so that the uppermost passes near the transition point. */
function characteristicsOf(
  device: SquareLaw,
  vgs: number,
  transitionOverdrive: number | null,
  vdd: number,
): Characteristic[] {
  const overdrive = vgs - device.vt;
  // A stage that is off or ohmic has no transition: spread the curves up to the gate voltage it does have.
  const span = transitionOverdrive === null ? Math.max(overdrive, 0.3) : transitionOverdrive - overdrive;
  const step = Math.max(span, 0.05 * Math.abs(overdrive), 1e-3) / CURVES_EACH_WAY;
  const curves: Characteristic[] = [];
  for (let at = -CURVES_EACH_WAY; at <= CURVES_EACH_WAY; at++) {
    const gate = vgs + at * step;
    if (gate <= device.vt) continue;
    const knee = gate - device.vt;
    const points = Array.from({ length: CURVE_POINTS + 1 }, (_, index) => {
      // Half the points up to the knee, where the curve bends, half along the flat.
      const half = CURVE_POINTS / 2;
      const end = Math.min(knee, vdd);
      const vds = index <= half ? (end * index) / half : end + ((vdd - end) * (index - half)) / half;
      return { vds, id: drainCurrent(device, gate, vds) };
    });
    curves.push({ vgs: gate, points });
  }
  return curves;
}

/** The edge of saturation, vDS = vGS - VT, up to a current. */
function edgeOfSaturation(device: SquareLaw, top: number): FigurePoint[] {
  const widest = Math.sqrt(top / device.k);
  return Array.from({ length: EDGE_POINTS + 1 }, (_, index) => {
    const vds = (widest * index) / EDGE_POINTS;
    return { vds, id: device.k * vds * vds * (1 + device.lambda * vds) };
  }).filter(({ id }) => id <= top);
}

/** The drain-source voltage over time for a sine at the gate, clipped where the stage clips. */
function drawWave(
  { device, network, bias }: StageFigures,
  outputPeak: number,
): Pick<LoadLineData, "wave" | "clipped"> {
  if (!bias.swing || outputPeak <= 0)
    return { wave: [], clipped: { towardOhmic: false, towardCutoff: false } };
  const path = { device, q: bias, network };
  const { slope, degeneration, feedthrough } = network;
  const inputPeak = outputPeak / Math.abs(bias.gain);
  const drainSource = (input: number) => {
    const current = instantaneousCurrent(path, input);
    return { current, vds: bias.vds + feedthrough * input - (current - bias.id) * slope };
  };
  const wave: WavePoint[] = Array.from({ length: WAVE_POINTS + 1 }, (_, index) => {
    const t = (WAVE_PERIODS * index) / WAVE_POINTS;
    return { t, vds: drainSource(inputPeak * Math.sin(2 * Math.PI * t)).vds };
  });
  const up = drainSource(inputPeak);
  const gate = bias.vgs + inputPeak - (up.current - bias.id) * degeneration;
  return {
    wave,
    clipped: {
      towardOhmic: regionOf(device, gate, up.vds) === "ohmic",
      towardCutoff: drainSource(-inputPeak).current === 0,
    },
  };
}
