import { SATURATED } from "#shared/bias/builds/conditions";
import type { BuildBox } from "#shared/bias/spread";
import { simulateBuilds } from "#shared/bias/yield";
import { buildStageValues } from "../support/build-stage";
import { runNumpy } from "./numpy";
import { median, type Report } from "./report";

const RUNS = 7;
const BUILDS = 1_000_000;
const PEAK = 2.9;
const NUMPY_SECONDS = 6;
const BAR = 1.2;
/** How far two shares of a million builds and more may lie apart: some six standard errors of the smaller run. */
const SAME_SHARE = 0.003;

/** A stage of which some builds swing so far either way and some don't; with channel-length modulation. */
const BOX: BuildBox = {
  device: {
    ...{ vtMin: 0.8, vtTyp: 1.2, vtMax: 1.8, kMin: 6e-3, kTyp: 10e-3, kMax: 14e-3 },
    ...{ lambda: 0.02, tcVt: -2e-3 },
  },
  stage: buildStageValues({ vdd: 12, r1: 680e3, r2: 180e3, rd: 2700, rs: 470, rl: 10e3 }),
  tolerance: { resistors: 0.01, rail: 0.05 },
  ambient: { min: 25, max: 25 },
};

/**
 * Builds per second on one thread, against NumPy asking the same of the same distributions.
 *
 * @throws Error where the two find different shares
 */
export function benchYield(report: Report, withNumpy: boolean): void {
  report.heading(`Yield: saturates and swings ${PEAK} V each way, λ above 0, one thread`);
  let seed = 1;
  let passed = 0;
  const rate = () => {
    const started = performance.now();
    const conditions = { ...SATURATED, swingPeak: PEAK };
    passed += simulateBuilds({ box: BOX, conditions, readings: null, builds: BUILDS, seed: seed++ }).fraction;
    return BUILDS / ((performance.now() - started) / 1000);
  };
  rate();
  // Before NumPy and after it, so that whatever else the machine does meets both alike.
  const rates = Array.from({ length: RUNS }, rate);
  const task = { task: "yield" as const, box: BOX, peak: PEAK, seconds: NUMPY_SECONDS, seed: 1 };
  const numpy = withNumpy ? runNumpy(task) : null;
  rates.push(...Array.from({ length: RUNS }, rate));
  const fraction = passed / (seed - 1);
  report.figure("yield: share of builds", fraction, "");
  report.figure("yield: builds", median(rates) / 1e6, "M builds/s");
  if (!numpy) return;
  if (Math.abs((numpy.fraction ?? 0) - fraction) > SAME_SHARE) {
    throw new Error(`NumPy finds a yield of ${numpy.fraction}, the simulation ${fraction}.`);
  }
  report.figure("yield: NumPy", median(numpy.rates) / 1e6, "M builds/s");
  const asItComes = median(runNumpy(task, "as it comes").rates);
  report.figure("yield: NumPy with the usual memory settings", asItComes / 1e6, "M builds/s");
  report.figure("yield: builds per second over that", median(rates) / asItComes, "times");
  report.bar("yield: builds per second over NumPy's", median(rates) / median(numpy.rates), BAR);
}
