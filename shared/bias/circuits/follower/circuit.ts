import { dividerVoltage } from "#shared/bias/divider";
import { parallel } from "#shared/bias/swing";
import type { Circuit } from "../circuit";

/**
 * The source follower: R1 and R2 divide the rail for the gate, the drain stands at the rail, RS carries the output and
 * the load with it, rL = RS || RL. VGS = VG - ID RS, VDS = VDD - ID RS; the output follows the input.
 *
 * Where the least room lies. U = ID rL: ID rises with the rail, K and R2 and falls with VT, R1 and RS, while rL rises
 * with RS, so RS is tried at both ends. D = (iT - ID) rL = VDSQ - vT, tried at both ends of rail, K and RS.
 */
export const FOLLOWER: Circuit = {
  title: "Source follower",
  description:
    "R1 and R2 divide the rail for the gate, the drain stands at the rail, the output is at the source.",
  ranges: { r1: "divider", r2: "divider", rs: "source" },
  sourceResistors: ["unbypassed"],
  network: ({ vdd, r1, r2, rs, rl }) => {
    const output = parallel(rs, rl);
    return {
      gate: dividerVoltage(vdd, r1, r2),
      gateSlope: rs,
      supply: vdd,
      total: rs,
      slope: output,
      degeneration: output,
      output,
      feedthrough: 0,
      inverting: false,
    };
  },
  nodes: ({ vdd, r1, r2, rs }, id) => ({ gate: dividerVoltage(vdd, r1, r2), source: id * rs, drain: vdd }),
  resistorVoltages: ({ vdd, r1, r2, rs }, id) => {
    const r2Volts = dividerVoltage(vdd, r1, r2);
    return { r1: vdd - r2Volts, r2: r2Volts, rs: id * rs };
  },
  supplyCurrent: ({ vdd, r1, r2 }, id) => id + vdd / (r1 + r2),
  inputResistance: ({ r1, r2 }) => parallel(r1, r2),
  outputResistance: ({ rs }, { gm, gds }) => 1 / (1 / rs + gm + gds),
  signalNodes: ({ r1, r2, rs, rl }) => ({
    drain: 0,
    source: parallel(rs, rl),
    gate: parallel(r1, r2),
    feedback: null,
    output: "source",
  }),
  couplingNodes: ({ r1, r2, rs, rl }) => ({
    drain: 0,
    load: rl,
    source: { signal: rs, bypassed: 0 },
    gate: parallel(r1, r2),
    feedback: null,
    output: "source",
  }),
  worst: {
    cutoff: { fixed: { rail: -1, k: -1, r1: 1, r2: -1 }, either: ["rs"] },
    ohmic: { fixed: { r1: -1, r2: 1 }, either: ["rail", "k", "rs"] },
  },
};
