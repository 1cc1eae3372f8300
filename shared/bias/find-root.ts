/**
 * Finds where a function crosses zero inside a bracket, by Chandrupatla's method (T. R. Chandrupatla, "A new
 * hybrid quadratic/bisection algorithm for finding the zero of a nonlinear function", Advances in Engineering
 * Software 28, 1997): inverse quadratic steps where they are safe, halving where they are not.
 *
 * @param f a continuous function whose signs at the ends differ (or are zero)
 * @param low one end of the bracket
 * @param high the other end
 * @returns the root to about one part in 10¹⁵ of the bracket's larger end
 * @throws RangeError when the ends have the same sign
 */
export function findRoot(f: (x: number) => number, low: number, high: number): number {
  let a = high;
  let b = low;
  let c = high;
  let fa = f(a);
  let fb = f(b);
  let fc = fa;
  if (fa === 0) return a;
  if (fb === 0) return b;
  if (fa > 0 === fb > 0) throw new RangeError(`No sign change: f(${low}) = ${fb}, f(${high}) = ${fa}`);
  let t = 0.5;
  for (let step = 0; step < 200; step++) {
    const x = a + t * (b - a);
    const fx = f(x);
    if (fx > 0 === fa > 0) {
      c = a;
      fc = fa;
    } else {
      c = b;
      b = a;
      fc = fb;
      fb = fa;
    }
    a = x;
    fa = fx;
    const best = Math.abs(fb) < Math.abs(fa) ? b : a;
    const bestValue = Math.abs(fb) < Math.abs(fa) ? fb : fa;
    const width = Math.abs(b - a);
    const tolerance = 4.5e-16 * Math.abs(best) + 1e-300;
    if (bestValue === 0 || width <= 2 * tolerance) return best;
    const xi = (a - b) / (c - b);
    const phi = (fa - fb) / (fc - fb);
    const quadratic = phi * phi < xi && (1 - phi) * (1 - phi) < 1 - xi;
    t = quadratic
      ? (fa / (fb - fa)) * (fc / (fb - fc)) + ((c - a) / (b - a)) * (fa / (fc - fa)) * (fb / (fc - fb))
      : 0.5;
    const least = tolerance / width;
    t = Math.min(1 - least, Math.max(least, t));
  }
  return a;
}
