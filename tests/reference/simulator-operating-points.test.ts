import { describe, expect, it } from "vitest";
import { solveStage } from "#shared/bias/solve-stage";
import { seededRandom } from "../support/random";
import { SEED } from "../support/seed";
import { drawNetlist, signOf } from "./netlist";
import { runNgspice } from "./ngspice";
import { drawStages } from "./random-stages";

describe(`operating points of every circuit agree with ngspice (seed ${SEED})`, () => {
  // Some of these stages are ohmic: VDS from a third of the overdrive up.
  const cases = drawStages(seededRandom(SEED), 24, [0.3, 6]);
  const [op] = runNgspice(
    cases.flatMap(({ device, stage }, n) => drawNetlist(device, stage, `${n}`)),
    ["op"],
    cases.flatMap((_, n) => [`i(vm${n})`, `v(d${n})`, `v(g${n})`, `v(s${n})`]),
  );

  it("on stages of which some are ohmic and some carry a depletion-mode part", () => {
    const regions = cases.map(({ device, stage }) => solveStage(device, stage).region);
    expect(regions.filter((region) => region === "saturation").length).toBeGreaterThan(60);
    expect(regions).toContain("ohmic");
    for (const circuit of ["four-resistor", "split-source", "follower", "drain-feedback", "negative-rail"]) {
      const depletion = cases.filter((drawn) => drawn.stage.circuit === circuit && drawn.device.vt < 0);
      expect(depletion.length).toBeGreaterThan(0);
    }
  });

  it.each(cases.map((drawn, n) => ({ ...drawn, n })))("on $name", ({ device, stage, n }) => {
    const bias = solveStage(device, stage);
    const sign = signOf(device);
    const [gate, drain, source] = ["g", "d", "s"].map((node) => sign * op.of(`v(${node}${n})`)[0]);
    const id = sign * op.of(`i(vm${n})`)[0];
    expect(Math.abs(bias.id / id - 1)).toBeLessThan(1e-3);
    expect(Math.abs(bias.vds / (drain - source) - 1)).toBeLessThan(1e-3);
    expect(Math.abs(bias.vgs - (gate - source))).toBeLessThan(1e-3 * Math.max(1, Math.abs(gate - source)));
    expect(Math.abs(bias.vg - gate)).toBeLessThan(1e-3 * Math.max(1, Math.abs(gate)));
  });
});
