type Point = { x: number; y: number };

/** Which way three points turn: above zero for a left turn. */
function turn(a: Point, b: Point, c: Point): number {
  return (b.x - a.x) * (c.y - a.y) - (b.y - a.y) * (c.x - a.x);
}

/**
 * The smallest convex outline around points, counter-clockwise, by Andrew's monotone chain (A. M. Andrew, "Another
 * efficient algorithm for convex hulls in two dimensions", Information Processing Letters 9, 1979).
 */
export function convexHull<P extends Point>(points: readonly P[]): P[] {
  const sorted = [...points].sort((a, b) => a.x - b.x || a.y - b.y);
  if (sorted.length < 3) return sorted;
  const chain = (ordered: readonly P[]) => {
    const kept: P[] = [];
    for (const point of ordered) {
      while (kept.length > 1 && turn(kept[kept.length - 2], kept[kept.length - 1], point) <= 0) kept.pop();
      kept.push(point);
    }
    kept.pop();
    return kept;
  };
  return [...chain(sorted), ...chain(sorted.reverse())];
}
