import { findRoot } from "./find-root";

/** The resistances that the coupling and bypass capacitors of a stage work against, ohms. */
export type CapacitorResistances = {
  /** Rsig + Rin. */
  input: number;
  /** Rout + RL; null without a load, which needs no coupling. */
  output: number | null;
  /** RS and what the source terminal shows in parallel with it; null where RS isn't bypassed. */
  bypass: { rs: number; seen: number } | null;
};

/** Farads; null where the stage has no such capacitor. */
export type Capacitors = { input: number; output: number | null; bypass: number | null };

/**
 * What a bypass capacitor sees across its resistor: the resistor in parallel with what the source terminal shows,
 * (ro + rL)/(1 + gm ro), behind any resistance that stays in the signal's way.
 *
 * @param load the a.c. load at the drain, ohms
 * @param rs the bypassed resistor, ohms
 * @param series between the source terminal and the capacitor, ohms
 * @returns ohms
 */
export function resistanceAtSource(gm: number, gds: number, load: number, rs: number, series = 0): number {
  return 1 / (1 / rs + 1 / (series + (1 + gds * load) / (gm + gds)));
}

/** Squared response relative to mid-band: two coupling zeros at 0 Hz, and the bypass pole with its zero. */
function relativeResponse(resistances: CapacitorResistances, capacitors: Capacitors, hertz: number): number {
  const omega = 2 * Math.PI * hertz;
  let response = highPass(omega * resistances.input * capacitors.input);
  if (resistances.output !== null && capacitors.output !== null) {
    response *= highPass(omega * resistances.output * capacitors.output);
  }
  if (resistances.bypass && capacitors.bypass !== null) {
    const zero = omega * resistances.bypass.rs * capacitors.bypass;
    const pole = omega * resistances.bypass.seen * capacitors.bypass;
    const floor = resistances.bypass.seen / resistances.bypass.rs;
    response *= (floor * floor * (1 + zero * zero)) / (1 + pole * pole);
  }
  return response;
}

function highPass(x: number): number {
  return (x * x) / (1 + x * x);
}

/**
 * The low corner: where the response has fallen by 3 dB from mid-band.
 *
 * @returns hertz
 */
export function lowCorner(resistances: CapacitorResistances, capacitors: Capacitors): number {
  const excess = (logHertz: number) => relativeResponse(resistances, capacitors, 10 ** logHertz) - 0.5;
  return 10 ** findRoot(excess, -9, 12);
}

/** How far below the corner the coupling capacitors' own corners lie when a bypass capacitor is to dominate. */
const COUPLING_SHARE = 0.1;

/**
 * The smallest capacitors that give a low corner. The bypass capacitor works against the least resistance and is the
 * largest, so it sets the corner and the coupling capacitors stay a decade below (common practice); without it the
 * coupling capacitors share the corner equally.
 *
 * @param hertz the wanted corner, above zero
 * @returns farads, exact; round up to a preferred value
 */
export function smallestCapacitors(resistances: CapacitorResistances, hertz: number): Capacitors {
  const forCorner = (resistance: number, corner: number) => 1 / (2 * Math.PI * resistance * corner);
  const { input, output, bypass } = resistances;
  if (bypass === null || bypass.seen / bypass.rs > Math.SQRT1_2) {
    // Two equal corners f together fall by 3 dB at f / sqrt(sqrt 2 - 1).
    const corner = output === null ? hertz : hertz * Math.sqrt(Math.SQRT2 - 1);
    return {
      input: forCorner(input, corner),
      output: output === null ? null : forCorner(output, corner),
      bypass: bypass === null ? null : forCorner(bypass.seen, hertz * COUPLING_SHARE),
    };
  }
  const coupling = hertz * COUPLING_SHARE;
  const share = {
    input: forCorner(input, coupling),
    output: output === null ? null : forCorner(output, coupling),
  };
  const excess = (logFarads: number) =>
    relativeResponse(resistances, { ...share, bypass: 10 ** logFarads }, hertz) - 0.5;
  return { ...share, bypass: 10 ** findRoot(excess, -20, 3) };
}
