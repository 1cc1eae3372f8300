import { circuitOf } from "#shared/bias/circuits/registry";
import { distortionPeak, negativeRail } from "#shared/bias/stage-sheet";
import type { Brief } from "#shared/schemas/brief";
import { type CircuitName, RESISTOR_KEYS, type ResistorKey, resistorsOf } from "#shared/schemas/circuit";
import type { Objective } from "#shared/schemas/fits";
import { valuesBetween } from "#shared/values/e-series";
import type { ResistorPrices } from "./cost";

/** What can be bought at the brief's resistor tolerance, and how much power the largest size takes. */
export type ResistorSupply = {
  /** Power rating of the largest size, W. */
  rating: number;
  /** Resistances in stock, ohms; null where stock is no condition. */
  stocked: ReadonlySet<number> | null;
  /** What resistors cost at the brief's build quantity. */
  prices: ResistorPrices;
};

/** A brief as the search wants it: plain numbers (a limit that isn't stated is 0 or Infinity) and lists of values. */
export type Problem = {
  circuit: CircuitName;
  objective: Objective;
  vdd: number;
  /** Magnitude of the negative rail; 0 where the circuit has none. */
  vss: number;
  railTolerance: number;
  resistorTolerance: number;
  load: number | null;
  sourceImpedance: number;
  bypassed: boolean;
  /** The values that each resistor may have, ohms, ascending; none for those the circuit lacks. */
  values: Record<ResistorKey, number[]>;
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
  ambientMin: number;
  ambientMax: number;
  deratingVds: number;
  deratingPower: number;
  /** What each resistor may dissipate, W, derating applied. */
  resistorPower: number;
  resistorDerating: number;
  /** What resistors cost; empty unless the objective is the cost. */
  prices: ResistorPrices;
};

/** Turns a checked brief into the search's numbers. */
export function compileProblem(brief: Brief, objective: Objective, supply: ResistorSupply): Problem {
  const { ranges } = circuitOf(brief.circuit);
  const optional = resistorsOf(brief.circuit, "optional");
  const list = (key: ResistorKey): number[] => {
    const range = ranges[key];
    if (!range) return [];
    if (key === "rs" && brief.sourceResistor === "none") return [0];
    const { series, min, max } = brief.resistors[range];
    const values = valuesBetween(series, min, max).filter((value) => supply.stocked?.has(value) ?? true);
    // A source resistor is there or not as the brief says; what else the circuit may do without is tried both ways.
    return optional.includes(key) && key !== "rs" ? [0, ...values] : values;
  };
  return {
    circuit: brief.circuit,
    objective,
    vdd: brief.rail.volts,
    vss: negativeRail(brief),
    railTolerance: brief.rail.tolerance,
    resistorTolerance: brief.resistors.tolerance,
    load: brief.load.ohms,
    sourceImpedance: brief.source.ohms,
    bypassed: brief.sourceResistor !== "unbypassed",
    values: Object.fromEntries(RESISTOR_KEYS.map((key) => [key, list(key)])) as Problem["values"],
    swingPeak: brief.swing.peak,
    gainMin: brief.gain.min ?? 0,
    gainMax: brief.gain.max ?? Number.POSITIVE_INFINITY,
    inputResistanceMin: brief.inputResistance.min ?? 0,
    supplyCurrentMax: brief.supplyCurrent.max ?? Number.POSITIVE_INFINITY,
    sourceDropMin: brief.sourceDrop.min ?? 0,
    highCornerMin: brief.highCorner.min ?? 0,
    distortionMax: brief.distortion.max ?? Number.POSITIVE_INFINITY,
    distortionPeak: distortionPeak(brief),
    ambientMin: brief.ambient.min,
    ambientMax: brief.ambient.max,
    deratingVds: brief.derating.vds,
    deratingPower: brief.derating.power,
    resistorPower: brief.derating.resistorPower * supply.rating,
    resistorDerating: brief.derating.resistorPower,
    prices: objective === "cost" ? supply.prices : new Map(),
  };
}

/** How many resistor sets one part can be combined with. */
export function combinationsPerPart({ circuit, values }: Problem): number {
  return resistorsOf(circuit).reduce((product, key) => product * values[key].length, 1);
}
