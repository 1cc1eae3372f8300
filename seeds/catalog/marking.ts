const prefixes = [
  ["P", 1e-12],
  ["N", 1e-9],
  ["U", 1e-6],
  ["R", 1],
  ["K", 1e3],
  ["M", 1e6],
] as const;

/**
 * Writes a value as it stands in an order number: its IEC 60062 marking in capitals, as in 4K7, 10R, 2M2, 100N.
 *
 * @param value ohms (1 Ω and up) or farads (1 pF to below 1 F), of three significant digits at most
 */
export function marking(value: number): string {
  // A value that is one of its unit may arrive a hair below it.
  const [letter, unit] = prefixes.findLast(([, each]) => value > each * 0.9999) ?? prefixes[0];
  const [whole, decimals = ""] = String(Number((value / unit).toPrecision(3))).split(".");
  return `${whole}${letter}${decimals}`;
}
