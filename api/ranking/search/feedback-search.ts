import { circuitOf } from "#shared/bias/circuits/registry";
import { highCorner } from "#shared/bias/high-corner";
import { type Network, solveNetwork } from "#shared/bias/network";
import { saturationCurrent, saturationOverdrive } from "#shared/bias/saturation";
import { assuredSwing } from "#shared/bias/spread";
import { distortionAt } from "#shared/bias/wave";
import type { StageValues } from "#shared/schemas/bias";
import type { ResistorKey } from "#shared/schemas/circuit";
import type { Catalog } from "../catalog";
import { lineCentsFor } from "../cost";
import type { Problem } from "../problem";
import { CONDITIONS, type Condition, type Device, readDevice } from "./conditions";
import { type Best, bucketOf, nanovolts, PartBest, rankOf } from "./order";
import { type PartSpread, partSpread } from "./part-spread";

const CIRCUIT = circuitOf("drain-feedback");
const KEYS = ["rg", "r2", "rd", "rs"] as const;
/** The least assured swing that shows in the order: half a nanovolt. */
const LEAST_LEVEL = 0.5e-9;
/** Room for rounding in a bound. */
const SLACK = 1e-9;

/** First and last index of each resistor, in the order of `KEYS`. */
type Box = readonly [number, number, number, number, number, number, number, number];

/**
 * The exact search of drain-feedback stages. Here the gate hangs on the drain, so every resistor moves it and there is
 * no list of gate voltages to walk: the resistors' ranges are a box that is halved until it can be left out or is one
 * combination, which is then solved in full. The network's figures rise or fall with each resistor, so a box bounds
 * them: VGS without current rises with R2 and falls with RG and RD; what it loses per ampere rises with R2, RD and RS
 * and falls with RG; RT rises with all; the a.c. load rises with RD and RG. The drain current follows from these, and
 * no room is greater than U <= ID rL or D <= VDS.
 */
export class FeedbackSearch {
  readonly #problem: Problem;
  readonly #values: readonly (readonly number[])[];
  readonly #shouldStop: () => boolean;
  readonly #leastCents: number;
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
    this.#floor = best instanceof PartBest && objective !== "cost";
    if (this.#floor) this.#searchAll(best);
    if (!this.#floor || best.threshold === null) {
      this.#floor = false;
      this.#searchAll(best);
    }
    return this.#stopped ? null : CONDITIONS[this.#furthest];
  }

  #searchAll(best: Best): void {
    const [rg, r2, rd, rs] = this.#values.map((values) => values.length - 1);
    if (Math.min(rg, r2, rd, rs) < 0) return;
    // Without R2 the circuit is another: it has a box of its own.
    const first = this.#values[1][0] === 0 ? 1 : 0;
    if (first === 1) this.#searchBox([0, rg, 0, 0, 0, rd, 0, rs], best);
    if (first <= r2) this.#searchBox([0, rg, first, r2, 0, rd, 0, rs], best);
  }

  #fail(condition: Condition): void {
    this.#furthest = Math.max(this.#furthest, CONDITIONS.indexOf(condition));
  }

  #searchBox(box: Box, best: Best): void {
    this.#stopped ||= this.#shouldStop();
    if (this.#stopped || !this.#mightHold(box, best)) return;
    let widest = -1;
    let width = 1;
    for (let axis = 0; axis < KEYS.length; axis++) {
      const from = box[2 * axis];
      const to = box[2 * axis + 1];
      const own = this.#values[axis][to] / (this.#values[axis][from] || 1);
      if (from < to && own > width) {
        widest = axis;
        width = own;
      }
    }
    if (widest < 0) {
      this.#tryCombination(box, best);
      return;
    }
    const middle = (box[2 * widest] + box[2 * widest + 1]) >> 1;
    const below = [...box] as number[];
    const above = [...box] as number[];
    below[2 * widest + 1] = middle;
    above[2 * widest] = middle + 1;
    this.#searchBox(above as unknown as Box, best);
    this.#searchBox(below as unknown as Box, best);
  }

  /** Whether some combination of a box might meet the brief and enter the list; never wrong about "can't". */
  #mightHold(box: Box, best: Best): boolean {
    const problem = this.#problem;
    const [rg0, rg1, r20, r21, rd0, rd1, rs0, rs1] = box.map((at, place) => this.#values[place >> 1][at]);
    const stage = (rg: number, r2: number, rd: number, rs: number) => this.#network(rg, r2, rd, rs);
    const gateHigh = stage(rg0, r21, rd0, rs0).gate;
    const gateLow = stage(rg1, r20, rd1, rs1).gate;
    const slopeLow = stage(rg1, r20, rd0, rs0).gateSlope;
    const slopeHigh = stage(rg0, r21, rd1, rs1).gateSlope;
    const shortest = stage(rg0, r20, rd0, rs0);
    const longest = stage(rg1, r21, rd1, rs1);
    const supplyHigh = stage(rg1, r21, rd0, rs0).supply;
    const supplyLow = stage(rg0, r20, rd1, rs1).supply;
    const most = (vt: number, k: number) =>
      currentOf(vt, k, this.#device.lambda, gateHigh, slopeLow, supplyHigh, shortest.total);
    const least = (vt: number, k: number) =>
      currentOf(vt, k, this.#device.lambda, gateLow, slopeHigh, supplyLow, longest.total);
    const { vt, k } = this.#device;
    const idHigh = most(vt, k);
    const idLow = least(vt, k);
    const towardCutoff = longest.output * idHigh;
    const towardOhmic = supplyHigh - idLow * shortest.total;
    const swing = Math.min(towardCutoff, towardOhmic) * (1 + SLACK);
    if (idHigh <= 0 || swing <= 0 || swing < problem.swingPeak) {
      this.#fail("swing");
      return false;
    }
    if (idLow > problem.supplyCurrentMax * (1 + SLACK)) {
      this.#fail("supply-current");
      return false;
    }
    if (idHigh * rs1 * (1 + SLACK) < problem.sourceDropMin) {
      this.#fail("source-drop");
      return false;
    }
    const threshold = best.threshold;
    const { level, centring, supply } = this.#demand(best);
    if (centring < 1) {
      // U is at least what is left of ID rL once the input passes around the device, D at most VDS.
      const x = Math.sqrt(idHigh / k);
      const passed = stage(rg0, r20, rd1, rs0).feedthrough * (x + longest.degeneration * idHigh);
      const low = shortest.output * idLow - passed;
      if (low > towardOhmic && (low - towardOhmic) / (low + towardOhmic) > centring * (1 + SLACK))
        return false;
    }
    if (level > 0) {
      const spread = this.#spread as PartSpread;
      const hottest = spread.temperatures - 1;
      if (longest.output * most(spread.vtMaxAt[0], spread.kMinAt[0]) * (1 + SLACK) < level) return false;
      const current = least(spread.vtMinAt[hottest], spread.kMaxAt[hottest]);
      if ((supplyHigh - current * shortest.total) * (1 + SLACK) < level) return false;
    }
    return threshold === null || idLow <= supply * (1 + SLACK);
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
    const reached = objective === "assured" ? -threshold.major : threshold.major === 0 ? -threshold.minor : 0;
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

  #network(rg: number, r2: number, rd: number, rs: number): Network {
    return CIRCUIT.network(this.#stage(rg, r2, rd, rs));
  }

  /** Solves one combination in full and offers it. */
  #tryCombination(box: Box, best: Best): void {
    const problem = this.#problem;
    const device = this.#device;
    const [rg, r2, rd, rs] = KEYS.map((_, axis) => this.#values[axis][box[2 * axis]]);
    const stage = this.#stage(rg, r2, rd, rs);
    const network = CIRCUIT.network(stage);
    const solved = solveNetwork(device, network);
    const { swing, id } = solved;
    if (!swing || swing.symmetric < problem.swingPeak) {
      this.#fail("swing");
      return;
    }
    const supply = CIRCUIT.supplyCurrent(stage, id);
    const failed = this.#failed(stage, network, solved, supply);
    if (failed) {
      this.#fail(failed);
      return;
    }
    const bucket = bucketOf(swing.towardCutoff, swing.towardOhmic);
    const threshold = best.threshold;
    if (threshold && problem.objective === "centred" && bucket > threshold.major) return;
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

/** The drain current of a saturated device in a network, A; 0 where it is off. */
function currentOf(
  vt: number,
  k: number,
  lambda: number,
  gate: number,
  gateSlope: number,
  supply: number,
  total: number,
): number {
  if (gate <= vt) return 0;
  const device = { vt, k, lambda };
  return saturationCurrent(
    device,
    supply,
    saturationOverdrive(device, supply, gate - vt, gateSlope, total),
    total,
  );
}
