import type { FitsResponse } from "#shared/schemas/fits";

const MOST_ANSWERS = 64;
/** Fits in all the answers together; each takes some two kilobytes. */
const MOST_FITS = 20_000;

/** Answers to briefs, the least recently asked for dropped first. */
export class Answers {
  readonly #answers = new Map<string, FitsResponse>();
  #fits = 0;

  get(key: string): FitsResponse | undefined {
    const found = this.#answers.get(key);
    if (!found) return undefined;
    this.#answers.delete(key);
    this.#answers.set(key, found);
    return found;
  }

  /** Keeps an answer; one cut off by its deadline is not worth keeping. */
  keep(key: string, answer: FitsResponse): void {
    if (!answer.complete) return;
    this.#drop(key);
    this.#answers.set(key, answer);
    this.#fits += answer.fits.length;
    for (const oldest of this.#answers.keys()) {
      if (this.#answers.size <= MOST_ANSWERS && this.#fits <= MOST_FITS) return;
      this.#drop(oldest);
    }
  }

  #drop(key: string): void {
    this.#fits -= this.#answers.get(key)?.fits.length ?? 0;
    this.#answers.delete(key);
  }
}
