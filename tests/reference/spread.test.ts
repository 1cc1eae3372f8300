import { describe, expect, it } from "vitest";
import { circuitOf } from "#shared/bias/circuits/registry";
import { roomOf, solveQPoint } from "#shared/bias/network";
import { assuredSwing, type Box } from "#shared/bias/spread";
import type { Swing } from "#shared/schemas/bias";
import { RESISTOR_KEYS } from "#shared/schemas/circuit";
import { type Random, seededRandom } from "../support/random";
import { SEED } from "../support/seed";
import { plainAssured } from "./plain-stage";
import { drawStages } from "./random-stages";

/** Stages of each circuit; EVENSWING_STAGES=200 is the full form. */
const STAGES = Number(process.env.EVENSWING_STAGES ?? 16);
const BUILDS = Number(process.env.EVENSWING_BUILDS ?? 20_000);

/** Where a value lies in its range: -1 the lowest, 1 the highest. */
type Draw = () => number;

describe(`every build inside the spread has the assured swing (seed ${SEED})`, () => {
  const random = seededRandom(SEED + 20);
  const drawn = drawStages(random, 3 * STAGES, [1.6, 8]).map((stage) => ({
    ...stage,
    box: boxAround(random, stage),
  }));
  const circuits = [...new Set(drawn.map(({ stage }) => stage.circuit))];

  it.each(circuits)("of a %s stage", (circuit) => {
    // A stage of which some build has no swing promises nothing.
    const promising = drawn.filter(
      ({ stage, box }) => stage.circuit === circuit && assuredSwing(box).swing.symmetric > 0,
    );
    expect(promising.length).toBeGreaterThanOrEqual(STAGES);
    const stages = promising.filter((_, at) => (at * STAGES) % promising.length < STAGES);
    let reached = 0;
    for (const { name, box } of stages) {
      const assured = assuredSwing(box).swing;
      const least = leastOf(random, box);
      for (const side of ["symmetric", "towardCutoff", "towardOhmic"] as const) {
        expect(least[side], `${name}: ${side}`).toBeGreaterThanOrEqual(assured[side] * (1 - 1e-9));
      }
      if (least.symmetric < 1.03 * assured.symmetric) reached++;
    }
    // A bound that is never reached would be safe and useless.
    expect(reached).toBeGreaterThanOrEqual(0.9 * STAGES);
  });
});

describe(`the assured swing is the least of all corners and of the valleys between them (seed ${SEED})`, () => {
  const random = seededRandom(SEED + 21);
  const stages = drawStages(random, 6, [1.6, 8]).map((drawn) => ({
    ...drawn,
    box: boxAround(random, drawn),
  }));

  it.each(stages)("as circuit laws solved by halving have it: $name", ({ box }) => {
    const { device, stage, tolerance, ambient } = box;
    const plain = plainAssured({
      ...{ vt: [device.vtMin, device.vtMax], k: [device.kMin, device.kMax] },
      ...{ lambda: device.lambda, tcVt: device.tcVt },
      stage: { ...stage, load: stage.rl, bypassed: stage.sourceBypassed },
      ...{ resistors: tolerance.resistors, rail: tolerance.rail },
      ambient: [ambient.min, ambient.max],
    });
    const { symmetric } = assuredSwing(box).swing;
    expect(Math.abs(symmetric - plain)).toBeLessThanOrEqual(1e-7 * Math.max(plain, 0.01));
  });
});

/** A spread around a stage: that of a narrow bin up to one that some builds don't survive. */
function boxAround(random: Random, { device, stage }: ReturnType<typeof drawStages>[number]): Box {
  const { vt, k, lambda } = device;
  const width = random.between(0.02, 0.3);
  const spread = random.between(0.05, 0.5);
  const coldest = random.between(-40, 40);
  return {
    device: {
      ...{ vtMin: vt - width, vtTyp: vt, vtMax: vt + width },
      ...{ kMin: k * (1 - spread), kTyp: k, kMax: k * (1 + spread) },
      lambda,
      tcVt: -random.between(0, 5e-3),
    },
    stage,
    tolerance: { resistors: random.pick([0, 0.01, 0.02, 0.05, 0.1]), rail: random.between(0, 0.1) },
    ambient: { min: coldest, max: coldest + random.pick([0, 1, random.between(10, 85)]) },
  };
}

/** The least room of many builds of a box, each way and both ways; 0 for one that isn't saturated. */
function leastOf(random: Random, box: Box): Swing {
  const anywhere: Draw = () => random.between(-1, 1);
  const end: Draw = () => (random.chance(0.5) ? 1 : -1);
  const least = {
    towardCutoff: Number.POSITIVE_INFINITY,
    towardOhmic: Number.POSITIVE_INFINITY,
    symmetric: Number.POSITIVE_INFINITY,
  };
  for (let build = 0; build < BUILDS; build++) {
    // Half of the builds anywhere; the rest at corners, at an end of the ambient range or anywhere in it.
    const swing = swingOfBuild(box, build % 2 === 0 ? anywhere : end, build % 4 === 1 ? end : anywhere);
    least.towardCutoff = Math.min(least.towardCutoff, swing.towardCutoff);
    least.towardOhmic = Math.min(least.towardOhmic, swing.towardOhmic);
    least.symmetric = Math.min(least.symmetric, swing.symmetric);
  }
  return least;
}

function swingOfBuild({ device, stage, tolerance, ambient }: Box, draw: Draw, drawCelsius: Draw): Swing {
  const within = (low: number, high: number, at: number) => (low + high) / 2 + (at * (high - low)) / 2;
  const celsius = within(ambient.min, ambient.max, drawCelsius());
  const built = {
    vt: within(device.vtMin, device.vtMax, draw()) + device.tcVt * (celsius - 25),
    k: within(device.kMin, device.kMax, draw()) * ((celsius + 273.15) / 298.15) ** -1.5,
    lambda: device.lambda,
  };
  const values = { ...stage };
  values.vdd *= 1 + tolerance.rail * draw();
  values.vss *= 1 + tolerance.rail * draw();
  for (const key of RESISTOR_KEYS) if (stage[key] > 0) values[key] *= 1 + tolerance.resistors * draw();
  const network = circuitOf(stage.circuit).network(values);
  const q = solveQPoint(built, network);
  if (q.region !== "saturation") return { towardCutoff: 0, towardOhmic: 0, symmetric: 0 };
  const { towardCutoff, towardOhmic } = roomOf(built, network, q);
  return { towardCutoff, towardOhmic, symmetric: Math.max(0, Math.min(towardCutoff, towardOhmic)) };
}
