import { parallel } from "#shared/bias/swing";
import type { StageValues } from "#shared/schemas/bias";
import type { Circuit } from "../circuit";

const degenerationOf = ({ sourceBypassed, rs }: StageValues) => (sourceBypassed ? 0 : rs);

/**
 * The common-source stage with its gate at ground and its source resistor to a negative rail: VGS = VSS - ID RS,
 * VDS = VDD + VSS - ID (RD + RS); the output is taken at the drain, rL = RD || RL. RG only ties the gate to ground.
 *
 * Where the least room lies. U = ID rL rises with VSS, K and RD and falls with VT and RS; for λ = 0 the positive rail
 * does not act, with λ > 0 it raises ID, so its low end is taken; a larger RD then also lowers ID, so both ends are
 * tried. D rises with the positive rail, which only adds to VDS; the rest is tried at both ends.
 */
export const NEGATIVE_RAIL: Circuit = {
  title: "Common source, gate at ground",
  description:
    "RG ties the gate to ground, RS runs to the negative rail, RD stands at the drain; the output is at the drain.",
  ranges: { rg: "divider", rd: "drain", rs: "source" },
  sourceResistors: ["bypassed", "unbypassed"],
  network: (stage) => {
    const output = parallel(stage.rd, stage.rl);
    const degeneration = degenerationOf(stage);
    return {
      gate: stage.vss,
      gateSlope: stage.rs,
      supply: stage.vdd + stage.vss,
      total: stage.rd + stage.rs,
      slope: output + degeneration,
      degeneration,
      output,
      feedthrough: 0,
      inverting: true,
    };
  },
  nodes: ({ vdd, vss, rd, rs }, id) => ({ gate: 0, source: id * rs - vss, drain: vdd - id * rd }),
  resistorVoltages: ({ rd, rs }, id) => ({ rg: 0, rd: id * rd, rs: id * rs }),
  supplyCurrent: (_stage, id) => id,
  inputResistance: ({ rg }) => rg,
  outputResistance: (stage, { gm, gds }) =>
    1 / (1 / stage.rd + gds / (1 + (gm + gds) * degenerationOf(stage))),
  signalNodes: (stage) => ({
    drain: parallel(stage.rd, stage.rl),
    source: degenerationOf(stage),
    gate: stage.rg,
    feedback: null,
    output: "drain",
  }),
  couplingNodes: (stage) => ({
    drain: stage.rd,
    load: stage.rl,
    source: { signal: degenerationOf(stage), bypassed: stage.sourceBypassed ? stage.rs : 0 },
    gate: stage.rg,
    feedback: null,
    output: "drain",
  }),
  worst: {
    cutoff: { fixed: { rail: -1, negativeRail: -1, k: -1, rs: 1 }, either: ["rd"] },
    ohmic: { fixed: { rail: -1 }, either: ["negativeRail", "k", "rd", "rs"] },
  },
};
