import type { Resistors } from "#shared/schemas/circuit";

/** Builds that are drawn and tried together: few enough for their figures to stay close to the processor. */
export const BLOCK = 240;

export type Column = Float64Array;

/** What a block of builds turned out to be, a column a figure: VT and K at the build's own temperature. */
export type BuildColumns = {
  vt: Column;
  k: Column;
  celsius: Column;
  rail: Column;
  negativeRail: Column;
  resistors: Record<keyof Resistors, Column>;
};

/** The networks of a block of builds, a column a figure; see `Network`. */
export type NetworkColumns = {
  gate: Column;
  gateSlope: Column;
  supply: Column;
  total: Column;
  slope: Column;
  degeneration: Column;
  output: Column;
  feedthrough: Column;
};

const column = () => new Float64Array(BLOCK);

export function newBuildColumns(): BuildColumns {
  return {
    vt: column(),
    k: column(),
    celsius: column(),
    rail: column(),
    negativeRail: column(),
    resistors: { r1: column(), r2: column(), rg: column(), rd: column(), rs: column(), rs2: column() },
  };
}

export function newNetworkColumns(): NetworkColumns {
  return {
    gate: column(),
    gateSlope: column(),
    supply: column(),
    total: column(),
    slope: column(),
    degeneration: column(),
    output: column(),
    feedthrough: column(),
  };
}
