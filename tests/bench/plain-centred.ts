import {
  assuredNanovolts,
  currentOf,
  edgeCurrent,
  overdriveOf,
  type PlainBest,
  type PlainDevice,
  type PlainProblem,
  type PlainUnit,
} from "./plain-stage";

/**
 * The plain loop that anyone would write first for `centred`: every combination solved in full, the least centring
 * error in whole per cent of each part kept, and of those the greatest assured swing, which is worked out only for
 * combinations that reach the least error so far.
 *
 * @param bests of each device, where the loop goes on from
 * @returns how many combinations were solved
 */
export function runPlainCentred(
  problem: PlainProblem,
  devices: readonly PlainDevice[],
  units: readonly PlainUnit[],
  bests: readonly PlainBest[],
): number {
  const { vdd, load, drain, source } = problem;
  for (const unit of units) {
    const { r1, r2 } = unit;
    const device = devices[unit.device];
    const best = bests[unit.device];
    const { vt, k, lambda } = device;
    const drive = vdd / (1 + r1 / r2) - vt;
    for (const rd of drain) {
      const rl = (rd * load) / (rd + load);
      for (const rs of source) {
        if (drive <= 0) continue;
        const x = overdriveOf(drive, k, lambda, vdd, rd, rs);
        const id = currentOf(x, k, lambda, vdd, rd, rs);
        const vds = vdd - id * (rd + rs);
        if (!(vds >= x)) continue;
        const up = id * rl;
        const down = (edgeCurrent(id + vds / rl, rl, k, lambda) - id) * rl;
        const bucket = Math.floor((100 * Math.abs(up - down)) / (up + down));
        if (bucket > best.bucket) continue;
        const nanovolts = assuredNanovolts(problem, device, r1, r2, rd, rs, true);
        if (bucket === best.bucket && nanovolts < best.nanovolts) continue;
        const supply = id + vdd / (r1 + r2);
        if (bucket === best.bucket && nanovolts === best.nanovolts && supply >= best.supply) continue;
        best.bucket = bucket;
        best.nanovolts = nanovolts;
        best.supply = supply;
      }
    }
  }
  return units.length * drain.length * source.length;
}
