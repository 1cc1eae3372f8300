import type { Bias, Device, Distortion, StageValues } from "#shared/schemas/bias";
import type { Brief } from "#shared/schemas/brief";
import { RESISTOR_KEYS, type Resistors } from "#shared/schemas/circuit";
import type { Part } from "#shared/schemas/part";
import type { NodeVoltages } from "./circuits/circuit";
import { circuitOf } from "./circuits/registry";
import { typicalDevice } from "./device";
import { highCorner, terminalCapacitances } from "./high-corner";
import { type Capacitors, smallestCapacitors } from "./low-corner";
import type { Network } from "./network";
import { solveStage } from "./solve-stage";
import { type Assured, assuredSwing, boxOf } from "./spread";
import { junctionTemperature, permittedDissipation } from "./thermal";
import { distortionAt, linearSwing } from "./wave";

/** What direct current and ratings say of a stage, SI units, for the typical device at one ambient temperature. */
export type StageFigures = {
  device: Device;
  values: StageValues;
  network: Network;
  bias: Bias;
  /** What the stage takes from its positive rail, A. */
  supplyCurrent: number;
  /** Voltages at gate, source and drain against the stage's ground, V (magnitudes from the common rail). */
  nodes: NodeVoltages;
  /** What the resistors dissipate, W; 0 where the circuit has none. */
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
    /** The room that every build inside the brief's spread has, V, whatever the sheet's temperature. */
    assured: Assured;
  };

/** The stage that a brief and four resistors make. */
export function stageValues(brief: Brief, resistors: Resistors): StageValues {
  return {
    circuit: brief.circuit,
    vdd: brief.rail.volts,
    vss: negativeRail(brief),
    ...resistors,
    rl: brief.load.ohms,
    sourceBypassed: brief.sourceResistor !== "unbypassed",
  };
}

/** Magnitude of a brief's negative rail, V: as stated, else that of the positive one; 0 where the circuit has none. */
export function negativeRail(brief: Brief): number {
  return brief.circuit === "negative-rail" ? (brief.rail.negative ?? brief.rail.volts) : 0;
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
  const circuit = circuitOf(values.circuit);
  const bias = solveStage(device, values);
  const volts = circuit.resistorVoltages(values, bias.id);
  const heat = (key: (typeof RESISTOR_KEYS)[number]) => {
    const across = volts[key] ?? 0;
    return values[key] > 0 ? across ** 2 / values[key] : 0;
  };
  return {
    device,
    values,
    network: circuit.network(values),
    bias,
    supplyCurrent: circuit.supplyCurrent(values, bias.id),
    nodes: circuit.nodes(values, bias.id),
    resistorPower: Object.fromEntries(RESISTOR_KEYS.map((key) => [key, heat(key)])) as Resistors,
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
  { device, values, network, bias }: StageFigures,
): SignalFigures {
  const gain = Math.abs(bias.gain);
  if (gain === 0) return { highCorner: null, distortion: null };
  const peak = distortionPeak(brief);
  return {
    highCorner: highCorner(
      {
        gm: bias.gm,
        gds: bias.ro === null ? 0 : 1 / bias.ro,
        ...circuitOf(values.circuit).signalNodes(values),
        sourceImpedance: brief.source.ohms,
      },
      terminalCapacitances(part),
    ),
    distortion: bias.swing && peak > 0 ? distortionAt({ device, q: bias, network }, peak / gain) : null,
  };
}

/**
 * Works out the whole sheet of a stage: the same code on the server and, live, in the browser.
 *
 * @param celsius ambient temperature, °C
 */
export function describeStage(part: Part, brief: Brief, resistors: Resistors, celsius = 25): StageSheet {
  const figures = figureStage(part, brief, resistors, celsius);
  const { device, values, network, bias } = figures;
  const gain = Math.abs(bias.gain);
  const limit = brief.distortion.max;
  return {
    ...figures,
    ...figureSignal(part, brief, figures),
    capacitors: gain > 0 ? capacitorsFor(brief, figures) : null,
    assured: assuredSwing(boxOf(part, brief, values)),
    linearSwing:
      bias.swing && gain > 0 && limit !== undefined
        ? linearSwing({ device, q: bias, network }, limit, gain, bias.swing.symmetric)
        : null,
  };
}

function capacitorsFor(brief: Brief, { values, bias }: StageFigures): Capacitors {
  const stage = {
    gm: bias.gm,
    gds: bias.ro === null ? 0 : 1 / bias.ro,
    ...circuitOf(values.circuit).couplingNodes(values),
    sourceImpedance: brief.source.ohms,
  };
  return smallestCapacitors(stage, brief.lowCorner.hertz);
}
