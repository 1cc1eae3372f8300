/**
 * Every divider that the values allow, by ratio. Pairs of one ratio give one gate voltage, so the search looks at
 * ratios and only then at the pairs behind the one it wants.
 */
export type RatioTable = {
  /** Distinct R1/R2, falling, so that the gate voltage rises with the index. */
  ratios: Float64Array;
  /** Pairs of ratio i stand at [offsets[i], offsets[i + 1]), the largest R1 + R2 first. */
  offsets: Uint32Array;
  r1: Float64Array;
  r2: Float64Array;
};

/**
 * Builds the table for one list of divider values. Distinct ratios are found by sorting bare numbers, which the
 * engine does natively, and the pairs are then dealt into their places: several times quicker than sorting pairs.
 *
 * @param values divider values, ohms, ascending
 */
export function buildRatioTable(values: readonly number[]): RatioTable {
  const count = values.length;
  const all = new Float64Array(count * count);
  let next = 0;
  for (const r1 of values) for (const r2 of values) all[next++] = r1 / r2;
  const sorted = all.slice().sort().reverse();
  let distinct = 0;
  for (let i = 0; i < sorted.length; i++) {
    if (i === 0 || sorted[i] !== sorted[i - 1]) sorted[distinct++] = sorted[i];
  }
  const ratios = sorted.slice(0, distinct);
  const place = new Uint32Array(all.length);
  const offsets = new Uint32Array(distinct + 1);
  for (let i = 0; i < all.length; i++) {
    place[i] = firstAtMost(ratios, all[i]);
    offsets[place[i] + 1]++;
  }
  for (let i = 0; i < distinct; i++) offsets[i + 1] += offsets[i];
  const fill = offsets.slice();
  const r1 = new Float64Array(all.length);
  const r2 = new Float64Array(all.length);
  // From the largest values down, so that each ratio's pairs come out with the largest sum first.
  for (let i = count - 1; i >= 0; i--) {
    for (let j = count - 1; j >= 0; j--) {
      const at = fill[place[i * count + j]]++;
      r1[at] = values[i];
      r2[at] = values[j];
    }
  }
  return { ratios, offsets, r1, r2 };
}

/**
 * Keeps the pairs that a brief allows whatever the device does.
 *
 * @param allows whether a pair (R1, R2, ohms) may be used
 */
export function filterRatioTable(table: RatioTable, allows: (r1: number, r2: number) => boolean): RatioTable {
  const ratios = new Float64Array(table.ratios.length);
  const offsets = new Uint32Array(table.ratios.length + 1);
  const r1 = new Float64Array(table.r1.length);
  const r2 = new Float64Array(table.r2.length);
  let kept = 0;
  let pairs = 0;
  for (let i = 0; i < table.ratios.length; i++) {
    const before = pairs;
    for (let at = table.offsets[i]; at < table.offsets[i + 1]; at++) {
      if (!allows(table.r1[at], table.r2[at])) continue;
      r1[pairs] = table.r1[at];
      r2[pairs++] = table.r2[at];
    }
    if (pairs > before) {
      ratios[kept++] = table.ratios[i];
      offsets[kept] = pairs;
    }
  }
  return {
    ratios: ratios.slice(0, kept),
    offsets: offsets.slice(0, kept + 1),
    r1: r1.slice(0, pairs),
    r2: r2.slice(0, pairs),
  };
}

/** The table of a gate that one resistor ties to ground: its voltage is given, whatever the resistor. */
export function singleRatioTable(values: readonly number[]): RatioTable {
  return {
    ratios: Float64Array.of(0),
    offsets: Uint32Array.of(0, values.length),
    r1: new Float64Array(values.length),
    r2: Float64Array.from(values),
  };
}

/** R1 || R2 of a pair, ohms; of a gate resistor alone, itself. */
export function pairResistance(r1: number, r2: number): number {
  return r1 === 0 ? r2 : (r1 * r2) / (r1 + r2);
}

/** Index of the first ratio that is not above the given one, in a falling list; its length when all are above. */
export function firstAtMost(ratios: Float64Array, ratio: number): number {
  let low = 0;
  let high = ratios.length;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (ratios[middle] > ratio) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** Index of the first ratio that is below the given one, in a falling list; its length when none is. */
export function firstBelow(ratios: Float64Array, ratio: number): number {
  let low = 0;
  let high = ratios.length;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (ratios[middle] >= ratio) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** The least input resistance of a table, ohms; Infinity when it is empty. */
export function leastResistance({ r1, r2 }: RatioTable): number {
  let least = Number.POSITIVE_INFINITY;
  for (let at = 0; at < r1.length; at++) least = Math.min(least, pairResistance(r1[at], r2[at]));
  return least;
}
