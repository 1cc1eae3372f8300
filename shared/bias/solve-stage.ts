import type { Bias, StageValues } from "#shared/schemas/bias";
import { circuitOf } from "./circuits/registry";
import type { SquareLaw } from "./device";
import { solveNetwork } from "./network";
import { distortionAt } from "./wave";

/**
 * Solves a stage of any circuit: Q-point, transition point, swing, small-signal figures and, with an input peak,
 * distortion from the wave itself.
 *
 * @param device square-law figures
 * @param stage SI units, magnitudes for both polarities
 * @param inputPeak peak of a sine at the gate, V
 */
export function solveStage(device: SquareLaw, stage: StageValues, inputPeak?: number): Bias {
  const circuit = circuitOf(stage.circuit);
  const network = circuit.network(stage);
  const { gds, ...solved } = solveNetwork(device, network);
  return {
    ...solved,
    vg: circuit.nodes(stage, solved.id).gate,
    ro: gds > 0 ? 1 / gds : null,
    inputResistance: circuit.inputResistance(stage, solved.gain),
    outputResistance: circuit.outputResistance(stage, { gm: solved.gm, gds }),
    ...(inputPeak !== undefined && solved.region !== "cutoff"
      ? { distortion: distortionAt({ device, q: solved, network }, inputPeak) }
      : {}),
  };
}
