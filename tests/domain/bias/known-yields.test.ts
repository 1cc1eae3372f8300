import { describe, expect, it } from "vitest";
import { newBuildColumns } from "#shared/bias/builds/columns";
import { type BuildConditions, SATURATED } from "#shared/bias/builds/conditions";
import { buildDrawer } from "#shared/bias/builds/draw-builds";
import type { BuildBox } from "#shared/bias/spread";
import { stageValues } from "#shared/bias/stage-sheet";
import { costliestParameter, simulateBuilds, wilsonInterval } from "#shared/bias/yield";
import { briefSchema } from "#shared/schemas/brief";
import { buildResistors } from "../../support/build-stage";
import { SEED } from "../../support/seed";

/** The standard normal distribution by Simpson's rule over its density, from -3 up. */
function normalShare(z: number): number {
  const steps = 2000;
  const width = (z + 3) / steps;
  let sum = 0;
  for (let step = 0; step <= steps; step++) {
    const weight = step === 0 || step === steps ? 1 : step % 2 === 1 ? 4 : 2;
    const at = -3 + step * width;
    sum += (weight * Math.exp((-at * at) / 2)) / Math.sqrt(2 * Math.PI);
  }
  return (sum * width) / 3;
}

/** Nothing differs from build to build but what is said to. */
function still(more: Partial<BuildBox["device"]> = {}, ambient = { min: 25, max: 25 }): BuildBox {
  const device = {
    vtMin: 1.2,
    vtTyp: 1.2,
    vtMax: 1.2,
    kMin: 0.01,
    kTyp: 0.01,
    kMax: 0.01,
    lambda: 0,
    tcVt: 0,
  };
  const stage = stageValues(
    briefSchema.parse({ rail: { volts: 12 } }),
    buildResistors({ r1: 900_000, r2: 100_000, rd: 1000, rs: 100 }),
  );
  return {
    device: { ...device, ...more },
    stage,
    tolerance: { resistors: 0, rail: 0 },
    ambient,
  };
}

/** How many of 40 seeds have a share inside their own 95 % interval. */
function covered(box: BuildBox, share: number, conditions: BuildConditions = SATURATED): number {
  return Array.from({ length: 40 }, (_, seed) =>
    simulateBuilds({ box, conditions, readings: null, builds: 2000, seed: SEED + seed }),
  ).filter(({ low, high }) => low <= share && share <= high).length;
}

describe("a yield whose value is known", () => {
  // The gate stands at 1.2 V, so a build conducts where its threshold is lower.
  it("is the truncated normal's share of thresholds below the gate voltage", () => {
    // The range is 0.9 V to 1.4 V: its middle 1.15 V, a sigma its sixth.
    const share = normalShare((1.2 - 1.15) / (0.5 / 6)) / normalShare(3);
    expect(share).toBeCloseTo(0.7266, 3);
    expect(covered(still({ vtMin: 0.9, vtMax: 1.4 }), share)).toBeGreaterThanOrEqual(30);
  });

  it("is the truncated normal's share of conduction parameters, here above the one that swings enough", () => {
    // U = ID RD with RS shorted: K (0.2 V)² 1 kΩ reaches 0.4 V at K = 10 mA/V², in the range 8 to 14 mA/V².
    const box = still({ vtMin: 1, vtTyp: 1, vtMax: 1, kMin: 0.008, kTyp: 0.01, kMax: 0.014 });
    box.stage = { ...box.stage, rs: 0 };
    const share = 1 - normalShare((0.01 - 0.011) / 0.001) / normalShare(3);
    const swinging = { ...SATURATED, swingPeak: 0.4 };
    expect(covered(box, share, swinging)).toBeGreaterThanOrEqual(30);
  });

  it("is the uniform share of rails above the one that turns the device on", () => {
    const box = {
      ...still({ vtMin: 1.23, vtTyp: 1.23, vtMax: 1.23 }),
      tolerance: { resistors: 0, rail: 0.1 },
    };
    // 12.3 V of 10.8 V to 13.2 V.
    expect(covered(box, 0.375)).toBeGreaterThanOrEqual(30);
  });

  it("is the uniform share of temperatures at which the threshold has fallen far enough", () => {
    const device = { vtMin: 1.22, vtTyp: 1.22, vtMax: 1.22, tcVt: -1e-3 };
    // 20 mV below its value at 25 °C: above 45 °C, of 0 °C to 80 °C.
    expect(covered(still(device, { min: 0, max: 80 }), 35 / 80)).toBeGreaterThanOrEqual(30);
  });

  it("is the share of a lot's pieces that conduct, drawn as the pairs that were measured", () => {
    const readings = [
      { vt: 1.1, k: 0.01 },
      { vt: 1.3, k: 0.01 },
      { vt: 1.3, k: 0.02 },
      { vt: 1.1, k: 0.02 },
      { vt: 1.3, k: 0.03 },
    ];
    const answer = (seed: number) =>
      simulateBuilds({ box: still(), conditions: SATURATED, readings, builds: 2000, seed });
    const inside = Array.from({ length: 40 }, (_, seed) => answer(seed)).filter(
      ({ low, high }) => low <= 0.4 && 0.4 <= high,
    );
    expect(inside.length).toBeGreaterThanOrEqual(30);
    const columns = newBuildColumns();
    buildDrawer(still(), readings, 1, null)(columns, 100);
    for (let at = 0; at < 100; at++) {
      const pair = readings.find(({ vt, k }) => vt === columns.vt[at] && k === columns.k[at]);
      expect(pair).toBeDefined();
    }
  });

  it("is 1 or 0 where all builds are alike", () => {
    const simulate = (vt: number) =>
      simulateBuilds({
        box: still({ vtMin: vt, vtTyp: vt, vtMax: vt }),
        conditions: SATURATED,
        readings: null,
        builds: 1000,
        seed: 1,
      });
    expect(simulate(1.1)).toMatchObject({ fraction: 1, high: 1, builds: 1000 });
    expect(simulate(1.3)).toMatchObject({ fraction: 0, low: 0, builds: 1000 });
  });
});

describe("the costliest parameter", () => {
  it("is the threshold where only its spread turns builds off", () => {
    const box = { ...still({ vtMin: 0.9, vtTyp: 1.1, vtMax: 1.4, kMin: 0.005, kMax: 0.015 }) };
    const simulation = { box, conditions: SATURATED, readings: null, builds: 3000, seed: 1 };
    const { fraction } = simulateBuilds(simulation);
    expect(costliestParameter(simulation, fraction)).toEqual({ parameter: "vt", fraction: 1 });
  });

  it("is the rail where only the rail does", () => {
    const box = {
      ...still({ vtMin: 1.19, vtMax: 1.19, vtTyp: 1.19 }),
      tolerance: { resistors: 0, rail: 0.1 },
    };
    const simulation = { box, conditions: SATURATED, readings: null, builds: 3000, seed: 1 };
    const { fraction } = simulateBuilds(simulation);
    expect(costliestParameter(simulation, fraction)).toEqual({ parameter: "rail", fraction: 1 });
  });

  it("is none where every build passes, or where holding one helps nothing", () => {
    const good = { box: still({ vtMin: 1, vtTyp: 1, vtMax: 1 }), conditions: SATURATED };
    const bad = { box: still({ vtMin: 1.3, vtTyp: 1.35, vtMax: 1.4 }), conditions: SATURATED };
    for (const { box, conditions } of [good, bad]) {
      const simulation = { box, conditions, readings: null, builds: 1000, seed: 1 };
      expect(costliestParameter(simulation, simulateBuilds(simulation).fraction)).toBeNull();
    }
  });
});

describe("the 95 % interval (Wilson 1927)", () => {
  // Worked out apart: (p + z²/2n ± z √(p(1-p)/n + z²/4n²))/(1 + z²/n), z = 1.959964.
  it.each([
    [81, 263, 0.2553, 0.3662],
    [15, 148, 0.0624, 0.1605],
    [0, 20, 0, 0.1611],
    [1, 29, 0.0061, 0.1718],
  ])("of %i in %i is %f to %f (R. G. Newcombe, Statistics in Medicine 17, 1998)", (passed, of, low, high) => {
    const interval = wilsonInterval(passed, of);
    expect(interval.low).toBeCloseTo(low, 4);
    expect(interval.high).toBeCloseTo(high, 4);
  });

  it("is everything where nothing was tried", () => {
    expect(wilsonInterval(0, 0)).toEqual({ low: 0, high: 1 });
  });
});
