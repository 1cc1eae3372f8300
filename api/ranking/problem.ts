import { distortionPeak } from "#shared/bias/stage-sheet";
import type { Brief } from "#shared/schemas/brief";
import { valuesBetween } from "#shared/values/e-series";

/** What can be bought at the brief's resistor tolerance, and how much power the largest size takes. */
export type ResistorSupply = {
  /** Power rating of the largest size, W. */
  rating: number;
  /** Resistances in stock, ohms; null where stock is no condition. */
  stocked: ReadonlySet<number> | null;
};

/** A brief as the search wants it: plain numbers (a limit that isn't stated is 0 or Infinity) and lists of values. */
export type Problem = {
  vdd: number;
  load: number | null;
  sourceImpedance: number;
  bypassed: boolean;
  divider: number[];
  drain: number[];
  source: number[];
  swingPeak: number;
  gainMin: number;
  gainMax: number;
  inputResistanceMin: number;
  supplyCurrentMax: number;
  sourceDropMin: number;
  highCornerMin: number;
  distortionMax: number;
  /** Output peak at which the distortion limit holds, V. */
  distortionPeak: number;
  ambientMax: number;
  deratingVds: number;
  deratingPower: number;
  /** What each resistor may dissipate, W, derating applied. */
  resistorPower: number;
};

/** Turns a checked brief into the search's numbers. */
export function compileProblem(brief: Brief, supply: ResistorSupply): Problem {
  const { divider, drain, source } = brief.resistors;
  const list = ({ series, min, max }: typeof divider) => {
    const values = valuesBetween(series, min, max);
    return supply.stocked ? values.filter((value) => supply.stocked?.has(value)) : values;
  };
  return {
    vdd: brief.rail.volts,
    load: brief.load.ohms,
    sourceImpedance: brief.source.ohms,
    bypassed: brief.sourceResistor !== "unbypassed",
    divider: list(divider),
    drain: list(drain),
    source: brief.sourceResistor === "none" ? [0] : list(source),
    swingPeak: brief.swing.peak,
    gainMin: brief.gain.min ?? 0,
    gainMax: brief.gain.max ?? Number.POSITIVE_INFINITY,
    inputResistanceMin: brief.inputResistance.min ?? 0,
    supplyCurrentMax: brief.supplyCurrent.max ?? Number.POSITIVE_INFINITY,
    sourceDropMin: brief.sourceDrop.min ?? 0,
    highCornerMin: brief.highCorner.min ?? 0,
    distortionMax: brief.distortion.max ?? Number.POSITIVE_INFINITY,
    distortionPeak: distortionPeak(brief),
    ambientMax: brief.ambient.max,
    deratingVds: brief.derating.vds,
    deratingPower: brief.derating.power,
    resistorPower: brief.derating.resistorPower * supply.rating,
  };
}

/** How many resistor sets one part can be combined with. */
export function combinationsPerPart(problem: Problem): number {
  return problem.divider.length ** 2 * problem.drain.length * problem.source.length;
}
