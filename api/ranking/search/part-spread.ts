import { conductionAt, kelvin, thresholdAt } from "#shared/bias/device";
import type { Catalog } from "../catalog";
import type { Problem } from "../problem";

/** A part's thresholds and conduction parameters at the ends of its spread and of the ambient range. */
export type PartSpread = {
  lambda: number;
  tcVt: number;
  /** Kelvin, the coldest and the hottest. */
  cold: number;
  hot: number;
  /** The highest threshold with the least K, at 25 °C, and at both ends of the ambient range. */
  vtMax25: number;
  kMin25: number;
  vtMaxAt: readonly [number, number];
  kMinAt: readonly [number, number];
  /** The lowest threshold, and both ends of K, at both ends of the ambient range. */
  vtMinAt: readonly [number, number];
  kMaxAt: readonly [number, number];
  /** 1 where the ambient range is a point. */
  temperatures: number;
};

/** Reads a part's spread from the catalog, for the brief's ambient range. */
export function partSpread(catalog: Catalog, row: number, { ambientMin, ambientMax }: Problem): PartSpread {
  const tcVt = catalog.tcVt[row];
  const atEnds = (at: (celsius: number) => number): [number, number] => {
    const cold = at(ambientMin);
    return [cold, ambientMin === ambientMax ? cold : at(ambientMax)];
  };
  return {
    lambda: catalog.lambda[row],
    tcVt,
    cold: kelvin(ambientMin),
    hot: kelvin(ambientMax),
    vtMax25: catalog.vtMax[row],
    kMin25: catalog.kMin[row],
    vtMaxAt: atEnds((celsius) => thresholdAt(catalog.vtMax[row], tcVt, celsius)),
    kMinAt: atEnds((celsius) => conductionAt(catalog.kMin[row], celsius)),
    vtMinAt: atEnds((celsius) => thresholdAt(catalog.vtMin[row], tcVt, celsius)),
    kMaxAt: atEnds((celsius) => conductionAt(catalog.kMax[row], celsius)),
    temperatures: ambientMin === ambientMax ? 1 : 2,
  };
}
