import { drainCurrent, regionOf, type SquareLaw } from "#shared/bias/device";
import { findRoot } from "#shared/bias/find-root";
import { saturationCurrent, saturationOverdrive } from "#shared/bias/saturation";
import type { Region, StageValues } from "#shared/schemas/bias";

/** The d.c. operating point; magnitudes for both polarities. */
export type QPoint = { region: Region; vg: number; vgs: number; id: number; vds: number };

/**
 * Gate voltage of the divider. Written with the ratio of the two resistors, so that pairs of the same ratio
 * give the same voltage to the last bit.
 *
 * @returns volts, VDD R2/(R1 + R2)
 */
export function dividerVoltage(vdd: number, r1: number, r2: number): number {
  return vdd / (1 + r1 / r2);
}

/**
 * Solves the d.c. operating point of the four-resistor stage:
 * VG = VDD R2/(R1 + R2), VGS = VG - ID RS, VDS = VDD - ID (RD + RS).
 *
 * @param device square-law figures
 * @param stage SI units, magnitudes
 */
export function solveQPoint(device: SquareLaw, stage: StageValues): QPoint {
  const { vdd, r1, r2, rd, rs } = stage;
  const vg = dividerVoltage(vdd, r1, r2);
  const drive = vg - device.vt;
  if (drive <= 0) return { region: "cutoff", vg, vgs: vg, id: 0, vds: vdd };
  const rt = rd + rs;
  const x = saturationOverdrive(device, vdd, drive, rs, rt);
  const id = saturationCurrent(device, vdd, x, rt);
  const vds = vdd - id * rt;
  if (vds >= x) return { region: "saturation", vg, vgs: device.vt + x, id, vds };
  // Ohmic: the device's current falls as the stage takes more, so the balance has one root below VDD/RT.
  const balance = (current: number) => drainCurrent(device, vg - current * rs, vdd - current * rt) - current;
  const ohmic = findRoot(balance, 0, vdd / rt);
  const vgs = vg - ohmic * rs;
  const ohmicVds = vdd - ohmic * rt;
  return { region: regionOf(device, vgs, ohmicVds), vg, vgs, id: ohmic, vds: ohmicVds };
}
