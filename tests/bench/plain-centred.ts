/** The part of a brief that the bench uses: rail, load, bypassed source resistor, no conditions. */
export type PlainProblem = {
  vdd: number;
  load: number;
  divider: readonly number[];
  drain: readonly number[];
  source: readonly number[];
};

export type PlainDevice = { vt: number; k: number; lambda: number };

/**
 * The plain loop that anyone would write first: every combination solved in full, the best of each part kept. Closed
 * forms where λ is 0, Newton's method where it isn't, so that it is a fair opponent.
 *
 * @param most stop after about this many combinations
 * @returns how many combinations were solved, how long that took, and the best swing met (so that no work is idle)
 */
export function runPlainLoop(problem: PlainProblem, devices: readonly PlainDevice[], most: number) {
  const { vdd, load, divider, drain, source } = problem;
  let solved = 0;
  let check = 0;
  const started = performance.now();
  outer: for (const { vt, k, lambda } of devices) {
    let bestBucket = 101;
    let bestSwing = 0;
    for (const r1 of divider) {
      for (const r2 of divider) {
        const drive = vdd / (1 + r1 / r2) - vt;
        for (const rd of drain) {
          const rl = (rd * load) / (rd + load);
          for (const rs of source) {
            solved++;
            if (drive <= 0) continue;
            const total = rd + rs;
            let x = (2 * drive) / (1 + Math.sqrt(1 + 4 * k * rs * drive));
            const a = k * (1 + lambda * vdd);
            const b = lambda * k * total;
            if (lambda > 0) {
              for (let step = 0; step < 4; step++) {
                const d = 1 + b * x * x;
                x -= (x + (a * x * x * rs) / d - drive) / (1 + (2 * a * x * rs) / (d * d));
              }
            }
            const id = (a * x * x) / (1 + b * x * x);
            const vds = vdd - id * total;
            if (vds < x) continue;
            const intercept = id + vds / rl;
            const g = 1 / rl;
            let v = (2 * intercept) / (g + Math.sqrt(g * g + 4 * k * intercept));
            if (lambda > 0) {
              for (let step = 0; step < 4; step++) {
                v -= (k * v * v * (1 + lambda * v) + v * g - intercept) / (k * v * (2 + 3 * lambda * v) + g);
              }
            }
            const up = id * rl;
            const down = (k * v * v * (1 + lambda * v) - id) * rl;
            const swing = Math.min(up, down);
            const bucket = Math.floor((100 * Math.abs(up - down)) / (up + down));
            if (bucket < bestBucket || (bucket === bestBucket && swing > bestSwing)) {
              bestBucket = bucket;
              bestSwing = swing;
            }
          }
        }
        if (solved >= most) {
          check += bestSwing;
          break outer;
        }
      }
    }
    check += bestSwing;
  }
  return { solved, elapsedMs: performance.now() - started, check };
}
