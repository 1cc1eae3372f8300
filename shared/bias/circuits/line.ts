import type { ResistorKey } from "#shared/schemas/circuit";

/** What the resistors around the device, without those at the gate, make of a stage, ohms; see `Network`. */
export type Line = {
  gateSlope: number;
  total: number;
  slope: number;
  output: number;
  degeneration: number;
};

/**
 * A circuit whose gate voltage depends on nothing but the resistors at the gate: its search walks the gate voltages
 * of each line. Every figure of a line only rises with each of its resistors.
 */
export type LineCircuit = {
  /** The resistors of a line, in the order in which `fill` takes them. */
  axes: readonly ResistorKey[];
  /** The resistors at the gate: two that divide the rail, or one that only ties the gate to ground. */
  gate: readonly ["r1", "r2"] | readonly ["rg"];
  /**
   * Works out a line; hot code, so it fills a record at hand.
   *
   * @param load the stage's load, ohms; Infinity without one
   * @param bypassed whether signals pass the source resistor by, where the circuit leaves that open
   */
  fill: (into: Line, load: number, bypassed: boolean, a: number, b: number, c: number) => void;
};

/** Two resistances in parallel where the second may be infinite. */
export function beside(resistance: number, load: number): number {
  return load === Number.POSITIVE_INFINITY ? resistance : (resistance * load) / (resistance + load);
}
