import { beside, type LineCircuit } from "../line";

export const FOUR_RESISTOR_LINE: LineCircuit = {
  axes: ["rd", "rs"],
  gate: ["r1", "r2"],
  fill: (into, load, bypassed, rd, rs) => {
    into.gateSlope = rs;
    into.total = rd + rs;
    into.output = beside(rd, load);
    into.degeneration = bypassed ? 0 : rs;
    into.slope = into.output + into.degeneration;
  },
};
