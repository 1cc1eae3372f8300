import { describe, expect, it } from "vitest";
import { circuitOf } from "#shared/bias/circuits/registry";
import { solveStage } from "#shared/bias/solve-stage";
import { seededRandom } from "../support/random";
import { SEED } from "../support/seed";
import { drawCoupling, drawHeld, drawNetlist, everyCapacitor, outputOf } from "./netlist";
import { runNgspice } from "./ngspice";
import { drawStages } from "./random-stages";

/** Saturated with some room, as a stage has to be to carry a signal. */
const ROOM = [1.3, 6] as const;
const EACH = 24;

describe(`gain of every circuit agrees with ngspice (seed ${SEED})`, () => {
  const cases = drawStages(seededRandom(SEED + 1), EACH, ROOM);
  // At small signals a capacitor this large is as good as a wire.
  const [ac] = runNgspice(
    cases.flatMap(({ device, stage, brief }, n) => [
      ...drawNetlist(device, stage, `${n}`),
      ...drawCoupling(stage, `${n}`, brief.source.ohms, everyCapacitor(stage, 1)),
    ]),
    ["ac lin 1 1e6 1e6"],
    cases.flatMap(({ stage }, n) => [`v(g${n})`, `v(${outputOf(stage)}${n})`]),
  );

  it.each(cases.map((drawn, n) => ({ ...drawn, n })))("on $name", ({ device, stage, n }) => {
    const { gain } = solveStage(device, stage);
    const gate = ac.of(`v(g${n})`)[0];
    const output = ac.of(`v(${outputOf(stage)}${n})`)[0];
    expect(Math.abs((Math.abs(gain) * gate) / output - 1)).toBeLessThan(5e-3);
  });
});

describe(`input and output resistance of every circuit agree with ngspice (seed ${SEED})`, () => {
  const cases = drawStages(seededRandom(SEED + 2), EACH, ROOM);
  // Twins: one takes its signal from a source of 1 MΩ, the other a current into its output with the gate held.
  const [ac] = runNgspice(
    cases.flatMap(({ device, stage }, n) => [
      ...drawNetlist(device, stage, `i${n}`),
      ...drawCoupling(stage, `i${n}`, 1e6, everyCapacitor(stage, 1)),
      ...drawNetlist(device, { ...stage, rl: 1e15 }, `o${n}`),
      ...drawCoupling(stage, `o${n}`, 0, everyCapacitor({ ...stage, rl: 1e15 }, 1)).map((line) =>
        line.startsWith("vin") ? line.replace("ac 1", "ac 0") : line,
      ),
      `io${n} 0 lo${n} dc 0 ac 1`,
    ]),
    ["ac lin 1 1e6 1e6"],
    cases.flatMap((_, n) => [`v(gi${n})`, `i(vini${n})`, `v(lo${n})`]),
  );

  it.each(cases.map((drawn, n) => ({ ...drawn, n })))("on $name", ({ device, stage, n }) => {
    const { inputResistance, outputResistance } = solveStage(device, stage);
    const seen = ac.of(`v(gi${n})`)[0] / ac.of(`i(vini${n})`)[0];
    expect(Math.abs(inputResistance / seen - 1)).toBeLessThan(5e-3);
    expect(Math.abs(outputResistance / ac.of(`v(lo${n})`)[0] - 1)).toBeLessThan(5e-3);
  });
});

describe(`second harmonic of every circuit agrees with ngspice (seed ${SEED})`, () => {
  const cases = drawStages(seededRandom(SEED + 3), EACH, ROOM).map((drawn) => {
    const { device, stage } = drawn;
    const bias = solveStage(device, stage);
    // An input that moves the overdrive by a tenth and the output by no more than a tenth of its room.
    const { degeneration } = circuitOf(stage.circuit).network(stage);
    const room = (bias.swing?.symmetric ?? 0) / Math.abs(bias.gain);
    return { ...drawn, peak: Math.min(0.1 * bias.overdrive * (1 + bias.gm * degeneration), 0.1 * room) };
  });
  const steps = 32;
  // One sweep over a period: the angle is what is swept, and each stage takes its own share of the sine.
  const [sweep] = runNgspice(
    [
      "vangle angle 0 0",
      "bsine sine 0 v=sin(v(angle))",
      ...cases.flatMap(({ device, stage, peak }, n) => drawHeld(device, stage, `${n}`, `${peak}*v(sine)`)),
    ],
    [`dc vangle 0 ${((steps - 0.5) * 2 * Math.PI) / steps} ${(2 * Math.PI) / steps}`],
    cases.flatMap(({ stage }, n) => `v(${outputOf(stage)}${n})`),
  );

  it.each(cases.map((drawn, n) => ({ ...drawn, n })))("on $name", ({ device, stage, peak, n }) => {
    const output = sweep.of(`v(${outputOf(stage)}${n})`);
    expect(output).toHaveLength(steps);
    const { distortion } = solveStage(device, stage, peak);
    const expected = harmonic(output, 2) / harmonic(output, 1);
    const error = Math.abs((distortion?.secondHarmonic ?? 0) - expected);
    // Where channel-length modulation cancels the harmonic, the simulator's own tolerance is what is left of it.
    expect(error).toBeLessThan(0.05 * expected + 1e-7);
  });
});

/** Magnitude of a harmonic in equal steps of one period. */
function harmonic(wave: readonly number[], order: number): number {
  let re = 0;
  let im = 0;
  wave.forEach((volts, step) => {
    const angle = (2 * Math.PI * order * step) / wave.length;
    re += volts * Math.cos(angle);
    im += volts * Math.sin(angle);
  });
  return Math.hypot(re, im);
}
