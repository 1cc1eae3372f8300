/**
 * Decimal text of a value. Scaling by powers of ten on text keeps 4.7 k at 4700, where a multiplication may leave
 * the nearest double.
 */
export type Decimal = {
  /** Significant digits without a point: "470". */
  digits: string;
  /** Power of ten of the first digit: 3 for 4700. */
  exponent: number;
};

/**
 * Rounds the magnitude of a value to significant digits.
 *
 * @param value finite
 * @param digits 1 to 101
 */
export function toDecimal(value: number, digits: number): Decimal {
  const [mantissa, exponent] = Math.abs(value)
    .toExponential(digits - 1)
    .split("e");
  return { digits: mantissa.replace(".", ""), exponent: Number(exponent) };
}

/** Writes digits with the point after the given number of them; below 1 that many zeros stand before them. */
export function placePoint(digits: string, whole: number): string {
  if (whole <= 0) return `0.${"0".repeat(-whole)}${digits}`;
  if (whole >= digits.length) return digits.padEnd(whole, "0");
  return `${digits.slice(0, whole)}.${digits.slice(whole)}`;
}

/** Drops the zeros behind the point that say nothing: "4.70" is "4.7", "10.0" is "10", "100" stays. */
export function stripZeros(text: string): string {
  return text.includes(".") ? text.replace(/\.?0+$/, "") : text;
}
