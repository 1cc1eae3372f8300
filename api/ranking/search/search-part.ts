import { saturationCurrent, saturationOverdrive } from "#shared/bias/saturation";
import { transitionVoltage } from "#shared/bias/swing";
import { permittedDissipation } from "#shared/bias/thermal";
import type { Catalog } from "../catalog";
import type { Problem } from "../problem";
import { impossibleIn } from "./bounds";
import {
  CONDITIONS,
  type Condition,
  type Device,
  failedCondition,
  hasPointConditions,
  type Line,
  type Point,
  reachesCorner,
} from "./conditions";
import { type BestCandidates, bucketOf, nanovolts } from "./order";
import { filterRatioTable, firstAtMost, type RatioTable } from "./ratio-table";
import {
  currentAtCentring,
  currentForOhmicRoom,
  overdriveAt,
  type Span,
  spansWithinDissipation,
  swingBound,
} from "./windows";

/** Windows are widened by this share, so that rounding never hides a ratio; each is then tested exactly. */
const SLACK = 1e-9;
/** How often a span is halved to cut away what can't meet a condition: 32 slices. */
const HALVINGS = 5;
/** A K in the middle of the discretes, A/V², to order the lines by before any part is known. */
const TYPICAL_K = 5e-3;

/**
 * The exact search of one brief. For a part and a pair RD, RS, room toward cutoff rises and room toward the ohmic
 * region falls with the gate voltage, so the best divider is a neighbour of the centring gate voltage in the sorted
 * list of ratios, the next best its neighbour, and so on outward on both sides until the list of the best is beaten.
 * A bound of one square root says whether a pair RD, RS can matter at all. Nothing is sampled.
 */
export class Search {
  readonly #problem: Problem;
  /** Every ratio the values allow, to tell a missing value from a pair that is barred. */
  readonly #every: RatioTable;
  readonly #table: RatioTable;
  readonly #leastInput: number;
  readonly #lines: Line[][];
  readonly #pointwise: boolean;
  readonly #shouldStop: () => boolean;
  #stopped = false;
  /** How far the part's combinations came: the furthest condition that one failed. */
  #furthest = 0;
  /** Where the last slice of the present line ended: widened slices may touch, and no ratio is to be met twice. */
  #walkedTo = 0;

  /**
   * @param problem the brief in numbers
   * @param every the ratio table of the brief's divider values
   * @param shouldStop asked often: whether to give up, as nobody waits any more or the time is over
   */
  constructor(problem: Problem, every: RatioTable, shouldStop: () => boolean = () => false) {
    this.#problem = problem;
    this.#shouldStop = shouldStop;
    this.#every = every;
    const { vdd, inputResistanceMin, resistorPower } = problem;
    this.#table = filterRatioTable(every, (r1, r2) => {
      const vg = vdd / (1 + r1 / r2);
      return (
        (r1 * r2) / (r1 + r2) >= inputResistanceMin &&
        (vdd - vg) ** 2 / r1 <= resistorPower &&
        vg ** 2 / r2 <= resistorPower
      );
    });
    this.#leastInput = leastInputResistance(this.#table);
    this.#lines = orderedLines(problem);
    this.#pointwise = hasPointConditions(problem);
  }

  /**
   * Adds a part's combinations to the list of the best, as far as they can enter it.
   *
   * @param row the part's row in the catalog
   * @param best the list; with a limit of one it ends up holding the part's best fit
   * @returns why the part has no fit: the furthest condition that any of its combinations failed, only meaningful when
   * `best` stays empty; null when the search was stopped and the part is not done
   */
  part(catalog: Catalog, row: number, best: BestCandidates): Condition | null {
    const { vdd, deratingVds, deratingPower, ambientMax } = this.#problem;
    if (vdd > deratingVds * catalog.vdss[row]) return "rail-rating";
    this.#furthest = 0;
    const figures = { pd25: catalog.pd25[row], rthJa: catalog.rthJa[row], tjMax: catalog.tjMax[row] };
    const device: Device = {
      row,
      vt: catalog.vt[row],
      k: catalog.k[row],
      lambda: catalog.lambda[row],
      cgs: catalog.cgs[row],
      cgd: catalog.cgd[row],
      cds: catalog.cds[row],
      power: deratingPower * permittedDissipation(figures, ambientMax),
    };
    const kUpper = device.k * (1 + device.lambda * vdd);
    for (const lines of this.#lines) this.#searchBlock(device, kUpper, lines, 0, lines.length - 1, best);
    return this.#stopped ? null : CONDITIONS[this.#furthest];
  }

  #fail(condition: Condition): void {
    this.#furthest = Math.max(this.#furthest, CONDITIONS.indexOf(condition));
  }

  /** All lines of one RD from one RS to another, halved until a block can be left out or is a single line. */
  #searchBlock(
    device: Device,
    kUpper: number,
    lines: Line[],
    from: number,
    to: number,
    best: BestCandidates,
  ): void {
    this.#stopped ||= this.#shouldStop();
    if (this.#stopped) return;
    const first = lines[from];
    const last = lines[to];
    const threshold = best.threshold;
    // With no centring error left to beat, only a greater swing gets in; and the swing falls as RS grows.
    if (threshold?.bucket === 0) {
      if (nanovolts(swingBound(this.#problem.vdd, kUpper, first)) < threshold.swing) return;
    }
    if (from === to) {
      this.#searchLine(device, first, best);
      return;
    }
    const span = this.#allowedSpan(device, first, last, best);
    if (!span) return;
    const impossible = this.#pointwise && this.#impossible(device, first, last, span);
    if (impossible) {
      this.#fail(impossible);
      return;
    }
    const middle = (from + to) >> 1;
    this.#searchBlock(device, kUpper, lines, from, middle, best);
    this.#searchBlock(device, kUpper, lines, middle + 1, to, best);
  }

  /** All dividers of one pair RD, RS. */
  #searchLine(device: Device, line: Line, best: BestCandidates): void {
    const span = this.#allowedSpan(device, line, line, best);
    if (!span) return;
    const { vdd } = this.#problem;
    const spans = spansWithinDissipation(span, vdd, line.total, device.power);
    if (spans.length === 0) this.#fail("power-rating");
    const centre = currentAtCentring(vdd, device.k, device.lambda, line, 0);
    this.#walkedTo = 0;
    for (const within of spans) {
      const slices = this.#pointwise ? this.#possibleSlices(device, line, within, HALVINGS) : [within];
      for (const slice of slices) this.#walk(device, line, slice, centre, best);
    }
  }

  /**
   * The currents that the conditions which are plain ranges allow on some line of a block, and that could still enter
   * the list; null where there are none. Every current here falls as RS grows, so each end comes from an end line.
   */
  #allowedSpan({ k, lambda }: Device, first: Line, last: Line, best: BestCandidates): Span | null {
    const problem = this.#problem;
    const { vdd } = problem;
    const span = { low: problem.swingPeak / first.load, high: Number.POSITIVE_INFINITY };
    const narrow = (condition: Condition | null, low: number, high: number) => {
      span.low = Math.max(span.low, low);
      span.high = Math.min(span.high, high);
      if (span.low <= span.high * (1 + SLACK)) return true;
      if (condition) this.#fail(condition);
      return false;
    };
    const leastDivider = vdd / (2 * problem.divider[problem.divider.length - 1]);
    const leastForDrop = problem.sourceDropMin > 0 ? problem.sourceDropMin / last.rs : 0;
    const mostForHeat = Math.sqrt(problem.resistorPower / Math.max(first.rd, first.rs));
    const allowed =
      narrow("swing", 0, currentForOhmicRoom(vdd, k, lambda, first, problem.swingPeak)) &&
      narrow("supply-current", 0, problem.supplyCurrentMax - leastDivider) &&
      narrow("source-drop", leastForDrop, Number.POSITIVE_INFINITY) &&
      narrow("resistor-rating", 0, mostForHeat);
    if (!allowed) return null;
    const threshold = best.threshold;
    if (threshold && threshold.bucket < 99) {
      const c = (threshold.bucket + 1) / 100;
      const low = currentAtCentring(vdd, k, lambda, last, -c);
      if (!narrow(null, low, currentAtCentring(vdd, k, lambda, first, c))) return null;
    }
    if (threshold?.bucket === 0) {
      const swing = (threshold.swing - 1) * 1e-9;
      const high = currentForOhmicRoom(vdd, k, lambda, first, swing);
      if (!narrow(null, swing / first.load, high)) return null;
    }
    return { low: span.low * (1 - SLACK), high: span.high * (1 + SLACK) };
  }

  #impossible(device: Device, first: Line, last: Line, span: Span): Condition | null {
    return impossibleIn(this.#problem, device, { first, last }, span, this.#leastInput);
  }

  /** Halves a span again and again and keeps the slices in which every condition might be met. */
  #possibleSlices(device: Device, line: Line, span: Span, halvings: number): Span[] {
    const impossible = impossibleIn(
      this.#problem,
      device,
      { first: line, last: line },
      span,
      this.#leastInput,
    );
    if (impossible) {
      this.#fail(impossible);
      return [];
    }
    if (halvings === 0) return [span];
    const middle = 0.5 * (span.low + span.high);
    const left = this.#possibleSlices(device, line, { low: span.low, high: middle }, halvings - 1);
    const right = this.#possibleSlices(device, line, { low: middle, high: span.high }, halvings - 1);
    const last = left[left.length - 1];
    const first = right[0];
    if (last && first && last.high === first.low) {
      first.low = last.low;
      left.pop();
    }
    return left.concat(right);
  }

  /** Walks the ratios of a span outward from the centring one, on each side until the list is beaten. */
  #walk(device: Device, line: Line, span: Span, centre: number, best: BestCandidates): void {
    const { vdd, inputResistanceMin } = this.#problem;
    const gateAt = (current: number) =>
      device.vt +
      (current > 0 ? overdriveAt(vdd, device.k, device.lambda, line.total, current) : 0) +
      current * line.rs;
    const low = gateAt(span.low) - SLACK * vdd;
    const high = gateAt(span.high) + SLACK * vdd;
    const from = Math.max(this.#walkedTo, this.#firstAtLeast(this.#table, low));
    const to = this.#firstAtLeast(this.#table, high);
    if (from >= to) {
      const barred = this.#firstAtLeast(this.#every, low) < this.#firstAtLeast(this.#every, high);
      if (!barred) this.#fail("resistor-values");
      else this.#fail(inputResistanceMin > 0 ? "input-resistance" : "resistor-rating");
      return;
    }
    this.#walkedTo = to;
    const start = Math.min(Math.max(this.#firstAtLeast(this.#table, gateAt(centre)), from), to);
    for (let at = start; at < to && this.#tryRatio(device, line, at, best); at++);
    for (let at = start - 1; at >= from && this.#tryRatio(device, line, at, best); at--);
  }

  /** Index of the first ratio whose gate voltage is not below the given one. */
  #firstAtLeast({ ratios }: RatioTable, vg: number): number {
    return vg <= 0 ? 0 : firstAtMost(ratios, this.#problem.vdd / vg - 1);
  }

  /**
   * Solves one ratio and offers its pairs.
   *
   * @returns whether the next ratio outward could still enter the list
   */
  #tryRatio(device: Device, line: Line, at: number, best: BestCandidates): boolean {
    const { vdd } = this.#problem;
    const drive = vdd / (1 + this.#table.ratios[at]) - device.vt;
    if (drive <= 0) return true;
    const x = saturationOverdrive(device, vdd, drive, line.rs, line.total);
    const id = saturationCurrent(device, vdd, x, line.total);
    const vds = vdd - id * line.total;
    if (vds < x) return true;
    const vT = transitionVoltage(device.k, device.lambda, id + vds / line.slope, line.slope);
    const iT = device.k * vT * vT * (1 + device.lambda * vT);
    const towardCutoff = id * line.load;
    const towardOhmic = (iT - id) * line.load;
    const bucket = bucketOf(towardCutoff, towardOhmic);
    const symmetric = Math.min(towardCutoff, towardOhmic);
    const threshold = best.threshold;
    if (threshold && bucket >= threshold.bucket) {
      if (bucket > threshold.bucket || nanovolts(symmetric) < threshold.swing) return false;
    }
    const point = { x, id, vds, symmetric };
    // The bounds at this one current are cheaper than the wave, and mostly decide.
    const failed =
      (this.#pointwise && this.#impossible(device, line, line, { low: id, high: id })) ||
      failedCondition(this.#problem, device, line, point);
    if (failed) this.#fail(failed);
    else this.#offerPairs(device, line, at, point, bucket, best);
    return true;
  }

  /** Offers the pairs of one ratio, the smallest divider current first. */
  #offerPairs(
    device: Device,
    line: Line,
    at: number,
    point: Point,
    bucket: number,
    best: BestCandidates,
  ): void {
    const problem = this.#problem;
    const { offsets, r1, r2 } = this.#table;
    for (let pair = offsets[at]; pair < offsets[at + 1]; pair++) {
      const supply = point.id + problem.vdd / (r1[pair] + r2[pair]);
      // Later pairs draw more still.
      if (supply > problem.supplyCurrentMax) {
        this.#fail("supply-current");
        return;
      }
      if (!reachesCorner(problem, device, line, point, r1[pair], r2[pair])) {
        this.#fail("high-corner");
        continue;
      }
      const taken = best.add({
        bucket,
        swing: nanovolts(point.symmetric),
        supply,
        row: device.row,
        r1: r1[pair],
        r2: r2[pair],
        rd: line.rd,
        rs: line.rs,
      });
      if (!taken) return;
    }
  }
}

/** The least R1 || R2 of a table, ohms; Infinity when it is empty. */
function leastInputResistance({ r1, r2 }: RatioTable): number {
  let least = Number.POSITIVE_INFINITY;
  for (let at = 0; at < r1.length; at++) least = Math.min(least, (r1[at] * r2[at]) / (r1[at] + r2[at]));
  return least;
}

/**
 * Every pair RD, RS: one list a drain resistor, RS ascending, the lists with the greatest swing first. Swing does not
 * depend on the threshold voltage and little on K, so one order serves all parts; it only decides how soon a good fit
 * raises the bar.
 */
function orderedLines({ vdd, load: stageLoad, drain, source, bypassed }: Problem): Line[][] {
  const lists = drain.map((rd) =>
    source.map((rs): Line => {
      const load = stageLoad === null ? rd : (rd * stageLoad) / (rd + stageLoad);
      const degeneration = bypassed ? 0 : rs;
      return { rd, rs, load, degeneration, slope: load + degeneration, total: rd + rs };
    }),
  );
  const bound = ([first]: Line[]) => swingBound(vdd, TYPICAL_K, first);
  return lists.sort((a, b) => bound(b) - bound(a));
}
