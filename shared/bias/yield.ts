import type { Yield } from "#shared/schemas/bias";
import { BUILD_PARAMETERS, type BuildParameter, type CostliestParameter } from "#shared/schemas/yield";
import { BLOCK, newBuildColumns, newNetworkColumns } from "./builds/columns";
import { type BuildConditions, survivorsFilter } from "./builds/conditions";
import { buildDrawer, type LotReading } from "./builds/draw-builds";
import { FILL_NETWORKS } from "./builds/fill-networks";
import { keepSwinging, newSurvivors, solveOverdrives } from "./builds/survivors";
import { circuitOf } from "./circuits/registry";
import { solveQPoint } from "./network";
import type { BuildBox } from "./spread";

/** What to simulate. */
export type Simulation = {
  /** What differs from build to build, and how far. */
  box: BuildBox;
  conditions: BuildConditions;
  /** VT and K of a lot's pieces, drawn in pairs instead of from the part's ranges; null or none for the ranges. */
  readings: readonly LotReading[] | null;
  /** How many, 1 or more. */
  builds: number;
  /** A whole number from 0 to 2³² - 1; the same seed gives the same builds. */
  seed: number;
};

/**
 * The share of simulated builds that meet their conditions, with its 95 % interval. How builds are drawn is told at
 * `buildDrawer`: VT and K normal within ± 3 sigma, the rest uniform.
 *
 * @param held what stays at its typical or nominal value
 * @param shouldStop asked between blocks of builds; once it says yes, the answer speaks for the builds so far
 */
export function simulateBuilds(
  simulation: Simulation,
  held: BuildParameter | null = null,
  shouldStop: () => boolean = () => false,
): Yield {
  const { box, conditions, readings, builds, seed } = simulation;
  const { stage, device } = box;
  const draw = buildDrawer(box, readings, seed, held);
  const fillNetworks = FILL_NETWORKS[stage.circuit];
  const keepMeeting = survivorsFilter(conditions, stage, device.lambda, box.tolerance);
  const share = typicalShare(box);
  const drawn = newBuildColumns();
  const networks = newNetworkColumns();
  const overdrives = new Float64Array(BLOCK);
  const survivors = newSurvivors();
  let passed = 0;
  let done = 0;
  while (done < builds && !shouldStop()) {
    const count = Math.min(BLOCK, builds - done);
    draw(drawn, count);
    fillNetworks(drawn, count, stage, networks);
    solveOverdrives(drawn, networks, device.lambda, share, count, overdrives);
    keepSwinging(drawn, networks, overdrives, device.lambda, conditions.swingPeak, count, survivors);
    keepMeeting(drawn, networks, survivors);
    passed += survivors.count;
    done += count;
  }
  return { fraction: done > 0 ? passed / done : 0, ...wilsonInterval(passed, done), builds: done };
}

/** What share 1 + λ VDS of the typical build is of 1 + λ times all of its supply. */
function typicalShare({ device: { vtTyp, kTyp, lambda }, stage }: BuildBox): number {
  const network = circuitOf(stage.circuit).network(stage);
  const { vds } = solveQPoint({ vt: vtTyp, k: kTyp, lambda }, network);
  return (1 + lambda * Math.max(0, vds)) / (1 + lambda * network.supply);
}

/**
 * Which one of VT, K, rail, resistors and ambient temperature costs the most yield: the one that, held at its typical
 * or nominal value, raises it most. Each is tried on the same builds, so that no luck decides between them.
 *
 * @param fraction the yield with nothing held
 * @returns null where holding one raises nothing
 */
export function costliestParameter(
  simulation: Simulation,
  fraction: number,
  shouldStop?: () => boolean,
): CostliestParameter | null {
  let costliest: CostliestParameter | null = null;
  if (fraction === 1) return null;
  for (const parameter of BUILD_PARAMETERS) {
    const without = simulateBuilds(simulation, parameter, shouldStop).fraction;
    if (without > (costliest?.fraction ?? fraction)) costliest = { parameter, fraction: without };
  }
  return costliest;
}

/** The normal distribution's 97.5 % point: 95 % lie between it and its negative. */
const Z = 1.959963984540054;

/**
 * The 95 % interval of a share (E. B. Wilson, "Probable inference, the law of succession, and statistical inference",
 * Journal of the American Statistical Association 22, 1927): good near 0 and 1 too.
 *
 * @param passed how many of the trials succeeded
 * @param trials 0 says nothing: the interval is then 0 to 1
 */
export function wilsonInterval(passed: number, trials: number): { low: number; high: number } {
  if (trials === 0) return { low: 0, high: 1 };
  const share = passed / trials;
  const middle = share + (Z * Z) / (2 * trials);
  const reach = Z * Math.sqrt((share * (1 - share)) / trials + (Z * Z) / (4 * trials * trials));
  const scale = 1 + (Z * Z) / trials;
  // At the ends rounding must not leave the share outside its own interval.
  return {
    low: passed === 0 ? 0 : (middle - reach) / scale,
    high: passed === trials ? 1 : (middle + reach) / scale,
  };
}
