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

/** Newton's steps from the first guess: two or three do. */
const MOST_STEPS = 8;
/** A step this small, as a share of the overdrive, leaves an error of about its square. */
const SMALL_STEP = 1e-6;

/**
 * Solves the Q-point of every build of a block and keeps those in saturation that swing as far as asked both ways.
 *
 * The overdrive x solves x + a x² r/(1 + b x²) = drive, with a = K (1 + λ supply), b = λ K RT and r the gate slope;
 * multiplied out it is a cubic, for which Newton's method needs one division a step. Where that doesn't settle,
 * `saturationOverdrive` does it safely. The room toward the ohmic region needs no root: it is S or more where the edge
 * of saturation, K v² (1 + λ v), lies above the a.c. line at the point v of the line that is S away from rest
 * (`lineToEdge`, `roomOf`).
 *
 * @param peak the swing asked for, V, not negative
 * @param typicalOverdrive about where the overdrives lie, V; only how soon they are found depends on it
 */
export function keepSwinging(
  builds: BuildColumns,
  networks: NetworkColumns,
  lambda: number,
  peak: number,
  typicalOverdrive: number,
  blockSize: number,
  into: Survivors,
): void {
  const { vt, k } = builds;
  const { gate, gateSlope, supply, total, slope, degeneration, output, feedthrough } = networks;
  const typicalSquare = typicalOverdrive * typicalOverdrive;
  let count = 0;
  for (let at = 0; at < blockSize; at++) {
    const drive = gate[at] - vt[at];
    if (!(drive > 0)) continue;
    const r = gateSlope[at];
    const a = k[at] * (1 + lambda * supply[at]);
    const b = lambda * k[at] * total[at];
    // Exact without channel-length modulation; with it, by how far it acts in the typical build.
    const guess = a / (1 + b * typicalSquare);
    let x = (2 * drive) / (1 + Math.sqrt(1 + 4 * guess * r * drive));
    if (lambda > 0 && r > 0) {
      const c = a * r - b * drive;
      let step = 0;
      for (; step < MOST_STEPS; step++) {
        const change = (((b * x + c) * x + 1) * x - drive) / ((3 * b * x + 2 * c) * x + 1);
        x -= change;
        if (change < SMALL_STEP * x && change > -SMALL_STEP * x) break;
      }
      if (step === MOST_STEPS || !(x > 0 && x < drive)) {
        const device = { vt: vt[at], k: k[at], lambda };
        x = saturationOverdrive(device, supply[at], drive, r, total[at]);
      }
    }
    const id = (a * x * x) / (1 + b * x * x);
    const vds = supply[at] - id * total[at];
    if (!(vds >= x)) continue;
    const load = output[at];
    const fed = degeneration[at];
    const passed = feedthrough[at];
    if (load * id - passed * (x + fed * id) < peak) continue;
    const share = passed / (1 - passed);
    const rest = vds + share * (vds - x);
    const lineSlope = slope[at] + share * (slope[at] - fed);
    // D = (rL - f r) Δ - f (v - x) = S with Δ = (rest - v)/rS on the line.
    const perAmpere = load - passed * fed;
    const v = (perAmpere * rest + lineSlope * (passed * x - peak)) / (perAmpere + passed * lineSlope);
    if (!(v >= 0 && k[at] * v * v * (1 + lambda * v) >= id + (rest - v) / lineSlope)) continue;
    into.places[count] = at;
    into.x[at] = x;
    into.id[at] = id;
    into.vds[at] = vds;
    count++;
  }
  into.count = count;
}
