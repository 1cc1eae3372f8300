import type { LineCircuit } from "#shared/bias/circuits/line";
import { LINE_CIRCUITS, type LineCircuitName } from "#shared/bias/circuits/lines";
import { saturationCurrent, saturationOverdrive } from "#shared/bias/saturation";
import { transitionVoltage } from "#shared/bias/swing";
import type { Catalog } from "../catalog";
import type { Problem } from "../problem";
import { AssuredSwing } from "./assured";
import { impossibleIn } from "./bounds";
import { Boxes, type Demand } from "./boxes";
import {
  CONDITIONS,
  type Condition,
  type Device,
  failedCondition,
  hasPointConditions,
  type Point,
  reachesCorner,
  readDevice,
  type SearchLine,
} from "./conditions";
import { Contraction } from "./contraction";
import { emptyLine, Lines, type Triple } from "./lines";
import { assuredToBeat, type Best, bucketOf, nanovolts, PartBest, rankOf } from "./order";
import { greatestAssuredSwing } from "./part-bound";
import { type PartSpread, partSpread } from "./part-spread";
import { Prices } from "./prices";
import { filterRatioTable, firstAtMost, firstBelow, leastResistance, type RatioTable } from "./ratio-table";
import { spreadEnds } from "./spread-ends";
import {
  currentAtCentring,
  currentForOhmicRoom,
  overdriveAt,
  type Span,
  spansWithinDissipation,
} from "./windows";

/** Windows are widened by this share, so that rounding never hides a ratio; each is then tested exactly. */
const SLACK = 1e-9;
/** How often a span is halved to cut away what can't meet a condition: 32 slices. */
const HALVINGS = 5;
/** How much sooner a box is cut in the first resistor where its ratios are narrowed without cutting. */
const CONTRACTED = 1000;
/** Ratios closer than this are told apart by the first resistor. */
const FINE = 1.03;
/** The least assured swing that shows in the order: half a nanovolt. */
const LEAST_LEVEL = 0.5e-9;

const NO_DEVICE: Device = { row: 0, vt: 0, k: 1, lambda: 0, power: 0, cgs: 0, cgd: 0, cds: 0 };
const NO_SPREAD: PartSpread = {
  lambda: 0,
  tcVt: 0,
  cold: 0,
  hot: 0,
  vtMax25: 0,
  kMin25: 1,
  vtMaxAt: [0, 0],
  kMinAt: [1, 1],
  vtMinAt: [0, 0],
  kMaxAt: [1, 1],
  temperatures: 1,
};

/**
 * The exact search of one brief over circuits whose gate voltage comes from the gate's resistors alone. The lines of a
 * part (its RD, RS and so on) are a box that is halved again and again; `Boxes` leaves out what can't hold anything
 * asked for. On a single line the room toward cutoff rises and the room toward the ohmic region falls with the gate
 * voltage, nominally and for the worst builds, so what is asked for is a window in the sorted list of divider ratios.
 * Nothing is sampled.
 */
export class LineSearch {
  readonly #problem: Problem;
  readonly #lines: Lines;
  /** Every ratio the values allow, to tell a missing value from a pair that is barred. */
  readonly #every: RatioTable;
  readonly #table: RatioTable;
  readonly #leastInput: number;
  readonly #supply: number;
  readonly #gateSupply: number;
  readonly #values: readonly (readonly number[])[];
  /** The least current that any divider draws, A. */
  readonly #leastDivider: number;
  readonly #boxes: Boxes;
  readonly #contraction: Contraction;
  readonly #assured: AssuredSwing;
  readonly #prices: Prices;
  readonly #pointwise: boolean;
  readonly #shouldStop: () => boolean;
  readonly #filled = emptyLine();
  #stopped = false;
  #device: Device = NO_DEVICE;
  #spread: PartSpread = NO_SPREAD;
  #triple: Triple = [0, 0, 0];
  readonly #line: SearchLine = { load: 0, degeneration: 0, slope: 0, total: 0, gateSlope: 0, greatest: 0 };
  /** How far the part's combinations came: the furthest condition that one failed. */
  #furthest = 0;
  /** What the list asks of the next, as of the last look at it. */
  readonly #demand: Demand = { centring: 1, level: 0, supply: Number.POSITIVE_INFINITY };
  /** The supply current to beat where the list has nothing assured to beat; null where it has. */
  #tie: number | null = null;
  /** No line of the part has more assured swing than this, V. */
  #greatestSwing = 0;
  /** Whether the part can't come before the bar, so that only whether it fits is of interest. */
  #isOut = false;
  /** Whether only what is dead centre and assured is looked for as long as nothing is found. */
  #floor = false;
  /** Where the last slice of the present line ended: widened slices may touch, and no ratio is to be met twice. */
  #walkedTo = 0;
  /** The line where the last part had its best fit, as indices: the next is likely to have it near. */
  #hint: Triple | null = null;
  #hinted: Triple | null = null;

  /**
   * @param problem the brief in numbers
   * @param every the ratio table of the values at the gate
   * @param shouldStop asked often: whether to give up, as nobody waits any more or the time is over
   */
  constructor(problem: Problem, every: RatioTable, shouldStop: () => boolean = () => false) {
    const name = problem.circuit as LineCircuitName;
    const { vdd, vss, inputResistanceMin, resistorPower, values } = problem;
    this.#problem = problem;
    const circuit: LineCircuit = LINE_CIRCUITS[name];
    this.#lines = new Lines(problem, circuit);
    this.#shouldStop = shouldStop;
    this.#every = every;
    this.#supply = vdd + vss;
    this.#gateSupply = vss > 0 ? vss : vdd;
    const divides = circuit.gate.length === 2;
    this.#table = filterRatioTable(every, (r1, r2) => {
      if (!divides) return r2 >= inputResistanceMin;
      const vg = vdd / (1 + r1 / r2);
      return (
        (r1 * r2) / (r1 + r2) >= inputResistanceMin &&
        (vdd - vg) ** 2 / r1 <= resistorPower &&
        vg ** 2 / r2 <= resistorPower
      );
    });
    this.#leastInput = leastResistance(this.#table);
    this.#values = [0, 1, 2].map((axis) => {
      const key = circuit.axes[axis];
      return key ? values[key] : [0];
    });
    const { resistorTolerance } = problem;
    const ratioSpread = divides ? (1 + resistorTolerance) / (1 - resistorTolerance) : 1;
    const ends = spreadEnds(problem, name, circuit);
    const [greatest] = values.r1.slice(-1);
    this.#leastDivider = divides ? vdd / (2 * greatest) : 0;
    const gateFigures = {
      leastDivider: this.#leastDivider,
      leastInput: this.#leastInput,
      table: this.#table,
      ratioSpread,
    };
    this.#boxes = new Boxes(problem, this.#lines, this.#values[0], ends, gateFigures);
    this.#contraction = new Contraction(problem, this.#lines, this.#values[0], ends, gateFigures);
    this.#assured = new AssuredSwing(this.#lines, ends, ratioSpread);
    this.#prices = new Prices(problem, circuit);
    this.#pointwise = hasPointConditions(problem);
  }

  /**
   * Adds a part's combinations to the list of the best, as far as they can enter it.
   *
   * @param row the part's row in the catalog
   * @returns why the part has no fit: the furthest condition that any of its combinations failed, only meaningful when
   * nothing was added; null when the search was stopped and the part is not done
   */
  part(catalog: Catalog, row: number, best: Best): Condition | null {
    const { deratingVds } = this.#problem;
    if (this.#supply > deratingVds * catalog.vdss[row]) return "rail-rating";
    this.#furthest = 0;
    this.#device = readDevice(catalog, row, this.#problem);
    this.#spread = partSpread(catalog, row, this.#problem);
    const [a, b, c] = this.#values;
    if (a.length * b.length * c.length === 0 || this.#every.ratios.length === 0) return "resistor-values";
    if (!this.#prices.startPart(catalog.cents[row])) return "no-price";
    this.#greatestSwing = greatestAssuredSwing(this.#problem, this.#spread);
    // Where there is nothing to beat yet, a part is first looked through for something dead centre and assured, as its
    // best mostly is.
    const { objective } = this.#problem;
    const bar = best instanceof PartBest ? best.bar : null;
    this.#floor = best instanceof PartBest && bar === null && objective !== "cost";
    this.#isOut = bar !== null && assuredToBeat(objective, bar) * 1e-9 > this.#greatestSwing + LEAST_LEVEL;
    if (this.#floor) this.#searchAll(best);
    if (!this.#floor || best.threshold === null) {
      this.#floor = false;
      this.#searchAll(best);
    }
    return this.#stopped ? null : CONDITIONS[this.#furthest];
  }

  #searchAll(best: Best): void {
    const [a, b, c] = this.#values;
    this.#hinted = this.#hint;
    if (this.#hinted) this.#searchLine(...this.#hinted, best);
    const last = a.length - 1;
    const over = 1 + SLACK;
    // Where a resistor isn't there, its ratio is 0 and the range has to hold that.
    const bHigh = b[0] > 0 ? (b[b.length - 1] / a[0]) * over : 1;
    const cHigh = c[0] > 0 ? (c[c.length - 1] / a[0]) * over : 1;
    this.#searchBox(0, last, b[0] / a[last], bHigh, c[0] / a[last], cHigh, best);
  }

  /** Whether all there is to know of the part is known: that it fits, where it can't come before the bar. */
  #isDone(best: Best): boolean {
    return this.#isOut && best.threshold !== null;
  }

  #fail(condition: Condition): void {
    this.#furthest = Math.max(this.#furthest, CONDITIONS.indexOf(condition));
  }

  /** Reads from the list what the next candidate has to have. */
  #lookAt(best: Best): Demand {
    const { objective, swingPeak } = this.#problem;
    const demand = this.#demand;
    const threshold = best.threshold;
    demand.centring = 1;
    demand.level = objective === "cost" ? swingPeak : 0;
    demand.supply = Number.POSITIVE_INFINITY;
    this.#tie = null;
    if (!threshold && this.#floor) {
      demand.centring = objective === "centred" ? 0.01 : 1;
      demand.level = Math.max(demand.level, LEAST_LEVEL);
    }
    if (!threshold) return demand;
    const { major, supply } = threshold;
    if (objective === "cost") {
      if (this.#prices.least > major) demand.supply = 0;
      else if (this.#prices.least === major) demand.supply = supply;
      return demand;
    }
    if (objective === "centred" && major < 99) demand.centring = (major + 1) / 100;
    const reached = assuredToBeat(objective, threshold);
    if (reached > 0) demand.level = (reached - 1) * 1e-9;
    // Where nothing is assured, the smaller supply current comes first.
    if (reached === 0) this.#tie = supply;
    return demand;
  }

  #mightHold(
    from: number,
    to: number,
    bLow: number,
    bHigh: number,
    cLow: number,
    cHigh: number,
    best: Best,
  ): boolean {
    const demand = this.#lookAt(best);
    const boxes = this.#boxes;
    if (this.#tie !== null) {
      demand.level = LEAST_LEVEL;
      if (boxes.mightHold(this.#device, this.#spread, from, to, bLow, bHigh, cLow, cHigh, demand))
        return true;
      demand.level = 0;
      demand.supply = this.#tie;
    }
    if (boxes.mightHold(this.#device, this.#spread, from, to, bLow, bHigh, cLow, cHigh, demand)) return true;
    if (boxes.failed) this.#fail(boxes.failed);
    return false;
  }

  /**
   * All lines whose first resistor lies in a run of values and whose others have ratios to it in given ranges, the
   * upper ends left out; halved until it can be left out or holds a single line.
   */
  #searchBox(
    from: number,
    to: number,
    bLow: number,
    bHigh: number,
    cLow: number,
    cHigh: number,
    best: Best,
  ): void {
    this.#stopped ||= this.#shouldStop();
    if (this.#stopped || this.#isDone(best)) return;
    const [a, b, c] = this.#values;
    const demand = this.#lookAt(best);
    let [b0, b1, c0, c1] = [bLow, bHigh, cLow, cHigh];
    const contracts = demand.level > 0 && this.#tie === null;
    if (contracts) {
      const { range } = this.#contraction;
      const { gateB, gateC } = this.#lines;
      range[0] = gateB * b0 + gateC * c0;
      range[1] = gateB * b1 + gateC * c1;
      if (!this.#contraction.contract(this.#device, this.#spread, from, to, b0, b1, demand)) return;
      if (gateB === 1) {
        b0 = Math.max(b0, range[0] - gateC * c1);
        b1 = Math.min(b1, range[1] - gateC * c0);
      }
      if (gateC === 1) {
        c0 = Math.max(c0, range[0] - b1);
        c1 = Math.min(c1, range[1] - b0);
      }
    }
    const conditions = this.#boxes.hasConditions || this.#problem.objective === "cost";
    if ((!contracts || conditions) && !this.#mightHold(from, to, b0, b1, c0, c1, best)) return;
    if (from === to) {
      this.#searchRow(from, b0, b1, c0, c1, best);
      return;
    }
    const bWidth = b[0] > 0 ? b1 / b0 : 1;
    const cWidth = c[0] > 0 ? c1 / c0 : 1;
    const width = (contracts ? CONTRACTED : 1) * (a[to] / a[from]);
    if (width > Math.max(bWidth, cWidth) || Math.max(bWidth, cWidth) < FINE) {
      const middle = (from + to) >> 1;
      // First the half where the last best was.
      if (this.#hint && this.#hint[0] <= middle) {
        this.#searchBox(from, middle, b0, b1, c0, c1, best);
        this.#searchBox(middle + 1, to, b0, b1, c0, c1, best);
      } else {
        this.#searchBox(middle + 1, to, b0, b1, c0, c1, best);
        this.#searchBox(from, middle, b0, b1, c0, c1, best);
      }
    } else if (bWidth >= cWidth) {
      const middle = Math.sqrt(b0 * b1);
      this.#searchBox(from, to, b0, middle, c0, c1, best);
      this.#searchBox(from, to, middle, b1, c0, c1, best);
    } else {
      const middle = Math.sqrt(c0 * c1);
      this.#searchBox(from, to, b0, b1, c0, middle, best);
      this.#searchBox(from, to, b0, b1, middle, c1, best);
    }
  }

  /** The lines of one value of the first resistor: halved by ratio while there are several. */
  #searchRow(at: number, bLow: number, bHigh: number, cLow: number, cHigh: number, best: Best): void {
    const [a, b, c] = this.#values;
    const bFrom = firstRatioAtLeast(b, a[at], bLow);
    const bTo = firstRatioAtLeast(b, a[at], bHigh);
    const cFrom = firstRatioAtLeast(c, a[at], cLow);
    const cTo = firstRatioAtLeast(c, a[at], cHigh);
    const bCount = bTo - bFrom;
    const cCount = cTo - cFrom;
    if (bCount <= 0 || cCount <= 0) return;
    if (bCount === 1 && cCount === 1) {
      const hinted = this.#hinted;
      if (hinted && hinted[0] === at && hinted[1] === bFrom && hinted[2] === cFrom) return;
      // A box of one line is tighter than the one it came in.
      const bRatio = b[bFrom] / a[at];
      const cRatio = c[cFrom] / a[at];
      if (this.#mightHold(at, at, bRatio, bRatio, cRatio, cRatio, best)) {
        this.#searchLine(at, bFrom, cFrom, best);
      }
    } else if (bCount >= cCount) {
      const middle = b[(bFrom + bTo) >> 1] / a[at];
      this.#searchBox(at, at, b[bFrom] / a[at], middle, cLow, cHigh, best);
      this.#searchBox(at, at, middle, bHigh, cLow, cHigh, best);
    } else {
      const middle = c[(cFrom + cTo) >> 1] / a[at];
      this.#searchBox(at, at, bLow, bHigh, c[cFrom] / a[at], middle, best);
      this.#searchBox(at, at, bLow, bHigh, middle, cHigh, best);
    }
  }

  /** All gate voltages of one line. */
  #searchLine(a: number, b: number, c: number, best: Best): void {
    const line = this.#line;
    const triple: Triple = [this.#values[0][a], this.#values[1][b], this.#values[2][c]];
    this.#lines.fill(this.#filled, triple[0], triple[1], triple[2]);
    line.load = this.#filled.output;
    line.degeneration = this.#filled.degeneration;
    line.slope = this.#filled.slope;
    line.total = this.#filled.total;
    line.gateSlope = this.#filled.gateSlope;
    line.greatest = Math.max(...triple);
    this.#triple = triple;
    const span = this.#allowedSpan(line);
    if (!span) return;
    const spans = spansWithinDissipation(span, this.#supply, line.total, this.#device.power);
    if (spans.length === 0) this.#fail("power-rating");
    this.#walkedTo = 0;
    const before = best.threshold;
    for (const within of spans) {
      const slices = this.#pointwise ? this.#possibleSlices(line, within, HALVINGS) : [within];
      for (const slice of slices) this.#walk(line, slice, best);
    }
    if (best.threshold !== before) this.#hint = [a, b, c];
  }

  /** The currents that the conditions which are plain ranges allow on a line; null where there are none. */
  #allowedSpan(line: SearchLine): Span | null {
    const problem = this.#problem;
    const { k, lambda } = this.#device;
    let low = problem.swingPeak / line.load;
    let high = currentForOhmicRoom(this.#supply, k, lambda, line, problem.swingPeak);
    if (low > high * (1 + SLACK)) {
      this.#fail("swing");
      return null;
    }
    high = Math.min(high, problem.supplyCurrentMax - this.#leastDivider);
    if (low > high * (1 + SLACK)) {
      this.#fail("supply-current");
      return null;
    }
    low = Math.max(low, problem.sourceDropMin / line.gateSlope || 0);
    if (low > high * (1 + SLACK)) {
      this.#fail("source-drop");
      return null;
    }
    high = Math.min(high, Math.sqrt(problem.resistorPower / line.greatest));
    if (low > high * (1 + SLACK)) {
      this.#fail("resistor-rating");
      return null;
    }
    return { low: low * (1 - SLACK), high: high * (1 + SLACK) };
  }

  #impossible(line: SearchLine, span: Span): Condition | null {
    return impossibleIn(this.#problem, this.#device, { first: line, last: line }, span, this.#leastInput);
  }

  /** Halves a span again and again and keeps the slices in which every condition might be met. */
  #possibleSlices(line: SearchLine, span: Span, halvings: number): Span[] {
    const impossible = this.#impossible(line, span);
    if (impossible) {
      this.#fail(impossible);
      return [];
    }
    if (halvings === 0) return [span];
    const middle = 0.5 * (span.low + span.high);
    const left = this.#possibleSlices(line, { low: span.low, high: middle }, halvings - 1);
    const right = this.#possibleSlices(line, { low: middle, high: span.high }, halvings - 1);
    const last = left[left.length - 1];
    const first = right[0];
    if (last && first && last.high === first.low) {
      first.low = last.low;
      left.pop();
    }
    return left.concat(right);
  }

  /** The gate voltage that a current takes on a line, V. */
  #gateAt({ total, gateSlope }: SearchLine, current: number): number {
    const { vt, k, lambda } = this.#device;
    return (
      vt + (current > 0 ? overdriveAt(this.#supply, k, lambda, total, current) : 0) + current * gateSlope
    );
  }

  /** Walks the ratios of a span of currents. */
  #walk(line: SearchLine, span: Span, best: Best): void {
    const { inputResistanceMin } = this.#problem;
    const low = this.#gateAt(line, span.low) - SLACK * this.#supply;
    const high = this.#gateAt(line, span.high) + SLACK * this.#supply;
    const from = Math.max(this.#walkedTo, this.#firstAtLeast(this.#table, low));
    const to = this.#firstAbove(this.#table, high);
    if (from >= to) {
      const barred = this.#firstAtLeast(this.#every, low) < this.#firstAbove(this.#every, high);
      if (!barred) this.#fail("resistor-values");
      else this.#fail(inputResistanceMin > 0 ? "input-resistance" : "resistor-rating");
      return;
    }
    this.#walkedTo = to;
    const centre = currentAtCentring(this.#supply, this.#device.k, this.#device.lambda, line, 0);
    const likeliest = this.#firstAtLeast(this.#table, this.#gateAt(line, centre));
    // The least cost is mostly shared, and then the smallest current comes first.
    this.#visit(line, from, to, this.#problem.objective === "cost" ? from : likeliest, best);
  }

  /** Index of the first ratio whose gate voltage is not below the given one. */
  #firstAtLeast({ ratios }: RatioTable, vg: number): number {
    return vg <= 0 ? 0 : firstAtMost(ratios, this.#gateSupply / vg - 1);
  }

  /** Index of the first ratio whose gate voltage is above the given one. */
  #firstAbove({ ratios }: RatioTable, vg: number): number {
    return vg <= 0 ? 0 : firstBelow(ratios, this.#gateSupply / vg - 1);
  }

  /**
   * Tries the ratios from one index to another, the likeliest first; what is found narrows the rest on both sides.
   *
   * @param likeliest where to begin
   */
  #visit(line: SearchLine, from: number, to: number, likeliest: number, best: Best): void {
    if (from >= to || this.#isDone(best)) return;
    const [low, high] = this.#narrow(line, from, to, best);
    if (low >= high) return;
    const at = likeliest >= low && likeliest < high ? likeliest : (low + high) >> 1;
    this.#tryRatio(line, at, best);
    this.#visit(line, low, at, (low + at) >> 1, best);
    this.#visit(line, at + 1, high, (at + 1 + high) >> 1, best);
  }

  /** The part of a run of ratios that can still enter the list. */
  #narrow(line: SearchLine, from: number, to: number, best: Best): readonly [number, number] {
    const demand = this.#lookAt(best);
    const { k, lambda } = this.#device;
    const { ratios } = this.#table;
    let low = from;
    let high = to;
    let most = demand.supply - this.#leastDivider;
    if (!(most > 0)) return [low, low];
    if (demand.centring < 1) {
      const c = demand.centring;
      const least = currentAtCentring(this.#supply, k, lambda, line, -c) * (1 - SLACK);
      most = Math.min(most, currentAtCentring(this.#supply, k, lambda, line, c) * (1 + SLACK));
      low = Math.max(low, this.#firstAtLeast(this.#table, this.#gateAt(line, least) * (1 - SLACK)));
    }
    if (this.#tie !== null && !this.#assured.window(this.#spread, this.#triple, LEAST_LEVEL)) {
      most = Math.min(most, this.#tie - this.#leastDivider);
      if (!(most > 0)) return [low, low];
    }
    if (most < Number.POSITIVE_INFINITY) {
      high = Math.min(high, this.#firstAbove(this.#table, this.#gateAt(line, most) * (1 + SLACK)));
    }
    if (low >= high || demand.level <= 0) return [low, high];
    if (!this.#assured.window(this.#spread, this.#triple, demand.level)) {
      if (this.#problem.objective === "cost") this.#fail("assured-swing");
      return [low, low];
    }
    low = Math.max(low, firstAtMost(ratios, this.#assured.high * (1 + SLACK)));
    high = Math.min(high, firstBelow(ratios, this.#assured.low * (1 - SLACK)));
    return [low, high];
  }

  /** Solves one ratio and offers its pairs. */
  #tryRatio(line: SearchLine, at: number, best: Best): void {
    const device = this.#device;
    const ratio = this.#table.ratios[at];
    const supply = this.#supply;
    const drive = this.#gateSupply / (1 + ratio) - device.vt;
    if (drive <= 0) return;
    const x = saturationOverdrive(device, supply, drive, line.gateSlope, line.total);
    const id = saturationCurrent(device, supply, x, line.total);
    const vds = supply - id * line.total;
    if (vds < x) return;
    const vT = transitionVoltage(device.k, device.lambda, id + vds / line.slope, line.slope);
    const iT = device.k * vT * vT * (1 + device.lambda * vT);
    const towardCutoff = id * line.load;
    const towardOhmic = (iT - id) * line.load;
    const bucket = bucketOf(towardCutoff, towardOhmic);
    const threshold = best.threshold;
    const { objective } = this.#problem;
    let least = 0;
    if (threshold && objective === "centred") {
      if (bucket > threshold.major) return;
      if (bucket === threshold.major) least = (-threshold.minor - 1) * 1e-9;
    }
    if (threshold && objective === "assured") least = (-threshold.major - 1) * 1e-9;
    const point = { x, id, vds, symmetric: Math.min(towardCutoff, towardOhmic) };
    const assured = this.#isOut ? 0 : this.#assured.swing(this.#spread, this.#triple, ratio, least);
    if (assured < least) return;
    // The bounds at this one current are cheaper than the wave, and mostly decide.
    const failed =
      (this.#pointwise && this.#impossible(line, { low: id, high: id })) ||
      failedCondition(this.#problem, device, line, point) ||
      (objective === "cost" && assured < this.#problem.swingPeak ? "assured-swing" : null);
    if (failed) this.#fail(failed);
    else this.#offerPairs(line, at, point, bucket, nanovolts(assured), best);
  }

  /** Offers the pairs of one ratio, the smallest divider current first. */
  #offerPairs(line: SearchLine, at: number, point: Point, bucket: number, assured: number, best: Best): void {
    const problem = this.#problem;
    const { offsets, r1, r2 } = this.#table;
    const byCost = problem.objective === "cost";
    const lineCents = byCost ? this.#prices.lineCents(this.#triple, point.id) : 0;
    if (lineCents === null) {
      this.#fail("no-price");
      return;
    }
    for (let pair = offsets[at]; pair < offsets[at + 1]; pair++) {
      const supply = point.id + (r1[pair] > 0 ? problem.vdd / (r1[pair] + r2[pair]) : 0);
      // Later pairs draw more still.
      if (supply > problem.supplyCurrentMax) {
        this.#fail("supply-current");
        return;
      }
      if (!reachesCorner(problem, this.#device, line, point, r1[pair], r2[pair])) {
        this.#fail("high-corner");
        continue;
      }
      const gateCents = byCost ? this.#prices.gateCents(r1[pair], r2[pair]) : 0;
      if (gateCents === null) {
        this.#fail("no-price");
        continue;
      }
      const { major, minor } = rankOf(problem.objective, bucket, assured, lineCents + gateCents);
      const taken = best.add({
        major,
        minor,
        supply,
        row: this.#device.row,
        first: r1[pair],
        second: r2[pair],
        a: this.#triple[0],
        b: this.#triple[1],
        c: this.#triple[2],
      });
      // Pairs that draw more may still cost less.
      if (!taken && !byCost) return;
    }
  }
}

/** Index of the first value whose ratio to another is not below a given one, in a rising list. */
function firstRatioAtLeast(values: readonly number[], to: number, ratio: number): number {
  let low = 0;
  let high = values.length;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (values[middle] / to < ratio) low = middle + 1;
    else high = middle;
  }
  return low;
}
