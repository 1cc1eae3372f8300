import type { StageValues } from "#shared/schemas/bias";
import type { Brief } from "#shared/schemas/brief";
import { RESISTOR_KEYS, type ResistorKey, type Resistors } from "#shared/schemas/circuit";
import type { Part } from "#shared/schemas/part";
import { circuitOf } from "../circuits/registry";
import { type SquareLaw, typicalDevice } from "../device";
import { solveNetwork } from "../network";
import { stageValues } from "../stage-sheet";

/** What a stage is made of: its resistors, rails and load, and the device's threshold and conduction parameter. */
export type Component = ResistorKey | "rail" | "negativeRail" | "vt" | "k" | "rl";

/** What one per cent more of a component does, at the rate that holds at the stage's own values. */
export type Sensitivity = {
  component: Component;
  /** Change of the symmetric swing, V, and as a share of it. */
  swing: number;
  swingShare: number;
  /** Change of the centring error, a fraction: 0.01 is a percentage point. */
  centring: number;
};

/** One per cent: what the changes are given for. */
const CHANGE = 0.01;

/**
 * The relative step of the differences. The error of a central difference falls with the step's square and that of
 * rounding grows as it shrinks; near the cube root of the double's 2e-16 both are near 1e-10.
 */
const STEP = 1e-5;

type Rooms = { towardCutoff: number; towardOhmic: number };

/**
 * What +1 % of each component does to the symmetric swing and to the centring error of the typical device at 25 °C;
 * none for a stage that isn't saturated.
 *
 * The two rooms are smooth in every component, and their slopes are taken by central differences. S and c have a kink
 * at dead centre, where the side that runs out first changes: their slopes follow from those of the rooms, on the
 * stage's own side of it; at dead centre itself, as the component grows.
 */
export function sensitivitiesOf(part: Part, brief: Brief, resistors: Resistors): Sensitivity[] {
  const device = typicalDevice(part);
  const stage = stageValues(brief, resistors);
  const rooms = roomsOf(device, stage);
  if (!rooms) return [];
  return componentsOf(device, stage).flatMap(({ component, scaled }) => {
    const more = roomsOf(...scaled(1 + STEP));
    const less = roomsOf(...scaled(1 - STEP));
    if (!more || !less) return [];
    const slope = (side: keyof Rooms) => (CHANGE * (more[side] - less[side])) / (2 * STEP);
    return [{ component, ...followRooms(rooms, slope("towardCutoff"), slope("towardOhmic")) }];
  });
}

/** How S and c change where the room toward cutoff changes by du and that toward the ohmic region by dd. */
function followRooms({ towardCutoff: u, towardOhmic: d }: Rooms, du: number, dd: number) {
  const swing = u < d ? du : u > d ? dd : Math.min(du, dd);
  // e = (U - D)/(U + D) is smooth; c is its magnitude.
  const lean = (2 * (d * du - u * dd)) / (u + d) ** 2;
  const centring = u < d ? -lean : u > d ? lean : Math.abs(lean);
  return { swing, swingShare: swing / Math.min(u, d), centring };
}

/** The rooms of a saturated stage with room on both sides; null for any other. */
function roomsOf(device: SquareLaw, stage: StageValues): Rooms | null {
  const { swing } = solveNetwork(device, circuitOf(stage.circuit).network(stage));
  return swing && swing.symmetric > 0 ? swing : null;
}

type Scaled = (by: number) => [SquareLaw, StageValues];

/** Every component of a stage, with the stage that it makes when scaled. */
function componentsOf(device: SquareLaw, stage: StageValues): { component: Component; scaled: Scaled }[] {
  const { vdd, vss, rl } = stage;
  const inStage = (component: Component, key: ResistorKey | "vdd" | "vss" | "rl", value: number) => ({
    component,
    scaled: ((by) => [device, { ...stage, [key]: by * value }]) satisfies Scaled,
  });
  const inDevice = (key: "vt" | "k") => ({
    component: key,
    scaled: ((by) => [{ ...device, [key]: by * device[key] }, stage]) satisfies Scaled,
  });
  return [
    ...RESISTOR_KEYS.filter((key) => stage[key] > 0).map((key) => inStage(key, key, stage[key])),
    ...(rl === null ? [] : [inStage("rl", "rl", rl)]),
    inStage("rail", "vdd", vdd),
    ...(vss > 0 ? [inStage("negativeRail", "vss", vss)] : []),
    inDevice("vt"),
    inDevice("k"),
  ];
}
