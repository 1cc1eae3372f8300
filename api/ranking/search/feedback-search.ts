import { circuitOf } from "#shared/bias/circuits/registry";
import { highCorner } from "#shared/bias/high-corner";
import { type Network, solveNetwork } from "#shared/bias/network";
import { assuredSwing } from "#shared/bias/spread";
import { distortionAt } from "#shared/bias/wave";
import type { StageValues } from "#shared/schemas/bias";
import type { ResistorKey } from "#shared/schemas/circuit";
import type { Catalog } from "../catalog";
import { lineCentsFor } from "../cost";
import type { Problem } from "../problem";
import { CONDITIONS, type Condition, type Device, readDevice } from "./conditions";
import { mostCurrent, type Reach, sigmaFor } from "./feedback-window";
import { assuredToBeat, type Best, bucketOf, nanovolts, PartBest, rankOf } from "./order";
import { type PartSpread, partSpread } from "./part-spread";
import { swingBound } from "./windows";

const CIRCUIT = circuitOf("drain-feedback");
const KEYS = ["rg", "r2", "rd", "rs"] as const;
/** The least assured swing that shows in the order: half a nanovolt. */
const LEAST_LEVEL = 0.5e-9;
/** Room for rounding in a bound. */
const SLACK = 1e-9;

/**
 * The exact search of drain-feedback stages. The gate hangs on the drain: with σ = R2/(RG + R2 + RD), the gate's share
 * of the rail, VGS = σ (VDD - ID RD) - ID RS, so for a given RD and RS the drain current only rises with σ. What is
 * asked for is a range of the drain current and so a window of σ, and for each R2 a run of RG. RG and R2 also load the
 * drain a little and pass some input on to the output; how little is bounded over the values that are left, so that a
 * window never leaves out what could do. Every combination in it is then solved in full. Without R2 σ is 1.
 */
export class FeedbackSearch {
  readonly #problem: Problem;
  readonly #values: readonly (readonly number[])[];
  readonly #shouldStop: () => boolean;
  readonly #leastCents: number;
  readonly #reach: Reach = {
    rd: 0.5,
    rs: 0.5,
    degeneration: 0.5,
    loadedLow: 0.5,
    loadedHigh: 0.5,
    outputLow: 0.5,
    outputHigh: 0.5,
    feedthrough: 0.5,
  };
  #sigmaLow = 0.5;
  #sigmaHigh = 0.5;
  #stopped = false;
  #floor = false;
  #furthest = 0;
  #device: Device = { row: 0, vt: 0, k: 1, lambda: 0, power: 0, cgs: 0, cgd: 0, cds: 0 };
  #spread: PartSpread | null = null;
  #spreadAt25 = { vtMin: 0, vtTyp: 0, vtMax: 0, kMin: 1, kTyp: 1, kMax: 1 };
  #partCents = 0;

  constructor(problem: Problem, shouldStop: () => boolean = () => false) {
    this.#problem = problem;
    this.#shouldStop = shouldStop;
    this.#values = KEYS.map((key) => problem.values[key]);
    const least = (values: readonly number[]) =>
      Math.min(
        ...values.map((ohms) =>
          ohms === 0 ? 0 : Math.min(...(problem.prices.get(ohms) ?? []).map(({ lineCents }) => lineCents)),
        ),
      );
    this.#leastCents =
      problem.objective === "cost" ? this.#values.reduce((sum, values) => sum + least(values), 0) : 0;
  }

  part(catalog: Catalog, row: number, best: Best): Condition | null {
    const { vdd, deratingVds, objective } = this.#problem;
    if (vdd > deratingVds * catalog.vdss[row]) return "rail-rating";
    if (objective === "cost" && Number.isNaN(catalog.cents[row])) return "no-price";
    this.#furthest = 0;
    this.#partCents = catalog.cents[row];
    this.#device = readDevice(catalog, row, this.#problem);
    this.#spread = partSpread(catalog, row, this.#problem);
    this.#spreadAt25 = {
      vtMin: catalog.vtMin[row],
      vtTyp: catalog.vt[row],
      vtMax: catalog.vtMax[row],
      kMin: catalog.kMin[row],
      kTyp: catalog.k[row],
      kMax: catalog.kMax[row],
    };
    this.#floor = best instanceof PartBest && best.bar === null && objective !== "cost";
    if (this.#floor) this.#searchAll(best);
    if (!this.#floor || best.threshold === null) {
      this.#floor = false;
      this.#searchAll(best);
    }
    return this.#stopped ? null : CONDITIONS[this.#furthest];
  }

  #searchAll(best: Best): void {
    const [rgs, r2s, rds, rss] = this.#values;
    if (Math.min(rgs.length, rds.length, rss.length) === 0) {
      this.#fail("resistor-values");
      return;
    }
    const dividers = r2s.filter((r2) => r2 > 0);
    // The greatest swing at dead centre first: what is found there leaves little of the rest. RG and R2 only lower it.
    const { vdd, load, bypassed } = this.#problem;
    const kUpper = this.#device.k * (1 + this.#device.lambda * vdd);
    const bound = (rd: number, rs: number) => {
      const beside = load === null ? rd : (rd * load) / (rd + load);
      const degeneration = bypassed ? 0 : rs;
      const line = { load: beside, degeneration, slope: beside + degeneration, total: rd + rs };
      return swingBound(vdd, kUpper, line) * (1 + SLACK);
    };
    for (const rd of [...rds].sort((a, b) => bound(b, 0) - bound(a, 0))) {
      for (const rs of rss) {
        if (bound(rd, rs) < this.#demand(best).level) break;
        this.#stopped ||= this.#shouldStop();
        if (this.#stopped) return;
        if (r2s[0] === 0) this.#searchUndivided(rd, rs, best);
        if (dividers.length > 0) this.#searchDivided(rd, rs, dividers, best);
      }
    }
  }

  #fail(condition: Condition): void {
    this.#furthest = Math.max(this.#furthest, CONDITIONS.indexOf(condition));
  }

  /** The stages of one RD and RS without R2: σ is 1. */
  #searchUndivided(rd: number, rs: number, best: Best): void {
    const [rgs] = this.#values;
    if (!this.#findWindow(rd, rs, rgs[0], rgs[rgs.length - 1], 0, 0, best)) return;
    if (this.#sigmaLow > 1 + SLACK || this.#sigmaHigh < 1 - SLACK) return;
    for (const rg of rgs) this.#tryCombination(rg, 0, rd, rs, best);
  }

  /** The stages of one RD and RS with R2. */
  #searchDivided(rd: number, rs: number, r2s: readonly number[], best: Best): void {
    const [rgs] = this.#values;
    const rgLow = rgs[0];
    const rgHigh = rgs[rgs.length - 1];
    if (!this.#findWindow(rd, rs, rgLow, rgHigh, r2s[0], r2s[r2s.length - 1], best)) return;
    for (const r2 of r2s) {
      let from = 0;
      let to = rgs.length - 1;
      let count = rgs.length + 1;
      // The fewer values of RG are left, the less they differ in how they load the drain, and the tighter the window.
      while (from <= to && to - from + 1 < count) {
        count = to - from + 1;
        if (!this.#findWindow(rd, rs, rgs[from], rgs[to], r2, r2, best)) {
          count = 0;
          break;
        }
        // σ falls as RG rises.
        from = Math.max(from, firstAtLeast(rgs, (r2 / this.#sigmaHigh - r2 - rd) * (1 - SLACK)));
        if (this.#sigmaLow > 0) {
          to = Math.min(to, firstAtLeast(rgs, (r2 / this.#sigmaLow - r2 - rd) * (1 + SLACK)));
          if (rgs[to] > (r2 / this.#sigmaLow - r2 - rd) * (1 + SLACK)) to--;
        }
      }
      if (count === 0) continue;
      for (let at = from; at <= to; at++) this.#tryCombination(rgs[at], r2, rd, rs, best);
    }
  }

  /**
   * Finds the window of σ that can hold what the brief and the list so far ask for; false where there is none.
   *
   * @param rgLow least RG that is left, ohms, `rgHigh` the greatest; likewise R2, 0 for none
   */
  #findWindow(
    rd: number,
    rs: number,
    rgLow: number,
    rgHigh: number,
    r2Low: number,
    r2High: number,
    best: Best,
  ): boolean {
    const { vdd, load, bypassed, swingPeak, sourceDropMin, supplyCurrentMax, railTolerance } = this.#problem;
    const { level, centring, supply } = this.#demand(best);
    const beside = 1 / rd + (load === null ? 0 : 1 / load);
    const reach = this.#reach;
    reach.rd = rd;
    reach.rs = rs;
    reach.degeneration = bypassed ? 0 : rs;
    reach.loadedLow = r2Low === 0 ? 1 : (rgLow + r2Low) / (rgLow + r2Low + rd);
    reach.loadedHigh = r2Low === 0 ? 1 : (rgHigh + r2High) / (rgHigh + r2High + rd);
    reach.outputLow = 1 / (beside + 1 / rgLow);
    reach.outputHigh = 1 / (beside + 1 / rgHigh);
    reach.feedthrough = reach.outputLow / rgLow;
    const { vt, k, lambda } = this.#device;
    const least = Math.max(swingPeak / reach.outputHigh, rs > 0 ? sourceDropMin / rs : 0);
    const most = Math.min(
      mostCurrent(reach, k, lambda, vdd, swingPeak, centring),
      Math.min(supplyCurrentMax, supply) * (1 + SLACK),
    );
    if (!(least <= most * (1 + SLACK))) {
      if (swingPeak > 0 || sourceDropMin > 0) this.#fail("swing");
      return false;
    }
    this.#sigmaLow = sigmaFor(reach, least, vt, k * (1 + lambda * vdd), vdd);
    this.#sigmaHigh = sigmaFor(reach, most, vt, k, vdd);
    if (level > 0) {
      const spread = this.#spread as PartSpread;
      const hottest = spread.temperatures - 1;
      const low = vdd * (1 - railTolerance);
      const kLow = spread.kMinAt[0] * (1 + lambda * low);
      const leastSigma = sigmaFor(reach, level / reach.outputHigh, spread.vtMaxAt[0], kLow, low);
      this.#sigmaLow = Math.max(this.#sigmaLow, leastSigma);
      for (const rail of [low, vdd * (1 + railTolerance)]) {
        const allowed = mostCurrent(reach, spread.kMaxAt[hottest], lambda, rail, level, 1);
        if (allowed <= 0) return false;
        const mostSigma = sigmaFor(reach, allowed, spread.vtMinAt[hottest], spread.kMaxAt[hottest], rail);
        this.#sigmaHigh = Math.min(this.#sigmaHigh, mostSigma);
      }
    }
    return this.#sigmaLow <= this.#sigmaHigh * (1 + SLACK);
  }

  /** What the list asks of the next candidate; the supply current only where all else can at best be equal. */
  #demand(best: Best): { level: number; centring: number; supply: number } {
    const { objective, swingPeak } = this.#problem;
    const threshold = best.threshold;
    const none = Number.POSITIVE_INFINITY;
    if (objective === "cost") {
      const least = this.#partCents + this.#leastCents;
      const bound =
        !threshold || least < threshold.major ? none : least > threshold.major ? 0 : threshold.supply;
      return { level: swingPeak, centring: 1, supply: bound };
    }
    if (!threshold) {
      return this.#floor
        ? { level: LEAST_LEVEL, centring: objective === "centred" ? 0.01 : 1, supply: none }
        : { level: 0, centring: 1, supply: none };
    }
    const reached = assuredToBeat(objective, threshold);
    return {
      level: Math.max(0, (reached - 1) * 1e-9),
      centring: objective === "centred" && threshold.major < 99 ? (threshold.major + 1) / 100 : 1,
      supply: none,
    };
  }

  #stage(rg: number, r2: number, rd: number, rs: number): StageValues {
    const { vdd, load, bypassed } = this.#problem;
    return {
      circuit: "drain-feedback",
      vdd,
      vss: 0,
      r1: 0,
      r2,
      rg,
      rd,
      rs,
      rs2: 0,
      rl: load,
      sourceBypassed: bypassed,
    };
  }

  /** Solves one combination in full and offers it. */
  #tryCombination(rg: number, r2: number, rd: number, rs: number, best: Best): void {
    const problem = this.#problem;
    const device = this.#device;
    const stage = this.#stage(rg, r2, rd, rs);
    const network = CIRCUIT.network(stage);
    const solved = solveNetwork(device, network);
    const { swing, id } = solved;
    if (!swing || swing.symmetric <= 0 || swing.symmetric < problem.swingPeak) {
      this.#fail("swing");
      return;
    }
    const supply = CIRCUIT.supplyCurrent(stage, id);
    const bucket = bucketOf(swing.towardCutoff, swing.towardOhmic);
    const threshold = best.threshold;
    if (threshold && problem.objective === "centred" && bucket > threshold.major) return;
    // No build swings further than the typical one, so this is known before the whole box is looked through.
    if (nanovolts(swing.symmetric) < this.#demand(best).level * 1e9) return;
    const failed = this.#failed(stage, network, solved, supply);
    if (failed) {
      this.#fail(failed);
      return;
    }
    const assured = nanovolts(this.#assured(stage));
    if (problem.objective === "cost" && assured * 1e-9 < problem.swingPeak - 0.5e-9) {
      this.#fail("assured-swing");
      return;
    }
    const cents = problem.objective === "cost" ? this.#cents(stage, id) : 0;
    if (cents === null) {
      this.#fail("no-price");
      return;
    }
    best.add({
      ...rankOf(problem.objective, bucket, assured, cents),
      supply,
      row: device.row,
      first: r2,
      second: rg,
      a: rd,
      b: rs,
      c: 0,
    });
  }

  #assured(stage: StageValues): number {
    const { resistorTolerance, railTolerance, ambientMin, ambientMax } = this.#problem;
    const spread = this.#spread as PartSpread;
    return assuredSwing({
      device: { ...this.#spreadAt25, lambda: spread.lambda, tcVt: spread.tcVt },
      stage,
      tolerance: { resistors: resistorTolerance, rail: railTolerance },
      ambient: { min: ambientMin, max: ambientMax },
    }).swing.symmetric;
  }

  #cents(stage: StageValues, id: number): number | null {
    let cents = this.#partCents;
    for (const [key, volts] of Object.entries(CIRCUIT.resistorVoltages(stage, id))) {
      const ohms = stage[key as ResistorKey];
      if (ohms === 0) continue;
      const { prices, resistorDerating } = this.#problem;
      const line = lineCentsFor(prices.get(ohms), volts ** 2 / ohms, volts, resistorDerating);
      if (line === null) return null;
      cents += line;
    }
    return cents;
  }

  /** The first condition that a combination fails, its swing apart; null when none. */
  #failed(
    stage: StageValues,
    network: Network,
    solved: ReturnType<typeof solveNetwork>,
    supply: number,
  ): Condition | null {
    const problem = this.#problem;
    const { id, vds, vgs, gm, gds, gain } = solved;
    const size = Math.abs(gain);
    if (supply > problem.supplyCurrentMax) return "supply-current";
    if (id * stage.rs < problem.sourceDropMin) return "source-drop";
    if (vds * id > this.#device.power) return "power-rating";
    for (const [key, volts] of Object.entries(CIRCUIT.resistorVoltages(stage, id))) {
      const ohms = stage[key as ResistorKey];
      if (ohms > 0 && volts ** 2 / ohms > problem.resistorPower) return "resistor-rating";
    }
    if (size < problem.gainMin || size > problem.gainMax) return "gain";
    if (CIRCUIT.inputResistance(stage, gain) < problem.inputResistanceMin) return "input-resistance";
    if (problem.highCornerMin > 0) {
      const signal = { gm, gds, ...CIRCUIT.signalNodes(stage), sourceImpedance: problem.sourceImpedance };
      const corner = highCorner(signal, this.#device);
      if (corner !== null && corner < problem.highCornerMin) return "high-corner";
    }
    if (problem.distortionMax < Number.POSITIVE_INFINITY && problem.distortionPeak > 0) {
      const path = { device: this.#device, q: { id, vds, vgs }, network };
      const { secondHarmonic } = distortionAt(path, problem.distortionPeak / size);
      if (!(secondHarmonic <= problem.distortionMax)) return "distortion";
    }
    return null;
  }
}

/** Index of the first value that is not below a given one, in a rising list. */
function firstAtLeast(values: readonly number[], least: number): number {
  let low = 0;
  let high = values.length;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (values[middle] < least) low = middle + 1;
    else high = middle;
  }
  return low;
}
