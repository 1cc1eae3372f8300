import type { Conductances, CouplingNodes } from "./circuits/circuit";
import { type Complex, minus, over, plus, real, squaredMagnitude, times } from "./complex";
import { findRoot } from "./find-root";
import { parallel } from "./swing";

/** The small-signal circuit of a stage that its coupling and bypass capacitors stand in, SI units. */
export type CoupledStage = CouplingNodes &
  Conductances & {
    /** Source impedance ahead of the input capacitor, ohms. */
    sourceImpedance: number;
  };

/** Farads; null where the stage has no such capacitor. */
export type Capacitors = { input: number; output: number | null; bypass: number | null };

/** What each capacitor works against, ohms; null where the stage has no such capacitor. */
export type CapacitorResistances = { input: number; output: number | null; bypass: number | null };

/**
 * The resistance that each capacitor sees with the other two shorted and the signal source at rest: what the method
 * of short-circuit time constants adds up (P. E. Gray and C. L. Searle, "Electronic Principles", 1969).
 */
export function capacitorResistances(stage: CoupledStage): CapacitorResistances {
  const { gm, gds, gate, feedback, drain, load, source, sourceImpedance, output } = stage;
  const gfb = feedback === null ? 0 : 1 / feedback;
  const loaded = output === "drain" ? parallel(drain, load) : drain;
  const degeneration = output === "source" ? parallel(source.signal, load) : source.signal;
  const fall = 1 + degeneration * (gm + gds);
  const drainGain = loaded === 0 ? 0 : (gfb - gm / fall) / (1 / loaded + gfb + gds / fall);
  // The share of the drain's movement that the feedback resistor brings to the gate.
  const followed = sourceImpedance === 0 ? 0 : gfb / (gfb + 1 / gate + 1 / sourceImpedance);
  const seenByLoad =
    output === "drain"
      ? 1 / (1 / drain + gfb * (1 - followed) + (gds + gm * followed) / fall)
      : 1 / (1 / source.signal + gm + gds);
  return {
    input: sourceImpedance + 1 / (1 / gate + gfb * (1 - drainGain)),
    output: load === null ? null : seenByLoad + load,
    // The source terminal shows (ro + rL)/(1 + gm ro), behind what stays in the signal's way.
    bypass:
      source.bypassed === 0
        ? null
        : parallel(source.bypassed, source.signal + (1 + gds * loaded) / (gm + gds)),
  };
}

/**
 * Squared magnitude of the transfer from the signal source to the output at one frequency: nodal analysis of gate,
 * drain and source with every capacitor in place.
 *
 * @param capacitors null for the mid-band value
 * @param hertz above zero
 */
export function coupledSquared(stage: CoupledStage, capacitors: Capacitors | null, hertz: number): number {
  const { gm, gds, gate, feedback, drain, load, source, sourceImpedance, output } = stage;
  const omega = 2 * Math.PI * hertz;
  const one = real(1);
  const inSeries = (ohms: number, farads: number | null | undefined): Complex => ({
    re: ohms,
    im: farads ? -1 / (omega * farads) : 0,
  });
  const gfb = real(feedback === null ? 0 : 1 / feedback);
  const toLoad = load === null ? real(0) : over(one, inSeries(load, capacitors?.output));
  const loadShare = load === null ? one : times(toLoad, real(load));
  const underBypass =
    capacitors?.bypass && source.bypassed > 0
      ? over(one, { re: 1 / source.bypassed, im: omega * capacitors.bypass })
      : real(0);
  const resting = plus(real(source.signal), underBypass);
  const atSource = output === "source" ? over(one, plus(over(one, resting), toLoad)) : resting;
  // The drain current is (gm vg + gds vd)/fall; the source terminal moves by it times the impedance there.
  const fall = plus(one, times(atSource, real(gm + gds)));
  const gmLeft = over(real(gm), fall);
  const gdsLeft = over(real(gds), fall);
  const drainConductance = plus(real(1 / drain), plus(gfb, output === "drain" ? toLoad : real(0)));
  const drainGain = drain === 0 ? real(0) : over(minus(gfb, gmLeft), plus(drainConductance, gdsLeft));
  const terminal = output === "drain" ? drainGain : times(plus(gmLeft, times(gdsLeft, drainGain)), atSource);
  // The gate node: what flows in goes into the bias network and what the drain feeds back.
  const inflow = plus(real(1 / gate), times(gfb, minus(one, drainGain)));
  const divided = plus(one, times(inSeries(sourceImpedance, capacitors?.input), inflow));
  return squaredMagnitude(over(times(terminal, loadShare), divided));
}

/** The scan comes down from this many times the sum of the three corners, which is never far below the true one. */
const HEADROOM = 1000;
const STEPS_PER_DECADE = 8;

/**
 * The low corner: the highest frequency at which the response has fallen by 3 dB from mid-band.
 *
 * @returns hertz
 */
export function lowCorner(stage: CoupledStage, capacitors: Capacitors): number {
  const resistances = capacitorResistances(stage);
  const corners = (["input", "output", "bypass"] as const).map((key) => {
    const farads = capacitors[key];
    const ohms = resistances[key];
    return farads === null || ohms === null ? 0 : cornerOf(ohms, farads);
  });
  const target = coupledSquared(stage, null, 1) / 2;
  const excess = (logHertz: number) => coupledSquared(stage, capacitors, 10 ** logHertz) - target;
  // The input capacitor passes nothing at 0 Hz, so the way down always ends at a crossing.
  let high = Math.log10(HEADROOM * corners.reduce((sum, corner) => sum + corner));
  while (excess(high - 1 / STEPS_PER_DECADE) > 0) high -= 1 / STEPS_PER_DECADE;
  return 10 ** findRoot(excess, high - 1 / STEPS_PER_DECADE, high);
}

/** The corner of a resistance and a capacitance, Hz; or the capacitance, F, of a resistance and a corner. */
function cornerOf(ohms: number, other: number): number {
  return 1 / (2 * Math.PI * ohms * other);
}

/** How far below the corner the coupling capacitors' own corners lie when a bypass capacitor is to dominate. */
const COUPLING_SHARE = 0.1;

/**
 * The smallest capacitors that give a low corner. The bypass capacitor works against the least resistance and is the
 * largest, so it sets the corner and the coupling capacitors stay a decade below (common practice); without it the
 * coupling capacitors share the corner equally. These proportions come from the three sections taken apart; all
 * three are then scaled by how far the whole circuit's corner lies from the wanted one, which is exact because the
 * response knows a capacitor only by its product with the frequency.
 *
 * @param hertz the wanted corner, above zero
 * @returns farads, exact; round up to a preferred value
 */
export function smallestCapacitors(stage: CoupledStage, hertz: number): Capacitors {
  const first = proportions(stage, hertz);
  const excess = lowCorner(stage, first) / hertz;
  const scaled = (farads: number | null) => (farads === null ? null : farads * excess);
  return { input: first.input * excess, output: scaled(first.output), bypass: scaled(first.bypass) };
}

function proportions(stage: CoupledStage, hertz: number): Capacitors {
  const { input, output, bypass } = capacitorResistances(stage);
  // What is left of mid-band's response without any bypassing.
  const floor = bypass === null ? 1 : (bypass / stage.source.bypassed) ** 2;
  const dominates = bypass !== null && floor < 0.5;
  const couplings = output === null ? 1 : 2;
  // Two equal corners f together fall by 3 dB at f / sqrt(sqrt 2 - 1).
  const coupling = hertz * (dominates ? COUPLING_SHARE : Math.sqrt(2 ** (1 / couplings) - 1));
  const left = 0.5 * (1 + COUPLING_SHARE ** 2) ** couplings;
  return {
    input: cornerOf(input, coupling),
    output: output === null ? null : cornerOf(output, coupling),
    bypass:
      bypass === null
        ? null
        : // The section's response (floor + p²)/(1 + p²), p the frequency over its pole, has to be what is left.
          cornerOf(
            bypass,
            dominates ? hertz / Math.sqrt((left - floor) / (1 - left)) : hertz * COUPLING_SHARE,
          ),
  };
}
