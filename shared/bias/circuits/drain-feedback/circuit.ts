import { parallel } from "#shared/bias/swing";
import type { StageValues } from "#shared/schemas/bias";
import type { Circuit } from "../circuit";

const degenerationOf = ({ sourceBypassed, rs }: StageValues) => (sourceBypassed ? 0 : rs);

/** The gate's share of the drain voltage: all of it without R2. */
const shareOf = ({ rg, r2 }: StageValues) => (r2 === 0 ? 1 : r2 / (rg + r2));

/** The drain's share of the rail when the device is off: RG and R2 load it. */
const loadedShareOf = ({ rg, r2, rd }: StageValues) => (r2 === 0 ? 1 : (rg + r2) / (rg + r2 + rd));

const drainVoltage = (stage: StageValues, id: number) => loadedShareOf(stage) * (stage.vdd - id * stage.rd);

/** From the gate to ground: nothing without R2. */
const gateResistanceOf = ({ r2 }: StageValues) => (r2 === 0 ? Number.POSITIVE_INFINITY : r2);

/** The a.c. load at the drain: RD, RL, and RG, whose other end the source holds. */
const loadOf = ({ rd, rl, rg }: StageValues) => 1 / (1 / parallel(rd, rl) + 1 / rg);

/**
 * Drain-feedback bias: RG from drain to gate, R2 from gate to ground (or none, and then VG = VD), RD at the drain, RS
 * at the source. With a = (RG + R2)/(RG + R2 + RD) and r = R2/(RG + R2): VD = a (VDD - ID RD),
 * VGS = r VD - ID RS, VDS = VD - ID RS. For signals RG joins the load and passes the input on to the output:
 * vd = v rL/RG - id rL with rL = RD || RL || RG, the gate held by the source.
 *
 * Where the least room lies: the box is tried at all its corners but those of the threshold and, toward cutoff, of K,
 * which only raises ID.
 */
export const DRAIN_FEEDBACK: Circuit = {
  title: "Drain feedback",
  description:
    "RG feeds the drain voltage back to the gate, R2 (if any) takes part of it to ground; RD stands at the drain, RS at the source.",
  ranges: { rg: "divider", r2: "divider", rd: "drain", rs: "source" },
  sourceResistors: ["bypassed", "unbypassed", "none"],
  network: (stage) => {
    const share = shareOf(stage);
    const loaded = loadedShareOf(stage);
    const output = loadOf(stage);
    const degeneration = degenerationOf(stage);
    return {
      gate: share * loaded * stage.vdd,
      gateSlope: share * loaded * stage.rd + stage.rs,
      supply: loaded * stage.vdd,
      total: loaded * stage.rd + stage.rs,
      slope: output + degeneration,
      degeneration,
      output,
      feedthrough: output / stage.rg,
      inverting: true,
    };
  },
  nodes: (stage, id) => {
    const drain = drainVoltage(stage, id);
    return { gate: shareOf(stage) * drain, source: id * stage.rs, drain };
  },
  resistorVoltages: (stage, id) => {
    const drain = drainVoltage(stage, id);
    const gate = shareOf(stage) * drain;
    return { rg: drain - gate, r2: stage.r2 === 0 ? 0 : gate, rd: stage.vdd - drain, rs: id * stage.rs };
  },
  supplyCurrent: (stage, id) => (stage.vdd - drainVoltage(stage, id)) / stage.rd,
  // The Miller effect: RG carries 1 - Av times the current it would to ground.
  inputResistance: ({ rg, r2 }, gain) => 1 / ((1 - gain) / rg + (r2 === 0 ? 0 : 1 / r2)),
  outputResistance: (stage, { gm, gds }) =>
    1 / (1 / stage.rd + 1 / stage.rg + gds / (1 + (gm + gds) * degenerationOf(stage))),
  signalNodes: (stage) => ({
    drain: parallel(stage.rd, stage.rl),
    source: degenerationOf(stage),
    gate: gateResistanceOf(stage),
    feedback: stage.rg,
    output: "drain",
  }),
  couplingNodes: (stage) => ({
    drain: stage.rd,
    load: stage.rl,
    source: { signal: degenerationOf(stage), bypassed: stage.sourceBypassed ? stage.rs : 0 },
    gate: gateResistanceOf(stage),
    feedback: stage.rg,
    output: "drain",
  }),
  worst: {
    cutoff: { fixed: { k: -1 }, either: ["rail", "r2", "rg", "rd", "rs"] },
    ohmic: { fixed: {}, either: ["rail", "k", "r2", "rg", "rd", "rs"] },
  },
};
