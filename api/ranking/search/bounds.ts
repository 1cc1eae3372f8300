import { transitionVoltage } from "#shared/bias/swing";
import type { Problem } from "../problem";
import { type LineResistances, overdriveAt, type Span } from "./windows";

/** What of a part the bounds need; farads. */
export type BoundDevice = { k: number; lambda: number; cgs: number; cgd: number; cds: number };

/** The condition that no current in a span can meet. */
export type Impossible = "gain" | "high-corner" | "distortion";

/**
 * Says which condition no current of a span can meet, or null where each might be met. Never wrong about "can't":
 * gain rises with gm and falls with gds, and both are bounded by the ends of the span.
 *
 * @param leastInput the least R1 || R2 of the allowed dividers, ohms
 */
export function impossibleIn(
  problem: Problem,
  device: BoundDevice,
  line: LineResistances,
  span: Span,
  leastInput: number,
): Impossible | null {
  const { vdd } = problem;
  const { k, lambda } = device;
  const { load, degeneration, slope, total } = line;
  const xLow = overdriveAt(vdd, k, lambda, total, span.low);
  const xHigh = overdriveAt(vdd, k, lambda, total, span.high);
  const gmLow = 2 * Math.sqrt(k * span.low * (1 + lambda * (vdd - span.high * total)));
  const gmHigh = 2 * Math.sqrt(k * span.high * (1 + lambda * (vdd - span.low * total)));
  const gdsLow = lambda * k * xLow * xLow;
  const gdsHigh = lambda * k * xHigh * xHigh;
  const gainLow = (gmLow * load) / (1 + gdsHigh * slope + gmLow * degeneration);
  const gainHigh = (gmHigh * load) / (1 + gdsLow * slope + gmHigh * degeneration);
  if (gainHigh < problem.gainMin || gainLow > problem.gainMax) return "gain";
  if (degeneration > 0) return null;
  if (problem.highCornerMin > 0) {
    // |H|² / |H(0)|² = (1 + (ω Cgd/gm)²) / ((1 - a2 ω²)² + (a1 ω)²); a1 rises with gm and with each resistance.
    const omega = 2 * Math.PI * problem.highCornerMin;
    const output = load / (1 + gdsHigh * load);
    const source = (problem.sourceImpedance * leastInput) / (problem.sourceImpedance + leastInput);
    const a1 = source * (device.cgs + device.cgd * (1 + gmLow * output)) + output * (device.cgd + device.cds);
    const zero = (omega * device.cgd) / gmLow;
    if ((a1 * omega) ** 2 > 2 * (1 + zero * zero)) return "high-corner";
  }
  if (problem.distortionMax < Number.POSITIVE_INFINITY && problem.distortionPeak > 0) {
    const least = leastSecondHarmonic(problem, device, line, span, { xLow, xHigh, gainLow, gainHigh });
    if (least > problem.distortionMax) return "distortion";
  }
  return null;
}

/**
 * A lower bound on the second harmonic over a span, bypassed; 0 where none is known.
 *
 * Along the a.c. line the current is proportional to F(o) = o²/(1 + β o²), β = λ K rS, o the instantaneous overdrive.
 * Integrating the Fourier integrals by parts, HD2 = A/4 |mean F''| / mean F' with positive weights over the wave, so
 * the least F'' over the largest F' bounds it. Up to β o² = 1/3, F'' = (2 - 6 β o²)/(1 + β o²)³ only falls and
 * F' = 2 o/(1 + β o²)² only rises: both are taken at the wave's top.
 */
function leastSecondHarmonic(
  problem: Problem,
  { k, lambda }: BoundDevice,
  { slope, total }: LineResistances,
  span: Span,
  ends: { xLow: number; xHigh: number; gainLow: number; gainHigh: number },
): number {
  const amplitudeLow = problem.distortionPeak / ends.gainHigh;
  const amplitudeHigh = problem.distortionPeak / ends.gainLow;
  const top = ends.xHigh + amplitudeHigh;
  const beta = lambda * k * slope;
  const stretch = beta * top * top;
  if (amplitudeHigh >= ends.xLow || stretch >= 1 / 3) return 0;
  // The wave's top must stay in saturation everywhere in the span; the transition falls as the current rises.
  const vds = problem.vdd - span.high * total;
  if (vds <= 0 || top > transitionVoltage(k, lambda, span.high + vds / slope, slope)) return 0;
  const curvature = (2 - 6 * stretch) / (1 + stretch) ** 3;
  const steepness = (2 * top) / (1 + stretch) ** 2;
  return ((amplitudeLow / 4) * curvature) / steepness;
}
