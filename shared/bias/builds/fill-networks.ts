import type { StageValues } from "#shared/schemas/bias";
import type { CircuitName } from "#shared/schemas/circuit";
import type { BuildColumns, NetworkColumns } from "./columns";

/** Works out the networks of a block of builds. */
type FillNetworks = (builds: BuildColumns, count: number, stage: StageValues, into: NetworkColumns) => void;

/**
 * Each circuit's `network` again, over columns: what simulating builds spends its time on, so there is no object a
 * build. Held to the circuits' own by the tests. Only drain feedback passes anything around the device; elsewhere that
 * column stays 0.
 */
export const FILL_NETWORKS: Record<CircuitName, FillNetworks> = {
  "four-resistor": ({ rail, resistors: { r1, r2, rd, rs } }, count, stage, into) => {
    const loaded = conductanceOf(stage.rl);
    const inSignal = stage.sourceBypassed ? 0 : 1;
    for (let at = 0; at < count; at++) {
      into.gate[at] = (rail[at] * r2[at]) / (r1[at] + r2[at]);
      into.supply[at] = rail[at];
      into.gateSlope[at] = rs[at];
      into.total[at] = rd[at] + rs[at];
      fillDrainOutput(into, at, rd[at] / (1 + rd[at] * loaded), inSignal * rs[at]);
    }
  },
  "split-source": ({ rail, resistors: { r1, r2, rd, rs, rs2 } }, count, stage, into) => {
    const loaded = conductanceOf(stage.rl);
    for (let at = 0; at < count; at++) {
      into.gate[at] = (rail[at] * r2[at]) / (r1[at] + r2[at]);
      into.supply[at] = rail[at];
      into.gateSlope[at] = rs[at] + rs2[at];
      into.total[at] = rd[at] + rs[at] + rs2[at];
      fillDrainOutput(into, at, rd[at] / (1 + rd[at] * loaded), rs[at]);
    }
  },
  follower: ({ rail, resistors: { r1, r2, rs } }, count, stage, into) => {
    const loaded = conductanceOf(stage.rl);
    for (let at = 0; at < count; at++) {
      const output = rs[at] / (1 + rs[at] * loaded);
      into.gate[at] = (rail[at] * r2[at]) / (r1[at] + r2[at]);
      into.supply[at] = rail[at];
      into.gateSlope[at] = rs[at];
      into.total[at] = rs[at];
      into.output[at] = output;
      into.degeneration[at] = output;
      into.slope[at] = output;
    }
  },
  "drain-feedback": ({ rail, resistors: { rg, r2, rd, rs } }, count, stage, into) => {
    const loaded = conductanceOf(stage.rl);
    const inSignal = stage.sourceBypassed ? 0 : 1;
    const divides = stage.r2 > 0;
    for (let at = 0; at < count; at++) {
      const bridge = rg[at] + r2[at];
      const share = divides ? r2[at] / bridge : 1;
      const drain = divides ? bridge / (bridge + rd[at]) : 1;
      into.gate[at] = share * drain * rail[at];
      into.supply[at] = drain * rail[at];
      into.gateSlope[at] = share * drain * rd[at] + rs[at];
      into.total[at] = drain * rd[at] + rs[at];
      fillDrainOutput(into, at, rd[at] / (1 + rd[at] * (loaded + 1 / rg[at])), inSignal * rs[at]);
      into.feedthrough[at] = into.output[at] / rg[at];
    }
  },
  "negative-rail": ({ rail, negativeRail, resistors: { rd, rs } }, count, stage, into) => {
    const loaded = conductanceOf(stage.rl);
    const inSignal = stage.sourceBypassed ? 0 : 1;
    for (let at = 0; at < count; at++) {
      into.gate[at] = negativeRail[at];
      into.supply[at] = rail[at] + negativeRail[at];
      into.gateSlope[at] = rs[at];
      into.total[at] = rd[at] + rs[at];
      fillDrainOutput(into, at, rd[at] / (1 + rd[at] * loaded), inSignal * rs[at]);
    }
  },
};

function conductanceOf(load: number | null): number {
  return load === null ? 0 : 1 / load;
}

function fillDrainOutput(into: NetworkColumns, at: number, output: number, degeneration: number): void {
  into.output[at] = output;
  into.degeneration[at] = degeneration;
  into.slope[at] = output + degeneration;
}
