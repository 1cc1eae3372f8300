import type { StageValues } from "#shared/schemas/bias";
import type { Brief } from "#shared/schemas/brief";
import { RESISTOR_KEYS } from "#shared/schemas/circuit";
import type { Part } from "#shared/schemas/part";
import type { Circuit } from "../circuits/circuit";
import { circuitOf } from "../circuits/registry";
import { type Capacitances, highCorner, terminalCapacitances, transferSquared } from "../high-corner";
import type { Network } from "../network";
import { distortionPeak } from "../stage-sheet";
import { permittedDissipation } from "../thermal";
import { distortionAt } from "../wave";
import type { BuildColumns, NetworkColumns } from "./columns";
import type { Survivors } from "./survivors";

/** What a build must meet beside its swing, as plain numbers in SI units; a limit that isn't stated is 0 or Infinity. */
export type BuildConditions = {
  /** Output peak, V. */
  swingPeak: number;
  /** The greatest sum of the rails, V: VDSS, derated. */
  railMax: number;
  supplyCurrentMax: number;
  sourceDropMin: number;
  /** What the device may dissipate; null for any. */
  power: (Pick<Part, "pd25" | "rthJa" | "tjMax"> & { derating: number }) | null;
  /** What each resistor may dissipate, W, derated. */
  resistorPowerMax: number;
  gainMin: number;
  gainMax: number;
  inputResistanceMin: number;
  highCornerMin: number;
  sourceImpedance: number;
  capacitances: Capacitances;
  distortionMax: number;
  distortionPeak: number;
};

/** Nothing is asked of a build but that it conducts and is saturated at its Q-point. */
export const SATURATED: BuildConditions = {
  swingPeak: 0,
  railMax: Number.POSITIVE_INFINITY,
  supplyCurrentMax: Number.POSITIVE_INFINITY,
  sourceDropMin: 0,
  power: null,
  resistorPowerMax: Number.POSITIVE_INFINITY,
  gainMin: 0,
  gainMax: Number.POSITIVE_INFINITY,
  inputResistanceMin: 0,
  highCornerMin: 0,
  sourceImpedance: 0,
  capacitances: { cgs: 0, cgd: 0, cds: 0 },
  distortionMax: Number.POSITIVE_INFINITY,
  distortionPeak: 0,
};

/**
 * What a brief asks of every build.
 *
 * @param resistorRating what a resistor's largest size may dissipate, W, before derating
 */
export function conditionsOf(part: Part, brief: Brief, resistorRating: number): BuildConditions {
  const { derating } = brief;
  return {
    swingPeak: brief.swing.peak,
    railMax: derating.vds * part.vdss,
    supplyCurrentMax: brief.supplyCurrent.max ?? Number.POSITIVE_INFINITY,
    sourceDropMin: brief.sourceDrop.min ?? 0,
    power: { ...part, derating: derating.power },
    resistorPowerMax: derating.resistorPower * resistorRating,
    gainMin: brief.gain.min ?? 0,
    gainMax: brief.gain.max ?? Number.POSITIVE_INFINITY,
    inputResistanceMin: brief.inputResistance.min ?? 0,
    highCornerMin: brief.highCorner.min ?? 0,
    sourceImpedance: brief.source.ohms,
    capacitances: terminalCapacitances(part),
    distortionMax: brief.distortion.max ?? Number.POSITIVE_INFINITY,
    distortionPeak: distortionPeak(brief),
  };
}

/** The build that is looked at, as the circuit's own functions take it; filled anew for each. */
type Build = {
  k: number;
  vt: number;
  lambda: number;
  celsius: number;
  x: number;
  id: number;
  vds: number;
  stage: StageValues;
  network: Network;
};

/** Whether a build meets one condition. */
type Test = (build: Build) => boolean;

/**
 * Keeps the builds that meet the conditions beside the swing. Only what is asked for is worked out, the cheap first.
 *
 * @param stage the stage as drawn
 * @param lambda of the device, 1/V
 */
export function survivorsFilter(
  conditions: BuildConditions,
  stage: StageValues,
  lambda: number,
  tolerance: { resistors: number; rail: number },
): (builds: BuildColumns, networks: NetworkColumns, survivors: Survivors) => void {
  const circuit = circuitOf(stage.circuit);
  const tests = testsFor(conditions, circuit, stage, tolerance);
  const build: Build = {
    ...{ k: 0, vt: 0, lambda, celsius: 0, x: 0, id: 0, vds: 0 },
    stage: { ...stage },
    network: circuit.network(stage),
  };
  const keys = RESISTOR_KEYS.filter((key) => stage[key] > 0);
  return (builds, networks, survivors) => {
    if (tests.length === 0) return;
    const { places } = survivors;
    let count = 0;
    for (let index = 0; index < survivors.count; index++) {
      const at = places[index];
      build.k = builds.k[at];
      build.vt = builds.vt[at];
      build.celsius = builds.celsius[at];
      build.x = survivors.x[at];
      build.id = survivors.id[at];
      build.vds = survivors.vds[at];
      build.stage.vdd = builds.rail[at];
      build.stage.vss = builds.negativeRail[at];
      for (const key of keys) build.stage[key] = builds.resistors[key][at];
      build.network.slope = networks.slope[at];
      build.network.degeneration = networks.degeneration[at];
      build.network.output = networks.output[at];
      build.network.feedthrough = networks.feedthrough[at];
      if (tests.every((test) => test(build))) places[count++] = at;
    }
    survivors.count = count;
  };
}

function testsFor(
  conditions: BuildConditions,
  circuit: Circuit,
  nominal: StageValues,
  tolerance: { resistors: number; rail: number },
): Test[] {
  const { power, capacitances, sourceImpedance } = conditions;
  const tests: Test[] = [];
  const greatestSupply = (nominal.vdd + nominal.vss) * (1 + tolerance.rail);
  if (greatestSupply > conditions.railMax) {
    tests.push(({ stage }) => stage.vdd + stage.vss <= conditions.railMax);
  }
  if (power) {
    tests.push(({ id, vds, celsius }) => vds * id <= power.derating * permittedDissipation(power, celsius));
  }
  if (conditions.sourceDropMin > 0) {
    tests.push(({ stage, id }) => id * (stage.rs + stage.rs2) >= conditions.sourceDropMin);
  }
  if (conditions.supplyCurrentMax < Number.POSITIVE_INFINITY) {
    tests.push(({ stage, id }) => circuit.supplyCurrent(stage, id) <= conditions.supplyCurrentMax);
  }
  // No resistor has more across it than both rails together.
  const heated = RESISTOR_KEYS.filter(
    (key) =>
      nominal[key] > 0 &&
      greatestSupply ** 2 / (nominal[key] * (1 - tolerance.resistors)) > conditions.resistorPowerMax,
  );
  if (heated.length > 0) {
    tests.push(({ stage, id }) => {
      const volts = circuit.resistorVoltages(stage, id);
      return heated.every((key) => (volts[key] ?? 0) ** 2 <= conditions.resistorPowerMax * stage[key]);
    });
  }
  if (conditions.gainMin > 0 || conditions.gainMax < Number.POSITIVE_INFINITY) {
    tests.push((build) => {
      const gain = gainOf(build);
      return gain >= conditions.gainMin && gain <= conditions.gainMax;
    });
  }
  if (conditions.inputResistanceMin > 0) {
    tests.push((build) => {
      const gain = build.network.inverting ? -gainOf(build) : gainOf(build);
      return circuit.inputResistance(build.stage, gain) >= conditions.inputResistanceMin;
    });
  }
  if (conditions.highCornerMin > 0) {
    tests.push((build) => {
      const nodes = { ...circuit.signalNodes(build.stage), ...conductancesOf(build), sourceImpedance };
      // Cheap and necessary; the corner itself is only worked out for what passes.
      const midBand = transferSquared(nodes, capacitances, 0);
      if (2 * transferSquared(nodes, capacitances, conditions.highCornerMin) < midBand) return false;
      const corner = highCorner(nodes, capacitances);
      return corner === null || corner >= conditions.highCornerMin;
    });
  }
  if (conditions.distortionMax < Number.POSITIVE_INFINITY && conditions.distortionPeak > 0) {
    tests.push((build) => {
      const path = {
        device: build,
        q: { id: build.id, vds: build.vds, vgs: build.vt + build.x },
        network: build.network,
      };
      const { secondHarmonic } = distortionAt(path, conditions.distortionPeak / gainOf(build));
      return secondHarmonic <= conditions.distortionMax;
    });
  }
  return tests;
}

/** gm and gds of a saturated build, S. */
function conductancesOf({ k, lambda, x, vds }: Build): { gm: number; gds: number } {
  return { gm: 2 * k * x * (1 + lambda * vds), gds: k * x * x * lambda };
}

/** Magnitude of the gain; `smallSignalOf` of a saturated device. */
function gainOf(build: Build): number {
  const { gm, gds } = conductancesOf(build);
  const { slope, degeneration, output, feedthrough } = build.network;
  const perVolt = (gm + gds * feedthrough) / (1 + gm * degeneration + gds * slope);
  return Math.abs(output * perVolt - feedthrough);
}
