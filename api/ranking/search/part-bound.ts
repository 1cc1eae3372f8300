import { LINE_CIRCUITS, type LineCircuitName } from "#shared/bias/circuits/lines";
import type { Problem } from "../problem";
import type { PartSpread } from "./part-spread";

/**
 * An upper bound on the assured swing s of a part with any resistors at all: one square root.
 *
 * Take two builds with the same resistors and the same K: A at the low rail with the highest threshold, B with the
 * lowest, at either rail; γ is the ratio of the rails. In A at least I RL' >= s, so q = I RD >= s too. With y = I RS + x/2
 * the gate of B stands Δ = γ VTA - VTB above what A has, which drives at least Δ/(RS + x/(2 I)) more current through it,
 * as √I is concave. So B's rail holds VB >= Δ + γ y + q (1 + Δ/y) + s >= Δ + (1 + γ) s + 2 √(γ s Δ), the last by the
 * inequality of the means over y. Channel-length modulation lets x differ by m = √(1 + λ VB) between the builds, which
 * takes 2 s (m - 1)/m off at most.
 *
 * @returns V; Infinity where the circuit has no such bound
 */
export function greatestAssuredSwing(problem: Problem, part: PartSpread): number {
  const { gate, output } = LINE_CIRCUITS[problem.circuit as LineCircuitName];
  const hottest = part.temperatures - 1;
  const sharesK = part.kMinAt[0] <= part.kMaxAt[hottest];
  if (gate.length === 1 || output === "source" || !sharesK) return Number.POSITIVE_INFINITY;
  const low = problem.vdd * (1 - problem.railTolerance);
  const high = problem.vdd * (1 + problem.railTolerance);
  let bound = Number.POSITIVE_INFINITY;
  for (const rail of [low, high]) {
    const gamma = rail / low;
    const m = Math.sqrt(1 + part.lambda * rail);
    if (m > 2) continue;
    const delta = gamma * part.vtMaxAt[0] - part.vtMinAt[hottest];
    const share = 1 + gamma - (2 * (m - 1)) / m;
    const half = Math.sqrt(gamma * Math.max(0, delta));
    const root = (Math.sqrt(Math.max(0, half * half + share * (rail - delta))) - half) / share;
    bound = Math.min(bound, Math.max(0, root) ** 2);
  }
  return bound;
}
