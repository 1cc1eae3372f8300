import type { Mounting } from "#shared/schemas/quantity";

export type PackageName =
  | "SOT-23"
  | "SC-70"
  | "SOT-323"
  | "DFN-3"
  | "SOT-89"
  | "TO-92"
  | "SOT-223"
  | "TO-252"
  | "TO-220";

export interface PackageFigures {
  mounting: Mounting;
  /** Junction to still air, K/W: with the smallest die it takes, and with the largest. */
  rthJa: { smallestDie: number; largestDie: number };
  /** The largest die that fits, as the K of an N-channel low-voltage die of that area, A/V². */
  largestDie: number;
  /** What the leads and bond wires carry, A. */
  leadCurrent: number;
  /** What the distance between its leads stands, V. */
  leadVoltage: number;
  /** What one assembled and tested piece costs without its die, US cents for a single piece. */
  cents: number;
}

/** Standard outlines, from the smallest die to the largest; thermal figures as engineers commonly meet them. */
export const packages: Readonly<Record<PackageName, PackageFigures>> = {
  "SC-70": {
    mounting: "surface",
    rthJa: { smallestDie: 560, largestDie: 420 },
    largestDie: 0.3,
    leadCurrent: 1.5,
    leadVoltage: 100,
    cents: 20,
  },
  "SOT-323": {
    mounting: "surface",
    rthJa: { smallestDie: 600, largestDie: 440 },
    largestDie: 0.3,
    leadCurrent: 1.5,
    leadVoltage: 100,
    cents: 19,
  },
  "DFN-3": {
    mounting: "surface",
    rthJa: { smallestDie: 500, largestDie: 400 },
    largestDie: 0.45,
    leadCurrent: 2.5,
    leadVoltage: 100,
    cents: 25,
  },
  "SOT-23": {
    mounting: "surface",
    rthJa: { smallestDie: 400, largestDie: 300 },
    largestDie: 0.7,
    leadCurrent: 4,
    leadVoltage: 250,
    cents: 18,
  },
  "TO-92": {
    mounting: "through-hole",
    rthJa: { smallestDie: 350, largestDie: 160 },
    largestDie: 0.8,
    leadCurrent: 3,
    leadVoltage: 450,
    cents: 31,
  },
  "SOT-89": {
    mounting: "surface",
    rthJa: { smallestDie: 120, largestDie: 95 },
    largestDie: 1,
    leadCurrent: 6,
    leadVoltage: 450,
    cents: 34,
  },
  "SOT-223": {
    mounting: "surface",
    rthJa: { smallestDie: 100, largestDie: 70 },
    largestDie: 2,
    leadCurrent: 10,
    leadVoltage: 450,
    cents: 48,
  },
  "TO-252": {
    mounting: "surface",
    rthJa: { smallestDie: 85, largestDie: 60 },
    largestDie: 6,
    leadCurrent: 30,
    leadVoltage: 450,
    cents: 62,
  },
  "TO-220": {
    mounting: "through-hole",
    rthJa: { smallestDie: 65, largestDie: 50 },
    largestDie: 10,
    leadCurrent: 60,
    leadVoltage: 450,
    cents: 84,
  },
};

/** Every outline, from the smallest die to the largest. */
export const packageNames = Object.keys(packages) as PackageName[];
