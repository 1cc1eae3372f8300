import { describe, expect, it } from "vitest";
import { circuitOf } from "#shared/bias/circuits/registry";
import { solveStage } from "#shared/bias/solve-stage";
import { seededRandom } from "../support/random";
import { SEED } from "../support/seed";
import { drawHeld, outputOf, signOf } from "./netlist";
import { runNgspice } from "./ngspice";
import { drawStages } from "./random-stages";

const EACH = 24;
const STEPS = 300;

describe(`clipping levels of every circuit agree with ngspice (seed ${SEED})`, () => {
  const cases = drawStages(seededRandom(SEED + 6), EACH, [1.2, 8]).map((drawn) => {
    const bias = solveStage(drawn.device, drawn.stage);
    const { degeneration } = circuitOf(drawn.stage.circuit).network(drawn.stage);
    // Inputs beyond both ends, so that the wave is cut on either side.
    const { transition, overdrive, id } = bias;
    if (transition === null) throw new Error(`${drawn.name} is not saturated`);
    const down = 1.2 * (overdrive + degeneration * id);
    const up = 1.2 * (transition.vds - overdrive + degeneration * (transition.id - id));
    return { ...drawn, bias, down, up };
  });
  const [sweep] = runNgspice(
    [
      "vsweep sweep 0 0",
      ...cases.flatMap(({ device, stage, down, up }, n) =>
        drawHeld(device, stage, `${n}`, `v(sweep)<0?${down}*v(sweep):${up}*v(sweep)`),
      ),
    ],
    [`dc vsweep -1 1 ${1 / STEPS}`],
    cases.flatMap(({ stage }, n) => [
      ...["g", "d", "s", outputOf(stage)].map((node) => `v(${node}${n})`),
      `i(vm${n})`,
    ]),
  );

  it.each(cases.map((drawn, n) => ({ ...drawn, n })))("on $name", ({ device, stage, bias, n }) => {
    const sign = signOf(device);
    const volts = (node: string) => sweep.of(`v(${node}${n})`).map((value) => sign * value);
    const [gate, drain, source, output] = [volts("g"), volts("d"), volts("s"), volts(outputOf(stage))];
    const current = sweep.of(`i(vm${n})`).map((value) => sign * value);
    const rest = STEPS;
    expect(current).toHaveLength(2 * STEPS + 1);
    // Cutoff: the last point at which the device carries nothing to speak of.
    const off = current.findIndex((amperes) => amperes > 1e-4 * current[rest]) - 1;
    expect(off).toBeGreaterThan(0);
    const towardCutoff = Math.abs(output[off] - output[rest]);
    // The edge of saturation, between the last point on this side of it and the first beyond.
    const beyond = gate.map((volt, at) => volt - source[at] - device.vt - (drain[at] - source[at]));
    const edge = beyond.findIndex((excess, at) => at > rest && excess > 0);
    expect(edge).toBeGreaterThan(rest);
    const share = beyond[edge] / (beyond[edge] - beyond[edge - 1]);
    const towardOhmic = Math.abs(output[edge] + share * (output[edge - 1] - output[edge]) - output[rest]);
    const { swing } = bias;
    const tolerance = 0.02 * Math.min(towardCutoff, towardOhmic);
    expect(Math.abs((swing?.towardCutoff ?? 0) - towardCutoff)).toBeLessThan(tolerance);
    expect(Math.abs((swing?.towardOhmic ?? 0) - towardOhmic)).toBeLessThan(tolerance);
    // The output goes opposite ways at the two ends.
    expect((output[off] - output[rest]) * (output[edge] - output[rest])).toBeLessThan(0);
  });
});
