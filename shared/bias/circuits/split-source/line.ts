import type { LineCircuit } from "../line";

export const SPLIT_SOURCE_LINE: LineCircuit = {
  axes: ["rd", "rs", "rs2"],
  gate: ["r1", "r2"],
  gateSlope: [0, 1, 1],
  total: [1, 1, 1],
  output: "drain",
  degeneration: () => [0, 1, 0],
};
