import type { LineCircuit } from "../line";

export const FOUR_RESISTOR_LINE: LineCircuit = {
  axes: ["rd", "rs"],
  gate: ["r1", "r2"],
  gateSlope: [0, 1, 0],
  total: [1, 1, 0],
  output: "drain",
  degeneration: (bypassed) => (bypassed ? [0, 0, 0] : [0, 1, 0]),
};
