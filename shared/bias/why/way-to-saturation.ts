import type { Bias } from "#shared/schemas/bias";
import type { Brief } from "#shared/schemas/brief";
import { RESISTOR_KEYS, type ResistorKey, type Resistors } from "#shared/schemas/circuit";
import type { Part } from "#shared/schemas/part";
import { figureStage } from "../stage-sheet";

/** The resistors that, made smaller or larger, bring a stage toward saturation. */
export type WayToSaturation = { lower: ResistorKey[]; raise: ResistorKey[] };

/** A change to try, as a share: about a step of E24. */
const CHANGE = 0.1;
/** A resistor that does less than this share of what the strongest does is not worth naming. */
const WORTH_NAMING = 0.1;

/**
 * Which way each resistor of a stage that is off, or in the ohmic region, brings it toward saturation; those that
 * hardly act are left out, and where none acts both lists are empty. Found by trying, so it holds for every circuit.
 *
 * @param celsius ambient temperature, °C
 */
export function wayToSaturation(
  part: Part,
  brief: Brief,
  resistors: Resistors,
  celsius = 25,
): WayToSaturation {
  const { region } = figureStage(part, brief, resistors, celsius).bias;
  const inside = (tried: Resistors) => insideBy(figureStage(part, brief, tried, celsius).bias, region);
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

/** How far a stage is inside the edge that it is past, V: that of conducting where it is off, else that of saturation. */
function insideBy({ vds, overdrive }: Bias, pastEdge: Bias["region"]): number {
  return pastEdge === "cutoff" ? overdrive : vds - overdrive;
}
