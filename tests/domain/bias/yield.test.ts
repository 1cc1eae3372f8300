import { describe, expect, it } from "vitest";
import { BLOCK, newBuildColumns, newNetworkColumns } from "#shared/bias/builds/columns";
import { conditionsOf, SATURATED } from "#shared/bias/builds/conditions";
import { buildDrawer } from "#shared/bias/builds/draw-builds";
import { FILL_NETWORKS } from "#shared/bias/builds/fill-networks";
import { circuitOf } from "#shared/bias/circuits/registry";
import { conductionAt, thresholdAt } from "#shared/bias/device";
import type { Network } from "#shared/bias/network";
import { boxOf } from "#shared/bias/spread";
import { figureSignal, figureStage, stageValues } from "#shared/bias/stage-sheet";
import { type Simulation, simulateBuilds } from "#shared/bias/yield";
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
