import type { Distortion } from "#shared/schemas/bias";
import { drainCurrent, type SquareLaw } from "./device";
import { findRoot } from "./find-root";
import type { Network } from "./network";
import { saturationCurrent, saturationOverdrive } from "./saturation";

/** What a signal meets at the Q-point: the device, where it sits, and the network around it. */
export type SignalPath = {
  device: SquareLaw;
  q: { id: number; vds: number; vgs: number };
  network: Pick<Network, "slope" | "degeneration" | "output" | "feedthrough">;
};

/**
 * Drain current at one instant of the input, on the a.c. line through the Q-point, with the whole device law:
 * cutoff and the ohmic region clip the wave as they would.
 *
 * @param input instantaneous gate voltage above its quiescent value, V
 * @returns amperes
 */
export function instantaneousCurrent({ device, q, network }: SignalPath, input: number): number {
  const { slope, degeneration, feedthrough } = network;
  const drive = q.vgs + input;
  // Along the a.c. line the device sees a rail of VDS + ID rS: the d.c. problem again, with other numbers.
  const rail = q.vds + q.id * slope + feedthrough * input;
  const overdrive = drive + q.id * degeneration - device.vt;
  if (overdrive <= 0 || rail <= 0) return 0;
  const x = saturationOverdrive(device, rail, overdrive, degeneration, slope);
  const saturated = saturationCurrent(device, rail, x, slope);
  if (rail - saturated * slope >= x) return saturated;
  const balance = (current: number) =>
    drainCurrent(device, drive - (current - q.id) * degeneration, rail - current * slope) - current;
  // Where the a.c. line reaches VDS = 0 the device carries nothing, so the root lies below.
  return findRoot(balance, 0, rail / slope);
}

/** How far the output has moved from rest at one instant, V: up or down as the network inverts. */
function outputAt({ q, network }: SignalPath, input: number, current: number): number {
  return network.output * (current - q.id) - network.feedthrough * input;
}

/** Samples a period; even harmonics of a static curve need only the rising half, mirrored. */
const HALF_PERIOD_STEPS = 128;

/**
 * Harmonics of the output for a sine at the gate: the wave solved point by point along the a.c. line, and its
 * Fourier coefficients. The curve has no memory, so v(θ) depends on sin θ alone and half a period holds it all;
 * equal steps in θ make the sums exact for every harmonic below the sample count.
 *
 * @param inputPeak V, above zero
 * @returns second and third harmonic over the fundamental, the largest excursion of the output in volts, and
 * whether the wave reaches cutoff or the ohmic region
 */
export function distortionAt(path: SignalPath, inputPeak: number): Distortion {
  let fundamental = 0;
  let second = 0;
  let third = 0;
  let outputPeak = 0;
  let clipped = false;
  for (let step = 0; step <= HALF_PERIOD_STEPS; step++) {
    const theta = Math.PI * (step / HALF_PERIOD_STEPS - 0.5);
    const weight = step === 0 || step === HALF_PERIOD_STEPS ? 0.5 : 1;
    const sine = Math.sin(theta);
    const current = instantaneousCurrent(path, inputPeak * sine);
    const output = outputAt(path, inputPeak * sine, current);
    fundamental += weight * output * sine;
    second += weight * output * Math.cos(2 * theta);
    third += weight * output * Math.sin(3 * theta);
    outputPeak = Math.max(outputPeak, Math.abs(output));
    if (step === 0 || step === HALF_PERIOD_STEPS) clipped ||= isClipped(path, inputPeak * sine, current);
  }
  return {
    secondHarmonic: Math.abs(second / fundamental),
    thirdHarmonic: Math.abs(third / fundamental),
    outputPeak,
    clipped,
  };
}

function isClipped({ device, q, network }: SignalPath, input: number, current: number): boolean {
  if (current === 0) return true;
  const change = current - q.id;
  const overdrive = q.vgs + input - change * network.degeneration - device.vt;
  return q.vds + network.feedthrough * input - change * network.slope < overdrive;
}

/**
 * The largest output peak whose second harmonic stays within a limit; the clipping limit when distortion never
 * reaches it. The harmonic may dip before it rises (channel-length modulation cancels it near δ = 1/3), so the
 * first crossing is looked for in steps and then closed in on.
 *
 * @param limit second harmonic over fundamental, 0 to 1
 * @param gain magnitude of the small-signal gain
 * @param symmetric the symmetric swing, V peak
 * @returns volts peak at the output
 */
export function linearSwing(path: SignalPath, limit: number, gain: number, symmetric: number): number {
  const excess = (outputPeak: number) => distortionAt(path, outputPeak / gain).secondHarmonic - limit;
  const steps = 24;
  let previous = symmetric / 1000;
  if (excess(previous) > 0) return 0;
  for (let step = 1; step <= steps; step++) {
    const peak = (symmetric * step) / steps;
    if (excess(peak) > 0) return findRoot(excess, previous, peak);
    previous = peak;
  }
  return symmetric;
}
