import type { ResistorKey } from "#shared/schemas/circuit";

/** For each resistor of a line whether it counts, 1, or not, 0. */
export type Counts = readonly [0 | 1, 0 | 1, 0 | 1];

/**
 * A circuit whose gate voltage depends on nothing but the resistors at the gate, so that its search can walk the gate
 * voltages of each line of resistors around the device. As plain coefficients, because the search lives on them. The
 * first resistor of a line stands where the output is, so that the a.c. load is that resistor beside the load.
 */
export type LineCircuit = {
  /** The resistors of a line; at most three. */
  axes: readonly ResistorKey[];
  /** The resistors at the gate: two that divide the rail, or one that only ties the gate to ground. */
  gate: readonly ["r1", "r2"] | readonly ["rg"];
  /** Which resistors the gate-source voltage loses ID times. */
  gateSlope: Counts;
  /** Which resistors the drain-source voltage loses ID times. */
  total: Counts;
  /** Where the output is taken from. From the source, all of it is fed back and the drain stands still. */
  output: "drain" | "source";
  /** Which resistors feed signal back into the gate-source voltage, the output itself apart. */
  degeneration: (bypassed: boolean) => Counts;
};
