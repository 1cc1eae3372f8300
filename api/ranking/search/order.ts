/**
 * One combination with what ranks it. `row` is the part's place in the catalog, which is in part-number order.
 */
export type Candidate = {
  /** Centring error in whole per cent, rounded down. */
  bucket: number;
  /** Symmetric swing in whole nanovolts: less is rounding noise, and a tie must not depend on it. */
  swing: number;
  /** Drain and divider current together, A. */
  supply: number;
  row: number;
  r1: number;
  r2: number;
  rd: number;
  rs: number;
};

/** Centring error in whole per cent, rounded down, because less is noise. */
export function bucketOf(towardCutoff: number, towardOhmic: number): number {
  return Math.floor((100 * Math.abs(towardCutoff - towardOhmic)) / (towardCutoff + towardOhmic));
}

export function nanovolts(volts: number): number {
  return Math.round(volts * 1e9);
}

/**
 * The order of the `centred` objective: least centring error in whole per cent, then the greater swing; ties by the
 * smaller supply current, part number, R1, R2, RD, RS.
 *
 * @returns below zero when a comes first
 */
export function compareCandidates(a: Candidate, b: Candidate): number {
  return (
    a.bucket - b.bucket ||
    b.swing - a.swing ||
    a.supply - b.supply ||
    a.row - b.row ||
    a.r1 - b.r1 ||
    a.r2 - b.r2 ||
    a.rd - b.rd ||
    a.rs - b.rs
  );
}

/** Keeps the best so many candidates; a heap with the worst on top. */
export class BestCandidates {
  readonly #limit: number;
  readonly #bar: Candidate | null;
  readonly #heap: Candidate[] = [];

  /**
   * @param limit how many to keep, at least 1
   * @param bar a candidate known to be in the answer: whatever comes after it stays out
   */
  constructor(limit: number, bar: Candidate | null = null) {
    this.#limit = limit;
    this.#bar = bar;
  }

  /** The candidate that a new one must not come after; null while anything gets in. */
  get threshold(): Candidate | null {
    return this.#heap.length < this.#limit ? this.#bar : this.#heap[0];
  }

  /** Takes a candidate in if it belongs there, and says whether it did. */
  add(candidate: Candidate): boolean {
    const heap = this.#heap;
    if (this.#bar && compareCandidates(candidate, this.#bar) > 0) return false;
    if (heap.length < this.#limit) {
      heap.push(candidate);
      this.#siftUp(heap.length - 1);
      return true;
    }
    if (compareCandidates(candidate, heap[0]) >= 0) return false;
    heap[0] = candidate;
    this.#siftDown();
    return true;
  }

  /** The candidates, best first. */
  sorted(): Candidate[] {
    return [...this.#heap].sort(compareCandidates);
  }

  #siftUp(at: number): void {
    const heap = this.#heap;
    while (at > 0) {
      const parent = (at - 1) >> 1;
      if (compareCandidates(heap[parent], heap[at]) >= 0) return;
      [heap[parent], heap[at]] = [heap[at], heap[parent]];
      at = parent;
    }
  }

  #siftDown(): void {
    const heap = this.#heap;
    for (let at = 0, child = 1; child < heap.length; child = 2 * at + 1) {
      if (child + 1 < heap.length && compareCandidates(heap[child + 1], heap[child]) > 0) child++;
      if (compareCandidates(heap[at], heap[child]) >= 0) return;
      [heap[child], heap[at]] = [heap[at], heap[child]];
      at = child;
    }
  }
}
