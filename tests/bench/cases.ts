import { type Brief, briefSchema } from "#shared/schemas/brief";
import type { Part } from "#shared/schemas/part";
import { type SeriesName, valuesBetween } from "#shared/values/e-series";
import { randomParts } from "../support/build-part";
import { seededRandom } from "../support/random";
import type { PlainDevice, PlainProblem } from "./plain-stage";

const CATALOG_SEED = 2026;

/** 12 V, 10 kΩ, no conditions: the working case, with each resistor's values between the same three decades. */
export function benchBrief(series: SeriesName): Brief {
  const range = (min: number, max: number) => ({ series, min, max });
  return briefSchema.parse({
    polarity: "either",
    rail: { volts: 12, tolerance: 0.05 },
    load: { ohms: 10e3 },
    ambient: { min: 25, max: 25 },
    resistors: {
      tolerance: 0.01,
      divider: range(10e3, 10e6),
      drain: range(100, 100e3),
      source: range(10, 10e3),
    },
  });
}

/** Parts over the range of discretes, half of them without channel-length modulation; the rail is no bar to any. */
export function benchParts(count: number): Part[] {
  return randomParts(seededRandom(CATALOG_SEED), count).map((part) => ({ ...part, vdss: 60 }));
}

/** A brief of the bench as the plain loops want it. */
export function plainProblem({ rail, load, resistors }: Brief): PlainProblem {
  const { divider, drain, source } = resistors;
  if (load.ohms === null) throw new Error("The plain loops want a load.");
  return {
    vdd: rail.volts,
    load: load.ohms,
    railTolerance: rail.tolerance,
    resistorTolerance: resistors.tolerance,
    divider: valuesBetween(divider.series, divider.min, divider.max),
    drain: valuesBetween(drain.series, drain.min, drain.max),
    source: valuesBetween(source.series, source.min, source.max),
  };
}

export function plainDevice({ vtMin, vtTyp, vtMax, kMin, kTyp, kMax, lambda }: Part): PlainDevice {
  return { vt: vtTyp, k: kTyp, vtMin, vtMax, kMin, kMax, lambda };
}

/** How many resistor sets one part can be combined with. */
export function combinationsOf({ divider, drain, source }: PlainProblem): number {
  return divider.length ** 2 * drain.length * source.length;
}

/** So many parts for a loop to be measured on: every n-th in the order of λ, so that the share without λ is kept. */
export function spreadOver(parts: readonly Part[], count: number): Part[] {
  const sorted = [...parts].sort((a, b) => a.lambda - b.lambda);
  return Array.from({ length: count }, (_, n) => sorted[Math.floor(((n + 0.5) * sorted.length) / count)]);
}
