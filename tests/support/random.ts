/** A stream of seeded numbers for tests: the same seed gives the same problems on every run. */
export type Random = {
  /** A number in [low, high). */
  between: (low: number, high: number) => number;
  /** A number in [low, high), evenly spread on a logarithmic scale. */
  logBetween: (low: number, high: number) => number;
  /** A whole number from low to high, both included. */
  whole: (low: number, high: number) => number;
  pick: <T>(items: readonly T[]) => T;
  chance: (probability: number) => boolean;
};

/** Mulberry32 (T. Ettinger, public domain): 32 bits of state, good enough for drawing test cases. */
export function seededRandom(seed: number): Random {
  let state = seed >>> 0;
  const next = () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = Math.imul(state ^ (state >>> 15), 1 | state);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
  const between = (low: number, high: number) => low + (high - low) * next();
  return {
    between,
    logBetween: (low, high) => Math.exp(between(Math.log(low), Math.log(high))),
    whole: (low, high) => Math.floor(between(low, high + 1)),
    pick: (items) => items[Math.floor(next() * items.length)],
    chance: (probability) => next() < probability,
  };
}

/** A number as a datasheet prints it. */
export function significant(value: number, digits = 3): number {
  return Number(value.toPrecision(digits));
}
