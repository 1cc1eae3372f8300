import type { Problem } from "../problem";
import { impossibleIn } from "./bounds";
import { type Condition, type Device, hasPointConditions } from "./conditions";
import { emptyLine, type Line, type Lines } from "./lines";
import type { PartSpread } from "./part-spread";
import { firstAtMost, type RatioTable } from "./ratio-table";
import { type LineEnd, likeliest, type SpreadEnds } from "./spread-ends";

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

function asResistances({ total, slope, output, degeneration }: Line) {
  return { load: output, degeneration, slope, total };
}

/** J = ID A at a signed centring error, for λ = 0 and all resistances as multiples of A; see `currentAtCentring`. */
function centringCurrent(supply: number, ka: number, total: number, slope: number, c: number): number {
  const r = total + (slope * (1 - c)) / (1 + c);
  return (supply - (2 * supply) / (1 + Math.sqrt(1 + 2 * ka * r * (1 + c) * supply))) / r;
}
