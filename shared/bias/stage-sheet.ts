import type { Bias, Device, Distortion, StageValues } from "#shared/schemas/bias";
import type { Brief } from "#shared/schemas/brief";
import type { Part } from "#shared/schemas/part";
import type { Resistors } from "#shared/schemas/stage";
import { acResistances, signalPath, solveFourResistor } from "./circuits/four-resistor/solve";
import { typicalDevice } from "./device";
import { highCorner, terminalCapacitances } from "./high-corner";
import { type Capacitors, resistanceAtSource, smallestCapacitors } from "./low-corner";
import { junctionTemperature, permittedDissipation } from "./thermal";
import { distortionAt, linearSwing } from "./wave";

/** What direct current and ratings say of a stage, SI units, for the typical device at one ambient temperature. */
export type StageFigures = {
  device: Device;
  values: StageValues;
  bias: Bias;
  /** Drain and divider current together, A. */
  supplyCurrent: number;
  /** Voltages at gate, source and drain against the stage's ground, V (magnitudes from the common rail). */
  nodes: { gate: number; source: number; drain: number };
  /** What the resistors dissipate, W. */
  resistorPower: Resistors;
  /** The device's dissipation, what the derated rating allows (W), and the junction in still air (°C). */
  thermal: { power: number; permitted: number; junction: number };
};

/** What a signal meets. */
export type SignalFigures = {
  /** −3 dB high corner, Hz; null where nothing limits it or the device doesn't conduct. */
  highCorner: number | null;
  /** At the brief's output peak; null when it states none or the stage doesn't amplify. */
  distortion: Distortion | null;
};

/** Every figure of a stage's sheet. */
export type StageSheet = StageFigures &
  SignalFigures & {
    /** Smallest capacitors for the brief's low corner, F; null where the device doesn't conduct. */
    capacitors: Capacitors | null;
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
 * Solves a stage for the typical device and compares it with the part's ratings.
 *
 * @param celsius ambient temperature, °C; threshold and conduction parameter follow it
 */
export function figureStage(part: Part, brief: Brief, resistors: Resistors, celsius = 25): StageFigures {
  const values = stageValues(brief, resistors);
  const device = typicalDevice(part, celsius);
  const bias = solveFourResistor(device, values);
  const { vdd, r1, r2, rd, rs } = values;
  return {
    device,
    values,
    bias,
    supplyCurrent: bias.id + vdd / (r1 + r2),
    nodes: { gate: bias.vg, source: bias.id * rs, drain: vdd - bias.id * rd },
    resistorPower: {
      r1: (vdd - bias.vg) ** 2 / r1,
      r2: bias.vg ** 2 / r2,
      rd: bias.id ** 2 * rd,
      rs: bias.id ** 2 * rs,
    },
    thermal: {
      power: bias.power,
      permitted: brief.derating.power * permittedDissipation(part, celsius),
      junction: junctionTemperature(part, bias.power, celsius),
    },
  };
}

/** Works out the high corner, and the distortion at the brief's output peak. */
export function figureSignal(
  part: Part,
  brief: Brief,
  { device, values, bias }: StageFigures,
): SignalFigures {
  const gain = Math.abs(bias.gain);
  if (gain === 0) return { highCorner: null, distortion: null };
  const { load, degeneration } = acResistances(values);
  const peak = distortionPeak(brief);
  return {
    highCorner: highCorner(
      {
        gm: bias.gm,
        gds: bias.ro === null ? 0 : 1 / bias.ro,
        load,
        degeneration,
        sourceImpedance: brief.source.ohms,
        inputResistance: bias.inputResistance,
      },
      terminalCapacitances(part),
    ),
    distortion: bias.swing && peak > 0 ? distortionAt(signalPath(device, values, bias), peak / gain) : null,
  };
}

/**
 * Works out the whole sheet of a stage: the same code on the server and, live, in the browser.
 *
 * @param celsius ambient temperature, °C
 */
export function describeStage(part: Part, brief: Brief, resistors: Resistors, celsius = 25): StageSheet {
  const figures = figureStage(part, brief, resistors, celsius);
  const { device, values, bias } = figures;
  const gain = Math.abs(bias.gain);
  const limit = brief.distortion.max;
  return {
    ...figures,
    ...figureSignal(part, brief, figures),
    capacitors: gain > 0 ? capacitorsFor(brief, figures) : null,
    linearSwing:
      bias.swing && gain > 0 && limit !== undefined
        ? linearSwing(signalPath(device, values, bias), limit, gain, bias.swing.symmetric)
        : null,
  };
}

function capacitorsFor(brief: Brief, { values, bias }: StageFigures): Capacitors {
  const { load } = acResistances(values);
  const gds = bias.ro === null ? 0 : 1 / bias.ro;
  const bypass =
    values.sourceBypassed && values.rs > 0
      ? { rs: values.rs, seen: resistanceAtSource(bias.gm, gds, load, values.rs) }
      : null;
  const resistances = {
    input: brief.source.ohms + bias.inputResistance,
    output: values.rl === null ? null : bias.outputResistance + values.rl,
    bypass,
  };
  return smallestCapacitors(resistances, brief.lowCorner.hertz);
}
