import type { Part } from "#shared/schemas/part";
import { partLineCents } from "./cost";
import type { Problem } from "./problem";

/**
 * The order in which to search parts, the most promising first: it decides how soon the last place of the answer is
 * dear, not what the answer is. What eats the assured swing is how far the threshold and the overdrive spread from
 * build to build, so the parts that spread least come first; for the least cost, the cheapest.
 *
 * @returns rows of the parts
 */
export function promiseOrder(problem: Problem, parts: readonly Part[], buildQuantity: number): Int32Array {
  if (problem.objective === "cost") {
    const cents = parts.map((part) => partLineCents(part, buildQuantity) ?? Number.POSITIVE_INFINITY);
    return Int32Array.from(parts.keys()).sort((a, b) =>
      cents[a] < cents[b] ? -1 : cents[a] > cents[b] ? 1 : 0,
    );
  }
  const supply = problem.vdd + problem.vss;
  const { rd, rs } = problem.values;
  const values = rd.length > 0 ? rd : rs;
  const resistance = Math.min(
    problem.load ?? Number.POSITIVE_INFINITY,
    Math.sqrt(values[0] * values[values.length - 1]),
  );
  const current = supply / (4 * resistance);
  const burden = parts.map(
    ({ vtMin, vtMax, kMin }) =>
      vtMax - vtMin + 2 * problem.railTolerance * vtMax + 0.5 * Math.sqrt(current / kMin),
  );
  return Int32Array.from(parts.keys()).sort((a, b) => burden[a] - burden[b]);
}
