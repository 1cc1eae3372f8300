import { permittedDissipation } from "#shared/bias/thermal";
import { type Capacitances, highCorner, type SmallSignalStage, transferSquared } from "#shared/bias/high-corner";
import { saturationCurrent, saturationOverdrive } from "#shared/bias/saturation";
import { transitionVoltage } from "#shared/bias/swing";
import { distortionAt } from "#shared/bias/wave";
import type { PassedOverReason } from "#shared/schemas/fits";
import type { Catalog } from "../catalog";
import type { Problem } from "../problem";
import { impossibleIn } from "./bounds";
import { type BestCandidates, bucketOf, nanovolts } from "./order";
import { filterRatioTable, firstAtMost, type RatioTable } from "./ratio-table";
import {
  currentAtCentring,
  currentForOhmicRoom,
  type LineResistances,
  overdriveAt,
  type Span,
  spansWithinDissipation,
  swingBound,
} from "./windows";

/** The conditions in the order in which the search meets them. */
const CONDITIONS = [
  "rail-rating",
  "swing",
  "supply-current",
  "source-drop",
  "power-rating",
  "resistor-rating",
  "gain",
  "resistor-values",
  "input-resistance",
  "high-corner",
  "distortion",
] as const satisfies readonly PassedOverReason[];

type Condition = (typeof CONDITIONS)[number];
const DEPTH = Object.fromEntries(CONDITIONS.map((name, depth) => [name, depth])) as Record<Condition, number>;

/** Gate-voltage windows are widened by this share, so that rounding never hides a ratio; each is then tested exactly. */
const SLACK = 1e-9;
/** How often a span is halved to cut away what can't meet a condition: 32 slices. */
const HALVINGS = 5;

type Line = LineResistances & { rd: number; rs: number };

/** One part's figures, taken out of the columns once. */
type Device = { vt: number; k: number; lambda: number } & Capacitances;

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
  /** How far the part's combinations came: the furthest condition that one failed. */
  #furthest = -1;
  /** Where the last slice of the present line ended: widened slices may touch, and no ratio is to be met twice. */
  #walkedTo = 0;

  constructor(problem: Problem, every: RatioTable) {
    this.#problem = problem;
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
    let leastInput = Number.POSITIVE_INFINITY;
    for (let at = 0; at < this.#table.r1.length; at++) {
      const { r1, r2 } = this.#table;
      leastInput = Math.min(leastInput, (r1[at] * r2[at]) / (r1[at] + r2[at]));
    }
    this.#leastInput = leastInput;
    this.#lines = orderedLines(problem);
    this.#pointwise =
      problem.gainMin > 0 ||
      problem.gainMax < Number.POSITIVE_INFINITY ||
      problem.highCornerMin > 0 ||
      problem.distortionMax < Number.POSITIVE_INFINITY;
  }

  /**
   * Adds a part's combinations to the list of the best, as far as they can enter it.
   *
   * @param row the part's row in the catalog
   * @param best the list; with a limit of one it ends up holding the part's best fit
   * @returns why the part has no fit: the furthest condition that any of its combinations failed. Only meaningful
   * when `best` stays empty.
   */
  part(catalog: Catalog, row: number, best: BestCandidates): Condition {
    const { vdd, deratingVds, deratingPower, ambientMax } = this.#problem;
    this.#furthest = -1;
    if (vdd > deratingVds * catalog.vdss[row]) return "rail-rating";
    const figures = { pd25: catalog.pd25[row], rthJa: catalog.rthJa[row], tjMax: catalog.tjMax[row] };
    const power = deratingPower * permittedDissipation(figures, ambientMax);
    const device: Device = {
      vt: catalog.vt[row],
      k: catalog.k[row],
      lambda: catalog.lambda[row],
      cgs: catalog.cgs[row],
      cgd: catalog.cgd[row],
      cds: catalog.cds[row],
    };
    const kUpper = device.k * (1 + device.lambda * vdd);
    for (const sameDrain of this.#lines) {
      for (const line of sameDrain) {
        const threshold = best.threshold;
        if (threshold && threshold.bucket === 0) {
          // With the least centring error in the list, only a greater swing gets in; and swing falls as RS grows.
          if (nanovolts(swingBound(vdd, kUpper, line)) < threshold.swing) break;
        }
        this.#line(row, device, power, line, best);
      }
    }
    return CONDITIONS[Math.max(this.#furthest, 0)];
  }

  #fail(condition: Condition): void {
    if (DEPTH[condition] > this.#furthest) this.#furthest = DEPTH[condition];
  }

  /** All dividers of one pair RD, RS. */
  #line(row: number, device: Device, power: number, line: Line, best: BestCandidates): void {
    const span = this.#span(device, line, best);
    if (!span) return;
    const { vdd } = this.#problem;
    const spans = spansWithinDissipation(span, vdd, line.total, power);
    if (spans.length === 0) return this.#fail("power-rating");
    const centre = currentAtCentring(vdd, device.k, device.lambda, line, 0);
    this.#walkedTo = 0;
    for (const within of spans) {
      const slices = this.#pointwise ? this.#possibleSlices(device, line, within, HALVINGS) : [within];
      for (const slice of slices) this.#slice(row, device, power, line, slice, centre, best);
    }
  }

  /** The currents that the conditions which are intervals allow, and that could still enter the list. */
  #span({ k, lambda }: Device, line: Line, best: BestCandidates): Span | null {
    const problem = this.#problem;
    const { vdd } = problem;
    let low = problem.swingPeak / line.load;
    let high = currentForOhmicRoom(vdd, k, lambda, line, problem.swingPeak);
    if (low > high * (1 + SLACK)) return this.#none("swing");
    const leastDivider = vdd / (2 * problem.divider[problem.divider.length - 1]);
    high = Math.min(high, problem.supplyCurrentMax - leastDivider);
    if (low > high * (1 + SLACK)) return this.#none("supply-current");
    if (problem.sourceDropMin > 0) {
      low = Math.max(low, line.rs > 0 ? problem.sourceDropMin / line.rs : Number.POSITIVE_INFINITY);
      if (low > high * (1 + SLACK)) return this.#none("source-drop");
    }
    high = Math.min(high, Math.sqrt(problem.resistorPower / Math.max(line.rd, line.rs)));
    if (low > high * (1 + SLACK)) return this.#none("resistor-rating");
    const threshold = best.threshold;
    if (threshold) {
      const c = (threshold.bucket + 1) / 100;
      if (c < 1) {
        low = Math.max(low, currentAtCentring(vdd, k, lambda, line, -c));
        high = Math.min(high, currentAtCentring(vdd, k, lambda, line, c));
      }
      if (threshold.bucket === 0) {
        const swing = (threshold.swing - 1) * 1e-9;
        low = Math.max(low, swing / line.load);
        high = Math.min(high, currentForOhmicRoom(vdd, k, lambda, line, swing));
      }
      if (low > high * (1 + SLACK)) return null;
    }
    // Never below a current so small that the gate sits at the threshold: the widening needs something to widen.
    return { low: low * (1 - SLACK), high: high * (1 + SLACK) };
  }

  #none(condition: Condition): null {
    this.#fail(condition);
    return null;
  }

  /** Halves a span again and again and keeps the slices in which every condition might be met. */
  #possibleSlices(device: Device, line: Line, span: Span, halvings: number): Span[] {
    const impossible = impossibleIn(this.#problem, device, line, span, this.#leastInput);
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
  #slice(
    row: number,
    device: Device,
    power: number,
    line: Line,
    span: Span,
    centre: number,
    best: BestCandidates,
  ): void {
    const { vdd } = this.#problem;
    const { k, lambda, vt } = device;
    const gateAt = (current: number) =>
      vt + (current > 0 ? overdriveAt(vdd, k, lambda, line.total, current) : 0) + current * line.rs;
    const from = Math.max(this.#walkedTo, this.#firstAtLeast(this.#table, gateAt(span.low) - SLACK * vdd));
    const to = this.#firstAtLeast(this.#table, gateAt(span.high) + SLACK * vdd);
    if (from >= to) {
      const barred =
        this.#firstAtLeast(this.#every, gateAt(span.low)) < this.#firstAtLeast(this.#every, gateAt(span.high));
      if (!barred) return this.#fail("resistor-values");
      return this.#fail(this.#problem.inputResistanceMin > 0 ? "input-resistance" : "resistor-rating");
    }
    this.#walkedTo = to;
    const start = Math.min(Math.max(this.#firstAtLeast(this.#table, gateAt(centre)), from), to);
    for (let at = start; at < to && this.#ratio(row, device, power, line, at, best); at++);
    for (let at = start - 1; at >= from && this.#ratio(row, device, power, line, at, best); at--);
  }

  /** Index of the first ratio whose gate voltage is not below the given one. */
  #firstAtLeast({ ratios }: RatioTable, vg: number): number {
    if (vg <= 0) return 0;
    return firstAtMost(ratios, this.#problem.vdd / vg - 1);
  }

  /**
   * Solves one ratio and offers its pairs.
   *
   * @returns whether the next ratio outward could still enter the list
   */
  #ratio(row: number, device: Device, power: number, line: Line, at: number, best: BestCandidates): boolean {
    const problem = this.#problem;
    const { vdd } = problem;
    const vg = vdd / (1 + this.#table.ratios[at]);
    const drive = vg - device.vt;
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
    const swing = nanovolts(symmetric);
    const threshold = best.threshold;
    if (threshold && (bucket > threshold.bucket || (bucket === threshold.bucket && swing < threshold.swing))) {
      return false;
    }
    const failed = this.#failedCondition(device, power, line, { x, id, vds, symmetric });
    if (failed) {
      this.#fail(failed);
      return true;
    }
    this.#pairs(row, device, line, at, { x, id, vds, bucket, swing }, best);
    return true;
  }

  /** The first condition that an operating point fails, whichever pair of the ratio makes it. */
  #failedCondition(
    device: Device,
    power: number,
    line: Line,
    point: { x: number; id: number; vds: number; symmetric: number },
  ): Condition | null {
    const problem = this.#problem;
    const { x, id, vds } = point;
    if (point.symmetric < problem.swingPeak) return "swing";
    if (id * line.rs < problem.sourceDropMin) return "source-drop";
    if (vds * id > power) return "power-rating";
    if (id * id * Math.max(line.rd, line.rs) > problem.resistorPower) return "resistor-rating";
    if (!this.#pointwise) return null;
    const gain = gainAt(device, line, x, vds);
    if (gain < problem.gainMin || gain > problem.gainMax) return "gain";
    if (problem.distortionMax < Number.POSITIVE_INFINITY && problem.distortionPeak > 0) {
      const path = {
        device,
        q: { id, vds, vgs: device.vt + x },
        load: line.load,
        degeneration: line.degeneration,
      };
      const { secondHarmonic } = distortionAt(path, problem.distortionPeak / gain);
      if (!(secondHarmonic <= problem.distortionMax)) return "distortion";
    }
    return null;
  }

  /** Offers the pairs of one ratio, the smallest divider current first. */
  #pairs(
    row: number,
    device: Device,
    line: Line,
    at: number,
    point: { x: number; id: number; vds: number; bucket: number; swing: number },
    best: BestCandidates,
  ): void {
    const problem = this.#problem;
    const { offsets, r1, r2 } = this.#table;
    for (let pair = offsets[at]; pair < offsets[at + 1]; pair++) {
      const supply = point.id + problem.vdd / (r1[pair] + r2[pair]);
      // Later pairs draw more still.
      if (supply > problem.supplyCurrentMax) return this.#fail("supply-current");
      if (problem.highCornerMin > 0 && !this.#reachesCorner(device, line, point, r1[pair], r2[pair])) {
        this.#fail("high-corner");
        continue;
      }
      const { bucket, swing } = point;
      const candidate = { bucket, swing, supply, row, r1: r1[pair], r2: r2[pair], rd: line.rd, rs: line.rs };
      if (!best.add(candidate)) return;
    }
  }

  #reachesCorner(
    device: Device,
    line: Line,
    { x, vds }: { x: number; vds: number },
    r1: number,
    r2: number,
  ): boolean {
    const { sourceImpedance, highCornerMin } = this.#problem;
    const stage: SmallSignalStage = {
      gm: 2 * device.k * x * (1 + device.lambda * vds),
      gds: device.lambda * device.k * x * x,
      load: line.load,
      degeneration: line.degeneration,
      sourceImpedance,
      inputResistance: (r1 * r2) / (r1 + r2),
    };
    // Cheap and necessary; the corner itself is only worked out for what passes.
    if (2 * transferSquared(stage, device, highCornerMin) < transferSquared(stage, device, 0)) return false;
    const corner = highCorner(stage, device);
    return corner === null || corner >= highCornerMin;
  }
}

/** Magnitude of the gain of a saturated device; the formula of `solveFourResistor`. */
function gainAt(device: Device, line: Line, x: number, vds: number): number {
  const gm = 2 * device.k * x * (1 + device.lambda * vds);
  const gds = device.k * x * x * device.lambda;
  return (gm * line.load) / (1 + gds * line.slope + gm * line.degeneration);
}

/**
 * Every pair RD, RS: one list a drain resistor, RS ascending, the lists with the greatest swing first. Swing does not
 * depend on the threshold voltage and little on K, so one order serves all parts; it only decides how soon a good fit
 * raises the bar.
 */
function orderedLines(problem: Problem): Line[][] {
  const typicalK = 5e-3;
  const lists = problem.drain.map((rd) =>
    problem.source.map((rs): Line => {
      const load = problem.load === null ? rd : (rd * problem.load) / (rd + problem.load);
      const degeneration = problem.bypassed ? 0 : rs;
      return { rd, rs, load, degeneration, slope: load + degeneration, total: rd + rs };
    }),
  );
  const bound = (list: Line[]) => (list.length > 0 ? swingBound(problem.vdd, typicalK, list[0]) : 0);
  return lists.sort((a, b) => bound(b) - bound(a));
}
