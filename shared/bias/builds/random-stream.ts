/** What an unsigned 32-bit number is multiplied by to lie in [0, 1). */
const PER_STEP = 2 ** -32;

/**
 * A seeded stream of random numbers, drawn many at a time: xoshiro128** (D. Blackman and S. Vigna, "Scrambled linear
 * pseudorandom number generators", ACM Transactions on Mathematical Software 47, 2021), its state filled from the seed
 * by the finaliser of MurmurHash3 (A. Appleby, public domain). The same seed gives the same numbers everywhere.
 */
export class RandomStream {
  #a: number;
  #b: number;
  #c: number;
  #d: number;

  /** @param seed a whole number from 0 to 2³² - 1 */
  constructor(seed: number) {
    let state = seed >>> 0;
    const next = () => {
      state = (state + 0x9e3779b9) >>> 0;
      let mixed = state ^ (state >>> 16);
      mixed = Math.imul(mixed, 0x85ebca6b);
      mixed ^= mixed >>> 13;
      mixed = Math.imul(mixed, 0xc2b2ae35);
      return mixed ^ (mixed >>> 16);
    };
    this.#a = next();
    this.#b = next();
    this.#c = next();
    // A state of nothing but zeros would stay there.
    this.#d = next() || 1;
  }

  /** Fills the first places of an array with numbers spread evenly over [0, 1). */
  fillUniform(into: Float64Array, count: number): void {
    let a = this.#a;
    let b = this.#b;
    let c = this.#c;
    let d = this.#d;
    for (let at = 0; at < count; at++) {
      const times5 = Math.imul(b, 5);
      const scrambled = Math.imul((times5 << 7) | (times5 >>> 25), 9);
      const shifted = b << 9;
      c ^= a;
      d ^= b;
      b ^= c;
      a ^= d;
      c ^= shifted;
      d = (d << 11) | (d >>> 21);
      into[at] = (scrambled >>> 0) * PER_STEP;
    }
    this.#a = a;
    this.#b = b;
    this.#c = c;
    this.#d = d;
  }

  /**
   * Fills the first places of two arrays with independent standard normal numbers, each truncated: a pair with one of
   * them beyond the limit is drawn again. Marsaglia's polar method (G. Marsaglia and T. A. Bray, "A convenient method
   * for generating normal variables", SIAM Review 6, 1964) gives them in pairs.
   *
   * @param limit the greatest magnitude, above zero
   */
  fillNormalPairs(first: Float64Array, second: Float64Array, count: number, limit: number): void {
    const drawn = this.#pairs;
    let left = 0;
    let from = 0;
    for (let at = 0; at < count; ) {
      if (left === 0) {
        // A pair takes 1.27 places of the square on average, and what is left over is not kept.
        left = Math.min(drawn.length, 2 * Math.ceil(1.3 * (count - at) + 4)) >> 1;
        this.fillUniform(drawn, 2 * left);
        from = 0;
      }
      const x = 2 * drawn[from] - 1;
      const y = 2 * drawn[from + 1] - 1;
      from += 2;
      left--;
      const square = x * x + y * y;
      if (square >= 1 || square === 0) continue;
      const scale = Math.sqrt((-2 * Math.log(square)) / square);
      const one = x * scale;
      const other = y * scale;
      if (one > limit || one < -limit || other > limit || other < -limit) continue;
      first[at] = one;
      second[at] = other;
      at++;
    }
  }

  readonly #pairs = new Float64Array(1024);
}
