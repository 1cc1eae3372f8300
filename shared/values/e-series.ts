import { toDecimal } from "./decimal";

/** The series of preferred values, by how many values each has in a decade. */
export const SERIES_NAMES = ["E3", "E6", "E12", "E24", "E48", "E96", "E192"] as const;
export type SeriesName = (typeof SERIES_NAMES)[number];

/** IEC 60063: a list of its own, which no rounding rule gives. */
const E24 = [10, 11, 12, 13, 15, 16, 18, 20, 22, 24, 27, 30, 33, 36, 39, 43, 47, 51, 56, 62, 68, 75, 82, 91];

/** IEC 60063: E3, E6 and E12 are every eighth, fourth and second value of E24. */
const everyOfE24 = (step: number) => E24.filter((_, index) => index % step === 0);

/** IEC 60063: E48 and up are round(100 × 10^(k/n)), but for one value of E192, where the rule gives 919. */
const rounded = (count: number) =>
  Array.from({ length: count }, (_, k) => {
    const value = Math.round(100 * 10 ** (k / count));
    return value === 919 ? 920 : value;
  });

const MANTISSAS: Record<SeriesName, readonly number[]> = {
  E3: everyOfE24(8),
  E6: everyOfE24(4),
  E12: everyOfE24(2),
  E24,
  E48: rounded(48),
  E96: rounded(96),
  E192: rounded(192),
};

/** How far a value may be from a preferred one, relative, and still be it: float noise, far below any series' step. */
const NOISE = 1e-9;

/** The values of one decade as whole numbers, ascending: two digits up to E24, three from E48. Source: IEC 60063. */
export function mantissas(series: SeriesName): readonly number[] {
  return MANTISSAS[series];
}

/**
 * Every preferred value from `min` to `max`, both included, ascending; each is the double nearest to its decimal.
 *
 * @param min above zero, any unit
 * @param max the same unit; below `min` the list is empty
 * @throws RangeError where a bound is not a finite number above zero
 */
export function valuesBetween(series: SeriesName, min: number, max: number): number[] {
  const first = placeAtOrAbove(series, min);
  const last = placeAtOrBelow(series, max);
  return Array.from({ length: Math.max(0, last - first + 1) }, (_, index) => valueAt(series, first + index));
}

/**
 * The preferred value so many steps up (or down, where negative). From a value between two preferred ones the first
 * step goes to the neighbour on that side; no step at all gives the nearest.
 *
 * @param value above zero
 * @param steps whole number
 * @throws RangeError where the value is not a finite number above zero, or the steps are not whole
 */
export function stepInSeries(series: SeriesName, value: number, steps: number): number {
  if (!Number.isInteger(steps)) throw new RangeError(`expected a whole number of steps, got ${steps}`);
  if (steps === 0) return nearestInSeries(series, value);
  const from = steps > 0 ? placeAtOrBelow(series, value) : placeAtOrAbove(series, value);
  return valueAt(series, from + steps);
}

/**
 * The preferred value nearest by ratio, which is how a resistor acts in a divider; between two equally near, the lower.
 *
 * @param value above zero
 * @throws RangeError where the value is not a finite number above zero
 */
export function nearestInSeries(series: SeriesName, value: number): number {
  const place = placeAtOrBelow(series, value);
  const lower = valueAt(series, place);
  const upper = valueAt(series, place + 1);
  return value / lower <= upper / value ? lower : upper;
}

/** Whether a value is one of the series, float noise aside. Zero, negative and non-finite values are not. */
export function isInSeries(series: SeriesName, value: number): boolean {
  if (!(value > 0 && Number.isFinite(value))) return false;
  return placeAtOrBelow(series, value) === placeAtOrAbove(series, value);
}

/**
 * A value as three whole digits times a power of ten, so that ratios of preferred values compare exactly in integers:
 * 4700 is 470 × 10^1. A value with more digits is rounded.
 *
 * @param value above zero
 * @throws RangeError where the value is not a finite number above zero
 */
export function toMantissa(value: number): { digits: number; exponent: number } {
  assertPositive(value);
  const { digits, exponent } = toDecimal(value, 3);
  return { digits: Number(digits), exponent: exponent - 2 };
}

/** The value at a place counted through the decades: place 0 is 1, one decade on is the series' count. */
function valueAt(series: SeriesName, place: number): number {
  const decade = MANTISSAS[series];
  const exponent = Math.floor(place / decade.length);
  const mantissa = decade[place - exponent * decade.length];
  // Read from decimal text: a product with a power of ten may miss the nearest double.
  return Number(`${mantissa}e${exponent - String(mantissa).length + 1}`);
}

/** The place of the greatest preferred value not above the given one. */
function placeAtOrBelow(series: SeriesName, value: number): number {
  assertPositive(value);
  // E24 and the rounding leave the even logarithmic grid by less than a step or two.
  let place = Math.floor(Math.log10(value) * MANTISSAS[series].length);
  while (valueAt(series, place) > value * (1 + NOISE)) place--;
  while (valueAt(series, place + 1) <= value * (1 + NOISE)) place++;
  return place;
}

/** The place of the least preferred value not below the given one. */
function placeAtOrAbove(series: SeriesName, value: number): number {
  const below = placeAtOrBelow(series, value);
  return valueAt(series, below) >= value * (1 - NOISE) ? below : below + 1;
}

function assertPositive(value: number): void {
  if (!(value > 0 && Number.isFinite(value))) {
    throw new RangeError(`expected a finite value above zero, got ${value}`);
  }
}
