import { FOLLOWER_LINE } from "./follower/line";
import { FOUR_RESISTOR_LINE } from "./four-resistor/line";
import type { LineCircuit } from "./line";
import { NEGATIVE_RAIL_LINE } from "./negative-rail/line";
import { SPLIT_SOURCE_LINE } from "./split-source/line";

/** The circuits whose gate voltage depends on the gate's resistors alone. */
export const LINE_CIRCUITS = {
  "four-resistor": FOUR_RESISTOR_LINE,
  "split-source": SPLIT_SOURCE_LINE,
  follower: FOLLOWER_LINE,
  "negative-rail": NEGATIVE_RAIL_LINE,
} as const satisfies Record<string, LineCircuit>;

export type LineCircuitName = keyof typeof LINE_CIRCUITS;
