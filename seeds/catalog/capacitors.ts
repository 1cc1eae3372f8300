import { valuesBetween } from "#shared/values/e-series";
import { formatRkmFarads } from "#shared/values/rkm";
import { significant } from "./figures";
import { createRandom, type Random } from "./random";
import type { CapacitorFamily, CapacitorRecord } from "./records";
import { type PriceSteps, priceLadder } from "./supply";

/** One line of a maker's price list: a family at one voltage in one outline, over a range of values. */
interface Range {
  family: CapacitorFamily;
  maker: string;
  /** What the order number starts with. */
  prefix: string;
  size: string;
  tolerance: number;
  series: "E6" | "E12";
  /** pF. */
  least: number;
  greatest: number;
  voltageRating: number;
  polarised: boolean;
  /** US cents per thousand when a single piece of the least value is bought. */
  cents: number;
}

/** Picofarads in a nanofarad and in a microfarad. */
const nano = 1e3;
const micro = 1e6;

const c0g = {
  family: "C0G",
  maker: "Sallow Ceramics",
  tolerance: 0.05,
  series: "E12",
  polarised: false,
} as const;
const x7r = {
  family: "X7R",
  maker: "Sallow Ceramics",
  tolerance: 0.1,
  series: "E6",
  polarised: false,
} as const;
const film = {
  family: "film",
  maker: "Lowmoor Film",
  tolerance: 0.05,
  series: "E6",
  polarised: false,
} as const;

const chipsAndBoxes: readonly Range[] = [
  { ...c0g, prefix: "SG04", size: "0402", voltageRating: 50, least: 1, greatest: 1 * nano, cents: 3000 },
  { ...c0g, prefix: "SG06", size: "0603", voltageRating: 50, least: 1, greatest: 4.7 * nano, cents: 3500 },
  { ...c0g, prefix: "SG08", size: "0805", voltageRating: 100, least: 10, greatest: 10 * nano, cents: 6000 },
  { ...c0g, prefix: "SG12", size: "1206", voltageRating: 250, least: 10, greatest: 10 * nano, cents: 11000 },
  { ...x7r, prefix: "SX04", size: "0402", voltageRating: 50, least: 220, greatest: 47 * nano, cents: 2500 },
  {
    ...x7r,
    prefix: "SX04",
    size: "0402",
    voltageRating: 16,
    least: 10 * nano,
    greatest: 220 * nano,
    cents: 2800,
  },
  { ...x7r, prefix: "SX06", size: "0603", voltageRating: 50, least: 220, greatest: 470 * nano, cents: 2800 },
  {
    ...x7r,
    prefix: "SX06",
    size: "0603",
    voltageRating: 25,
    least: 100 * nano,
    greatest: 1 * micro,
    cents: 3600,
  },
  {
    ...x7r,
    prefix: "SX08",
    size: "0805",
    voltageRating: 50,
    least: 1 * nano,
    greatest: 1 * micro,
    cents: 4200,
  },
  {
    ...x7r,
    prefix: "SX08",
    size: "0805",
    voltageRating: 25,
    least: 470 * nano,
    greatest: 4.7 * micro,
    cents: 7000,
  },
  {
    ...x7r,
    prefix: "SX12",
    size: "1206",
    voltageRating: 100,
    least: 1 * nano,
    greatest: 1 * micro,
    cents: 8000,
  },
  {
    ...x7r,
    prefix: "SX12",
    size: "1206",
    voltageRating: 25,
    least: 1 * micro,
    greatest: 10 * micro,
    cents: 12000,
  },
  {
    ...x7r,
    prefix: "SX12",
    size: "1206",
    voltageRating: 630,
    least: 1 * nano,
    greatest: 22 * nano,
    cents: 15000,
  },
  {
    ...film,
    prefix: "PM0805",
    size: "0805",
    voltageRating: 50,
    least: 1 * nano,
    greatest: 22 * nano,
    cents: 19000,
  },
  {
    ...film,
    prefix: "PM1206",
    size: "1206",
    voltageRating: 50,
    least: 1 * nano,
    greatest: 100 * nano,
    cents: 17000,
  },
  {
    ...film,
    prefix: "PM1812",
    size: "1812",
    voltageRating: 63,
    least: 47 * nano,
    greatest: 1 * micro,
    cents: 34000,
  },
  {
    ...film,
    prefix: "PB5",
    size: "box 5 mm",
    voltageRating: 63,
    least: 1 * nano,
    greatest: 1 * micro,
    cents: 12000,
  },
  {
    ...film,
    prefix: "PB7",
    size: "box 7.5 mm",
    voltageRating: 100,
    least: 1 * nano,
    greatest: 1 * micro,
    cents: 16000,
  },
  {
    ...film,
    prefix: "PB10",
    size: "box 10 mm",
    voltageRating: 250,
    least: 10 * nano,
    greatest: 1 * micro,
    cents: 24000,
  },
  {
    ...film,
    prefix: "PB15",
    size: "box 15 mm",
    voltageRating: 630,
    least: 10 * nano,
    greatest: 1 * micro,
    cents: 41000,
  },
];

/** Can diameters in mm, and the greatest charge at the rated voltage that each holds, in pF times V. */
const cans: readonly (readonly [diameter: number, charge: number])[] = [
  [4, 100 * micro],
  [5, 600 * micro],
  [6.3, 1600 * micro],
  [8, 5000 * micro],
  [10, 12_000 * micro],
  [12.5, 28_000 * micro],
  [16, 60_000 * micro],
];

/** Rated voltages of the cans, and the range of values at each in pF. */
const canVoltages: readonly (readonly [volts: number, least: number, greatest: number])[] = [
  [6.3, 22 * micro, 2200 * micro],
  [10, 10 * micro, 2200 * micro],
  [16, 10 * micro, 2200 * micro],
  [25, 4.7 * micro, 2200 * micro],
  [35, 4.7 * micro, 1000 * micro],
  [50, 1 * micro, 1000 * micro],
  [63, 1 * micro, 680 * micro],
  [100, 1 * micro, 330 * micro],
  [250, 1 * micro, 47 * micro],
  [450, 1 * micro, 22 * micro],
];

const steps: PriceSteps = { 1: 1, 10: 0.78, 100: 0.6, 500: 0.48, 1000: 0.4, 5000: 0.28 };

/** One capacitor before it stands in a shop: the price list's line and the one value. */
interface Item extends Omit<Range, "series" | "least" | "greatest"> {
  picofarads: number;
}

/** Invents every capacitor that can be ordered, the same each time, range by range with rising value. */
export function inventCapacitors(): CapacitorRecord[] {
  const random = createRandom(60384);
  return [...chipsAndBoxes.flatMap(itemsOf), ...canVoltages.flatMap(cansAt)].map((item) =>
    order(random, item),
  );
}

/** Larger values of one outline cost a little more. */
function itemsOf({ series, least, greatest, cents, ...line }: Range): Item[] {
  return valuesBetween(series, least, greatest).map((value) => ({
    ...line,
    picofarads: significant(value, 2),
    cents: cents * (value / least) ** 0.12,
  }));
}

/** The cans of one rated voltage: the smallest diameter that holds each value. */
function cansAt([voltageRating, least, greatest]: (typeof canVoltages)[number]): Item[] {
  return valuesBetween("E12", least, greatest).map((value) => {
    const picofarads = significant(value, 2);
    const [diameter] =
      cans.find(([, charge]) => charge >= picofarads * voltageRating) ?? cans[cans.length - 1];
    return {
      family: "electrolytic",
      maker: "Lowmoor Film",
      prefix: `EL${Math.floor(diameter)}`,
      size: `${diameter} mm`,
      tolerance: 0.2,
      voltageRating,
      polarised: true,
      picofarads,
      cents: 11000 + 45 * diameter ** 2.2,
    };
  });
}

function order(random: Random, { prefix, picofarads, cents, ...figures }: Item): CapacitorRecord {
  const farads = Number(`${picofarads}e-12`);
  // In capitals but for the m of millifarads, which would read as mega.
  const marking = formatRkmFarads(farads).replace(/[pnu]/, (letter) => letter.toUpperCase());
  return {
    ...figures,
    orderableNumber: `${prefix}-${marking}-${figures.voltageRating}`,
    farads,
    stock: random.chance(1 / 15) ? 0 : Math.round(random.logBetween(300, 40_000) / 10) * 10,
    leadTimeWeeks: random.whole(2, 16),
    priceBreaks: priceLadder(cents, steps).map(({ quantity, cents: each }) => ({
      quantity,
      centsPerThousand: each,
    })),
  };
}
