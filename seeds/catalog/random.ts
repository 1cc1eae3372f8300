/** Repeatable draws: the same seed gives the same sequence on every machine. */
export interface Random {
  /** Uniform in [0, 1). */
  unit(): number;
  /** Uniform in [low, high). */
  between(low: number, high: number): number;
  /** Uniform in the logarithm, in [low, high); both above zero. */
  logBetween(low: number, high: number): number;
  /** Whole number in [low, high], both included. */
  whole(low: number, high: number): number;
  /** True with the given probability (0 to 1). */
  chance(probability: number): boolean;
  /** One of the choices, each as likely as its weight says. */
  weighted<T>(choices: readonly (readonly [T, number])[]): T;
}

/**
 * Starts a repeatable sequence with the mulberry32 generator (Tommy Ettinger, 2017, public domain):
 * 32 bits of state, full period 2^32, good enough to invent a catalog and short enough to read.
 *
 * @param seed any whole number; only its low 32 bits count
 */
export function createRandom(seed: number): Random {
  let state = seed >>> 0;

  function unit(): number {
    state = (state + 0x6d2b79f5) >>> 0;
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state);
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed;
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4294967296;
  }

  return {
    unit,
    between: (low, high) => low + (high - low) * unit(),
    logBetween: (low, high) => low * (high / low) ** unit(),
    whole: (low, high) => low + Math.floor((high - low + 1) * unit()),
    chance: (probability) => unit() < probability,
    weighted(choices) {
      const total = choices.reduce((sum, [, weight]) => sum + weight, 0);
      let left = total * unit();
      for (const [choice, weight] of choices) {
        left -= weight;
        if (left < 0) return choice;
      }
      return choices[choices.length - 1][0];
    },
  };
}
