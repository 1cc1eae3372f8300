import { conductionAt, kelvin, thresholdAt } from "#shared/bias/device";
import { findRoot } from "#shared/bias/find-root";
import { saturationCurrent, saturationOverdrive } from "#shared/bias/saturation";
import { transitionVoltage } from "#shared/bias/swing";
import { emptyLine, type Line, type Lines, type Triple } from "./lines";
import type { PartSpread } from "./part-spread";
import type { LineEnd, SpreadEnds } from "./spread-ends";

const KELVIN_25 = kelvin(25);

/**
 * The assured swing of combinations, for the search: the same least over the same corners as `assuredSwing`, worked
 * out in plain numbers, and the window of divider ratios that keeps it above a level.
 *
 * In both directions a level s fixes the drain current of a corner and with it the gate voltage it takes, in closed
 * form but for the cubic of λ > 0. A corner toward cutoff carries ID = s/rL, so it asks for at least
 * VT + √(ID/(K (1 + λ VDS))) + ID RS; over temperature that is greatest at an end or where the overdrive is
 * (4/3) |tcVt| T. A corner toward the ohmic region allows at most the current that leaves the room s.
 */
export class AssuredSwing {
  readonly #ends: SpreadEnds;
  readonly #lines: Lines;
  /** What tolerance does to R1/R2 at most: (1 + t)/(1 - t); 1 where the gate has no divider. */
  readonly #ratioSpread: number;
  readonly #line: Line = emptyLine();
  /** The window that `window` found: ratios from `low` to `high` keep the level. */
  low = 0;
  high = 0;

  constructor(lines: Lines, ends: SpreadEnds, ratioSpread: number) {
    this.#ends = ends;
    this.#lines = lines;
    this.#ratioSpread = ratioSpread;
  }

  #fill({ scale }: LineEnd, triple: Triple): Line {
    return this.#lines.fill(this.#line, triple[0] * scale[0], triple[1] * scale[1], triple[2] * scale[2]);
  }

  /**
   * Finds the divider ratios R1/R2 for which a line keeps at least a level of assured swing.
   *
   * @param level V, above zero
   * @returns whether there are any; they are left in `low` and `high`
   */
  window(part: PartSpread, triple: Triple, level: number): boolean {
    let high = Number.POSITIVE_INFINITY;
    for (const end of this.#ends.cutoff) {
      const gate = this.#leastGate(part, end, triple, level);
      high = Math.min(high, (end.gateSupply / gate - 1) / this.#ratioSpread);
    }
    if (!(high >= 0)) return false;
    let low = 0;
    for (const end of this.#ends.ohmic) {
      const gate = this.#greatestGate(part, end, triple, level);
      if (!(gate > 0)) return false;
      low = Math.max(low, (end.gateSupply / gate - 1) * this.#ratioSpread);
      if (low > high) return false;
    }
    this.low = low;
    this.high = high;
    return true;
  }

  /** The least gate voltage with which a corner's room toward cutoff reaches a level at every temperature, V. */
  #leastGate(part: PartSpread, end: LineEnd, triple: Triple, level: number): number {
    const line = this.#fill(end, triple);
    const current = level / line.output;
    const vds = end.supply - current * line.total;
    if (vds <= 0) return Number.POSITIVE_INFINITY;
    const modulation = 1 + part.lambda * vds;
    const drop = current * line.gateSlope;
    let gate = part.vtMaxAt[0] + Math.sqrt(current / (part.kMinAt[0] * modulation)) + drop;
    if (part.temperatures === 1) return gate;
    gate = Math.max(gate, part.vtMaxAt[1] + Math.sqrt(current / (part.kMinAt[1] * modulation)) + drop);
    if (part.tcVt >= 0) return gate;
    // x goes with T^(3/4), and x = (4/3) |tcVt| T at the turning point.
    const x25 = Math.sqrt(current / (part.kMin25 * modulation));
    const turn = ((3 * x25) / (-4 * part.tcVt)) ** 4 / KELVIN_25 ** 3;
    if (turn <= part.cold || turn >= part.hot) return gate;
    const vt = part.vtMax25 + part.tcVt * (turn - KELVIN_25);
    return Math.max(gate, vt + x25 * (turn / KELVIN_25) ** 0.75 + drop);
  }

  /** The greatest gate voltage with which a corner keeps a level of room toward the ohmic region, V. */
  #greatestGate(part: PartSpread, end: LineEnd, triple: Triple, level: number): number {
    const line = this.#fill(end, triple);
    const { supply } = end;
    const { lambda } = part;
    const share = level / line.output;
    // VDS0: what the Q-point's VDS and ID RT share once the room is taken off.
    const reach = supply - share * line.slope;
    let gate = Number.POSITIVE_INFINITY;
    for (let at = 0; at < part.temperatures; at++) {
      for (let which = 0; which < 2; which++) {
        const k = which === 0 ? part.kMinAt[at] : part.kMaxAt[at];
        const v = transitionVoltage(k * line.total, lambda, reach + share * line.total, 1);
        const current = (reach - v) / line.total;
        if (!(current > 0)) return 0;
        const vds = supply - current * line.total;
        const x = Math.sqrt(current / (k * (1 + lambda * vds)));
        gate = Math.min(gate, part.vtMinAt[at] + x + current * line.gateSlope);
      }
    }
    return gate;
  }

  /**
   * The assured swing of a line with a divider ratio, V; 0 where some build leaves saturation or does not conduct.
   * Gives up with the least found so far once that is below a level.
   *
   * @param least the level below which nobody asks for more
   */
  swing(part: PartSpread, triple: Triple, ratio: number, least: number): number {
    let swing = Number.POSITIVE_INFINITY;
    for (const end of this.#ends.cutoff) {
      swing = Math.min(swing, this.#roomTowardCutoff(part, end, triple, ratio));
      if (swing <= 0) return 0;
      if (swing < least) return swing;
    }
    for (const end of this.#ends.ohmic) {
      swing = Math.min(swing, this.#roomTowardOhmic(part, end, triple, ratio));
      if (swing <= 0) return 0;
      if (swing < least) return swing;
    }
    return swing;
  }

  #roomTowardCutoff(part: PartSpread, end: LineEnd, triple: Triple, ratio: number): number {
    const { gateSlope, total, output } = this.#fill(end, triple);
    const gate = end.gateSupply / (1 + ratio * this.#ratioSpread);
    const overdriveAt = (vt: number, k: number) =>
      gate <= vt
        ? 0
        : saturationOverdrive({ vt, k, lambda: part.lambda }, end.supply, gate - vt, gateSlope, total);
    const room = (vt: number, k: number, x: number) =>
      saturationCurrent({ vt, k, lambda: part.lambda }, end.supply, x, total) * output;
    const cold = overdriveAt(part.vtMaxAt[0], part.kMinAt[0]);
    const least = room(part.vtMaxAt[0], part.kMinAt[0], cold);
    if (part.temperatures === 1 || cold === 0) return least;
    const hot = overdriveAt(part.vtMaxAt[1], part.kMinAt[1]);
    const either = Math.min(least, room(part.vtMaxAt[1], part.kMinAt[1], hot));
    const excess = (t: number) => {
      const celsius = t - KELVIN_25 + 25;
      const vt = thresholdAt(part.vtMax25, part.tcVt, celsius);
      return overdriveAt(vt, conductionAt(part.kMin25, celsius)) + (4 / 3) * part.tcVt * t;
    };
    if (hot === 0 || excess(part.cold) > 0 === excess(part.hot) > 0) return either;
    const celsius = findRoot(excess, part.cold, part.hot) - KELVIN_25 + 25;
    const vt = thresholdAt(part.vtMax25, part.tcVt, celsius);
    const k = conductionAt(part.kMin25, celsius);
    return Math.min(either, room(vt, k, overdriveAt(vt, k)));
  }

  #roomTowardOhmic(part: PartSpread, end: LineEnd, triple: Triple, ratio: number): number {
    const { gateSlope, total, slope, output } = this.#fill(end, triple);
    const { supply } = end;
    const { lambda } = part;
    const gate = end.gateSupply / (1 + ratio / this.#ratioSpread);
    let least = Number.POSITIVE_INFINITY;
    for (let at = 0; at < part.temperatures; at++) {
      const vt = part.vtMinAt[at];
      if (gate <= vt) continue;
      for (let which = 0; which < 2; which++) {
        const k = which === 0 ? part.kMinAt[at] : part.kMaxAt[at];
        const device = { vt, k, lambda };
        const x = saturationOverdrive(device, supply, gate - vt, gateSlope, total);
        const current = saturationCurrent(device, supply, x, total);
        const vds = supply - current * total;
        if (vds < x) return 0;
        const v = transitionVoltage(k, lambda, current + vds / slope, slope);
        least = Math.min(least, (k * v * v * (1 + lambda * v) - current) * output);
      }
    }
    return least;
  }
}
