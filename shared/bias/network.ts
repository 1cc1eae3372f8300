import type { Bias, Region } from "#shared/schemas/bias";
import { conductances, drainCurrent, regionOf, type SquareLaw } from "./device";
import { findRoot } from "./find-root";
import { saturationCurrent, saturationOverdrive } from "./saturation";
import { centringErrorOf, transitionVoltage } from "./swing";

/**
 * A stage as its device sees it. Every circuit here comes down to two straight lines at d.c. and two for signals, so
 * one solver serves them all. SI units; magnitudes for both polarities.
 *
 * At d.c.: VGS = gate - gateSlope ID and VDS = supply - total ID.
 * For a signal v at the gate, with Δ the change of the drain current: ΔVGS = v - degeneration Δ,
 * ΔVDS = feedthrough v - slope Δ, and the output moves by feedthrough v - output Δ, up where the stage follows its
 * input, down where it inverts.
 */
export type Network = {
  /** VGS without drain current, V. */
  gate: number;
  /** What the gate-source voltage loses per ampere, ohms. */
  gateSlope: number;
  /** VDS without drain current, V. */
  supply: number;
  /** What the drain-source voltage loses per ampere, ohms. */
  total: number;
  /** The a.c. line's slope resistance, ohms. */
  slope: number;
  /** Signal fed back into VGS, volts per ampere of drain current. */
  degeneration: number;
  /** The a.c. load at the output, ohms. */
  output: number;
  /** The share of the input that reaches the output past the device: through a resistor from drain to gate. */
  feedthrough: number;
  /** Whether the output moves against the input. */
  inverting: boolean;
};

/** The d.c. operating point. */
export type QPoint = { region: Region; vgs: number; id: number; vds: number };

/** Solves the d.c. operating point of a network. */
export function solveQPoint(device: SquareLaw, network: Network): QPoint {
  const { gate, gateSlope, supply, total } = network;
  const drive = gate - device.vt;
  if (drive <= 0) return { region: "cutoff", vgs: gate, id: 0, vds: supply };
  const x = saturationOverdrive(device, supply, drive, gateSlope, total);
  const id = saturationCurrent(device, supply, x, total);
  const vds = supply - id * total;
  if (vds >= x) return { region: "saturation", vgs: device.vt + x, id, vds };
  // Ohmic: the device's current falls as the stage takes more, so the balance has one root below the line's end.
  const balance = (current: number) =>
    drainCurrent(device, gate - current * gateSlope, supply - current * total) - current;
  const ohmic = findRoot(balance, 0, supply / total);
  const vgs = gate - ohmic * gateSlope;
  const ohmicVds = supply - ohmic * total;
  return { region: regionOf(device, vgs, ohmicVds), vgs, id: ohmic, vds: ohmicVds };
}

/**
 * The a.c. line through the Q-point as one that meets the edge of saturation: VDS0 and its slope resistance in
 * iD = IDQ + (VDS0 - vDS)/rS. Without feedthrough these are VDSQ and the network's own slope; with it, the input that
 * reaches the edge is eliminated by vDS = vGS - VT there.
 *
 * @param overdrive VGSQ - VT, V
 */
export function lineToEdge(network: Network, vds: number, overdrive: number): { vds: number; slope: number } {
  const { slope, degeneration, feedthrough } = network;
  const share = feedthrough / (1 - feedthrough);
  return { vds: vds + share * (vds - overdrive), slope: slope + share * (slope - degeneration) };
}

/**
 * The transition point and the room each way of a saturated Q-point, volts peak at the output; below zero where more
 * of the input passes around the device than through it.
 */
export function roomOf(
  device: SquareLaw,
  network: Network,
  { id, vds, vgs }: Omit<QPoint, "region">,
): { transition: { id: number; vds: number }; towardCutoff: number; towardOhmic: number } {
  const { degeneration, output, feedthrough } = network;
  const { k, lambda, vt } = device;
  const overdrive = vgs - vt;
  const line = lineToEdge(network, vds, overdrive);
  const v = transitionVoltage(k, lambda, id + line.vds / line.slope, line.slope);
  const current = k * v * v * (1 + lambda * v);
  const change = current - id;
  // The inputs that bring the stage to either end count only where they pass around the device.
  const inputAtEdge = v + degeneration * change - overdrive;
  const inputAtCutoff = overdrive + degeneration * id;
  return {
    transition: { id: current, vds: v },
    towardCutoff: output * id - feedthrough * inputAtCutoff,
    towardOhmic: output * change - feedthrough * inputAtEdge,
  };
}

/** gm and gds, S, with the signed gain from the gate: the exact solution of the nodes, in each region. */
export function smallSignalOf(
  device: SquareLaw,
  network: Network,
  { region, vgs, vds }: QPoint,
): { gm: number; gds: number; gain: number } {
  const { gm, gds } = conductances(device, vgs, vds);
  const { slope, degeneration, output, feedthrough, inverting } = network;
  if (region === "cutoff") return { gm, gds, gain: 0 };
  const perVolt = (gm + gds * feedthrough) / (1 + gm * degeneration + gds * slope);
  const fall = output * perVolt - feedthrough;
  return { gm, gds, gain: inverting ? -fall : fall };
}

/** What a network's Q-point says of itself; the rest of a solved stage is its circuit's to tell. */
export type SolvedNetwork = Pick<
  Bias,
  | "region"
  | "vgs"
  | "overdrive"
  | "id"
  | "vds"
  | "transition"
  | "swing"
  | "centringError"
  | "gm"
  | "gain"
  | "power"
> & { gds: number };

/** Solves Q-point, swing and small-signal figures of a network. */
export function solveNetwork(device: SquareLaw, network: Network): SolvedNetwork {
  const q = solveQPoint(device, network);
  const room = q.region === "saturation" ? roomOf(device, network, q) : null;
  const towardCutoff = Math.max(0, room?.towardCutoff ?? 0);
  const towardOhmic = Math.max(0, room?.towardOhmic ?? 0);
  const swing = room && { towardCutoff, towardOhmic, symmetric: Math.min(towardCutoff, towardOhmic) };
  return {
    ...q,
    overdrive: q.vgs - device.vt,
    transition: room ? room.transition : null,
    swing,
    // Without room on one side a stage is as far off centre as can be, whatever it has on the other.
    centringError: swing && (swing.symmetric > 0 ? centringErrorOf(swing) : 1),
    ...smallSignalOf(device, network, q),
    power: q.vds * q.id,
  };
}
