import type { Swing } from "#shared/schemas/bias";
import type { SquareLaw } from "./device";

/** A point in the output plane: drain current in amperes, drain-source voltage in volts. */
export type OutputPoint = { id: number; vds: number };

/** Two resistances in parallel, ohms; null is an open circuit. */
export function parallel(a: number, b: number | null): number {
  return b === null ? a : (a * b) / (a + b);
}

/**
 * The transition point: where the a.c. line through the Q-point meets the edge of saturation, vDS = vGS - VT, that is
 * K v² (1 + λ v) = ID + (VDS - v)/rS. The left side rises and the right side falls with v, so there is one root;
 * the difference is convex, so Newton's method started above the root comes down on it without overshooting.
 *
 * @param q the Q-point, in saturation
 * @param slope the a.c. line's slope resistance rS, ohms, above zero
 */
export function transitionPoint(device: SquareLaw, q: OutputPoint, slope: number): OutputPoint {
  const { k, lambda } = device;
  const v = transitionVoltage(k, lambda, q.id + q.vds / slope, slope);
  return { id: k * v * v * (1 + lambda * v), vds: v };
}

/**
 * The root v of K v² (1 + λ v) + v/rS = intercept; see `transitionPoint`.
 *
 * @param intercept the current at which the a.c. line meets VDS = 0, A
 */
export function transitionVoltage(k: number, lambda: number, intercept: number, slope: number): number {
  const b = 1 / slope;
  // Without channel-length modulation the root is exact; with it that root lies above: the start.
  const exact = (2 * intercept) / (b + Math.sqrt(b * b + 4 * k * intercept));
  if (lambda === 0) return exact;
  let v = exact;
  for (let step = 0; step < 100; step++) {
    const error = k * v * v * (1 + lambda * v) + b * v - intercept;
    const next = v - error / (k * v * (2 + 3 * lambda * v) + b);
    // The descent is monotone until rounding stops it.
    if (!(next < v)) break;
    v = next;
  }
  return v;
}

/** How far off centre a Q-point is: |U - D|/(U + D), 0 at dead centre, 1 at an edge. */
export function centringErrorOf(swing: Swing): number {
  const { towardCutoff, towardOhmic } = swing;
  return Math.abs(towardCutoff - towardOhmic) / (towardCutoff + towardOhmic);
}
