import type { Brief } from "#shared/schemas/brief";
import { RESISTOR_KEYS, type ResistorKey, type Resistors } from "#shared/schemas/circuit";
import type { Part } from "#shared/schemas/part";
import { circuitOf } from "../circuits/registry";
import { typicalDevice } from "../device";
import { saturationCurrent, saturationOverdrive } from "../saturation";
import { stageValues } from "../stage-sheet";

/** The resistors that, made smaller or larger, bring a stage toward saturation. */
export type WayToSaturation = { lower: ResistorKey[]; raise: ResistorKey[] };

/** A change to try, as a share: about a step of E24. */
const CHANGE = 0.1;
/** A resistor that does less than this share of what the strongest does is not worth naming. */
const WORTH_NAMING = 0.1;

/**
 * Which way each resistor of a stage that is off, or in the ohmic region, at 25 °C brings it toward saturation; those
 * that hardly act are left out, and where none acts both lists are empty. Found by trying, so it holds for every circuit.
 */
export function wayToSaturation(part: Part, brief: Brief, resistors: Resistors): WayToSaturation {
  const isOff = insideOf(part, brief, resistors).conduction <= 0;
  const inside = (tried: Resistors) => insideOf(part, brief, tried)[isOff ? "conduction" : "saturation"];
  const effects = RESISTOR_KEYS.filter((key) => resistors[key] > 0).map((key) => ({
    key,
    effect:
      inside({ ...resistors, [key]: (1 + CHANGE) * resistors[key] }) -
      inside({ ...resistors, [key]: resistors[key] / (1 + CHANGE) }),
  }));
  const least = WORTH_NAMING * Math.max(...effects.map(({ effect }) => Math.abs(effect)));
  const named = effects.filter(({ effect }) => effect !== 0 && Math.abs(effect) >= least);
  return {
    lower: named.filter(({ effect }) => effect < 0).map(({ key }) => key),
    raise: named.filter(({ effect }) => effect > 0).map(({ key }) => key),
  };
}

/**
 * How far a stage is inside both edges, V: its gate above the threshold, and VDS above the overdrive as the saturation
 * law would have them. Past the edge the ohmic region flattens VDS, which would hide what a resistor does.
 */
function insideOf(
  part: Part,
  brief: Brief,
  resistors: Resistors,
): { conduction: number; saturation: number } {
  const device = typicalDevice(part);
  const stage = stageValues(brief, resistors);
  const { gate, gateSlope, supply, total } = circuitOf(stage.circuit).network(stage);
  const drive = gate - device.vt;
  const x = saturationOverdrive(device, supply, Math.max(0, drive), gateSlope, total);
  const vds = supply - total * saturationCurrent(device, supply, x, total);
  return { conduction: drive, saturation: vds - x };
}
