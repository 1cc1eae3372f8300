import type { Line, LineCircuit } from "#shared/bias/circuits/line";
import type { Problem } from "../problem";
import { impossibleIn } from "./bounds";
import { type Condition, type Device, hasPointConditions } from "./conditions";
import type { PartSpread } from "./part-spread";
import { emptyLine, type LineEnd, type SpreadEnds } from "./spread-ends";

/** What the list so far asks of whatever is still to enter it. */
export type Demand = {
  /** Greatest centring error, a fraction; 1 for any. */
  centring: number;
  /** Least assured swing, V; 0 for any. */
  level: number;
  /** Greatest supply current, A. */
  supply: number;
};

/** Lines from one value of each resistor to another, as indices into the lists of values. */
export type Box = readonly [number, number, number, number, number, number];

/** Room for rounding in a bound. */
const SLACK = 1e-9;

/**
 * Says of a whole box of lines whether one of them might hold what is asked for; never wrong about "can't". Every
 * figure of a line rises with each of its resistors, so the box's first and last line bound them, and from these come
 * the drain currents and gate voltages that its lines allow: the current that leaves a room or has a centring error
 * falls with RT and rS and rises with rL, and ID RS rises with RS. With λ > 0, K (1 + λ V) in place of K bounds a
 * current from above and K from below, so each bound is one square root.
 */
export class Boxes {
  readonly #problem: Problem;
  readonly #circuit: LineCircuit;
  readonly #values: readonly (readonly number[])[];
  readonly #supply: number;
  readonly #gateSupply: number;
  readonly #load: number;
  /** The least current that any divider draws, A. */
  readonly leastDivider: number;
  readonly #leastInput: number;
  readonly #cutoff: LineEnd;
  readonly #ohmic: LineEnd[];
  readonly #ratioSpread: number;
  readonly #pointwise: boolean;
  readonly #low: Line = emptyLine();
  readonly #high: Line = emptyLine();
  readonly #endLow: Line = emptyLine();
  readonly #endHigh: Line = emptyLine();
  /** Why the last box was left out; null where only the list so far is to blame. */
  failed: Condition | null = null;

  constructor(
    problem: Problem,
    circuit: LineCircuit,
    values: readonly (readonly number[])[],
    ends: SpreadEnds,
    gate: { leastDivider: number; leastInput: number },
  ) {
    const { resistorTolerance } = problem;
    this.#problem = problem;
    this.#circuit = circuit;
    this.#values = values;
    this.#supply = problem.vdd + problem.vss;
    this.#gateSupply = problem.vss > 0 ? problem.vss : problem.vdd;
    this.#load = problem.load ?? Number.POSITIVE_INFINITY;
    this.leastDivider = gate.leastDivider;
    this.#leastInput = gate.leastInput;
    this.#cutoff = ends.cutoff[0];
    this.#ohmic = likeliest(ends.ohmic);
    this.#ratioSpread = circuit.gate.length === 2 ? (1 + resistorTolerance) / (1 - resistorTolerance) : 1;
    this.#pointwise = hasPointConditions(problem);
  }

  #fill(into: Line, end: LineEnd | null, [a, b, c]: readonly [number, number, number]): void {
    const values = this.#values;
    const scale = end ? end.scale : NOMINAL;
    this.#circuit.fill(
      into,
      this.#load,
      this.#problem.bypassed,
      values[0][a] * scale[0],
      values[1][b] * scale[1],
      values[2][c] * scale[2],
    );
  }

  /** Whether some line of a box might hold what the brief and the list so far ask for. */
  mightHold(device: Device, part: PartSpread, box: Box, demand: Demand): boolean {
    const problem = this.#problem;
    const values = this.#values;
    const [a0, a1, b0, b1, c0, c1] = box;
    const low = this.#low;
    const high = this.#high;
    this.#fill(low, null, [a0, b0, c0]);
    this.#fill(high, null, [a1, b1, c1]);
    this.failed = null;
    const { k, lambda } = device;
    const supply = this.#supply;
    const kUpper = k * (1 + lambda * supply);

    let most = mostForRoom(supply, kUpper, low, high, problem.swingPeak);
    let least = problem.swingPeak / high.output;
    if (least > most * (1 + SLACK)) return this.#fail("swing");
    most = Math.min(most, problem.supplyCurrentMax - this.leastDivider);
    if (least > most) return this.#fail("supply-current");
    least = Math.max(least, problem.sourceDropMin / high.gateSlope || 0);
    if (least > most * (1 + SLACK)) return this.#fail("source-drop");
    const greatest = Math.max(values[0][a0], values[1][b0], values[2][c0]);
    most = Math.min(most, Math.sqrt(problem.resistorPower / greatest));
    if (least > most * (1 + SLACK)) return this.#fail("resistor-rating");

    most = Math.min(most, demand.supply - this.leastDivider);
    if (demand.centring < 1) {
      const c = demand.centring;
      least = Math.max(least, centringCurrent(supply, k, high.total, high.slope, -c));
      most = Math.min(most, centringCurrent(supply, kUpper, low.total, low.slope, c));
    }
    if (least > most * (1 + SLACK)) return false;

    // The divider ratio R1/R2 that the currents allow, from the least to the greatest gate voltage.
    const steps = high.gateSlope - low.gateSlope;
    let dropHigh = most * high.gateSlope;
    let dropLow = least * low.gateSlope;
    if (steps > 0 && demand.centring < 1) {
      const c = demand.centring;
      dropHigh = Math.min(
        dropHigh,
        centringCurrent(supply, kUpper, low.total + steps, low.slope, c) * high.gateSlope,
      );
      dropLow = Math.max(
        dropLow,
        centringCurrent(supply, k, high.total - steps, high.slope, -c) * low.gateSlope,
      );
    }
    const gateHigh = device.vt + Math.sqrt(most / k) + dropHigh;
    const gateLow = device.vt + Math.sqrt(least / kUpper) + dropLow;
    const ratioLow = gateHigh > 0 ? this.#gateSupply / gateHigh - 1 : 0;
    let ratioHigh = gateLow > 0 ? this.#gateSupply / gateLow - 1 : Number.POSITIVE_INFINITY;
    if (ratioHigh < 0) return this.#fail("resistor-values");
    if (demand.level > 0) {
      ratioHigh = Math.min(ratioHigh, this.#mostRatio(part, box, demand.level));
      if (ratioHigh * (1 + SLACK) < Math.max(0, ratioLow)) return false;
      for (const end of this.#ohmic) {
        if (ratioHigh * (1 + SLACK) < this.#leastRatio(part, end, box, demand.level)) return false;
      }
    }
    if (this.#pointwise && low.output === high.output) {
      const impossible = impossibleIn(
        problem,
        device,
        { first: asResistances(low), last: asResistances(high) },
        { low: least * (1 - SLACK), high: most * (1 + SLACK) },
        this.#leastInput,
      );
      if (impossible) return this.#fail(impossible);
    }
    return true;
  }

  #fail(condition: Condition): false {
    this.failed = condition;
    return false;
  }

  /** The greatest R1/R2 that lets the worst build toward cutoff reach a level on some line of a box. */
  #mostRatio(part: PartSpread, [a0, a1, b0, b1, c0, c1]: Box, level: number): number {
    const end = this.#cutoff;
    this.#fill(this.#endLow, end, [a0, b0, c0]);
    this.#fill(this.#endHigh, end, [a1, b1, c1]);
    const current = level / this.#endHigh.output;
    const x = Math.sqrt(current / (part.kMinAt[0] * (1 + part.lambda * end.supply)));
    const gate = part.vtMaxAt[0] + x + current * this.#endLow.gateSlope;
    return gate > 0 ? (end.gateSupply / gate - 1) / this.#ratioSpread : Number.POSITIVE_INFINITY;
  }

  /** The least R1/R2 with which one build keeps a level of room toward the ohmic region on some line of a box. */
  #leastRatio(part: PartSpread, end: LineEnd, [a0, a1, b0, b1, c0, c1]: Box, level: number): number {
    const low = this.#endLow;
    const high = this.#endHigh;
    this.#fill(low, end, [a0, b0, c0]);
    this.#fill(high, end, [a1, b1, c1]);
    const hottest = part.temperatures - 1;
    const k = part.kMaxAt[hottest];
    const kUpper = k * (1 + part.lambda * end.supply);
    const current = mostForRoom(end.supply, kUpper, low, high, level);
    if (current <= 0) return Number.POSITIVE_INFINITY;
    const steps = high.gateSlope - low.gateSlope;
    let drop = current * high.gateSlope;
    if (steps > 0) {
      const mixed = this.#mixed;
      mixed.total = low.total + steps;
      mixed.output = low.output;
      mixed.slope = low.slope;
      drop = Math.min(drop, mostForRoom(end.supply, kUpper, mixed, high, level) * high.gateSlope);
    }
    const gate = part.vtMinAt[hottest] + Math.sqrt(current / k) + drop;
    return gate > 0 ? (end.gateSupply / gate - 1) * this.#ratioSpread : Number.POSITIVE_INFINITY;
  }

  readonly #mixed: Line = emptyLine();
}

const NOMINAL = [1, 1, 1] as const;

/** Of the corners toward the ohmic region those that mostly bind, at both ends of the rail: RD high, RS low. */
function likeliest(ends: readonly LineEnd[]): LineEnd[] {
  const lean = ({ scale }: LineEnd) => scale[0] - scale[1] - scale[2];
  const most = Math.max(...ends.map(lean));
  return ends.filter((end) => lean(end) === most);
}

function asResistances({ total, slope, output, degeneration }: Line) {
  return { load: output, degeneration, slope, total };
}

/**
 * An upper bound on the drain current that leaves a room toward the ohmic region: V = v + I RT + D + s (rS - rL)
 * with K v² = I + s, s = D/rL.
 */
function mostForRoom(supply: number, k: number, low: Line, high: Line, room: number): number {
  const share = room / high.output;
  const reach = supply - room - share * (low.slope - low.output);
  if (reach <= 0) return 0;
  const kt = k * low.total;
  const v = (2 * (reach + share * low.total)) / (1 + Math.sqrt(1 + 4 * kt * (reach + share * low.total)));
  return (reach - v) / low.total;
}

/** The drain current at a signed centring error for λ = 0; see `currentAtCentring`. */
function centringCurrent(supply: number, k: number, total: number, slope: number, c: number): number {
  const r = total + (slope * (1 - c)) / (1 + c);
  const v = (2 * supply) / (1 + Math.sqrt(1 + 2 * k * r * (1 + c) * supply));
  return (supply - v) / r;
}
