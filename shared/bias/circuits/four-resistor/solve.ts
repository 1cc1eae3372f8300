import { conductances, type SquareLaw } from "#shared/bias/device";
import { centringErrorOf, parallel, swingOf, transitionPoint } from "#shared/bias/swing";
import { distortionAt, type SignalPath } from "#shared/bias/wave";
import type { Bias, StageValues } from "#shared/schemas/bias";
import { type QPoint, solveQPoint } from "./q-point";

/** The a.c. resistances of the stage: load at the drain, what of RS carries signal, slope of the a.c. line. */
export function acResistances(stage: StageValues): { load: number; degeneration: number; slope: number } {
  const load = parallel(stage.rd, stage.rl);
  const degeneration = stage.sourceBypassed ? 0 : stage.rs;
  return { load, degeneration, slope: load + degeneration };
}

/** What a signal meets in this stage, at a Q-point already solved. */
export function signalPath(device: SquareLaw, stage: StageValues, q: QPoint): SignalPath {
  const { load, degeneration } = acResistances(stage);
  return { device, q: { id: q.id, vds: q.vds, vgs: q.vgs }, load, degeneration };
}

/**
 * Solves the four-resistor common-source stage: Q-point, both load lines' ends, swing, small-signal figures and,
 * with an input peak, distortion from the wave itself.
 *
 * The gain is the exact solution of the drain and source nodes,
 * Av = -gm rL / (1 + gds (rL + RS) + gm RS), RS = 0 where bypassed; it holds in each region.
 *
 * @param device square-law figures
 * @param stage SI units, magnitudes for both polarities
 * @param inputPeak peak of a sine at the gate, V
 */
export function solveFourResistor(device: SquareLaw, stage: StageValues, inputPeak?: number): Bias {
  const q = solveQPoint(device, stage);
  const { load, degeneration, slope } = acResistances(stage);
  const { gm, gds } = conductances(device, q.vgs, q.vds);
  const saturated = q.region === "saturation";
  const transition = saturated ? transitionPoint(device, q, slope) : null;
  const swing = transition && swingOf(q.id, transition.id, load);
  const conducts = q.region !== "cutoff";
  // Looking into the drain: ro raised by the signal across the source resistor.
  const drainConductance = gds / (1 + (gm + gds) * degeneration);
  return {
    region: q.region,
    vg: q.vg,
    vgs: q.vgs,
    overdrive: q.vgs - device.vt,
    id: q.id,
    vds: q.vds,
    transition,
    swing,
    centringError: swing && centringErrorOf(swing),
    gm,
    ro: gds > 0 ? 1 / gds : null,
    gain: conducts ? (-gm * load) / (1 + gds * slope + gm * degeneration) : 0,
    inputResistance: parallel(stage.r1, stage.r2),
    outputResistance: 1 / (1 / stage.rd + drainConductance),
    power: q.vds * q.id,
    ...(inputPeak !== undefined && conducts
      ? { distortion: distortionAt(signalPath(device, stage, q), inputPeak) }
      : {}),
  };
}
