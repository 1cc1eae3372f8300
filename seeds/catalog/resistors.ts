import { valuesBetween } from "#shared/values/e-series";
import { formatRkm } from "#shared/values/rkm";
import { significant } from "./figures";
import { createRandom, type Random } from "./random";
import type { ResistorFamily, ResistorRecord, ResistorSeries } from "./records";
import { type PriceSteps, priceLadder } from "./supply";

/** One line of a maker's price list: a family in one size and tolerance, over a range of values. */
interface Range {
  family: ResistorFamily;
  maker: string;
  /** What the order number starts with. */
  prefix: string;
  size: string;
  tolerance: number;
  series: readonly ResistorSeries[];
  /** Ω. */
  least: number;
  greatest: number;
  powerRating: number;
  voltageRating: number;
  ppmPerKelvin: number;
  /** US cents per thousand when a single piece is bought. */
  cents: number;
}

const both: readonly ResistorSeries[] = ["E24", "E96"];

const thickFilm = { family: "thick film", maker: "Tarn Resistive" } as const;
const thickOne = { ...thickFilm, tolerance: 0.01, series: both, least: 1, greatest: 10e6, ppmPerKelvin: 100 };
const thickFive = {
  ...thickFilm,
  tolerance: 0.05,
  series: ["E24"] as const,
  least: 1,
  greatest: 10e6,
  ppmPerKelvin: 200,
};
const thinFilm = {
  family: "thin film",
  maker: "Wexcombe Precision",
  tolerance: 0.01,
  series: both,
  least: 10,
  greatest: 1e6,
  ppmPerKelvin: 25,
} as const;
const metalFilm = {
  family: "metal film",
  maker: "Ardle & Finch",
  tolerance: 0.01,
  series: both,
  least: 10,
  greatest: 1e6,
  ppmPerKelvin: 50,
} as const;

const size0402 = { size: "0402", powerRating: 0.063, voltageRating: 50 };
const size0603 = { size: "0603", powerRating: 0.1, voltageRating: 75 };
const size0805 = { size: "0805", powerRating: 0.125, voltageRating: 150 };
const size1206 = { size: "1206", powerRating: 0.25, voltageRating: 200 };
const size2512 = { size: "2512", powerRating: 1, voltageRating: 250 };

const ranges: readonly Range[] = [
  { ...thickFive, ...size0402, prefix: "FX04", cents: 1500 },
  { ...thickOne, ...size0402, prefix: "FX04", cents: 1900 },
  { ...thickFive, ...size0603, prefix: "FX06", cents: 1600 },
  { ...thickOne, ...size0603, prefix: "FX06", cents: 2000 },
  { ...thickFive, ...size0805, prefix: "FX08", cents: 1800 },
  { ...thickOne, ...size0805, prefix: "FX08", cents: 2300 },
  { ...thickFive, ...size1206, prefix: "FX12", cents: 2400 },
  { ...thickOne, ...size1206, prefix: "FX12", cents: 3100 },
  { ...thickFive, ...size2512, greatest: 1e6, prefix: "FX25", cents: 11000 },
  { ...thickOne, ...size2512, series: ["E24"], greatest: 1e6, prefix: "FX25", cents: 14000 },
  { ...thinFilm, ...size0603, prefix: "WXT6", cents: 9000 },
  { ...thinFilm, ...size0805, voltageRating: 100, prefix: "WXT8", cents: 10500 },
  { ...metalFilm, size: "axial 3.6 mm", powerRating: 0.25, voltageRating: 200, prefix: "AXF36", cents: 7000 },
  { ...metalFilm, size: "axial 6.3 mm", powerRating: 0.6, voltageRating: 350, prefix: "AXF63", cents: 8500 },
];

const steps: PriceSteps = { 1: 1, 100: 0.32, 500: 0.2, 1000: 0.15, 10000: 0.09 };

/** Values between the 24 of a decade sell less, and so cost more. */
const seriesPriceFactor: Record<ResistorSeries, number> = { E24: 1, E96: 1.15 };

/** Invents every resistor that can be ordered, the same each time, range by range with rising value. */
export function inventResistors(): ResistorRecord[] {
  const random = createRandom(60063);
  return ranges.flatMap((range) =>
    valuesOf(range).map(([ohms, series]) => order(random, range, ohms, series)),
  );
}

/** Each value once, rising, with the coarser series that holds it. */
function valuesOf(range: Range): [number, ResistorSeries][] {
  const found = new Map<number, ResistorSeries>();
  for (const series of range.series) {
    for (const value of valuesBetween(series, range.least, range.greatest)) {
      const ohms = significant(value, 3);
      if (!found.has(ohms)) found.set(ohms, series);
    }
  }
  return [...found].sort(([a], [b]) => a - b);
}

function order(random: Random, range: Range, ohms: number, series: ResistorSeries): ResistorRecord {
  const { prefix, least: _least, greatest: _greatest, cents, ...figures } = range;
  return {
    ...figures,
    orderableNumber: `${prefix}-${formatRkm(ohms).toUpperCase()}-${range.tolerance === 0.01 ? "F" : "J"}`,
    series,
    ohms,
    stock: random.chance(1 / 15) ? 0 : Math.round(random.logBetween(800, 150_000) / 100) * 100,
    leadTimeWeeks: random.whole(1, 14),
    priceBreaks: priceLadder(cents * seriesPriceFactor[series], steps).map(({ quantity, cents: each }) => ({
      quantity,
      centsPerThousand: each,
    })),
  };
}
