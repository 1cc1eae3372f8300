import { dividerVoltage } from "#shared/bias/divider";
import { parallel } from "#shared/bias/swing";
import type { StageValues } from "#shared/schemas/bias";
import type { Circuit } from "../circuit";

const degenerationOf = ({ sourceBypassed, rs }: StageValues) => (sourceBypassed ? 0 : rs);

/**
 * The four-resistor common-source stage: VG = VDD R2/(R1 + R2), VGS = VG - ID RS, VDS = VDD - ID (RD + RS);
 * the output is taken at the drain, rL = RD || RL.
 *
 * Where the least room lies, for λ = 0, bypassed or not. U = ID rL only rises with the rail, K, R2 and RD and falls
 * with VT, R1 and RS; with λ > 0 a larger RD also lowers VDS and with it ID, and {RD : U >= S} is still an interval
 * (S = ID rL fixes ID = S (1/RL + 1/RD), and the gate voltage it takes is a convex function of RD), so RD is tried at
 * both ends. D >= S holds exactly where VG <= N = VT + x + I RS, with I the current at which D = S: it solves
 * VDD = v + I RT + S (1 + r/rL), v = √((I + s)/K), s = S/rL, r the part of RS that carries signal, x = √(I/K).
 * VT, R1 and R2 act on one side only. In each of the others, with the rest held still, {D >= S} is an interval, so
 * that the minimum over the box lies at a corner:
 * rail: N - ρ VDD, ρ the divider's share, is √I - ρ √(I + s) over √K plus a straight line in I, concave as ρ < 1;
 * K: K = (I + s)/(c - I RT)² rises with I, and N = VT + (c - I RT) √(I/(I + s)) + I RS is concave in I;
 * RS: it falls with I, and N is √I - √(I + s) over √K plus a straight line (bypassed), or with I/(I + s) times the
 * rest of the rail (not bypassed), both concave;
 * RD: N rises with I, and I >= i holds where √((i + s)/K) + i RT + S stays below VDD, convex in RD as s = S (1/RD + 1/RL).
 * With λ > 0 this is tested, not proved (`tests/reference/spread.test.ts`). Of 4,000 random boxes with λ up to 0.2/V one,
 * at λ = 0.12/V on 57 V ± 30 %, had less room toward the ohmic region at a K inside its range, by 3.4 parts in a million.
 */
export const FOUR_RESISTOR: Circuit = {
  title: "Four-resistor common source",
  description:
    "R1 and R2 divide the rail for the gate, RD stands at the drain, RS at the source; the output is at the drain.",
  ranges: { r1: "divider", r2: "divider", rd: "drain", rs: "source" },
  sourceResistors: ["bypassed", "unbypassed", "none"],
  network: (stage) => {
    const output = parallel(stage.rd, stage.rl);
    const degeneration = degenerationOf(stage);
    return {
      gate: dividerVoltage(stage.vdd, stage.r1, stage.r2),
      gateSlope: stage.rs,
      supply: stage.vdd,
      total: stage.rd + stage.rs,
      slope: output + degeneration,
      degeneration,
      output,
      feedthrough: 0,
      inverting: true,
    };
  },
  nodes: ({ vdd, r1, r2, rd, rs }, id) => ({
    gate: dividerVoltage(vdd, r1, r2),
    source: id * rs,
    drain: vdd - id * rd,
  }),
  resistorVoltages: ({ vdd, r1, r2, rd, rs }, id) => {
    const r2Volts = dividerVoltage(vdd, r1, r2);
    return { r1: vdd - r2Volts, r2: r2Volts, rd: id * rd, rs: id * rs };
  },
  supplyCurrent: ({ vdd, r1, r2 }, id) => id + vdd / (r1 + r2),
  inputResistance: ({ r1, r2 }) => parallel(r1, r2),
  outputResistance: (stage, { gm, gds }) => {
    // Looking into the drain: ro raised by the signal across the source resistor.
    const drainConductance = gds / (1 + (gm + gds) * degenerationOf(stage));
    return 1 / (1 / stage.rd + drainConductance);
  },
  signalNodes: (stage) => ({
    drain: parallel(stage.rd, stage.rl),
    source: degenerationOf(stage),
    gate: parallel(stage.r1, stage.r2),
    feedback: null,
    output: "drain",
  }),
  couplingNodes: (stage) => ({
    drain: stage.rd,
    load: stage.rl,
    source: { signal: degenerationOf(stage), bypassed: stage.sourceBypassed ? stage.rs : 0 },
    gate: parallel(stage.r1, stage.r2),
    feedback: null,
    output: "drain",
  }),
  worst: {
    cutoff: { fixed: { rail: -1, k: -1, r1: 1, r2: -1, rs: 1 }, either: ["rd"] },
    ohmic: { fixed: { r1: -1, r2: 1 }, either: ["rail", "k", "rd", "rs"] },
  },
};
