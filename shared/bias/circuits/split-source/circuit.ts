import { dividerVoltage } from "#shared/bias/divider";
import { parallel } from "#shared/bias/swing";
import type { Circuit } from "../circuit";

/**
 * The common-source stage with a split source resistor: RS carries signal, RS2 below it is bypassed. At d.c. they act
 * as their sum, VGS = VG - ID (RS + RS2), VDS = VDD - ID (RD + RS + RS2); for signals only RS degenerates.
 *
 * Where the least room lies, for λ = 0. U = ID rL only falls with either source resistor, as at d.c. they are one.
 * D >= S holds where VG <= N = VT + x + I (RS + RS2), with I solving VDD = v + I (RD + RS + RS2) + S (1 + RS/rL),
 * v = √((I + s)/K), s = S/rL, x = √(I/K). With RS2 moving, N = x + (rest of the rail) - v - I RD, and with RS moving,
 * N = x + I/(I + s) (rest - v - I (RD + RS2)) + I RS2: both concave in I, which each of them moves one way, so each
 * lies at an end. Rail, K and RD act as in any stage whose source resistors are one of these.
 */
export const SPLIT_SOURCE: Circuit = {
  title: "Common source, split source resistor",
  description:
    "R1 and R2 divide the rail for the gate, RD stands at the drain; RS stays in the signal's way, RS2 below it is bypassed.",
  ranges: { r1: "divider", r2: "divider", rd: "drain", rs: "source", rs2: "source" },
  sourceResistors: ["bypassed"],
  network: ({ vdd, r1, r2, rd, rs, rs2, rl }) => {
    const output = parallel(rd, rl);
    return {
      gate: dividerVoltage(vdd, r1, r2),
      gateSlope: rs + rs2,
      supply: vdd,
      total: rd + rs + rs2,
      slope: output + rs,
      degeneration: rs,
      output,
      feedthrough: 0,
      inverting: true,
    };
  },
  nodes: ({ vdd, r1, r2, rd, rs, rs2 }, id) => ({
    gate: dividerVoltage(vdd, r1, r2),
    source: id * (rs + rs2),
    drain: vdd - id * rd,
  }),
  resistorVoltages: ({ vdd, r1, r2, rd, rs, rs2 }, id) => {
    const r2Volts = dividerVoltage(vdd, r1, r2);
    return { r1: vdd - r2Volts, r2: r2Volts, rd: id * rd, rs: id * rs, rs2: id * rs2 };
  },
  supplyCurrent: ({ vdd, r1, r2 }, id) => id + vdd / (r1 + r2),
  inputResistance: ({ r1, r2 }) => parallel(r1, r2),
  outputResistance: ({ rd, rs }, { gm, gds }) => 1 / (1 / rd + gds / (1 + (gm + gds) * rs)),
  signalNodes: ({ r1, r2, rd, rs, rl }) => ({
    drain: parallel(rd, rl),
    source: rs,
    gate: parallel(r1, r2),
    feedback: null,
    output: "drain",
  }),
  couplingNodes: ({ r1, r2, rd, rs, rs2, rl }) => ({
    drain: rd,
    load: rl,
    source: { signal: rs, bypassed: rs2 },
    gate: parallel(r1, r2),
    feedback: null,
    output: "drain",
  }),
  worst: {
    cutoff: { fixed: { rail: -1, k: -1, r1: 1, r2: -1, rs: 1, rs2: 1 }, either: ["rd"] },
    ohmic: { fixed: { r1: -1, r2: 1 }, either: ["rail", "k", "rd", "rs", "rs2"] },
  },
};
