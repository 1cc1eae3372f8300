import type { Part } from "#shared/schemas/part";
import type { SignalNodes } from "./circuits/circuit";
import { findRoot } from "./find-root";

/** The small-signal circuit of a stage above its low corner, SI units. */
export type SmallSignalStage = SignalNodes & {
  gm: number;
  gds: number;
  /** Source impedance ahead of the input, ohms; 0 drives the gate directly. */
  sourceImpedance: number;
};

export type Capacitances = { cgs: number; cgd: number; cds: number };

/** Splits datasheet capacitances (F) into those between the terminals: Ciss = Cgs + Cgd, Crss = Cgd, Coss = Cds + Cgd. */
export function terminalCapacitances(part: Pick<Part, "ciss" | "coss" | "crss">): Capacitances {
  return { cgs: part.ciss - part.crss, cgd: part.crss, cds: part.coss - part.crss };
}

/**
 * The Miller effect on a capacitance across an inverting gain (J. M. Miller, "Dependence of the input impedance of a
 * three-electrode vacuum tube upon the load in the plate circuit", Scientific Papers of the Bureau of Standards 15,
 * 1920).
 *
 * @param capacitance F
 * @param gain magnitude
 * @returns farads seen at the input and at the output
 */
export function millerCapacitances(capacitance: number, gain: number): { input: number; output: number } {
  return { input: capacitance * (1 + gain), output: capacitance * (1 + 1 / gain) };
}

/**
 * The two poles as they are worked out by hand: the source impedance against the input with its Miller capacitance,
 * and the output node. Good to tell which of the two limits; the corner itself comes from `highCorner`.
 *
 * @param outputResistance load and ro in parallel, ohms
 * @returns hertz; null where there is no resistance or no capacitance
 */
export function millerPoles(
  stage: SmallSignalStage,
  capacitances: Capacitances,
  gain: number,
  outputResistance: number,
): { input: number | null; output: number | null } {
  const miller = millerCapacitances(capacitances.cgd, gain);
  const drive =
    stage.sourceImpedance === 0
      ? 0
      : (stage.sourceImpedance * stage.gate) / (stage.sourceImpedance + stage.gate);
  const pole = (resistance: number, capacitance: number) =>
    resistance > 0 && capacitance > 0 ? 1 / (2 * Math.PI * resistance * capacitance) : null;
  return {
    input: pole(drive, capacitances.cgs + miller.input),
    output: pole(outputResistance, capacitances.cds + miller.output),
  };
}

/**
 * Squared magnitude of the transfer from source to output at one frequency: nodal analysis of gate, drain and source,
 * solved by elimination with real and imaginary parts written out.
 *
 * @param frequency Hz; 0 gives the mid-band value
 */
export function transferSquared(
  stage: SmallSignalStage,
  capacitances: Capacitances,
  frequency: number,
): number {
  const { gm, gds, drain, source, gate, feedback, output, sourceImpedance } = stage;
  const gfb = feedback === null ? 0 : 1 / feedback;
  const omega = 2 * Math.PI * frequency;
  const bgs = omega * capacitances.cgs;
  const bgd = omega * capacitances.cgd;
  const bds = omega * capacitances.cds;
  // Source node eliminated: vs = a vg + b vd.
  let aRe = 0;
  let aIm = 0;
  let bRe = 0;
  let bIm = 0;
  if (source > 0) {
    const yRe = 1 / source + gm + gds;
    const yIm = bgs + bds;
    const norm = yRe * yRe + yIm * yIm;
    aRe = (gm * yRe + bgs * yIm) / norm;
    aIm = (bgs * yRe - gm * yIm) / norm;
    bRe = (gds * yRe + bds * yIm) / norm;
    bIm = (bds * yRe - gds * yIm) / norm;
  }
  // Drain node: (1/rD + gfb + gds + j(bgd + bds)) vd = (gfb + j bgd - gm) vg + (gm + gds + j bds) vs.
  let dRe = 0;
  let dIm = 0;
  if (drain > 0) {
    const sRe = gm + gds;
    const leftRe = 1 / drain + gfb + gds - (sRe * bRe - bds * bIm);
    const leftIm = bgd + bds - (sRe * bIm + bds * bRe);
    const rightRe = gfb - gm + (sRe * aRe - bds * aIm);
    const rightIm = bgd + (sRe * aIm + bds * aRe);
    const leftNorm = leftRe * leftRe + leftIm * leftIm;
    dRe = (rightRe * leftRe + rightIm * leftIm) / leftNorm;
    dIm = (rightIm * leftRe - rightRe * leftIm) / leftNorm;
  }
  const vsRe = aRe + bRe * dRe - bIm * dIm;
  const vsIm = aIm + bRe * dIm + bIm * dRe;
  const squared = output === "drain" ? dRe * dRe + dIm * dIm : vsRe * vsRe + vsIm * vsIm;
  if (sourceImpedance === 0) return squared;
  // Gate node: what flows in goes into the bias network, Cgs, Cgd and what the drain feeds back.
  const inRe = 1 / gate + bgs * vsIm + bgd * dIm + gfb * (1 - dRe);
  const inIm = bgs * (1 - vsRe) + bgd * (1 - dRe) - gfb * dIm;
  const gRe = 1 + sourceImpedance * inRe;
  const gIm = sourceImpedance * inIm;
  return squared / (gRe * gRe + gIm * gIm);
}

const FIRST_HERTZ = 1;
const LAST_HERTZ = 1e13;
const STEPS_PER_DECADE = 4;

/**
 * The high corner: the lowest frequency at which the gain has fallen by 3 dB from mid-band.
 *
 * @returns hertz, or null where it never falls so far (no capacitance, or a gain below what feeds through Cgd)
 */
export function highCorner(stage: SmallSignalStage, capacitances: Capacitances): number | null {
  const target = transferSquared(stage, capacitances, 0) / 2;
  const fall = (logHertz: number) => transferSquared(stage, capacitances, 10 ** logHertz) - target;
  const first = Math.log10(FIRST_HERTZ);
  const steps = (Math.log10(LAST_HERTZ) - first) * STEPS_PER_DECADE;
  for (let step = 1; step <= steps; step++) {
    const high = first + step / STEPS_PER_DECADE;
    if (fall(high) <= 0) return 10 ** findRoot(fall, high - 1 / STEPS_PER_DECADE, high);
  }
  return null;
}
