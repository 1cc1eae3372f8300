/** Rounds to a number of significant digits, as a datasheet prints it. */
export function significant(value: number, digits: number): number {
  return Number(value.toPrecision(digits));
}

/** Rounds a positive value to two significant digits, or three after a leading 1, so that no step exceeds 5 %. */
export function evenlyRounded(value: number): number {
  return significant(value, value.toExponential().startsWith("1") ? 3 : 2);
}

/** Rounds a positive value down to a number of significant digits: a rating never promises more than the die has. */
export function significantDown(value: number, digits: number): number {
  const exponent = Math.floor(Math.log10(value)) - digits + 1;
  // The small excess keeps an exact figure such as 0.35, which may arrive as 0.34999999999999997.
  const steps = Math.floor(value / 10 ** exponent + 1e-9);
  return Number(`${steps}e${exponent}`);
}
