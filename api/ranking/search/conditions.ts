import {
  type Capacitances,
  highCorner,
  type SmallSignalStage,
  transferSquared,
} from "#shared/bias/high-corner";
import { permittedDissipation } from "#shared/bias/thermal";
import { distortionAt } from "#shared/bias/wave";
import type { PassedOverReason } from "#shared/schemas/fits";
import type { Catalog } from "../catalog";
import type { Problem } from "../problem";
import { pairResistance } from "./ratio-table";
import type { LineResistances } from "./windows";

/** The conditions in the order in which the search meets them. */
export const CONDITIONS = [
  "rail-rating",
  "swing",
  "assured-swing",
  "supply-current",
  "source-drop",
  "power-rating",
  "resistor-rating",
  "gain",
  "resistor-values",
  "input-resistance",
  "high-corner",
  "distortion",
  "no-price",
] as const satisfies readonly PassedOverReason[];

export type Condition = (typeof CONDITIONS)[number];

/** One part with what it may dissipate. */
export type Device = { row: number; vt: number; k: number; lambda: number; power: number } & Capacitances;

/** Reads a part's typical device from the catalog. */
export function readDevice(catalog: Catalog, row: number, problem: Problem): Device {
  const thermal = { pd25: catalog.pd25[row], rthJa: catalog.rthJa[row], tjMax: catalog.tjMax[row] };
  return {
    row,
    vt: catalog.vt[row],
    k: catalog.k[row],
    lambda: catalog.lambda[row],
    cgs: catalog.cgs[row],
    cgd: catalog.cgd[row],
    cds: catalog.cds[row],
    power: problem.deratingPower * permittedDissipation(thermal, problem.ambientMax),
  };
}

/** A line with the greatest of its resistors, ohms: where the drain current heats most. */
export type SearchLine = LineResistances & { gateSlope: number; greatest: number };

/** A saturated operating point: overdrive V, drain current A, drain-source V, symmetric swing V. */
export type Point = { x: number; id: number; vds: number; symmetric: number };

/** Whether a brief has conditions that are no plain range of the drain current. */
export function hasPointConditions(problem: Problem): boolean {
  return (
    problem.gainMin > 0 ||
    problem.gainMax < Number.POSITIVE_INFINITY ||
    problem.highCornerMin > 0 ||
    problem.distortionMax < Number.POSITIVE_INFINITY
  );
}

/** The first condition that an operating point fails, whichever pair of values makes it; null when none. */
export function failedCondition(
  problem: Problem,
  device: Device,
  line: SearchLine,
  point: Point,
): Condition | null {
  const { x, id, vds } = point;
  if (point.symmetric < problem.swingPeak) return "swing";
  if (id * line.gateSlope < problem.sourceDropMin) return "source-drop";
  if (vds * id > device.power) return "power-rating";
  if (id * id * line.greatest > problem.resistorPower) return "resistor-rating";
  const { gm, gds } = conductancesAt(device, point);
  const gain = (gm * line.load) / (1 + gds * line.slope + gm * line.degeneration);
  if (gain < problem.gainMin || gain > problem.gainMax) return "gain";
  if (problem.distortionMax < Number.POSITIVE_INFINITY && problem.distortionPeak > 0) {
    const network = { output: line.load, slope: line.slope, degeneration: line.degeneration, feedthrough: 0 };
    const path = { device, q: { id, vds, vgs: device.vt + x }, network };
    const { secondHarmonic } = distortionAt(path, problem.distortionPeak / gain);
    if (!(secondHarmonic <= problem.distortionMax)) return "distortion";
  }
  return null;
}

/** Whether a stage with this divider still has its gain, less 3 dB, up to the brief's high corner. */
export function reachesCorner(
  problem: Problem,
  device: Device,
  line: SearchLine,
  point: Point,
  r1: number,
  r2: number,
): boolean {
  const { sourceImpedance, highCornerMin } = problem;
  if (highCornerMin === 0) return true;
  const stage: SmallSignalStage = {
    ...conductancesAt(device, point),
    // A follower's drain is at signal ground, and its load is what its source terminal has.
    drain: problem.circuit === "follower" ? 0 : line.load,
    source: line.degeneration,
    gate: pairResistance(r1, r2),
    feedback: null,
    output: problem.circuit === "follower" ? "source" : "drain",
    sourceImpedance,
  };
  // Cheap and necessary; the corner itself is only worked out for what passes.
  if (2 * transferSquared(stage, device, highCornerMin) < transferSquared(stage, device, 0)) return false;
  const corner = highCorner(stage, device);
  return corner === null || corner >= highCornerMin;
}

/** gm and gds of a saturated device; `conductances` of the device law with the overdrive at hand. */
function conductancesAt({ k, lambda }: Device, { x, vds }: Point): { gm: number; gds: number } {
  return { gm: 2 * k * x * (1 + lambda * vds), gds: k * x * x * lambda };
}
