import type { LineCircuit } from "../line";

export const FOLLOWER_LINE: LineCircuit = {
  axes: ["rs"],
  gate: ["r1", "r2"],
  gateSlope: [1, 0, 0],
  total: [1, 0, 0],
  output: "source",
  degeneration: () => [0, 0, 0],
};
