import type { Objective } from "#shared/schemas/fits";

/**
 * One combination with what ranks it; less is better throughout. `row` is the part's place in the catalog, which is in
 * part-number order.
 */
export type Candidate = {
  /** Centring error in whole per cent (`centred`), assured swing in nanovolts below zero, or integer cents. */
  major: number;
  /** `centred`: the assured swing in nanovolts, below zero; else 0. */
  minor: number;
  /** What the stage takes from its rail, A. */
  supply: number;
  row: number;
  /** The resistors at the gate, ohms: R1 and R2, or 0 and RG. */
  first: number;
  second: number;
  /** The resistors of the line, ohms, in the circuit's order. */
  a: number;
  b: number;
  c: number;
};

/** Centring error in whole per cent, rounded down, because less is noise. */
export function bucketOf(towardCutoff: number, towardOhmic: number): number {
  return Math.floor((100 * Math.abs(towardCutoff - towardOhmic)) / (towardCutoff + towardOhmic));
}

/** Swing in whole nanovolts: less is rounding noise, and a tie must not depend on it. */
export function nanovolts(volts: number): number {
  return Math.round(volts * 1e9);
}

/** What ranks a combination before its ties are looked at. */
export function rankOf(
  objective: Objective,
  bucket: number,
  assuredNanovolts: number,
  cents: number,
): Pick<Candidate, "major" | "minor"> {
  if (objective === "centred") return { major: bucket, minor: -assuredNanovolts };
  return { major: objective === "assured" ? -assuredNanovolts : cents, minor: 0 };
}

/**
 * The order of every objective: `centred` by least centring error in whole per cent, then the greater assured swing;
 * `assured` by the greater assured swing; `cost` by the lesser cost. Ties by the smaller supply current, part number,
 * R1, R2, RG, RD, RS, RS2.
 *
 * @returns below zero when a comes first
 */
export function compareCandidates(a: Candidate, b: Candidate): number {
  return (
    a.major - b.major ||
    a.minor - b.minor ||
    a.supply - b.supply ||
    a.row - b.row ||
    a.first - b.first ||
    a.second - b.second ||
    a.a - b.a ||
    a.b - b.b ||
    a.c - b.c
  );
}

/** The assured swing that a candidate has to have to come before another, in nanovolts; below zero where that is open. */
export function assuredToBeat(objective: Objective, { major, minor }: Candidate): number {
  if (objective === "assured") return -major;
  return objective === "centred" && major === 0 ? -minor : -1;
}

/** Where a search puts what it finds. */
export type Best = {
  /** The candidate that a new one must not come after; null while anything gets in. */
  readonly threshold: Candidate | null;
  /** Takes a candidate in if it belongs there, and says whether it did. */
  add: (candidate: Candidate) => boolean;
};

/**
 * The best of one part. Until something is found nothing is left out, so that it is known whether the part fits at
 * all; from then on only what comes before the bar matters, because the part's place after it is of no interest.
 */
export class PartBest implements Best {
  /** The last place of the answer so far; null where the part's very best is wanted. */
  readonly bar: Candidate | null;
  found: Candidate | null = null;

  /** @param bar the last place of the answer so far, when all its places are taken */
  constructor(bar: Candidate | null) {
    this.bar = bar;
  }

  get threshold(): Candidate | null {
    if (!this.found || !this.bar) return this.found;
    return compareCandidates(this.bar, this.found) < 0 ? this.bar : this.found;
  }

  add(candidate: Candidate): boolean {
    if (this.found && compareCandidates(candidate, this.found) >= 0) return false;
    this.found = candidate;
    return true;
  }
}

/** Keeps the best so many candidates; a heap with the worst on top. */
export class BestCandidates implements Best {
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

  get threshold(): Candidate | null {
    return this.#heap.length < this.#limit ? this.#bar : this.#heap[0];
  }

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
