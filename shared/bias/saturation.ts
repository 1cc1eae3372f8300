import type { SquareLaw } from "./device";

/**
 * The overdrive voltage x that a saturated device takes behind a source resistor: x + ID(x) RS = VG - VT, where
 * ID(x) = K (1 + λ VDD) x² / (1 + λ K RT x²) already holds VDS = VDD - ID RT. In this form 1 + λ VDS is never
 * negative and the left side only rises, so there is one root and none of the false ones of the cubic.
 *
 * @param drive VG - VT, V, above zero
 * @param rs source resistor, ohms
 * @param rt RD + RS, ohms
 */
export function saturationOverdrive(
  device: SquareLaw,
  vdd: number,
  drive: number,
  rs: number,
  rt: number,
): number {
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
 * Drain current of a saturated device at an overdrive, where the rail falls across RT and the device:
 * ID = K x² (1 + λ VDS) with VDS = VDD - ID RT, solved for ID.
 *
 * @param x overdrive, V
 * @returns amperes
 */
export function saturationCurrent(device: SquareLaw, vdd: number, x: number, rt: number): number {
  const { k, lambda } = device;
  return (k * (1 + lambda * vdd) * x * x) / (1 + lambda * k * rt * x * x);
}
