import { describe, expect, it } from "vitest";
import { BLOCK, newBuildColumns, newNetworkColumns } from "#shared/bias/builds/columns";
import { type BuildConditions, conditionsOf, SATURATED } from "#shared/bias/builds/conditions";
import { buildDrawer } from "#shared/bias/builds/draw-builds";
import { FILL_NETWORKS } from "#shared/bias/builds/fill-networks";
import { circuitOf } from "#shared/bias/circuits/registry";
import { conductionAt, thresholdAt } from "#shared/bias/device";
import type { Network } from "#shared/bias/network";
import { type BuildBox, boxOf } from "#shared/bias/spread";
import { figureSignal, figureStage, stageValues } from "#shared/bias/stage-sheet";
import { costliestParameter, type Simulation, simulateBuilds, wilsonInterval } from "#shared/bias/yield";
import { type Brief, briefSchema } from "#shared/schemas/brief";
import { RESISTOR_KEYS, type Resistors } from "#shared/schemas/circuit";
import type { Part } from "#shared/schemas/part";
import { plainPoint } from "../../reference/plain-stage";
import { drawStages } from "../../reference/random-stages";
import { buildPart } from "../../support/build-part";
import { buildResistors } from "../../support/build-stage";
import { seededRandom } from "../../support/random";
import { SEED } from "../../support/seed";

const RESISTOR_RATING = 0.1;
const RESISTORS = buildResistors({ r1: 680_000, r2: 180_000, rd: 2700, rs: 470 });

function simulationOf(
  part: Part,
  brief: Brief,
  resistors: Resistors = RESISTORS,
  more: Partial<Simulation> = {},
): Simulation {
  return {
    box: boxOf(part, brief, stageValues(brief, resistors)),
    conditions: conditionsOf(part, brief, RESISTOR_RATING),
    readings: null,
    builds: 4000,
    seed: 1,
    ...more,
  };
}

/** Every build that a simulation draws, one object each. */
function drawnBuilds(simulation: Simulation, count: number) {
  const columns = newBuildColumns();
  const draw = buildDrawer(simulation.box, simulation.readings, simulation.seed, null);
  const builds = [];
  for (let from = 0; from < count; from += BLOCK) {
    const some = Math.min(BLOCK, count - from);
    draw(columns, some);
    for (let at = 0; at < some; at++) {
      const resistors = RESISTOR_KEYS.map((key) => [
        key,
        simulation.box.stage[key] > 0 ? columns.resistors[key][at] : 0,
      ]);
      builds.push({
        vt: columns.vt[at],
        k: columns.k[at],
        celsius: columns.celsius[at],
        rail: columns.rail[at],
        negativeRail: columns.negativeRail[at],
        resistors: Object.fromEntries(resistors) as Resistors,
      });
    }
  }
  return builds;
}

/** Whether one build meets a brief, asked of the sheet that the product shows for a stage of just these values. */
function meets(part: Part, brief: Brief, build: ReturnType<typeof drawnBuilds>[number]): boolean {
  const { vt, k, celsius, rail, negativeRail, resistors } = build;
  // A part of these figures at the build's temperature, as the sheet takes them at 25 °C.
  const piece = {
    ...part,
    vtTyp: vt - part.tcVt * (celsius - 25),
    kTyp: k / conductionAt(1, celsius),
  };
  const negative = negativeRail > 0 ? { negative: negativeRail } : {};
  const made = { ...brief, rail: { ...brief.rail, volts: rail, ...negative } };
  const figures = figureStage(piece, made, resistors, celsius);
  const { bias, thermal, supplyCurrent, resistorPower } = figures;
  if (!bias.swing || bias.swing.symmetric < brief.swing.peak) return false;
  const { highCorner, distortion } = figureSignal(piece, made, figures);
  const gain = Math.abs(bias.gain);
  return (
    rail + negativeRail <= brief.derating.vds * part.vdss &&
    thermal.power <= thermal.permitted &&
    RESISTOR_KEYS.every((key) => resistorPower[key] <= brief.derating.resistorPower * RESISTOR_RATING) &&
    supplyCurrent <= (brief.supplyCurrent.max ?? Number.POSITIVE_INFINITY) &&
    bias.id * (resistors.rs + resistors.rs2) >= (brief.sourceDrop.min ?? 0) &&
    gain >= (brief.gain.min ?? 0) &&
    gain <= (brief.gain.max ?? Number.POSITIVE_INFINITY) &&
    bias.inputResistance >= (brief.inputResistance.min ?? 0) &&
    (highCorner ?? Number.POSITIVE_INFINITY) >= (brief.highCorner.min ?? 0) &&
    (distortion?.secondHarmonic ?? 0) <= (brief.distortion.max ?? 1)
  );
}

/** A stage's part with a spread, and a brief whose conditions some of its builds miss. */
function spreadOut(drawn: ReturnType<typeof drawStages>[number], at: number) {
  const { vt, k } = drawn.device;
  const part: Part = {
    ...drawn.part,
    ...{ vtMin: vt - 0.3, vtMax: vt + 0.3, kMin: k * 0.6, kMax: k * 1.4 },
    tcVt: -3e-3,
  };
  const figures = figureStage(drawn.part, drawn.brief, drawn.resistors);
  const { bias, supplyCurrent, thermal } = figures;
  const gain = Math.abs(bias.gain);
  const peak = 0.9 * (bias.swing?.symmetric ?? 0);
  const atSource = bias.id * (drawn.resistors.rs + drawn.resistors.rs2);
  const half = { ...drawn.brief, swing: { peak: 0.5 * peak } };
  const signal = figureSignal(drawn.part, half, figures);
  const conditions: Partial<Brief>[] = [
    { swing: { peak } },
    { gain: { min: 0.97 * gain, max: 1.04 * gain } },
    { inputResistance: { min: bias.inputResistance } },
    { supplyCurrent: { max: supplyCurrent } },
    { sourceDrop: atSource > 0 ? { min: atSource } : {} },
    { highCorner: signal.highCorner ? { min: signal.highCorner } : {} },
    { distortion: { max: Math.min(1, signal.distortion?.secondHarmonic ?? 1) } },
    { derating: { ...drawn.brief.derating, power: Math.min(1, bias.power / part.pd25) } },
    {
      derating: {
        ...drawn.brief.derating,
        resistorPower: Math.min(1, 10 * Math.max(...Object.values(figures.resistorPower))),
      },
    },
    { derating: { ...drawn.brief.derating, vds: Math.min(1, figures.network.supply / part.vdss) } },
  ];
  const brief = {
    ...half,
    ambient: { min: -10, max: thermal.permitted > 0 ? 60 : 25 },
    resistors: { ...half.resistors, tolerance: 0.05 },
    ...conditions[at % conditions.length],
  };
  return { part, brief };
}

describe(`a yield counts the builds that meet the brief (seed ${SEED})`, () => {
  const BUILDS = 300;
  const cases = drawStages(seededRandom(SEED + 30), 20, [1.3, 6]).map((drawn, at) => ({
    ...drawn,
    ...spreadOut(drawn, at),
  }));

  it.each(cases)("as the sheet of each would judge them: $name", ({ part, brief, resistors }) => {
    const simulation = simulationOf(part, brief, resistors, { builds: BUILDS, seed: SEED });
    const passed = drawnBuilds(simulation, BUILDS).filter((build) => meets(part, brief, build)).length;
    // A build on the very edge may be rounded either way.
    expect(Math.abs(simulateBuilds(simulation).fraction * BUILDS - passed)).toBeLessThanOrEqual(1);
  });

  it("as circuit laws solved by halving judge their swing", () => {
    for (const { name, part, brief, resistors } of cases) {
      const swinging = { ...SATURATED, swingPeak: brief.swing.peak };
      const simulation = simulationOf(part, brief, resistors, {
        builds: 100,
        seed: SEED,
        conditions: swinging,
      });
      const { stage } = simulation.box;
      const passed = drawnBuilds(simulation, 100).filter(({ vt, k, rail, negativeRail, resistors: made }) => {
        const plain = { ...made, circuit: stage.circuit, vdd: rail, vss: negativeRail };
        const signal = { load: stage.rl, bypassed: stage.sourceBypassed };
        const point = plainPoint({ vt, k, lambda: part.lambda }, { ...plain, ...signal });
        return point !== null && Math.min(point.up, point.down) >= brief.swing.peak;
      });
      const found = 100 * simulateBuilds(simulation).fraction;
      expect(Math.abs(found - passed.length), name).toBeLessThanOrEqual(1);
    }
  });

  it("with shares in between among them", () => {
    const shares = cases.map(
      ({ part, brief, resistors }) => simulateBuilds(simulationOf(part, brief, resistors)).fraction,
    );
    expect(shares.filter((share) => share > 0.05 && share < 0.95).length).toBeGreaterThan(cases.length / 4);
  });

  it("over the same networks as the circuits'", () => {
    for (const { part, brief, resistors } of cases) {
      const simulation = simulationOf(part, brief, resistors);
      const { stage } = simulation.box;
      const builds = newBuildColumns();
      const networks = newNetworkColumns();
      buildDrawer(simulation.box, null, SEED, null)(builds, 5);
      FILL_NETWORKS[stage.circuit](builds, 5, stage, networks);
      drawnBuilds({ ...simulation, seed: SEED }, 5).forEach((build, at) => {
        const values = { ...stage, ...build.resistors, vdd: build.rail, vss: build.negativeRail };
        const network: Network = circuitOf(stage.circuit).network(values);
        for (const [key, column] of Object.entries(networks)) {
          const expected = Number(network[key as keyof typeof networks]);
          expect(Math.abs(column[at] - expected), key).toBeLessThanOrEqual(1e-12 * Math.abs(expected));
        }
      });
    }
  });
});

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
    expect(covered(still({ vtMin: 0.9, vtMax: 1.4 }), share)).toBeGreaterThanOrEqual(33);
  });

  it("is the truncated normal's share of conduction parameters, here above the one that swings enough", () => {
    // U = ID RD with RS shorted: K (0.2 V)² 1 kΩ reaches 0.4 V at K = 10 mA/V², in the range 8 to 14 mA/V².
    const box = still({ vtMin: 1, vtTyp: 1, vtMax: 1, kMin: 0.008, kTyp: 0.01, kMax: 0.014 });
    box.stage = { ...box.stage, rs: 0 };
    const share = 1 - normalShare((0.01 - 0.011) / 0.001) / normalShare(3);
    const swinging = { ...SATURATED, swingPeak: 0.4 };
    expect(covered(box, share, swinging)).toBeGreaterThanOrEqual(33);
  });

  it("is the uniform share of rails above the one that turns the device on", () => {
    const box = {
      ...still({ vtMin: 1.23, vtTyp: 1.23, vtMax: 1.23 }),
      tolerance: { resistors: 0, rail: 0.1 },
    };
    // 12.3 V of 10.8 V to 13.2 V.
    expect(covered(box, 0.375)).toBeGreaterThanOrEqual(33);
  });

  it("is the uniform share of temperatures at which the threshold has fallen far enough", () => {
    const device = { vtMin: 1.22, vtTyp: 1.22, vtMax: 1.22, tcVt: -1e-3 };
    // 20 mV below its value at 25 °C: above 45 °C, of 0 °C to 80 °C.
    expect(covered(still(device, { min: 0, max: 80 }), 35 / 80)).toBeGreaterThanOrEqual(33);
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
    expect(inside.length).toBeGreaterThanOrEqual(33);
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

describe("the builds drawn", () => {
  const part = buildPart({ tcVt: -2e-3 });
  const brief = briefSchema.parse({ rail: { volts: 12 }, ambient: { min: -20, max: 60 } });
  const builds = drawnBuilds(simulationOf(part, brief, RESISTORS, { seed: SEED }), 512);

  it("stay inside every range", () => {
    for (const { vt, k, celsius, rail, resistors } of builds) {
      const within = (value: number, low: number, high: number) => {
        expect(value).toBeGreaterThanOrEqual(low * (1 - 1e-12));
        expect(value).toBeLessThanOrEqual(high * (1 + 1e-12));
      };
      within(celsius, -20, 60);
      within(vt, thresholdAt(part.vtMin, part.tcVt, celsius), thresholdAt(part.vtMax, part.tcVt, celsius));
      within(k, conductionAt(part.kMin, celsius), conductionAt(part.kMax, celsius));
      within(rail, 11.4, 12.6);
      within(resistors.r1, 680_000 * 0.99, 680_000 * 1.01);
      within(resistors.rs, 470 * 0.99, 470 * 1.01);
    }
  });

  it("are independent of one another: no two figures go together", () => {
    const figures = [
      builds.map(({ vt, celsius }) => thresholdAt(vt, -part.tcVt, celsius)),
      builds.map(({ k, celsius }) => k / conductionAt(1, celsius)),
      builds.map(({ celsius }) => celsius),
      builds.map(({ rail }) => rail),
      builds.map(({ resistors }) => resistors.r1),
      builds.map(({ resistors }) => resistors.r2),
      builds.map(({ resistors }) => resistors.rd),
      builds.map(({ resistors }) => resistors.rs),
    ];
    for (let a = 0; a < figures.length; a++) {
      for (let b = 0; b < a; b++) expect(Math.abs(correlation(figures[a], figures[b]))).toBeLessThan(0.25);
    }
  });

  it("are the same for the same seed, whatever their number, and others for another", () => {
    const some = simulateBuilds(simulationOf(part, brief, RESISTORS, { seed: 3 }));
    expect(simulateBuilds(simulationOf(part, brief, RESISTORS, { seed: 3 }))).toEqual(some);
    const other = drawnBuilds(simulationOf(part, brief, RESISTORS, { seed: SEED + 1 }), 512);
    expect(other[0]).not.toEqual(builds[0]);
  });
});

/** Pearson's. */
function correlation(a: readonly number[], b: readonly number[]): number {
  const mean = (values: readonly number[]) => values.reduce((sum, value) => sum + value, 0) / values.length;
  const [middleA, middleB] = [mean(a), mean(b)];
  const products = mean(a.map((value, at) => (value - middleA) * (b[at] - middleB)));
  const deviation = (values: readonly number[], middle: number) =>
    Math.sqrt(mean(values.map((value) => (value - middle) ** 2)));
  return products / (deviation(a, middleA) * deviation(b, middleB));
}

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
