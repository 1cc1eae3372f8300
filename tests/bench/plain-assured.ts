import {
  assuredNanovolts,
  currentOf,
  overdriveOf,
  type PlainBest,
  type PlainDevice,
  type PlainProblem,
  type PlainUnit,
} from "./plain-stage";

/**
 * The plain loop that anyone would write first for `assured`: the corners of every combination solved, the greatest
 * assured swing of each part kept. A combination without any is no fit by this measure.
 *
 * @param bests of each device, where the loop goes on from
 * @param giveUp leave a combination at its first corner without room, instead of solving all
 * @returns how many combinations were solved
 */
export function runPlainAssured(
  problem: PlainProblem,
  devices: readonly PlainDevice[],
  units: readonly PlainUnit[],
  bests: readonly PlainBest[],
  giveUp: boolean,
): number {
  const { vdd, drain, source } = problem;
  for (const unit of units) {
    const { r1, r2 } = unit;
    const device = devices[unit.device];
    const best = bests[unit.device];
    for (const rd of drain) {
      for (const rs of source) {
        const nanovolts = assuredNanovolts(problem, device, r1, r2, rd, rs, giveUp);
        if (nanovolts <= 0 || nanovolts < best.nanovolts) continue;
        const { vt, k, lambda } = device;
        const x = overdriveOf(vdd / (1 + r1 / r2) - vt, k, lambda, vdd, rd, rs);
        const supply = currentOf(x, k, lambda, vdd, rd, rs) + vdd / (r1 + r2);
        if (nanovolts === best.nanovolts && supply >= best.supply) continue;
        best.nanovolts = nanovolts;
        best.supply = supply;
      }
    }
  }
  return units.length * drain.length * source.length;
}
