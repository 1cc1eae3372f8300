import { placePoint, stripZeros, toDecimal } from "./decimal";
import { formatRkm } from "./rkm";
import { PREFIXES, type Prefix, UNITS, type Unit, type UnitSpec } from "./units";

export type QuantityOptions = {
  /** Significant digits, 1 to 17; digits before the point are kept even where there are more of them. */
  digits?: number;
  /** A stated figure rather than a computed one: every digit it has, and no zeros that say nothing (12 V, 10 kΩ). */
  exact?: boolean;
  /** Puts a plus before what is above zero. */
  sign?: boolean;
  /** The least magnitude that stands without a prefix, a power of ten in the unit; each unit has its own default. */
  unprefixedFrom?: number;
};

/** How the product shows resistances: 4k7 or 4.7 kΩ. */
export type ResistanceStyle = "rkm" | "spelled";

const MISSING = "—";
const MINUS = "\u2212";
const DEFAULT_DIGITS = 3;
/** Every digit a figure may be stated with; the rest of a double is float noise. */
const EXACT_DIGITS = 12;
/** What is left where equal figures were subtracted; no quantity here is that small. */
const VANISHING = 1e-15;
/** A unit price can be a thousandth of a cent, five places behind the point. */
const PRICE_DECIMALS = 5;

/**
 * Writes a quantity in engineering notation with an SI prefix where its unit takes one: 2.83 V, 1.89 mA, 10 kΩ.
 *
 * @param value SI, a fraction for the unit "%"; null and NaN give a dash, infinities their sign
 * @throws RangeError where the digits are not 1 to 17
 */
export function formatQuantity(
  value: number | null | undefined,
  unit: Unit,
  options: QuantityOptions = {},
): string {
  const special = formatSpecial(value);
  if (special !== null) return special;
  const magnitude = Math.abs(value as number);
  const { exact = false, sign = false } = options;
  const { number, prefix } =
    magnitude < VANISHING ? { number: "0", prefix: "" } : scale(magnitude, unit, options);
  const symbol = prefix + unit;
  return (
    signOf(number, value as number, sign) + (exact ? stripZeros(number) : number) + (symbol && ` ${symbol}`)
  );
}

/**
 * Writes a fraction as a percentage with fixed places behind the point, so that a column lines up: 0.9 %, 99.9 %.
 * A stated percentage (5 %) is `formatQuantity` with `exact`.
 *
 * @param fraction 0.05 is 5 %; null and NaN give a dash
 * @param decimals places behind the point, 0 to 10
 */
export function formatPercent(fraction: number | null | undefined, decimals = 1): string {
  const special = formatSpecial(fraction);
  if (special !== null) return special;
  // Twelve digits take the noise of the product away before it can turn a half the wrong way.
  const percent = Number((Math.abs(fraction as number) * 100).toPrecision(EXACT_DIGITS));
  const number = percent.toFixed(decimals);
  return `${signOf(number, fraction as number)}${number} %`;
}

/**
 * Writes a resistor's value in the reader's style, every digit kept and no zeros that say nothing.
 *
 * @param ohms zero or more; null and NaN give a dash
 * @param digits rounds a computed resistance to so many significant digits
 */
export function formatResistance(ohms: number | null, style: ResistanceStyle, digits?: number): string {
  if (style === "spelled" || ohms === Number.POSITIVE_INFINITY) {
    return formatQuantity(ohms, "Ω", { exact: true, digits });
  }
  return formatRkm(ohms, digits);
}

/**
 * Writes money: $278.40; a unit price with a fraction of a cent keeps it ($0.004).
 *
 * @param cents hundredths of the currency, to a thousandth of a cent; null and NaN give a dash
 * @param currency ISO 4217
 */
export function formatCents(cents: number | null | undefined, currency = "USD"): string {
  const special = formatSpecial(cents);
  if (special !== null) return special;
  const money = new Intl.NumberFormat("en-US", {
    style: "currency",
    currency,
    minimumFractionDigits: 2,
    maximumFractionDigits: PRICE_DECIMALS,
  });
  const number = money.format(Math.abs(cents as number) / 100);
  return signOf(number, cents as number) + number;
}

/** Writes a count with commas between thousands: 35,437,621,248; null and NaN give a dash. */
export function formatCount(count: number | null | undefined): string {
  const special = formatSpecial(count);
  if (special !== null) return special;
  const number = new Intl.NumberFormat("en-US", { maximumFractionDigits: 0 }).format(
    Math.abs(count as number),
  );
  return signOf(number, count as number) + number;
}

/** The text of what is no finite number; null for those that are. */
function formatSpecial(value: number | null | undefined): string | null {
  if (value === null || value === undefined || Number.isNaN(value)) return MISSING;
  if (Number.isFinite(value)) return null;
  return value > 0 ? "∞" : `${MINUS}∞`;
}

/** A figure that rounds to zero has no sign. */
function signOf(number: string, value: number, plus = false): string {
  if (!/[1-9]/.test(number)) return "";
  if (value < 0) return MINUS;
  return plus ? "+" : "";
}

function scale(magnitude: number, unit: Unit, options: QuantityOptions): { number: string; prefix: Prefix } {
  const spec: UnitSpec = UNITS[unit];
  const {
    exact = false,
    digits = exact ? EXACT_DIGITS : (spec.digits ?? DEFAULT_DIGITS),
    unprefixedFrom,
  } = options;
  const bareFrom =
    unprefixedFrom === undefined ? (spec.bareFrom ?? 0) : toDecimal(unprefixedFrom, 1).exponent;
  // Rounded first: 999.6 mA is 1.00 A, and the prefix follows the rounded figure.
  let decimal = toDecimal(magnitude, digits);
  const prefix = choosePrefix(decimal.exponent, spec.prefixes, bareFrom);
  const power = PREFIXES[prefix] + (spec.power ?? 0);
  if (decimal.exponent - power >= digits) {
    decimal = toDecimal(magnitude, toDecimal(magnitude, EXACT_DIGITS).exponent - power + 1);
  }
  return { number: placePoint(decimal.digits, decimal.exponent - power + 1), prefix };
}

/** The greatest prefix that leaves a digit before the point, or the unit's least. */
function choosePrefix(exponent: number, prefixes: readonly Prefix[], bareFrom: number): Prefix {
  if (exponent >= bareFrom && exponent < 0) return "";
  return prefixes.findLast((prefix) => PREFIXES[prefix] <= exponent) ?? prefixes[0];
}
