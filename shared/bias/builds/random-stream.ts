/** What an unsigned 32-bit number is multiplied by to lie in [0, 1). */
const PER_STEP = 2 ** -32;

/** Numbers drawn ahead at a time. */
const AHEAD = 512;

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
  readonly #bits = new Int32Array(AHEAD);

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

  /** Draws 32 random bits each for the first places of `#bits`. */
  #draw(count: number): void {
    const bits = this.#bits;
    let a = this.#a;
    let b = this.#b;
    let c = this.#c;
    let d = this.#d;
    for (let at = 0; at < count; at++) {
      const times5 = Math.imul(b, 5);
      bits[at] = Math.imul((times5 << 7) | (times5 >>> 25), 9);
      const shifted = b << 9;
      c ^= a;
      d ^= b;
      b ^= c;
      a ^= d;
      c ^= shifted;
      d = (d << 11) | (d >>> 21);
    }
    this.#a = a;
    this.#b = b;
    this.#c = c;
    this.#d = d;
  }

  /** Fills the first places of an array with numbers spread evenly over [low, high). */
  fillUniform(into: Float64Array, count: number, low: number, high: number): void {
    const bits = this.#bits;
    const step = (high - low) * PER_STEP;
    for (let from = 0; from < count; from += AHEAD) {
      const some = Math.min(AHEAD, count - from);
      this.#draw(some);
      for (let at = 0; at < some; at++) into[from + at] = low + step * (bits[at] >>> 0);
    }
  }

  /**
   * Fills the first places of an array with normal numbers around the middle of a range that is six standard
   * deviations wide; what falls outside it is drawn again. By the ziggurat (G. Marsaglia and W. W. Tsang, "The
   * ziggurat method for generating random variables", Journal of Statistical Software 5, 2000), the layer and the
   * place in it taken from bits of their own (J. A. Doornik, "An improved ziggurat method to generate normal random
   * samples", 2005). Its tail lies beyond the range, so there is none to draw.
   */
  fillNormal(into: Float64Array, count: number, low: number, high: number): void {
    const bits = this.#bits;
    const middle = (low + high) / 2;
    const sigma = (high - low) / (2 * SIGMAS);
    let drawn = 0;
    let next = 0;
    for (let at = 0; at < count; ) {
      // A wedge takes a second number: none may be missing.
      if (drawn - next < 2) {
        drawn = Math.min(AHEAD, count - at + 16);
        next = 0;
        this.#draw(drawn);
      }
      const random = bits[next++];
      const layer = random & (LAYERS - 1);
      const z = (random >> LAYER_BITS) * LAYER_STEPS[layer];
      const distance = Math.abs(z);
      if (distance >= LAYER_EDGES[layer + 1]) {
        if (layer === 0) continue;
        const height = LAYER_HEIGHTS[layer];
        const drop = LAYER_HEIGHTS[layer + 1] - height;
        if (height + drop * (bits[next++] >>> 0) * PER_STEP >= Math.exp(-0.5 * z * z)) continue;
      }
      if (distance > SIGMAS) continue;
      into[at++] = middle + sigma * z;
    }
  }
}

/** The range of a normal number in standard deviations either way of its middle. */
const SIGMAS = 3;

/** The ziggurat: layers of equal area under exp(-z²/2), the lowest with the tail beyond its edge. */
const LAYER_BITS = 7;
const LAYERS = 1 << LAYER_BITS;
const TAIL_EDGE = 3.442619855899;
const LAYER_AREA = 9.91256303526217e-3;
const density = (z: number) => Math.exp(-0.5 * z * z);

/** Where each layer ends; the first is the width that the lowest would have without its tail. */
const LAYER_EDGES = layerEdges();
const LAYER_HEIGHTS = LAYER_EDGES.map(density);
/** What a place in a layer, a signed number of as many bits as the layer leaves, is multiplied by. */
const LAYER_STEPS = LAYER_EDGES.map((edge) => edge / 2 ** (31 - LAYER_BITS));

function layerEdges(): Float64Array {
  const edges = new Float64Array(LAYERS + 1);
  edges[0] = LAYER_AREA / density(TAIL_EDGE);
  edges[1] = TAIL_EDGE;
  for (let layer = 2; layer < LAYERS; layer++) {
    const below = edges[layer - 1];
    edges[layer] = Math.sqrt(-2 * Math.log(LAYER_AREA / below + density(below)));
  }
  return edges;
}
