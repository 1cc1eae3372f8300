import type { LineCircuit } from "../line";

export const NEGATIVE_RAIL_LINE: LineCircuit = {
  axes: ["rd", "rs"],
  gate: ["rg"],
  gateSlope: [0, 1, 0],
  total: [1, 1, 0],
  output: "drain",
  degeneration: (bypassed) => (bypassed ? [0, 0, 0] : [0, 1, 0]),
};
