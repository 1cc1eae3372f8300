import { transitionVoltage } from "#shared/bias/swing";
import type { Problem } from "../problem";
import type { LineResistances, Span } from "./windows";

/** What of a part the bounds need; farads. */
export type BoundDevice = { k: number; lambda: number; cgs: number; cgd: number; cds: number };

/** Lines of one RD, from the smallest RS to the largest; both ends are one line where there is only one. */
export type Block = { first: LineResistances; last: LineResistances };

/** The condition that no current in a span can meet. */
export type Impossible = "gain" | "high-corner" | "distortion";

/** The ends between which an operating point of a block lies while its current stays in a span. */
type Ends = {
  xLow: number;
  xHigh: number;
  vdsLow: number;
  gmLow: number;
  gdsHigh: number;
  gainLow: number;
  gainHigh: number;
};

/**
 * Says which condition no current of a span can meet on any line of a block, or null where each might be met. Never
 * wrong about "can't": VDS falls as the current and RD + RS rise, gm and gds follow from both, and the gain rises with
 * gm and falls with gds and with each resistance at the source.
 *
 * @param leastInput the least R1 || R2 of the allowed dividers, ohms
 */
export function impossibleIn(
  problem: Problem,
  device: BoundDevice,
  block: Block,
  span: Span,
  leastInput: number,
): Impossible | null {
  const ends = endsOf(problem.vdd + problem.vss, device, block, span);
  if (ends.gainHigh < problem.gainMin || ends.gainLow > problem.gainMax) return "gain";
  if (problem.highCornerMin > 0 && missesCorner(problem, device, block.first, ends, leastInput)) {
    return "high-corner";
  }
  if (problem.distortionMax < Number.POSITIVE_INFINITY && problem.distortionPeak > 0) {
    if (leastSecondHarmonic(problem, device, block, span, ends) > problem.distortionMax) return "distortion";
  }
  return null;
}

function endsOf(
  supply: number,
  { k, lambda }: BoundDevice,
  { first, last }: Block,
  { low, high }: Span,
): Ends {
  const { load } = first;
  const vdsHigh = supply - low * first.total;
  const vdsLow = Math.max(0, supply - high * last.total);
  const xLow = Math.sqrt(low / (k * (1 + lambda * vdsHigh)));
  const xHigh = Math.sqrt(high / (k * (1 + lambda * vdsLow)));
  const gmLow = 2 * Math.sqrt(k * low * (1 + lambda * vdsLow));
  const gmHigh = 2 * Math.sqrt(k * high * (1 + lambda * vdsHigh));
  const gdsHigh = lambda * k * xHigh * xHigh;
  const gdsLow = lambda * k * xLow * xLow;
  return {
    xLow,
    xHigh,
    vdsLow,
    gmLow,
    gdsHigh,
    gainLow: (gmLow * load) / (1 + gdsHigh * last.slope + gmLow * last.degeneration),
    gainHigh: (gmHigh * load) / (1 + gdsLow * first.slope + gmHigh * first.degeneration),
  };
}

/**
 * With the source bypassed, |H|²/|H(0)|² = (1 + (ω Cgd/gm)²)/((1 - a2 ω²)² + (a1 ω)²), and
 * a1 = R'(Cgs + Cgd (1 + gm R)) + R (Cgd + Cds) rises with gm and with both resistances: where even the least a1 puts
 * the gain 3 dB down, the corner lies lower. Degeneration has no such short form and is left to the exact test.
 */
function missesCorner(
  { highCornerMin, sourceImpedance }: Problem,
  { cgs, cgd, cds }: BoundDevice,
  { load, degeneration }: LineResistances,
  { gmLow, gdsHigh }: Ends,
  leastInput: number,
): boolean {
  if (degeneration > 0) return false;
  const omega = 2 * Math.PI * highCornerMin;
  const output = load / (1 + gdsHigh * load);
  const source = (sourceImpedance * leastInput) / (sourceImpedance + leastInput);
  const a1 = source * (cgs + cgd * (1 + gmLow * output)) + output * (cgd + cds);
  const zero = (omega * cgd) / gmLow;
  return (a1 * omega) ** 2 > 2 * (1 + zero * zero);
}

/**
 * A lower bound on the second harmonic; 0 where none is known.
 *
 * Along the a.c. line the current is F(o) = K M o²/(1 + β o²), β = λ K rS, M = 1 + λ (VDS + ID rS), o the instantaneous
 * overdrive, and with degeneration R it follows the input through G' = F'/(1 + R F'). Integrating the Fourier integrals
 * by parts twice and once, HD2 = A/4 (mean of G'')/(mean of G') with weights cos⁴ and cos², symmetric about the Q-point.
 * Up to β o² = 1/3, F'' = K M (2 - 6 β o²)/(1 + β o²)³ and with it G'' = F''/(1 + R F')³ only fall, so the mean of G''
 * is at least its value at the wave's top, and G' is concave, so its mean is at most its value at the Q-point
 * (J. L. W. V. Jensen, Acta Mathematica 30, 1906). The top lies at most A/(1 + R F') above the Q-point.
 */
function leastSecondHarmonic(
  { vdd, vss, distortionPeak, swingPeak }: Problem,
  { k, lambda }: BoundDevice,
  { first, last }: Block,
  { low, high }: Span,
  { xLow, xHigh, vdsLow, gainLow, gainHigh }: Ends,
): number {
  const supply = vdd + vss;
  const amplitudeLow = distortionPeak / gainHigh;
  const amplitudeHigh = distortionPeak / gainLow;
  // A wave that cuts off is left to the exact test.
  if (amplitudeHigh >= xLow + low * first.degeneration) return 0;
  const betaLow = lambda * k * first.slope;
  const betaHigh = lambda * k * last.slope;
  const kmLow = k * (1 + lambda * (supply - high * (last.total - last.slope)));
  const kmHigh = k * (1 + lambda * (supply - low * (first.total - first.slope)));
  const feedback = first.degeneration * kmLow * steepness(xLow, betaHigh);
  const top = xHigh + amplitudeHigh / (1 + feedback);
  const stretch = betaHigh * top * top;
  if (stretch >= 1 / 3) return 0;
  const curvature = (2 - 6 * stretch) / (1 + stretch) ** 3;
  const fedBack = (1 + last.degeneration * kmHigh * steepness(top, betaLow)) ** 3;
  const whole =
    (amplitudeLow / 4) * (curvature / fedBack) * (1 / steepness(xHigh, betaLow) + first.degeneration * kmLow);
  // The transition falls as current and slope rise.
  const vT = transitionVoltage(k, lambda, high + vdsLow / last.slope, last.slope);
  if (top <= vT) return whole;
  if (last.degeneration > 0) return 0;
  const { load } = first;
  const room = (k * vT * vT * (1 + lambda * vT) - high) * load;
  const reach = ((kmHigh * top * top) / (1 + betaLow * top * top) - low) * load;
  const bottom = steepness(xLow - amplitudeHigh, betaHigh);
  const straightness = (bottom + steepness(xLow + amplitudeLow, betaHigh)) / (2 * steepness(xHigh, betaLow));
  return whole - clippedShare(Math.max(room, swingPeak), reach) / (straightness * distortionPeak);
}

/**
 * The most that the ohmic region can take off the second harmonic, as volts. It flattens the wave only where it would
 * have gone past the room, and never below it; the unclipped wave is convex in the input, so past the room it stays
 * under its chord, and the integral of what is above the room over that arc bounds the loss.
 *
 * @param room toward the ohmic region, V
 * @param reach of the unclipped wave, V
 */
function clippedShare(room: number, reach: number): number {
  const r = Math.min(1, room / reach);
  return (reach * 2 * (Math.sqrt(1 - r * r) - r * Math.acos(r))) / Math.PI;
}

/** F' over K M. */
function steepness(o: number, beta: number): number {
  const bend = 1 + beta * o * o;
  return (2 * o) / (bend * bend);
}
