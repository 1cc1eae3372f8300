import { describe, expect, it } from "vitest";
import { solveStage } from "#shared/bias/solve-stage";
import type { Device, StageValues } from "#shared/schemas/bias";
import { buildStageValues } from "../support/build-stage";
import { type Random, seededRandom, significant } from "../support/random";
import { simulateOperatingPoints } from "./ngspice";

/** Fresh stages on every run; a failure names the seed, and EVENSWING_SEED brings it back. */
const SEED = Number(process.env.EVENSWING_SEED ?? Date.now() % 1_000_000);
const STAGES = 40;

/** A stage whose divider lifts the gate above the threshold, so that it conducts, in saturation or not. */
function drawStage(random: Random): { device: Device; stage: StageValues } {
  const vdd = significant(random.between(3, 48));
  const vt = significant(random.between(0.4, Math.min(4, 0.6 * vdd)));
  const drive = random.between(0.1, Math.min(4, 0.8 * (vdd - vt)));
  const total = significant(random.logBetween(20e3, 5e6));
  const r2 = significant((total * (vt + drive)) / vdd);
  const rd = significant(random.logBetween(200, 100e3));
  return {
    device: {
      polarity: random.pick(["n", "p"] as const),
      vt,
      k: significant(random.logBetween(5e-5, 0.3)),
      lambda: random.chance(0.4) ? 0 : significant(random.between(0.002, 0.05)),
    },
    stage: buildStageValues({
      vdd,
      r1: significant(Math.max(0.1, total - r2)),
      r2,
      rd,
      rs: random.chance(0.25) ? 0 : significant(rd * random.between(0.05, 1)),
    }),
  };
}

describe(`operating points agree with ngspice (seed ${SEED})`, () => {
  const random = seededRandom(SEED);
  const cases = Array.from({ length: STAGES }, () => drawStage(random));
  const simulated = simulateOperatingPoints(cases);

  it.each(cases.map((drawn, n) => ({ ...drawn, n })))(
    "on random stage $n, $device.polarity-channel",
    ({ device, stage, n }) => {
      const bias = solveStage(device, stage);
      expect(Math.abs(bias.id / simulated[n].id - 1)).toBeLessThan(1e-3);
      expect(Math.abs(bias.vds / simulated[n].vds - 1)).toBeLessThan(1e-3);
    },
  );
});
