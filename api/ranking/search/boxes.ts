import type { Problem } from "../problem";
import { impossibleIn } from "./bounds";
import { type Condition, type Device, hasPointConditions } from "./conditions";
import { emptyLine, type Line, type Lines } from "./lines";
import type { PartSpread } from "./part-spread";
import { firstAtMost, type RatioTable } from "./ratio-table";
import type { LineEnd, SpreadEnds } from "./spread-ends";

/** What the list so far asks of whatever is still to enter it. */
export type Demand = {
  /** Greatest centring error, a fraction; 1 for any. */
  centring: number;
  /** Least assured swing, V; 0 for any. */
  level: number;
  /** Greatest supply current, A. */
  supply: number;
};

/** Room for rounding in a bound. */
const SLACK = 1e-9;
/** Below this width of a window of ratios it is worth looking whether the table has one in it. */
const NARROW = 1.2;

/** How often a range is narrowed at most, and to what share of itself for another round to be worth it. */
const MOST_ROUNDS = 4;
const WORTH_A_ROUND = 0.8;

/** What the gate's resistors come to. */
export type Gate = { leastDivider: number; leastInput: number; table: RatioTable; ratioSpread: number };

/**
 * Says of a whole box of lines whether one of them might hold what is asked for; never wrong about "can't".
 *
 * A box is a run of values of the first resistor A, which stands at the output, and a range of the ratio of each other
 * resistor to A. Written with J = ID A, volts, the currents hardly depend on A itself: with RT = τ A, rL = ω A and
 * ID RS = σ J a room toward cutoff s is J = s/ω, the current that leaves a room s toward the ohmic region solves
 * V = v + J τ + s rS/rL with K A v² = J + s/ω, and only the voltages v and the overdrive √(J/(K A)) and ω = 1/(1 + A/RL)
 * know A. So a box may be long in A and still be bounded well. J falls as τ rises and rises with K A; J σ rises with σ.
 * With λ > 0, K (1 + λ V) in place of K bounds a current from above and K from below. Each bound is one square root.
 *
 * This is where a search spends its time: numbers stay in local variables and typed arrays, so that none is put on
 * the heap.
 */
export class Boxes {
  readonly #problem: Problem;
  readonly #lines: Lines;
  readonly #a: Float64Array;
  readonly #supply: number;
  readonly #gateSupply: number;
  readonly #gate: Gate;
  readonly #cutoff: LineEnd;
  readonly #ohmicLow: LineEnd;
  readonly #ohmicHigh: LineEnd;
  /** Whether the brief has conditions that leave out lines by themselves. */
  readonly hasConditions: boolean;
  readonly #hasRanges: boolean;
  readonly #pointwise: boolean;
  readonly #first: Line = emptyLine();
  readonly #last: Line = emptyLine();
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
  /** The divider ratios R1/R2 that are left of a box, from low to high. */
  readonly #ratio = new Float64Array(2);
  /** Why the last box was left out; null where only the list so far is to blame. */
  failed: Condition | null = null;

  constructor(problem: Problem, lines: Lines, first: readonly number[], ends: SpreadEnds, gate: Gate) {
    this.#problem = problem;
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
    this.#pointwise = hasPointConditions(problem);
    this.#hasRanges =
      problem.swingPeak > 0 ||
      problem.sourceDropMin > 0 ||
      problem.supplyCurrentMax < Number.POSITIVE_INFINITY;
    this.hasConditions = this.#hasRanges || this.#pointwise;
  }

  /**
   * Whether some line might hold what the brief and the list so far ask for.
   *
   * @param from first value of A, as an index
   * @param to last value of A
   * @param bLow least ratio of the second resistor to A, `bHigh` the greatest; likewise the third
   */
  mightHold(
    device: Device,
    part: PartSpread,
    from: number,
    to: number,
    bLow: number,
    bHigh: number,
    cLow: number,
    cHigh: number,
    demand: Demand,
  ): boolean {
    this.failed = null;
    this.#ratio[0] = 0;
    this.#ratio[1] = Number.POSITIVE_INFINITY;
    const aLow = this.#a[from];
    const aHigh = this.#a[to];
    const { level } = demand;
    if (level > 0) {
      if (!this.#canReachCutoffLevel(part, aLow, aHigh, bLow, cLow, level)) return false;
      if (!this.#canKeepOhmicLevel(part, this.#ohmicLow, aLow, aHigh, bLow, bHigh, cLow, cHigh, level)) {
        return false;
      }
      if (!this.#canKeepOhmicLevel(part, this.#ohmicHigh, aLow, aHigh, bLow, bHigh, cLow, cHigh, level)) {
        return false;
      }
    }
    if (!this.#currentsAllow(device, aLow, aHigh, bLow, bHigh, cLow, cHigh, demand)) return false;
    return level === 0 || this.#hasRatio();
  }

  #hasRatio(): boolean {
    const low = this.#ratio[0];
    const high = this.#ratio[1];
    if (high > NARROW * low) return true;
    const { ratios } = this.#gate.table;
    const at = firstAtMost(ratios, high * (1 + SLACK));
    return at < ratios.length && ratios[at] >= low * (1 - SLACK);
  }

  #fail(condition: Condition): false {
    this.failed = condition;
    return false;
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

  /** Narrows the ratios to those that let the worst build toward cutoff reach a level on some line. */
  #canReachCutoffLevel(
    part: PartSpread,
    aLow: number,
    aHigh: number,
    bLow: number,
    cLow: number,
    level: number,
  ): boolean {
    const { supply, gateSupply, scale } = this.#cutoff;
    const lines = this.#lines;
    const sigma = lines.gateA + (lines.gateB * bLow * scale[1] + lines.gateC * cLow * scale[2]) / scale[0];
    const j = level * (1 + (aLow * scale[0]) / lines.load);
    const x = Math.sqrt(j / (part.kMinAt[0] * (1 + part.lambda * supply) * aHigh * scale[0]));
    const gate = part.vtMaxAt[0] + x + j * sigma;
    if (gate > 0) this.#ratio[1] = (gateSupply / gate - 1) / this.#gate.ratioSpread;
    return gate <= gateSupply;
  }

  /** Narrows the ratios to those with which one likely bad build keeps a level of ohmic room on some line. */
  #canKeepOhmicLevel(
    part: PartSpread,
    { supply, gateSupply, scale }: LineEnd,
    aLow: number,
    aHigh: number,
    bLow: number,
    bHigh: number,
    cLow: number,
    cHigh: number,
    level: number,
  ): boolean {
    const lines = this.#lines;
    const toB = scale[1] / scale[0];
    const toC = scale[2] / scale[0];
    const sigmaHigh = lines.gateA + lines.gateB * bHigh * toB + lines.gateC * cHigh * toC;
    const steps = sigmaHigh - (lines.gateA + lines.gateB * bLow * toB + lines.gateC * cLow * toC);
    const tau = 1 + lines.totalB * bLow * toB + lines.totalC * cLow * toC;
    const hottest = part.temperatures - 1;
    const k = part.kMaxAt[hottest];
    const ka = k * (1 + part.lambda * supply) * aHigh * scale[0];
    const share = level * (1 + (aLow * scale[0]) / lines.load);
    const excess = lines.fromSource
      ? 0
      : share * (lines.degenerationB * bLow * toB + lines.degenerationC * cLow * toC);
    const reach = supply - level - excess;
    if (reach <= 0) return false;
    const drive = reach + share * tau;
    const j = (reach - (2 * drive) / (1 + Math.sqrt(1 + 4 * ka * tau * drive))) / tau;
    if (j <= 0) return false;
    let drop = j * sigmaHigh;
    if (steps > 0) {
      const longer = tau + steps;
      const further = reach + share * longer;
      drop = ((reach - (2 * further) / (1 + Math.sqrt(1 + 4 * ka * longer * further))) / longer) * sigmaHigh;
    }
    const gate = part.vtMinAt[hottest] + Math.sqrt(j / (k * aLow * scale[0])) + drop;
    if (gate <= 0) return false;
    const least = (gateSupply / gate - 1) * this.#gate.ratioSpread;
    if (least > this.#ratio[0]) this.#ratio[0] = least;
    return least <= this.#ratio[1] * (1 + SLACK);
  }

  /** Narrows the ratios by the typical device's drain currents: those that the brief and the centring allow. */
  #currentsAllow(
    device: Device,
    aLow: number,
    aHigh: number,
    bLow: number,
    bHigh: number,
    cLow: number,
    cHigh: number,
    demand: Demand,
  ): boolean {
    const lines = this.#lines;
    const problem = this.#problem;
    const tauLow = 1 + lines.totalB * bLow + lines.totalC * cLow;
    const tauHigh = 1 + lines.totalB * bHigh + lines.totalC * cHigh;
    const sigmaLow = lines.gateA + lines.gateB * bLow + lines.gateC * cLow;
    const sigmaHigh = lines.gateA + lines.gateB * bHigh + lines.gateC * cHigh;
    const excessLow = lines.fromSource ? 0 : lines.degenerationB * bLow + lines.degenerationC * cLow;
    const excessHigh = lines.fromSource ? 0 : lines.degenerationB * bHigh + lines.degenerationC * cHigh;
    const supply = this.#supply;
    const kLow = device.k * aLow;
    const kHigh = device.k * (1 + device.lambda * supply) * aHigh;

    let least = 0;
    let most = Math.sqrt((problem.resistorPower * aHigh) / Math.max(1, bLow, cLow));
    if (this.#hasRanges) {
      const share = problem.swingPeak * (1 + aLow / lines.load);
      const reach = supply - problem.swingPeak - share * excessLow;
      const drive = reach + share * tauLow;
      const v = (2 * drive) / (1 + Math.sqrt(1 + 4 * kHigh * tauLow * drive));
      const roomy = reach > 0 ? (reach - v) / tauLow : 0;
      least = share;
      if (least > roomy * (1 + SLACK)) return this.#fail("swing");
      const supplied = Math.min(roomy, (problem.supplyCurrentMax - this.#gate.leastDivider) * aHigh);
      if (least > supplied * (1 + SLACK)) return this.#fail("supply-current");
      if (problem.sourceDropMin > 0) least = Math.max(least, problem.sourceDropMin / sigmaHigh);
      if (least > supplied * (1 + SLACK)) return this.#fail("source-drop");
      most = Math.min(most, supplied);
      if (least > most * (1 + SLACK)) return this.#fail("resistor-rating");
    }
    if (demand.supply < Number.POSITIVE_INFINITY) {
      most = Math.min(most, (demand.supply - this.#gate.leastDivider) * aHigh);
    }
    let dropHigh = most * sigmaHigh;
    let dropLow = least * sigmaLow;
    if (demand.centring < 1) {
      const c = demand.centring;
      const slopeLow = 1 / (1 + aHigh / lines.load) + excessLow;
      const slopeHigh = 1 / (1 + aLow / lines.load) + excessHigh;
      most = Math.min(most, centringCurrent(supply, kHigh, tauLow, slopeLow, c));
      least = Math.max(least, centringCurrent(supply, kLow, tauHigh, slopeHigh, -c));
      dropHigh = Math.min(dropHigh, most * sigmaHigh);
      dropLow = Math.max(dropLow, least * sigmaLow);
      const steps = sigmaHigh - sigmaLow;
      if (steps > 0) {
        dropHigh = Math.min(
          dropHigh,
          centringCurrent(supply, kHigh, tauLow + steps, slopeLow, c) * sigmaHigh,
        );
        dropLow = Math.max(dropLow, centringCurrent(supply, kLow, tauHigh - steps, slopeHigh, -c) * sigmaLow);
      }
    }
    if (least > most * (1 + SLACK)) return false;
    const greatest = device.vt + Math.sqrt(most / kLow) + dropHigh;
    const smallest = device.vt + Math.sqrt(least / kHigh) + dropLow;
    if (smallest > this.#gateSupply) return this.#fail("resistor-values");
    if (greatest > 0) this.#ratio[0] = Math.max(this.#ratio[0], this.#gateSupply / greatest - 1);
    if (smallest > 0) this.#ratio[1] = Math.min(this.#ratio[1], this.#gateSupply / smallest - 1);
    if (this.#ratio[0] > this.#ratio[1] * (1 + SLACK)) return false;
    if (this.#pointwise && aLow === aHigh) {
      const impossible = impossibleIn(
        problem,
        device,
        {
          first: asResistances(lines.fill(this.#first, aLow, bLow * aLow, cLow * aLow)),
          last: asResistances(lines.fill(this.#last, aLow, bHigh * aLow, cHigh * aLow)),
        },
        { low: (least / aLow) * (1 - SLACK), high: (most / aLow) * (1 + SLACK) },
        this.#gate.leastInput,
      );
      if (impossible) return this.#fail(impossible);
    }
    return true;
  }
}

/** Of the corners toward the ohmic region those that mostly bind, at both ends of the rail: RD high, RS low. */
function likeliest(ends: readonly LineEnd[]): LineEnd[] {
  const lean = ({ scale }: LineEnd) => scale[0] - scale[1] - scale[2];
  const most = Math.max(...ends.map(lean));
  return ends.filter((end) => lean(end) === most);
}

function asResistances({ total, slope, output, degeneration }: Line) {
  return { load: output, degeneration, slope, total };
}

/** J = ID A at a signed centring error, for λ = 0 and all resistances as multiples of A; see `currentAtCentring`. */
function centringCurrent(supply: number, ka: number, total: number, slope: number, c: number): number {
  const r = total + (slope * (1 - c)) / (1 + c);
  return (supply - (2 * supply) / (1 + Math.sqrt(1 + 2 * ka * r * (1 + c) * supply))) / r;
}
