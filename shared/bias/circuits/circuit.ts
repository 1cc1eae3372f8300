import type { Network } from "#shared/bias/network";
import type { StageValues } from "#shared/schemas/bias";
import type { Brief } from "#shared/schemas/brief";
import type { ResistorKey, Resistors } from "#shared/schemas/circuit";

/** Voltages of the device's terminals against ground, V (magnitudes from the common rail). */
export type NodeVoltages = { gate: number; source: number; drain: number };

/** Small-signal figures of the device at its Q-point, S. */
export type Conductances = { gm: number; gds: number };

/** How a signal flows around the device: what stands at each of its terminals, ohms. */
export type SignalNodes = {
  /** From drain to signal ground; 0 where the drain is at signal ground. */
  drain: number;
  /** From source to signal ground; 0 where the source is at signal ground. */
  source: number;
  /** From gate to signal ground, without what the output feeds back. */
  gate: number;
  /** Between drain and gate, ohms; null where there is nothing. */
  feedback: number | null;
  /** The terminal that the output is taken from. */
  output: "drain" | "source";
};

/** What the coupling and bypass capacitors stand among, ohms. */
export type CouplingNodes = Pick<SignalNodes, "gate" | "feedback" | "output"> & {
  /** From drain to signal ground without the load; 0 where the drain is at signal ground. */
  drain: number;
  /** Behind the output capacitor; null without a load, which needs no coupling. */
  load: number | null;
  /** From source to signal ground: what stays in the signal's way, and below it what is bypassed (0 for none). */
  source: { signal: number; bypassed: number };
};

/** What may lie anywhere in its range from build to build, beside the threshold. */
export type BuildValue = ResistorKey | "rail" | "negativeRail" | "k";

/** Which end of its range each value of a build takes: -1 the lowest, 1 the highest. */
export type BuildEnds = Partial<Record<BuildValue, -1 | 1>>;

/**
 * Where the least room of a box of builds can lie, as the circuit has proved it: some values at a fixed end, and
 * every combination of the ends of those named in `either`. The threshold is at its highest toward cutoff and at its
 * lowest toward the ohmic region in every circuit.
 */
export type WorstEnds = { fixed: BuildEnds; either: readonly BuildValue[] };

/** One circuit: all that the engine has to know of it. */
export type Circuit = {
  title: string;
  /** One sentence that says what stands where. */
  description: string;
  /** The range of the brief that each resistor's values come from. */
  ranges: Partial<Record<ResistorKey, keyof Pick<Brief["resistors"], "divider" | "drain" | "source">>>;
  /** The treatments of the source resistor that a brief may choose between; one means there is no choice. */
  sourceResistors: readonly Brief["sourceResistor"][];
  network: (stage: StageValues) => Network;
  nodes: (stage: StageValues, id: number) => NodeVoltages;
  /** The voltage across each resistor the circuit has, V. */
  resistorVoltages: (stage: StageValues, id: number) => Partial<Resistors>;
  /** What the stage takes from its positive rail, A. */
  supplyCurrent: (stage: StageValues, id: number) => number;
  /** What the gate node shows a signal, ohms. */
  inputResistance: (stage: StageValues, gain: number) => number;
  /** What the output shows its load, ohms, the load itself left out. */
  outputResistance: (stage: StageValues, device: Conductances) => number;
  signalNodes: (stage: StageValues) => SignalNodes;
  couplingNodes: (stage: StageValues) => CouplingNodes;
  /** Where the least room toward cutoff and toward the ohmic region can lie; the proofs stand in the circuit's file. */
  worst: { cutoff: WorstEnds; ohmic: WorstEnds };
};
