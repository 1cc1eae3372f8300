import { afterAll, describe, expect, it } from "vitest";
import { type BriefInput, briefSchema } from "#shared/schemas/brief";
import type { Part } from "#shared/schemas/part";
import { valuesBetween } from "#shared/values/e-series";
import { closePool } from "../../api/ranking/pool";
import { rankFits } from "../../api/ranking/rank-fits";
import { randomParts } from "../support/build-part";
import { type Random, seededRandom, significant } from "../support/random";
import { type PlainBrief, tryEveryCombination } from "./plain-loop";

const PROBLEMS = 48;
const MOST_COMBINATIONS = 200_000;
const RATING = 1;

afterAll(closePool);

const plainValues = (series: "E6" | "E12" | "E24", min: number, max: number) =>
  valuesBetween(series, min, max);

/** A small problem: few values, any mix of conditions, loads, polarities and source resistors. */
function drawProblem(random: Random): { input: BriefInput; parts: Part[]; combinations: number } {
  for (;;) {
    const parts = randomParts(random, random.whole(1, 8));
    const volts = random.pick([3, 5, 9, 12, 15, 24]);
    const series = random.pick(["E6", "E12", "E24"] as const);
    const low = significant(random.logBetween(10e3, 220e3), 2);
    const drainLow = significant(random.logBetween(200, 10e3), 2);
    const sourceLow = significant(random.logBetween(20, 2e3), 2);
    const divider = { series, min: low, max: low * random.pick([4, 10, 30]) };
    const drain = { series: random.pick(["E6", "E12"] as const), min: drainLow, max: drainLow * 10 };
    const source = { series: random.pick(["E6", "E12"] as const), min: sourceLow, max: sourceLow * 10 };
    const maybe = <T>(probability: number, value: () => T) =>
      random.chance(probability) ? value() : undefined;
    const peak = maybe(0.6, () => significant(volts * random.between(0.02, 0.2)));
    const input: BriefInput = {
      polarity: random.pick(["n", "p", "either"] as const),
      rail: { volts, tolerance: 0.05 },
      load: { ohms: random.chance(0.3) ? null : significant(random.logBetween(1e3, 100e3), 2) },
      source: { ohms: random.pick([0, 600, 10e3]) },
      swing: { peak: peak ?? 0 },
      gain: {
        min: maybe(0.3, () => significant(random.between(1, 6))),
        max: maybe(0.2, () => significant(random.between(8, 60))),
      },
      inputResistance: { min: maybe(0.3, () => significant(low * random.between(0.6, 2))) },
      supplyCurrent: { max: maybe(0.3, () => significant(random.logBetween(3e-4, 1e-2))) },
      highCorner: { min: maybe(0.25, () => significant(random.logBetween(2e4, 3e6))) },
      distortion: {
        max: maybe(0.3, () => significant(random.between(0.005, 0.06))),
        atPeak: maybe(0.3, () => significant(volts * random.between(0.02, 0.15))),
      },
      ambient: { min: 0, max: random.pick([25, 50, 85]) },
      sourceResistor: random.pick(["bypassed", "bypassed", "unbypassed", "none"] as const),
      sourceDrop: { min: maybe(0.25, () => significant(volts * random.between(0.01, 0.1))) },
      resistors: { divider, drain, source },
      derating: { vds: 0.8, power: random.pick([0.05, 0.5, 1]), resistorPower: random.pick([0.01, 0.5]) },
    };
    const count = (range: typeof divider | typeof drain) =>
      valuesBetween(range.series, range.min, range.max).length;
    const combinations =
      parts.length *
      count(divider) ** 2 *
      count(drain) *
      (input.sourceResistor === "none" ? 1 : count(source));
    if (combinations > 0 && combinations <= MOST_COMBINATIONS) return { input, parts, combinations };
  }
}

/** The same brief in the plain loop's own words. */
function plainBrief(input: BriefInput): PlainBrief {
  const brief = briefSchema.parse(input);
  const list = (range: { series: string; min: number; max: number }) =>
    plainValues(range.series as "E12", range.min, range.max);
  return {
    vdd: brief.rail.volts,
    load: brief.load.ohms,
    sourceImpedance: brief.source.ohms,
    sourceResistor: brief.sourceResistor,
    divider: list(brief.resistors.divider),
    drain: list(brief.resistors.drain),
    source: list(brief.resistors.source),
    swingPeak: brief.swing.peak,
    gainMin: brief.gain.min,
    gainMax: brief.gain.max,
    inputResistanceMin: brief.inputResistance.min,
    supplyCurrentMax: brief.supplyCurrent.max,
    sourceDropMin: brief.sourceDrop.min,
    highCornerMin: brief.highCorner.min,
    distortionMax: brief.distortion.max,
    distortionPeak: brief.distortion.atPeak ?? brief.swing.peak,
    ambientMax: brief.ambient.max,
    deratingVds: brief.derating.vds,
    deratingPower: brief.derating.power,
    resistorPower: brief.derating.resistorPower * RATING,
  };
}

describe("the ranking equals trying every combination", () => {
  const supply = { rating: RATING, stocked: null };

  for (let seed = 1; seed <= PROBLEMS; seed++) {
    it(`on random problem ${seed}`, async () => {
      const { input, parts, combinations } = drawProblem(seededRandom(seed));
      const brief = briefSchema.parse(input);
      const allowed = parts.filter((part) => brief.polarity === "either" || part.polarity === brief.polarity);
      const expected = tryEveryCombination(plainBrief(input), allowed);
      const all = await rankFits(
        { brief, objective: "centred", distinct: "none", limit: 5000 },
        parts,
        supply,
      );
      const values = ({ r1, r2, rd, rs }: { r1: number; r2: number; rd: number; rs: number }) => [
        r1,
        r2,
        rd,
        rs,
      ];
      expect(all.considered).toBe((combinations / parts.length) * allowed.length);
      expect(all.fits.map((fit) => [fit.part.id, ...values(fit)])).toEqual(
        expected.slice(0, 5000).map((fit) => [fit.partId, ...values(fit)]),
      );
      expect(all.partsThatFit).toBe(new Set(expected.map((fit) => fit.partId)).size);

      const few = await rankFits({ brief, objective: "centred", distinct: "none", limit: 7 }, parts, supply);
      expect(few.fits).toEqual(all.fits.slice(0, 7));

      const perPart = await rankFits(
        { brief, objective: "centred", distinct: "part", limit: 100 },
        parts,
        supply,
      );
      const firstOfEach = expected.filter(
        (fit, index) => expected.findIndex((other) => other.partId === fit.partId) === index,
      );
      expect(perPart.fits.map((fit) => [fit.part.id, ...values(fit)])).toEqual(
        firstOfEach.map((fit) => [fit.partId, ...values(fit)]),
      );
    });
  }
});
