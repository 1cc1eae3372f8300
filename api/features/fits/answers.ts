import type { FitsResponse } from "#shared/schemas/fits";

const MOST_ANSWERS = 64;
const MOST_CHARACTERS = 32e6;

/** Answers to briefs, the least recently asked for dropped first. */
export class Answers {
  readonly #answers = new Map<string, { answer: FitsResponse; characters: number }>();
  #characters = 0;

  get(key: string): FitsResponse | undefined {
    const found = this.#answers.get(key);
    if (!found) return undefined;
    this.#answers.delete(key);
    this.#answers.set(key, found);
    return found.answer;
  }

  /** Keeps an answer; one cut off by its deadline is not worth keeping. */
  keep(key: string, answer: FitsResponse): void {
    if (!answer.complete) return;
    this.#drop(key);
    const characters = JSON.stringify(answer).length;
    this.#answers.set(key, { answer, characters });
    this.#characters += characters;
    for (const oldest of this.#answers.keys()) {
      if (this.#answers.size <= MOST_ANSWERS && this.#characters <= MOST_CHARACTERS) return;
      this.#drop(oldest);
    }
  }

  #drop(key: string): void {
    this.#characters -= this.#answers.get(key)?.characters ?? 0;
    this.#answers.delete(key);
  }
}
