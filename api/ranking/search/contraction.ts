import type { Problem } from "../problem";
import type { Demand, Gate } from "./boxes";
import type { Device } from "./conditions";
import type { Lines } from "./lines";
import type { PartSpread } from "./part-spread";
import { type LineEnd, likeliest, type SpreadEnds } from "./spread-ends";

/** Room for rounding in a bound. */
const SLACK = 1e-9;
/** How often a range is narrowed at most, and to what share of itself for another round to be worth it. */
const MOST_ROUNDS = 4;
const WORTH_A_ROUND = 0.8;

/**
 * Narrows the ratios of the source resistors to the resistor A at the output to those that might hold what is asked
 * for, for a whole run of values of A at once; see `Boxes` for what the letters stand for.
 */
export class Contraction {
  readonly #lines: Lines;
  readonly #a: Float64Array;
  readonly #supply: number;
  readonly #gateSupply: number;
  readonly #gate: Gate;
  readonly #cutoff: LineEnd;
  readonly #ohmicLow: LineEnd;
  readonly #ohmicHigh: LineEnd;
  /** What tolerance does to the ratios of the source resistors to A, at the corners of either side. */
  readonly #toCutoff: number;
  readonly #toOhmic: number;
  /** 1 where the source resistors feed signal back, so that they count in the a.c. line too. */
  readonly #excess: number;
  /** The ratio to A of what feeds signal back, from low to high. */
  readonly #feedback = new Float64Array(2);
  readonly #centred = new Float64Array(5);
  readonly #left = new Float64Array(2);
  /** A range of the source resistors' ratio to A, narrowed by `contract`; and two places to work in. */
  readonly range = new Float64Array(4);

  constructor(problem: Problem, lines: Lines, first: readonly number[], ends: SpreadEnds, gate: Gate) {
    this.#lines = lines;
    this.#a = Float64Array.from(first);
    this.#supply = problem.vdd + problem.vss;
    this.#gateSupply = problem.vss > 0 ? problem.vss : problem.vdd;
    this.#gate = gate;
    this.#cutoff = ends.cutoff[0];
    const likely = likeliest(ends.ohmic);
    this.#ohmicLow = likely[0];
    this.#ohmicHigh = likely[likely.length - 1];
    this.#toCutoff = Math.min(this.#cutoff.scale[1], this.#cutoff.scale[2]) / this.#cutoff.scale[0];
    this.#toOhmic = this.#ohmicLow.scale[1] / this.#ohmicLow.scale[0];
    this.#excess = lines.fromSource ? 0 : lines.degenerationB;
  }

  /**
   * Narrows the range of y, the source resistors over A, in which a run of values of A might hold what is asked for.
   * For some divider to do, the gate voltage must be high enough for one build and low enough for another. What the one
   * takes is a straight line in y, or a concave curve and so no lower than its chord; what the other leaves is
   * x + W y/(E + y), concave too. Where they cross, a quadratic is zero.
   *
   * @param bLow least ratio of the second resistor to A, `bHigh` the greatest
   * @returns false where the range is empty; else the range left stands in `range`
   */
  contract(
    device: Device,
    part: PartSpread,
    from: number,
    to: number,
    bLow: number,
    bHigh: number,
    demand: Demand,
  ): boolean {
    this.#feedback[0] = this.#excess * bLow;
    this.#feedback[1] = this.#excess * bHigh;
    for (let round = 0; round < MOST_ROUNDS; round++) {
      const width = this.range[1] - this.range[0];
      if (!this.#contractOnce(device, part, this.#a[from], this.#a[to], demand)) return false;
      // Each round's bounds are tighter on a shorter range; it pays while the range shrinks.
      if (this.range[1] - this.range[0] > WORTH_A_ROUND * width) return true;
    }
    return true;
  }

  #contractOnce(
    device: Device,
    part: PartSpread,
    aLow: number,
    aHigh: number,
    { level, centring }: Demand,
  ): boolean {
    const { gateA, load } = this.#lines;
    const { ratioSpread } = this.#gate;
    const { range } = this;
    const gateSupply = this.#gateSupply;
    // What the worst build toward cutoff takes: VT + x + J y.
    const { scale, supply, gateSupply: cutoffSupply } = this.#cutoff;
    const j = level * (1 + (aLow * scale[0]) / load);
    const x =
      part.vtMaxAt[0] + Math.sqrt(j / (part.kMinAt[0] * (1 + part.lambda * supply) * aHigh * scale[0]));
    const takenLow = x + j * (gateA + this.#toCutoff * range[0]);
    const takenHigh = x + j * (gateA + this.#toCutoff * range[1]);
    if (takenLow > cutoffSupply) return false;
    if (takenLow <= 0) return true;
    const shortOfLow = (cutoffSupply / takenLow - 1) / ratioSpread;
    const shortOfHigh = Math.max(0, cutoffSupply / takenHigh - 1) / ratioSpread;
    let left = range[0];
    let right = range[1];
    if (centring < 1) {
      this.#centre(device, aLow, aHigh, centring);
      const centre = this.#centred;
      this.#cross(
        centre[0],
        centre[1],
        centre[2],
        gateSupply / (1 + shortOfLow),
        gateSupply / (1 + shortOfHigh),
      );
      left = Math.max(left, range[2]);
      right = Math.min(right, range[3]);
    }
    for (let end = 0; end < 2; end++) {
      const ohmic = end === 0 ? this.#ohmicLow : this.#ohmicHigh;
      if (!this.#leaves(part, ohmic, aLow, aHigh, level)) return false;
      const leaves = this.#left;
      this.#cross(
        leaves[0],
        leaves[1],
        this.#toOhmic,
        ohmic.gateSupply / (1 + shortOfLow / ratioSpread),
        ohmic.gateSupply / (1 + shortOfHigh / ratioSpread),
      );
      left = Math.max(left, range[2]);
      right = Math.min(right, range[3]);
      if (centring < 1) {
        const centre = this.#centred;
        if (centre[3] > 0 && centre[4] < gateSupply) {
          this.#cross(
            leaves[0],
            leaves[1],
            this.#toOhmic,
            ohmic.gateSupply / (1 + (gateSupply / centre[3] - 1) / ratioSpread),
            ohmic.gateSupply / (1 + (gateSupply / centre[4] - 1) / ratioSpread),
          );
          left = Math.max(left, range[2]);
          right = Math.min(right, range[3]);
        }
      }
      if (left > right * (1 + SLACK)) return false;
    }
    range[0] = left;
    range[1] = right;
    return true;
  }

  /** x, W and 1/E of the highest gate voltage at a centring error within a limit, and the lowest at either end. */
  #centre({ vt, k, lambda }: Device, aLow: number, aHigh: number, centring: number): void {
    const { gateA, load } = this.#lines;
    const supply = this.#supply;
    const low = this.range[0];
    const high = this.range[1];
    const kLow = 2 * k * aLow * supply;
    const kHigh = 2 * k * (1 + lambda * supply) * aHigh * supply;
    const most = 1 + centring;
    const least = 1 - centring;
    const slopeLow = 1 / (1 + aHigh / load) + this.#feedback[0];
    const slopeHigh = 1 / (1 + aLow / load) + this.#feedback[1];
    const nearLow = (slopeLow * least) / most;
    const nearHigh = (slopeHigh * least) / most;
    const farLow = (slopeLow * most) / least;
    const farHigh = (slopeHigh * most) / least;
    const centred = this.#centred;
    const short = 1 + low + nearLow;
    const shortW = supply - (2 * supply) / (1 + Math.sqrt(1 + kHigh * short * most));
    const longW = supply - (2 * supply) / (1 + Math.sqrt(1 + kHigh * (1 + high + nearHigh) * most));
    centred[0] = vt + Math.sqrt(shortW / short / (k * aLow));
    centred[1] = gateA === 0 ? longW : longW / (1 + nearLow);
    centred[2] = 1 / (1 + nearLow);
    const long = 1 + high + farHigh;
    const leastW = supply - (2 * supply) / (1 + Math.sqrt(1 + kLow * (1 + low + farLow) * least));
    const leastJ = (supply - (2 * supply) / (1 + Math.sqrt(1 + kLow * long * least))) / long;
    const leastX = vt + Math.sqrt(leastJ / (k * (1 + lambda * supply) * aHigh));
    centred[3] = leastX + (leastW * (gateA + low)) / (1 + low + farHigh);
    centred[4] = leastX + (leastW * (gateA + high)) / (1 + high + farHigh);
  }

  /** VT + x and W of the highest gate voltage with which a build keeps a level of ohmic room; false for none. */
  #leaves(part: PartSpread, end: LineEnd, aLow: number, aHigh: number, level: number): boolean {
    const { supply, scale } = end;
    const hottest = part.temperatures - 1;
    const k = part.kMaxAt[hottest];
    const share = level * (1 + (aLow * scale[0]) / this.#lines.load);
    const ka = 4 * k * (1 + part.lambda * supply) * aHigh * scale[0];
    const reach = supply - level - share * this.#feedback[0] * this.#toOhmic;
    const tauLow = 1 + this.#toOhmic * this.range[0];
    const tauHigh = 1 + this.#toOhmic * this.range[1];
    const driveLow = reach + share * tauLow;
    const driveHigh = reach + share * tauHigh;
    const leastV = (2 * driveHigh) / (1 + Math.sqrt(1 + ka * tauHigh * driveHigh));
    const mostJ = (reach - (2 * driveLow) / (1 + Math.sqrt(1 + ka * tauLow * driveLow))) / tauLow;
    this.#left[0] = part.vtMinAt[hottest] + Math.sqrt(Math.max(0, mostJ) / (k * aLow * scale[0]));
    this.#left[1] = reach - leastV;
    return mostJ > 0;
  }

  /**
   * Where x + W η y/(1 + η y) is at least a straight line from `atLow` to `atHigh` over the range: left in the range's
   * third and fourth place, the third above the fourth where nowhere.
   */
  #cross(x: number, w: number, eta: number, atLow: number, atHigh: number): void {
    const { range } = this;
    const low = range[0];
    const width = range[1] - low;
    range[2] = Number.NEGATIVE_INFINITY;
    range[3] = Number.POSITIVE_INFINITY;
    if (this.#lines.gateA === 1 || width <= 0) {
      const left = x + (this.#lines.gateA === 1 ? w : (w * eta * low) / (1 + eta * low));
      if (left < Math.min(atLow, atHigh) * (1 - SLACK)) range[2] = Number.POSITIVE_INFINITY;
      return;
    }
    // With z = 1 + η y: m z² - p z + W <= 0.
    const slope = (atHigh - atLow) / width;
    const m = slope / eta;
    const p = x + w - atLow + m + slope * low;
    const discriminant = p * p - 4 * m * w;
    if (discriminant < 0 || (m >= 0 && p <= 0)) {
      range[2] = Number.POSITIVE_INFINITY;
      return;
    }
    const root = Math.sqrt(discriminant);
    range[2] = ((2 * w) / (p + root) - 1) / eta - SLACK * range[1];
    if (m > 0) range[3] = ((p + root) / (2 * m) - 1) / eta + SLACK * range[1];
  }
}
