import type { PackageName } from "./packages";

export type KindName = "array" | "small-signal" | "logic-level" | "medium-power" | "power" | "depletion";

export interface Kind {
  /** The least and greatest K of an N-channel low-voltage die, A/V²; also the measure of the die's area. */
  size: readonly [least: number, greatest: number];
  /** Typical thresholds on offer, V. */
  thresholds: readonly number[];
  /** Drain-source ratings, V, and how common each is. */
  vdss: readonly (readonly [volts: number, weight: number])[];
  packages: readonly PackageName[];
  /** °C. */
  tjMax: number;
  /** What sorting, matching or a rare process adds to the price, as a factor. */
  priceFactor: number;
  /** How many parts the catalog lists. */
  parts: { n: number; p: number };
}

const small: readonly PackageName[] = ["SC-70", "SOT-323", "DFN-3", "SOT-23", "TO-92"];

/** The kinds of MOSFET in the catalog; 1,260 parts, seven in ten of them N-channel. */
export const kinds: Readonly<Record<KindName, Kind>> = {
  array: {
    size: [1.2e-4, 1e-3],
    thresholds: [0.55, 0.65, 0.75, 0.9, 1.2],
    vdss: [
      [12, 3],
      [20, 5],
      [30, 1],
    ],
    packages: small,
    tjMax: 125,
    priceFactor: 2.2,
    parts: { n: 105, p: 48 },
  },
  "small-signal": {
    size: [3e-3, 0.05],
    thresholds: [0.6, 0.7, 0.8, 0.9, 1.1, 1.4, 1.6, 1.9, 2.1, 2.4],
    vdss: [
      [20, 5],
      [30, 4],
      [40, 3],
      [60, 6],
      [80, 2],
      [100, 3],
      [150, 1],
      [200, 1],
      [250, 1],
      [400, 0.7],
      [450, 0.3],
    ],
    packages: [...small, "SOT-89"],
    tjMax: 150,
    priceFactor: 1,
    parts: { n: 370, p: 162 },
  },
  "logic-level": {
    size: [0.15, 0.5],
    thresholds: [0.6, 0.75, 0.9, 1.1, 1.4, 1.7],
    vdss: [
      [12, 2],
      [20, 5],
      [30, 5],
      [40, 2],
      [60, 4],
    ],
    packages: ["SC-70", "SOT-323", "DFN-3", "SOT-23", "SOT-89", "SOT-223"],
    tjMax: 150,
    priceFactor: 1,
    parts: { n: 190, p: 84 },
  },
  "medium-power": {
    size: [0.4, 1.8],
    thresholds: [1.4, 1.7, 2, 2.5, 3],
    vdss: [
      [30, 2],
      [40, 3],
      [60, 5],
      [80, 2],
      [100, 5],
      [150, 2],
      [200, 2],
      [250, 1],
      [400, 1],
    ],
    packages: ["TO-92", "SOT-89", "SOT-223", "TO-252", "TO-220"],
    tjMax: 150,
    priceFactor: 1,
    parts: { n: 125, p: 51 },
  },
  power: {
    size: [1.8, 9],
    thresholds: [1.7, 2.2, 3, 3.4],
    vdss: [
      [30, 1],
      [40, 2],
      [60, 4],
      [80, 2],
      [100, 5],
      [150, 2],
      [200, 3],
      [250, 2],
      [400, 2],
      [450, 1],
    ],
    packages: ["SOT-223", "TO-252", "TO-220"],
    tjMax: 175,
    priceFactor: 1,
    parts: { n: 80, p: 33 },
  },
  depletion: {
    size: [6e-3, 0.12],
    thresholds: [-1.2, -1.8, -2.5],
    vdss: [
      [60, 1],
      [100, 2],
      [250, 2],
      [400, 1],
    ],
    packages: ["SOT-23", "TO-92", "SOT-89", "SOT-223"],
    tjMax: 150,
    priceFactor: 1.8,
    parts: { n: 12, p: 0 },
  },
};
