/**
 * Gate voltage of a divider that is not loaded. Written with the ratio of the two resistors, so that pairs of the same
 * ratio give the same voltage to the last bit.
 *
 * @returns volts, VDD R2/(R1 + R2)
 */
export function dividerVoltage(vdd: number, r1: number, r2: number): number {
  return vdd / (1 + r1 / r2);
}
