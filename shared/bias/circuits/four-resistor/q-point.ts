import { drainCurrent, regionOf, type SquareLaw } from "#shared/bias/device";
import { findRoot } from "#shared/bias/find-root";
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
 * The overdrive voltage x that a saturated device takes behind a source resistor: x + ID(x) RS = VG - VT, where
 * ID(x) = K (1 + λ VDD) x² / (1 + λ K RT x²) already holds VDS = VDD - ID RT. In this form 1 + λ VDS is never
 * negative and the left side only rises, so there is one root and none of the false ones of the cubic.
 *
 * @param drive VG - VT, V, above zero
 * @param rs source resistor, ohms
 * @param rt RD + RS, ohms
 */
export function saturationOverdrive(device: SquareLaw, vdd: number, drive: number, rs: number, rt: number): number {
  const { k, lambda } = device;
  // Exact without channel-length modulation; the root of the quadratic with VGS above VT.
  const first = (2 * drive) / (1 + Math.sqrt(1 + 4 * k * rs * drive));
  if (lambda === 0 || rs === 0) return first;
  const a = k * (1 + lambda * vdd);
  const b = lambda * k * rt;
  let low = 0;
  let high = drive;
  let x = first;
  for (let step = 0; step < 100; step++) {
    const denominator = 1 + b * x * x;
    const current = (a * x * x) / denominator;
    const error = x + current * rs - drive;
    if (error > 0) high = x;
    else low = x;
    let next = x - error / (1 + (2 * a * x * rs) / (denominator * denominator));
    if (!(next > low && next < high)) next = 0.5 * (low + high);
    if (Math.abs(next - x) <= 2e-16 * x) return next;
    x = next;
  }
  return x;
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
  const id =
    (device.k * (1 + device.lambda * vdd) * x * x) / (1 + device.lambda * device.k * rt * x * x);
  const vds = vdd - id * rt;
  if (vds >= x) return { region: "saturation", vg, vgs: device.vt + x, id, vds };
  // Ohmic: the device's current falls as the stage takes more, so the balance has one root below VDD/RT.
  const balance = (current: number) =>
    drainCurrent(device, vg - current * rs, vdd - current * rt) - current;
  const ohmic = findRoot(balance, 0, vdd / rt);
  const vgs = vg - ohmic * rs;
  const ohmicVds = vdd - ohmic * rt;
  return { region: regionOf(device, vgs, ohmicVds), vg, vgs, id: ohmic, vds: ohmicVds };
}
