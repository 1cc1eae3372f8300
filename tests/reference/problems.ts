import { type Brief, type BriefInput, briefSchema } from "#shared/schemas/brief";
import { type CircuitName, resistorsOf } from "#shared/schemas/circuit";
import type { Part } from "#shared/schemas/part";
import { valuesBetween } from "#shared/values/e-series";
import { randomParts } from "../support/build-part";
import { type Random, significant } from "../support/random";
import type { PlainBrief, PlainResistor } from "./plain-loop";

/** Each combination of a drain feedback has twice as many corners to solve as of any other circuit. */
const mostCombinations = (circuit: CircuitName) => (circuit === "drain-feedback" ? 1500 : 5000);
const RATING = 1;

/** Sizes of each value, in ohms: small, middle and large, at prices that differ from value to value; a few have none. */
function sizesOf(ohms: number) {
  const digits = Number(
    ohms
      .toPrecision(2)
      .replace(/[^1-9]/g, "")
      .slice(0, 2),
  );
  if (digits % 11 === 0) return [];
  return [
    { power: 0.0625, voltage: 25, lineCents: 20 + (digits % 3) },
    { power: 0.125, voltage: 75, lineCents: 22 + (digits % 4) },
    { power: 1, voltage: 250, lineCents: 40 },
  ];
}

const PRICED = (["E3", "E6", "E12", "E24"] as const).flatMap((series) => valuesBetween(series, 10, 10e6));

export const SUPPLY = {
  rating: RATING,
  stocked: null,
  prices: new Map(PRICED.map((ohms) => [ohms, sizesOf(ohms)])),
};

/** The range of the brief that each resistor takes its values from. */
const RANGES: Record<PlainResistor, "divider" | "drain" | "source"> = {
  r1: "divider",
  r2: "divider",
  rg: "divider",
  rd: "drain",
  rs: "source",
  rs2: "source",
};

/** A small problem: few values, any mix of conditions, loads, polarities and source resistors. */
export function drawProblem(
  random: Random,
  circuit: CircuitName,
  most = mostCombinations(circuit),
): { brief: Brief; parts: Part[]; combinations: number } {
  for (;;) {
    const parts = randomParts(random, random.whole(1, 5));
    const brief = drawBrief(random, circuit);
    const choices = Object.values(plainValues(brief)).reduce((product, values) => product * values.length, 1);
    const combinations = parts.length * choices;
    if (combinations > 0 && combinations <= most) return { brief, parts, combinations };
  }
}

function drawBrief(random: Random, circuit: CircuitName): Brief {
  const maybe = <T>(probability: number, value: () => T) =>
    random.chance(probability) ? value() : undefined;
  const series = () => random.pick(["E3", "E6", "E12", "E24"] as const);
  const range = (low: number, high: number) => {
    const min = significant(random.logBetween(low, high), 2);
    return { series: series(), min, max: min * random.pick([2, 4, 10]) };
  };
  const volts = random.pick([3, 5, 9, 12, 15, 24]);
  const follows = circuit === "follower";
  const divider = range(10e3, 220e3);
  const peak = maybe(0.5, () => significant(volts * random.between(0.01, 0.15)));
  const gain = {
    min: maybe(0.3, () => significant(follows ? random.between(0.5, 0.95) : random.between(1, 6))),
    max: maybe(0.2, () => significant(follows ? 0.97 : random.between(8, 60))),
  };
  const input: BriefInput = {
    circuit,
    polarity: random.pick(["n", "p", "either"] as const),
    rail: {
      volts,
      tolerance: random.pick([0, 0.02, 0.05]),
      negative: circuit === "negative-rail" ? maybe(0.5, () => random.pick([3, 5, 9])) : undefined,
    },
    load: { ohms: random.chance(0.3) ? null : significant(random.logBetween(1e3, 100e3), 2) },
    source: { ohms: random.pick([0, 600, 10e3]) },
    swing: { peak: peak ?? 0 },
    gain,
    inputResistance: { min: maybe(0.3, () => significant(divider.min * random.between(0.6, 2))) },
    supplyCurrent: { max: maybe(0.3, () => significant(random.logBetween(3e-4, 1e-2))) },
    highCorner: { min: maybe(0.25, () => significant(random.logBetween(2e4, 3e6))) },
    distortion: {
      max: maybe(0.3, () => significant(random.between(0.005, 0.06))),
      atPeak: maybe(0.3, () => significant(volts * random.between(0.02, 0.15))),
    },
    ambient: random.chance(0.5)
      ? { min: 25, max: 25 }
      : { min: random.pick([-40, 0]), max: random.pick([50, 85]) },
    sourceResistor:
      circuit === "four-resistor" || circuit === "drain-feedback"
        ? random.pick(["bypassed", "bypassed", "unbypassed", "none"] as const)
        : random.pick(["bypassed", "unbypassed"] as const),
    sourceDrop: { min: maybe(0.25, () => significant(volts * random.between(0.01, 0.1))) },
    resistors: {
      divider,
      drain: range(200, 10e3),
      source: range(20, 4e3),
      tolerance: random.pick([0, 0.01, 0.05]),
    },
    derating: { vds: 0.8, power: random.pick([0.05, 0.5, 1]), resistorPower: random.pick([0.01, 0.5]) },
  };
  const parsed = briefSchema.safeParse(input);
  return parsed.success ? parsed.data : drawBrief(random, circuit);
}

/** The values that each resistor of a brief's circuit may have. */
function plainValues(brief: Brief): Partial<Record<PlainResistor, number[]>> {
  return Object.fromEntries(
    resistorsOf(brief.circuit).map((key) => {
      const { series, min, max } = brief.resistors[RANGES[key]];
      const values = valuesBetween(series, min, max);
      if (key === "rs" && brief.sourceResistor === "none") return [key, [0]];
      // A drain feedback may do without its resistor from gate to ground.
      return [key, brief.circuit === "drain-feedback" && key === "r2" ? [0, ...values] : values];
    }),
  );
}

/** A brief in the plain loop's own words. */
export function plainBrief(brief: Brief, objective: PlainBrief["objective"]): PlainBrief {
  return {
    circuit: brief.circuit,
    objective,
    vdd: brief.rail.volts,
    vss: brief.circuit === "negative-rail" ? (brief.rail.negative ?? brief.rail.volts) : 0,
    load: brief.load.ohms,
    sourceImpedance: brief.source.ohms,
    bypassed: brief.sourceResistor !== "unbypassed",
    values: plainValues(brief),
    resistorTolerance: brief.resistors.tolerance,
    railTolerance: brief.rail.tolerance,
    ambient: [brief.ambient.min, brief.ambient.max],
    swingPeak: brief.swing.peak,
    gainMin: brief.gain.min,
    gainMax: brief.gain.max,
    inputResistanceMin: brief.inputResistance.min,
    supplyCurrentMax: brief.supplyCurrent.max,
    sourceDropMin: brief.sourceDrop.min,
    highCornerMin: brief.highCorner.min,
    distortionMax: brief.distortion.max,
    distortionPeak: brief.distortion.atPeak ?? brief.swing.peak,
    deratingVds: brief.derating.vds,
    deratingPower: brief.derating.power,
    resistorPower: brief.derating.resistorPower * RATING,
    partCents: ({ priceBreaks }) => {
      const reached = priceBreaks.filter(({ quantity }) => quantity <= brief.buildQuantity);
      const last = reached[reached.length - 1];
      return last ? last.unitPrice * brief.buildQuantity : null;
    },
    resistorCents: (ohms, watts, volts) => {
      const share = brief.derating.resistorPower;
      for (const size of sizesOf(ohms)) {
        if (watts <= share * size.power && volts <= share * size.voltage) return size.lineCents;
      }
      return null;
    },
  };
}
