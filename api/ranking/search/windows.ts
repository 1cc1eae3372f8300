import { transitionVoltage } from "#shared/bias/swing";

/** A span of drain current, A. */
export type Span = { low: number; high: number };

/** The resistances of one RD and RS, ohms: what the d.c. and the a.c. line see. */
export type LineResistances = {
  /** RD || RL. */
  load: number;
  /** The part of RS that carries signal. */
  degeneration: number;
  /** rL plus that part. */
  slope: number;
  /** RD + RS. */
  total: number;
};

/**
 * Drain current at which a stage has a given signed centring error c = (U - D)/(U + D).
 *
 * With U = ID rL and D = (iT - ID) rL, c fixes iT = 2 ID/(1 + c), and along the a.c. line
 * vT = VDD - ID R with R = RT + rS (1 - c)/(1 + c). The edge of saturation then gives
 * K R (1 + c)/2 vT² (1 + λ vT) + vT = VDD, which has one root whatever the threshold is.
 *
 * @param c -1 (at cutoff) to 1 (at the edge of saturation), ends excluded
 * @returns amperes
 */
export function currentAtCentring(
  vdd: number,
  k: number,
  lambda: number,
  { slope, total }: LineResistances,
  c: number,
): number {
  const r = total + (slope * (1 - c)) / (1 + c);
  const v = transitionVoltage((k * r * (1 + c)) / 2, lambda, vdd, 1);
  return (vdd - v) / r;
}

/**
 * An upper bound on the symmetric swing of every divider with these resistances: the swing at dead centre, with
 * K (1 + λ VDD) for K, which can only raise it. One square root.
 *
 * @returns volts peak
 */
export function swingBound(vdd: number, kUpper: number, { load, slope, total }: LineResistances): number {
  const r = total + slope;
  const v = (2 * vdd) / (1 + Math.sqrt(1 + 2 * kUpper * r * vdd));
  return ((vdd - v) / r) * load;
}

/**
 * The largest drain current that leaves a given room toward the ohmic region; 0 where no current does.
 *
 * From K vT² (1 + λ vT) = ID + D/rL and vT = VDD - ID RT - D rS/rL, eliminating ID.
 *
 * @param room V peak at the output; 0 gives the edge of saturation
 * @returns amperes
 */
export function currentForOhmicRoom(
  vdd: number,
  k: number,
  lambda: number,
  { load, slope, total }: LineResistances,
  room: number,
): number {
  const reach = vdd - (room * slope) / load;
  if (reach <= 0) return 0;
  const v = transitionVoltage(k * total, lambda, reach + (room * total) / load, 1);
  return (reach - v) / total;
}

/**
 * Overdrive of a saturated device that carries a current with the rail behind RT.
 *
 * @param current A
 * @returns volts
 */
export function overdriveAt(vdd: number, k: number, lambda: number, total: number, current: number): number {
  return Math.sqrt(current / (k * (1 + lambda * (vdd - current * total))));
}

/**
 * The currents in a span at which ID (VDD - ID RT) stays within a limit. The dissipation rises to the middle of the
 * d.c. line and falls again, so a limit below its peak leaves two spans.
 *
 * @param limit W
 */
export function spansWithinDissipation(span: Span, vdd: number, total: number, limit: number): Span[] {
  const discriminant = vdd * vdd - 4 * total * limit;
  if (discriminant <= 0) return [span];
  const root = Math.sqrt(discriminant);
  const firstHigh = (2 * limit) / (vdd + root);
  const secondLow = (vdd + root) / (2 * total);
  const spans: Span[] = [];
  if (span.low <= firstHigh) spans.push({ low: span.low, high: Math.min(span.high, firstHigh) });
  if (span.high >= secondLow) spans.push({ low: Math.max(span.low, secondLow), high: span.high });
  return spans;
}
