/** One RD and RS with the ends between which RG and R2 leave the rest. */
export type Reach = {
  rd: number;
  rs: number;
  degeneration: number;
  /** The share of the rail at the drain when the device is off. */
  loadedLow: number;
  loadedHigh: number;
  /** The a.c. load, ohms. */
  outputLow: number;
  outputHigh: number;
  /** The greatest share of the input that passes the device by. */
  feedthrough: number;
};

/** The σ at which a device carries a current: VGS = σ (V - I RD) - I RS; Infinity where RD takes the whole rail. */
export function sigmaFor({ rd, rs }: Reach, current: number, vt: number, k: number, rail: number): number {
  const drain = rail - current * rd;
  return drain > 0 ? (vt + Math.sqrt(current / k) + current * rs) / drain : Number.POSITIVE_INFINITY;
}

/**
 * An upper bound on the drain current of a build with a room D toward the ohmic region and a centring error c at most.
 *
 * The current has to rise by δ >= D/rL, and by δ >= U/(m rL), m = (1 + c)/(1 - c), U >= rL ID - κ (x + ID R), R what of
 * RS carries signal. At the edge of saturation K v² (1 + λ v) = ID + δ, and (1 - κ) v <= VDS - (rL + (1 - κ) R) δ,
 * since the input that gets there is v - x + R δ at most v + R δ. With K (1 + λ V) for K this is a quadratic in v.
 */
export function mostCurrent(
  reach: Reach,
  k: number,
  lambda: number,
  rail: number,
  room: number,
  centring: number,
): number {
  const { rd, rs, degeneration, loadedLow, loadedHigh, outputLow, outputHigh, feedthrough } = reach;
  const kUpper = k * (1 + lambda * rail);
  const past = 1 - feedthrough;
  const step = outputLow + past * degeneration;
  const total = loadedLow * rd + rs;
  const rise = room / outputHigh;
  let most = currentWhere(kUpper, past, total, loadedHigh * rail - step * rise, rise, 0);
  if (centring < 1 && most > 0) {
    const m = (1 + centring) / (1 - centring);
    const share = Math.max(0, outputLow - feedthrough * degeneration) / (m * outputHigh);
    // x is at most that of the greatest current.
    const passed = (feedthrough * Math.sqrt(most / k)) / (m * outputHigh);
    most = Math.min(
      most,
      currentWhere(kUpper, past, total + step * share, loadedHigh * rail + step * passed, -passed, share),
    );
  }
  return most;
}

/** The greatest I with (1 - κ) v + I T <= V, K v² = I (1 + share) + rise; 0 where there is none. */
function currentWhere(
  k: number,
  past: number,
  total: number,
  rail: number,
  rise: number,
  share: number,
): number {
  // I = (K v² - rise)/(1 + share) put in: T K v²/(1 + share) + (1 - κ) v = V + T rise/(1 + share).
  const t = total / (1 + share);
  const right = rail + t * rise;
  if (right <= 0) return 0;
  const v = (2 * right) / (past + Math.sqrt(past * past + 4 * t * k * right));
  return Math.max(0, (rail - past * v) / total);
}
