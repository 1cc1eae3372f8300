import type { Part } from "#shared/schemas/part";
import { partLineCents } from "./cost";

/**
 * The figures of many parts as columns, in memory that every worker thread reads without a copy.
 * Rows stand in rank order: by part number, then id, so that a row's index is its place in a tie.
 */
export type Catalog = {
  size: number;
  id: Float64Array;
  vt: Float64Array;
  vtMin: Float64Array;
  vtMax: Float64Array;
  k: Float64Array;
  kMin: Float64Array;
  kMax: Float64Array;
  lambda: Float64Array;
  tcVt: Float64Array;
  vdss: Float64Array;
  pd25: Float64Array;
  rthJa: Float64Array;
  tjMax: Float64Array;
  cgs: Float64Array;
  cgd: Float64Array;
  cds: Float64Array;
  /** Integer cents for the transistors of a build; NaN without a price. */
  cents: Float64Array;
};

const COLUMNS = [
  "id",
  "vt",
  "vtMin",
  "vtMax",
  "k",
  "kMin",
  "kMax",
  "lambda",
  "tcVt",
  "vdss",
  "pd25",
  "rthJa",
  "tjMax",
  "cgs",
  "cgd",
  "cds",
  "cents",
] as const;

/** Compares part numbers by code unit, then ids: the order of the ranking's ties. */
export function compareParts(a: Part, b: Part): number {
  if (a.partNumber !== b.partNumber) return a.partNumber < b.partNumber ? -1 : 1;
  return a.id - b.id;
}

/**
 * Lays parts out as columns.
 *
 * @param parts in rank order already
 * @param buildQuantity what they are priced for
 */
export function buildCatalog(parts: readonly Part[], buildQuantity: number): Catalog {
  const columns = Object.fromEntries(
    COLUMNS.map((name) => [name, new Float64Array(new SharedArrayBuffer(8 * parts.length))]),
  ) as Record<(typeof COLUMNS)[number], Float64Array>;
  parts.forEach((part, row) => {
    columns.id[row] = part.id;
    columns.vt[row] = part.vtTyp;
    columns.vtMin[row] = part.vtMin;
    columns.vtMax[row] = part.vtMax;
    columns.k[row] = part.kTyp;
    columns.kMin[row] = part.kMin;
    columns.kMax[row] = part.kMax;
    columns.lambda[row] = part.lambda;
    columns.tcVt[row] = part.tcVt;
    columns.vdss[row] = part.vdss;
    columns.pd25[row] = part.pd25;
    columns.rthJa[row] = part.rthJa;
    columns.tjMax[row] = part.tjMax;
    columns.cgs[row] = part.ciss - part.crss;
    columns.cgd[row] = part.crss;
    columns.cds[row] = part.coss - part.crss;
    columns.cents[row] = partLineCents(part, buildQuantity) ?? Number.NaN;
  });
  return { size: parts.length, ...columns };
}
