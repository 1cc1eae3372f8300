import { beside, type LineCircuit } from "../line";

export const SPLIT_SOURCE_LINE: LineCircuit = {
  axes: ["rd", "rs", "rs2"],
  gate: ["r1", "r2"],
  fill: (into, load, _bypassed, rd, rs, rs2) => {
    into.gateSlope = rs + rs2;
    into.total = rd + rs + rs2;
    into.output = beside(rd, load);
    into.degeneration = rs;
    into.slope = into.output + rs;
  },
};
