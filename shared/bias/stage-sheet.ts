import type { Bias, Distortion, StageValues } from "#shared/schemas/bias";
import type { Brief } from "#shared/schemas/brief";
import type { Part } from "#shared/schemas/part";
import type { Resistors } from "#shared/schemas/stage";
import { acResistances, signalPath, solveFourResistor } from "./circuits/four-resistor/solve";
import { typicalDevice } from "./device";
import { highCorner, terminalCapacitances } from "./high-corner";
import { type Capacitors, resistanceAtSource, smallestCapacitors } from "./low-corner";
import { junctionTemperature, permittedDissipation } from "./thermal";
import { distortionAt, linearSwing } from "./wave";

/** Every figure of a stage's sheet, SI units, for the typical device at one ambient temperature. */
export type StageSheet = {
  values: StageValues;
  bias: Bias;
  /** Drain and divider current together, A. */
  supplyCurrent: number;
  /** Voltages at gate, source and drain against the stage's ground, V (magnitudes from the common rail). */
  nodes: { gate: number; source: number; drain: number };
  /** What the resistors dissipate, W. */
  resistorPower: Resistors;
  /** The device's dissipation, what the derated rating allows, and the junction in still air. */
  thermal: { power: number; permitted: number; junction: number };
  /** −3 dB high corner, Hz; null where nothing limits it or the device doesn't conduct. */
  highCorner: number | null;
  /** Smallest capacitors for the brief's low corner, F; null where the device doesn't conduct. */
  capacitors: Capacitors | null;
  /** At the brief's output peak; null when it states none or the stage doesn't amplify. */
  distortion: Distortion | null;
  /** The largest output peak at the brief's distortion limit, V; null without a limit or without a swing. */
  linearSwing: number | null;
};

/** The stage that a brief and four resistors make. */
export function stageValues(brief: Brief, resistors: Resistors): StageValues {
  return {
    vdd: brief.rail.volts,
    ...resistors,
    rl: brief.load.ohms,
    sourceBypassed: brief.sourceResistor !== "unbypassed",
  };
}

/** The output peak at which a brief's distortion is judged, V: as stated, else the brief's swing; 0 for none. */
export function distortionPeak(brief: Brief): number {
  return brief.distortion.atPeak ?? brief.swing.peak;
}

/**
 * Works out the whole sheet of a stage: the same code on the server and, live, in the browser.
 *
 * @param celsius ambient temperature, °C; threshold and conduction parameter follow it
 */
export function describeStage(part: Part, brief: Brief, resistors: Resistors, celsius = 25): StageSheet {
  const values = stageValues(brief, resistors);
  const device = typicalDevice(part, celsius);
  const bias = solveFourResistor(device, values);
  const { load, degeneration } = acResistances(values);
  const divider = values.vdd / (values.r1 + values.r2);
  const gds = bias.ro === null ? 0 : 1 / bias.ro;
  const gain = Math.abs(bias.gain);
  const path = signalPath(device, values, bias);
  const peak = distortionPeak(brief);
  const amplifies = bias.swing !== null && gain > 0;
  const square = (volts: number) => volts * volts;
  return {
    values,
    bias,
    supplyCurrent: bias.id + divider,
    nodes: { gate: bias.vg, source: bias.id * values.rs, drain: values.vdd - bias.id * values.rd },
    resistorPower: {
      r1: square(values.vdd - bias.vg) / values.r1,
      r2: square(bias.vg) / values.r2,
      rd: square(bias.id) * values.rd,
      rs: square(bias.id) * values.rs,
    },
    thermal: {
      power: bias.power,
      permitted: brief.derating.power * permittedDissipation(part, celsius),
      junction: junctionTemperature(part, bias.power, celsius),
    },
    highCorner:
      gain > 0
        ? highCorner(
            {
              gm: bias.gm,
              gds,
              load,
              degeneration,
              sourceImpedance: brief.source.ohms,
              inputResistance: bias.inputResistance,
            },
            terminalCapacitances(part),
          )
        : null,
    capacitors:
      gain > 0
        ? smallestCapacitors(
            {
              input: brief.source.ohms + bias.inputResistance,
              output: values.rl === null ? null : bias.outputResistance + values.rl,
              bypass:
                values.sourceBypassed && values.rs > 0
                  ? { rs: values.rs, seen: resistanceAtSource(bias.gm, gds, load, values.rs) }
                  : null,
            },
            brief.lowCorner.hertz,
          )
        : null,
    distortion: amplifies && peak > 0 ? distortionAt(path, peak / gain) : null,
    linearSwing:
      amplifies && brief.distortion.max !== undefined && bias.swing
        ? linearSwing(path, brief.distortion.max, gain, bias.swing.symmetric)
        : null,
  };
}
