import type { Build, DeviceSpread, StageValues, Swing } from "#shared/schemas/bias";
import type { Brief } from "#shared/schemas/brief";
import { RESISTOR_KEYS } from "#shared/schemas/circuit";
import type { Part } from "#shared/schemas/part";
import type { BuildEnds, WorstEnds } from "./circuits/circuit";
import { circuitOf } from "./circuits/registry";
import { conductionAt, kelvin, type SquareLaw, thresholdAt } from "./device";
import { findRoot } from "./find-root";
import { roomOf, solveQPoint } from "./network";

/** Everything that may differ from board to board: a closed box around the typical build. */
export type Box = {
  device: Pick<DeviceSpread, "vtMin" | "vtMax" | "kMin" | "kMax" | "lambda" | "tcVt">;
  /** The stage as drawn: nominal rails and resistors. */
  stage: StageValues;
  /** Fractions either way. */
  tolerance: { resistors: number; rail: number };
  /** °C. */
  ambient: { min: number; max: number };
};

/** A box with the typical device at its heart. */
export type BuildBox = Box & { device: Pick<DeviceSpread, "vtTyp" | "kTyp"> };

/** The room that every build of a box has, with the builds that set it. */
export type Assured = { swing: Swing; worst: { cutoff: Build; ohmic: Build } };

/** The box that a brief, a part and a stage make. */
export function boxOf(part: Part, brief: Brief, stage: StageValues): BuildBox {
  return {
    device: part,
    stage,
    tolerance: { resistors: brief.resistors.tolerance, rail: brief.rail.tolerance },
    ambient: brief.ambient,
  };
}

/**
 * The assured swing: the least room toward cutoff and toward the ohmic region of any build inside a box; 0 where some
 * build leaves saturation or does not conduct.
 *
 * Which corners can hold the least is each circuit's to prove (`worst` in its file). Temperature moves VT and K
 * together and is no such corner. Toward cutoff, where nothing passes around the device, U falls with ID, and ID is
 * stationary where VT' + x' = 0 with x = √(ID/K): as K goes with T^-1.5, where the overdrive x is (4/3) |tcVt| T. What
 * gate voltage a given U takes is a concave function of T, so this point is a minimum, the only one inside, and is
 * solved for. Toward the ohmic region, with I the current at which D is just the room asked for, T goes with
 * ((c - I RT)²/(I + s))^(2/3), convex in I, so for tcVt <= 0 and λ = 0 the gate voltage allowed is concave in I and
 * the least D lies at an end of the range. For other devices, and in a circuit that passes some of the input around
 * the device, the range is searched where the room falls from both of its ends. That rests on one valley at most, which
 * is not proved for these; simulated builds have found no second one (`tests/reference/spread.test.ts`).
 */
export function assuredSwing(box: Box): Assured {
  const { worst } = circuitOf(box.stage.circuit);
  const cutoff = leastOver(box, worst.cutoff, box.device.vtMax, "cutoff");
  const ohmic = leastOver(box, worst.ohmic, box.device.vtMin, "ohmic");
  const towardCutoff = Math.max(0, cutoff.room);
  const towardOhmic = Math.max(0, ohmic.room);
  const symmetric = Math.min(towardCutoff, towardOhmic);
  return { swing: { towardCutoff, towardOhmic, symmetric }, worst: { cutoff, ohmic } };
}

type Side = "cutoff" | "ohmic";

/** The least room toward one side over the corners named and the ambient range. */
function leastOver(box: Box, { fixed, either }: WorstEnds, vt: number, side: Side): Build {
  let least: Build | null = null;
  for (const ends of eachEnd(either, fixed)) {
    const stage = stageAt(box, ends);
    const k = ends.k === -1 ? box.device.kMin : box.device.kMax;
    const at = (celsius: number): Build => ({
      vt,
      k,
      celsius,
      stage,
      room: roomToward(side, deviceAt(box, vt, k, celsius), stage),
    });
    for (const celsius of temperaturesToTry(box, side, vt, k, stage, at)) {
      const build = at(celsius);
      if (!least || build.room < least.room) least = build;
    }
  }
  const found = least as Build;
  // Where all of them are past the other side, there is no room toward this one either.
  return { ...found, room: Number.isFinite(found.room) ? found.room : 0 };
}

/** Every combination of ends of the values named, with the fixed ones. */
function* eachEnd(either: WorstEnds["either"], fixed: BuildEnds): Generator<BuildEnds> {
  for (let bits = 0; bits < 1 << either.length; bits++) {
    const ends: BuildEnds = { ...fixed };
    either.forEach((name, at) => {
      ends[name] = bits & (1 << at) ? 1 : -1;
    });
    yield ends;
  }
}

/** A stage with each value at an end of its range; a value not named stays nominal. */
function stageAt({ stage, tolerance }: Box, ends: BuildEnds): StageValues {
  const rail = (end: number | undefined) => 1 + (end ?? 0) * tolerance.rail;
  const values = { ...stage, vdd: stage.vdd * rail(ends.rail), vss: stage.vss * rail(ends.negativeRail) };
  for (const key of RESISTOR_KEYS) values[key] = stage[key] * (1 + (ends[key] ?? 0) * tolerance.resistors);
  return values;
}

function deviceAt({ device }: Box, vt: number, k: number, celsius: number): SquareLaw {
  return {
    vt: thresholdAt(vt, device.tcVt, celsius),
    k: conductionAt(k, celsius),
    lambda: device.lambda,
  };
}

/** Room of one build toward one side, V: below zero where it is past that side, infinite where it is past the other. */
function roomToward(side: Side, device: SquareLaw, stage: StageValues): number {
  const network = circuitOf(stage.circuit).network(stage);
  const q = solveQPoint(device, network);
  if (q.region === "cutoff") return side === "cutoff" ? 0 : Number.POSITIVE_INFINITY;
  if (q.region === "ohmic") return side === "ohmic" ? q.vds - (q.vgs - device.vt) : Number.POSITIVE_INFINITY;
  const room = roomOf(device, network, q);
  return side === "cutoff" ? room.towardCutoff : room.towardOhmic;
}

/** The temperatures of a corner at which the least room can lie. */
function temperaturesToTry(
  box: Box,
  side: Side,
  vt: number,
  k: number,
  stage: StageValues,
  at: (celsius: number) => Build,
): number[] {
  const { min, max } = box.ambient;
  if (min === max) return [min];
  const ends = [min, max];
  const network = circuitOf(stage.circuit).network(stage);
  if (side === "cutoff" && network.feedthrough === 0) {
    const excess = (celsius: number) => {
      const device = deviceAt(box, vt, k, celsius);
      return solveQPoint(device, network).vgs - device.vt + (4 / 3) * box.device.tcVt * kelvin(celsius);
    };
    if (excess(min) > 0 !== excess(max) > 0) ends.push(findRoot(excess, min, max));
    return ends;
  }
  const step = VALLEY_STEP * (max - min);
  const isValley = at(min + step).room < at(min).room && at(max - step).room < at(max).room;
  if (isValley) ends.push(leastBetween(at, min, max));
  return ends;
}

/** How far inside the ambient range, as a share of it, the room is looked at to see whether it falls from both ends. */
const VALLEY_STEP = 1e-4;

/** Golden-section search for the lowest point of a valley (J. Kiefer, Proceedings of the AMS 4, 1953). */
function leastBetween(at: (celsius: number) => Build, min: number, max: number): number {
  const share = (Math.sqrt(5) - 1) / 2;
  let low = min;
  let high = max;
  for (let step = 0; step < 40; step++) {
    const left = high - share * (high - low);
    const right = low + share * (high - low);
    if (at(left).room < at(right).room) high = right;
    else low = left;
  }
  return (low + high) / 2;
}

/** Q-points of the builds at all corners of a box, at both ends of the ambient range. */
export function cornerQPoints(box: Box): { vds: number; id: number }[] {
  const { stage } = box;
  const resistors = RESISTOR_KEYS.filter((key) => stage[key] > 0);
  const rails = stage.vss > 0 ? (["rail", "negativeRail"] as const) : (["rail"] as const);
  const points: { vds: number; id: number }[] = [];
  for (const ends of eachEnd(["k", ...rails, ...resistors], {})) {
    const corner = stageAt(box, ends);
    const network = circuitOf(stage.circuit).network(corner);
    const k = ends.k === -1 ? box.device.kMin : box.device.kMax;
    for (const vt of [box.device.vtMin, box.device.vtMax]) {
      for (const celsius of [box.ambient.min, box.ambient.max]) {
        const { vds, id } = solveQPoint(deviceAt(box, vt, k, celsius), network);
        points.push({ vds, id });
      }
    }
  }
  return points;
}
