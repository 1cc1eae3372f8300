import { saturationOverdrive } from "../saturation";
import { BLOCK, type BuildColumns, type Column, type NetworkColumns } from "./columns";

/** The builds of a block that still meet every condition, with their Q-points; a build keeps its place in the columns. */
export type Survivors = { places: Int32Array; count: number; x: Column; id: Column; vds: Column };

export function newSurvivors(): Survivors {
  return {
    places: new Int32Array(BLOCK),
    count: 0,
    x: new Float64Array(BLOCK),
    id: new Float64Array(BLOCK),
    vds: new Float64Array(BLOCK),
  };
}

/** A step smaller than this share of the overdrive leaves an error of a quarter of its cube at most: 3 parts in 10⁷. */
const SMALL_STEP = 1e-2;

/**
 * Solves the overdrive of every build of a block, were it saturated; 0 for one that doesn't conduct.
 *
 * The overdrive x solves x + a x² r/(1 + b x²) = drive, with a = K (1 + λ supply), b = λ K RT and r the gate slope;
 * multiplied out it is a cubic, which a step of Halley's or two solve (E. Halley, "Methodus nova accurata et facilis
 * inveniendi radices aequationum", Philosophical Transactions 18, 1694). Where they don't settle, `saturationOverdrive`
 * does it safely. Two short loops keep a processor busier than one long one.
 *
 * @param typicalShare about what share 1 + λ VDS is of 1 + λ supply; only how soon the overdrives are found depends on it
 */
export function solveOverdrives(
  builds: BuildColumns,
  networks: NetworkColumns,
  lambda: number,
  typicalShare: number,
  blockSize: number,
  into: Column,
): void {
  const { vt, k } = builds;
  const { gate, gateSlope, supply, total } = networks;
  for (let at = 0; at < blockSize; at++) {
    const drive = Math.max(0, gate[at] - vt[at]);
    const a = k[at] * (1 + lambda * supply[at]);
    // Exact without channel-length modulation; with it, by how far it acts in the typical build.
    into[at] = (2 * drive) / (1 + Math.sqrt(1 + 4 * typicalShare * a * gateSlope[at] * drive));
  }
  if (lambda === 0) return;
  for (let at = 0; at < blockSize; at++) {
    const drive = gate[at] - vt[at];
    const b = lambda * k[at] * total[at];
    const c = k[at] * (1 + lambda * supply[at]) * gateSlope[at] - b * drive;
    let x = into[at];
    let change = halleyStep(b, c, drive, x);
    x -= change;
    if (!(Math.abs(change) < SMALL_STEP * x)) {
      change = halleyStep(b, c, drive, x);
      x -= change;
      if (!(Math.abs(change) < SMALL_STEP * x && x < drive)) {
        const device = { vt: vt[at], k: k[at], lambda };
        x = drive > 0 ? saturationOverdrive(device, supply[at], drive, gateSlope[at], total[at]) : 0;
      }
    }
    into[at] = x;
  }
}

/** Halley's step for b x³ + c x² + x = drive. */
function halleyStep(b: number, c: number, drive: number, x: number): number {
  const value = ((b * x + c) * x + 1) * x - drive;
  const bend = 3 * b * x + c;
  const rise = (bend + c) * x + 1;
  return (value * rise) / (rise * rise - value * bend);
}

/**
 * Keeps the builds of a block that are in saturation and swing as far as asked both ways.
 *
 * The room toward the ohmic region needs no root: it is S or more where the edge of saturation, K v² (1 + λ v), lies
 * above the a.c. line at the point v of the line that is S away from rest (`lineToEdge`, `roomOf`).
 *
 * @param overdrives of the builds, from `solveOverdrives`
 * @param peak the swing asked for, V, not negative
 */
export function keepSwinging(
  builds: BuildColumns,
  networks: NetworkColumns,
  overdrives: Column,
  lambda: number,
  peak: number,
  blockSize: number,
  into: Survivors,
): void {
  const { k } = builds;
  const { supply, total, slope, degeneration, output, feedthrough } = networks;
  let count = 0;
  for (let at = 0; at < blockSize; at++) {
    const x = overdrives[at];
    const a = k[at] * (1 + lambda * supply[at]);
    const id = (a * x * x) / (1 + lambda * k[at] * total[at] * x * x);
    const vds = supply[at] - id * total[at];
    if (!(x > 0 && vds >= x)) continue;
    const load = output[at];
    const passed = feedthrough[at];
    // Where the a.c. line is the peak away from rest: its voltage, and the current there.
    let v: number;
    let current: number;
    if (passed === 0) {
      if (load * id < peak) continue;
      const change = peak / load;
      v = vds - change * slope[at];
      current = id + change;
    } else {
      const fed = degeneration[at];
      if (load * id - passed * (x + fed * id) < peak) continue;
      const share = passed / (1 - passed);
      const rest = vds + share * (vds - x);
      const lineSlope = slope[at] + share * (slope[at] - fed);
      // D = (rL - f r) Δ - f (v - x) with Δ = (rest - v)/rS on the line.
      const perAmpere = load - passed * fed;
      v = (perAmpere * rest + lineSlope * (passed * x - peak)) / (perAmpere + passed * lineSlope);
      current = id + (rest - v) / lineSlope;
    }
    if (!(v >= 0 && k[at] * v * v * (1 + lambda * v) >= current)) continue;
    into.places[count] = at;
    into.x[at] = x;
    into.id[at] = id;
    into.vds[at] = vds;
    count++;
  }
  into.count = count;
}
