/** The part of a brief that the bench uses: rail, load, bypassed source resistor, 25 °C, no conditions. */
export type PlainProblem = {
  vdd: number;
  load: number;
  /** Fractions either way. */
  railTolerance: number;
  resistorTolerance: number;
  divider: readonly number[];
  drain: readonly number[];
  source: readonly number[];
};

export type PlainDevice = {
  vt: number;
  k: number;
  vtMin: number;
  vtMax: number;
  kMin: number;
  kMax: number;
  lambda: number;
};

/** Some of a loop's work: one part and one pair of divider resistors, with every RD and RS. */
export type PlainUnit = { device: number; r1: number; r2: number };

/** The best of one part so far; Infinity and -1 before there is any. */
export type PlainBest = { bucket: number; nanovolts: number; supply: number };

export function nothingYet(): PlainBest {
  return { bucket: Number.POSITIVE_INFINITY, nanovolts: -1, supply: Number.POSITIVE_INFINITY };
}

/**
 * VGS - VT of a saturated stage: in closed form where λ is 0, by Newton's method from there where it isn't.
 *
 * @param drive VG - VT, V, above zero
 * @returns NaN for a stage that is deep in the ohmic region
 */
export function overdriveOf(
  drive: number,
  k: number,
  lambda: number,
  vdd: number,
  rd: number,
  rs: number,
): number {
  let x = (2 * drive) / (1 + Math.sqrt(1 + 4 * k * rs * drive));
  if (lambda === 0) return x;
  if (k * x * x * (rd + rs) >= vdd) return Number.NaN;
  const a = k * (1 + lambda * vdd);
  const b = lambda * k * (rd + rs);
  for (let step = 0; step < 4; step++) {
    const d = 1 + b * x * x;
    x -= (x + (a * x * x * rs) / d - drive) / (1 + (2 * a * x * rs) / (d * d));
  }
  return x;
}

/** ID of a saturated stage from its VGS - VT. */
export function currentOf(x: number, k: number, lambda: number, vdd: number, rd: number, rs: number): number {
  return (k * (1 + lambda * vdd) * x * x) / (1 + lambda * k * (rd + rs) * x * x);
}

/** The current at which the a.c. line meets the edge of saturation; `intercept` is the line's current without VDS. */
export function edgeCurrent(intercept: number, rl: number, k: number, lambda: number): number {
  const g = 1 / rl;
  let v = (2 * intercept) / (g + Math.sqrt(g * g + 4 * k * intercept));
  if (lambda > 0) {
    for (let step = 0; step < 4; step++) {
      v -= (k * v * v * (1 + lambda * v) + v * g - intercept) / (k * v * (2 + 3 * lambda * v) + g);
    }
  }
  return k * v * v * (1 + lambda * v);
}

/**
 * The assured swing of one combination in whole nanovolts, from the corners of its box that can hold the least: one
 * toward cutoff (both ends of RD where λ isn't 0), sixteen toward the ohmic region.
 *
 * @param giveUp stop at the first corner without room, as nothing can come of it
 */
export function assuredNanovolts(
  problem: PlainProblem,
  device: PlainDevice,
  r1: number,
  r2: number,
  rd: number,
  rs: number,
  giveUp: boolean,
): number {
  const { vdd, load, railTolerance, resistorTolerance } = problem;
  const { vtMin, vtMax, kMin, kMax, lambda } = device;
  const low = 1 - resistorTolerance;
  const high = 1 + resistorTolerance;
  let least = Number.POSITIVE_INFINITY;

  const lowRail = vdd * (1 - railTolerance);
  const lowDrive = lowRail / (1 + (r1 * high) / (r2 * low)) - vtMax;
  for (let end = lambda > 0 ? 0 : 1; end < 2; end++) {
    const cornerRd = rd * (end === 0 ? high : low);
    const cornerRs = rs * high;
    let up = 0;
    if (lowDrive > 0) {
      const x = overdriveOf(lowDrive, kMin, lambda, lowRail, cornerRd, cornerRs);
      const id = currentOf(x, kMin, lambda, lowRail, cornerRd, cornerRs);
      if (lowRail - id * (cornerRd + cornerRs) >= x) up = (id * cornerRd * load) / (cornerRd + load);
    }
    if (up < least) least = up;
    if (giveUp && least <= 0) return 0;
  }

  const highShare = 1 / (1 + (r1 * low) / (r2 * high));
  for (let railEnd = 0; railEnd < 2; railEnd++) {
    const rail = vdd * (railEnd === 0 ? 1 - railTolerance : 1 + railTolerance);
    const drive = rail * highShare - vtMin;
    for (let rdEnd = 0; rdEnd < 2; rdEnd++) {
      const cornerRd = rd * (rdEnd === 0 ? high : low);
      const rl = (cornerRd * load) / (cornerRd + load);
      for (let rsEnd = 0; rsEnd < 2; rsEnd++) {
        const cornerRs = rs * (rsEnd === 0 ? low : high);
        for (let kEnd = 0; kEnd < 2; kEnd++) {
          const k = kEnd === 0 ? kMax : kMin;
          let down = 0;
          if (drive > 0) {
            const x = overdriveOf(drive, k, lambda, rail, cornerRd, cornerRs);
            const id = currentOf(x, k, lambda, rail, cornerRd, cornerRs);
            const vds = rail - id * (cornerRd + cornerRs);
            if (vds >= x) down = (edgeCurrent(id + vds / rl, rl, k, lambda) - id) * rl;
          }
          if (down < least) least = down;
          if (giveUp && least <= 0) return 0;
        }
      }
    }
  }
  return Math.round(least * 1e9);
}
