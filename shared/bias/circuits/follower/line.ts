import { beside, type LineCircuit } from "../line";

export const FOLLOWER_LINE: LineCircuit = {
  axes: ["rs"],
  gate: ["r1", "r2"],
  fill: (into, load, _bypassed, rs) => {
    const output = beside(rs, load);
    into.gateSlope = rs;
    into.total = rs;
    into.slope = output;
    into.output = output;
    into.degeneration = output;
  },
};
