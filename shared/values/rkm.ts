import { placePoint, stripZeros, toDecimal } from "./decimal";

type Letters = {
  /** The letter that stands for the point, by power of ten; in threes, without a gap. */
  written: ReadonlyMap<number, string>;
  /** The letters that are read. */
  read: ReadonlyMap<string, number>;
};

/** IEC 60062 writes K; this product writes k, as SI does, and reads both. */
const RESISTANCE: Letters = {
  written: new Map([
    [0, "R"],
    [3, "k"],
    [6, "M"],
    [9, "G"],
    [12, "T"],
  ]),
  read: new Map(Object.entries({ R: 0, r: 0, k: 3, K: 3, M: 6, G: 9, T: 12 })),
};

/** IEC 60062 writes µ; this product writes u, which every font and file has, and reads both code points of µ. */
const CAPACITANCE: Letters = {
  written: new Map([
    [-12, "p"],
    [-9, "n"],
    [-6, "u"],
    [-3, "m"],
    [0, "F"],
  ]),
  read: new Map(
    Object.entries({ p: -12, P: -12, n: -9, N: -9, u: -6, U: -6, "\u00b5": -6, "\u03bc": -6, m: -3, F: 0 }),
  ),
};

/** Every digit a value may be given with; the rest of a double is float noise. */
const ALL_DIGITS = 12;

/**
 * Tolerance letters as fractions (J is ± 5 %), for resistors, and for capacitors from 10 pF. Source: IEC 60062, E, L,
 * P, W, H and N from memory.
 */
export const TOLERANCE_LETTERS = {
  E: 0.00005,
  L: 0.0001,
  P: 0.0002,
  W: 0.0005,
  B: 0.001,
  C: 0.0025,
  D: 0.005,
  F: 0.01,
  G: 0.02,
  H: 0.03,
  J: 0.05,
  K: 0.1,
  M: 0.2,
  N: 0.3,
} as const;

/**
 * Writes a resistance as it is marked: R47, 4R7, 820R, 1k, 4k7, 47k3, 2M2. Source: IEC 60062, in lower-case k.
 *
 * @param ohms zero or more; null and NaN give a dash
 * @param digits significant digits to round to; without it every digit stays
 * @throws RangeError where the resistance is negative or infinite
 */
export function formatRkm(ohms: number | null, digits?: number): string {
  return format(ohms, RESISTANCE, digits);
}

/**
 * Writes a capacitance as it is marked: 4p7, 100n, 4n7, 10u. Source: IEC 60062, with u for µ.
 *
 * @param farads zero or more; null and NaN give a dash
 * @param digits significant digits to round to; without it every digit stays
 * @throws RangeError where the capacitance is negative or infinite
 */
export function formatRkmFarads(farads: number | null, digits?: number): string {
  return format(farads, CAPACITANCE, digits);
}

/** Reads a resistance marking in ohms, K or k alike; null where it is none. A bare number is none. */
export function parseRkm(text: string): number | null {
  return parse(text, RESISTANCE);
}

/** Reads a capacitance marking in farads; null where it is none. M is none: milli is m. */
export function parseRkmFarads(text: string): number | null {
  return parse(text, CAPACITANCE);
}

function format(value: number | null, { written }: Letters, digits = ALL_DIGITS): string {
  if (value === null || Number.isNaN(value)) return "—";
  if (!(value >= 0 && Number.isFinite(value))) {
    throw new RangeError(`expected a finite value of zero or more to mark, got ${value}`);
  }
  if (value === 0) return `0${written.get(0)}`;
  const decimal = toDecimal(value, digits);
  const powers = [...written.keys()];
  const power = Math.min(
    Math.max(Math.floor(decimal.exponent / 3) * 3, powers[0]),
    powers[powers.length - 1],
  );
  const letter = written.get(power) ?? "";
  const number = stripZeros(placePoint(decimal.digits, decimal.exponent - power + 1));
  return number.includes(".") ? number.replace(/^0?\./, letter).replace(".", letter) : number + letter;
}

function parse(text: string, { read }: Letters): number | null {
  const [, whole, letter, fraction] = text.trim().match(/^(\d*)(\D)(\d*)$/) ?? [];
  const power = read.get(letter);
  if (power === undefined || whole + fraction === "") return null;
  const value = Number(`${whole || "0"}.${fraction || "0"}e${power}`);
  return Number.isFinite(value) ? value : null;
}
