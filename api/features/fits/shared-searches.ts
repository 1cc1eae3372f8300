import type { Fit, FitsResponse } from "#shared/schemas/fits";
import type { RankingControl } from "../../ranking/rank-parts";

type Progress = { partsDone: number; partsTotal: number };

/** What a caller of a search wants to be told, and how to call it off. */
export type FitsControl = Pick<RankingControl, "signal" | "onProgress"> & { onFits?: (fits: Fit[]) => void };

type Search = (control: Required<FitsControl>) => Promise<FitsResponse>;

/** Searches under way, each shared by all who ask for the same meanwhile. */
export class SharedSearches {
  readonly #running = new Map<string, SharedSearch>();

  /**
   * Joins the search that runs under a key, or starts it.
   *
   * @throws the signal's reason when called off, at once; what the search throws
   */
  async join(key: string, control: FitsControl, start: Search): Promise<FitsResponse> {
    control.signal?.throwIfAborted();
    const running = this.#running.get(key);
    if (running && !running.calledOff) return running.follow(control);
    const search = new SharedSearch(start);
    this.#running.set(key, search);
    const forget = () => {
      // One called off may end after another of the same key has begun.
      if (this.#running.get(key) === search) this.#running.delete(key);
    };
    search.answer.then(forget, forget);
    return search.follow(control);
  }
}

/** One search for many callers: each can leave alone, and the last to leave calls it off. */
class SharedSearch {
  readonly answer: Promise<FitsResponse>;
  readonly #controller = new AbortController();
  readonly #callers = new Set<FitsControl>();
  #progress: Progress | null = null;
  #fits: Fit[] | null = null;

  constructor(start: Search) {
    this.answer = start({
      signal: this.#controller.signal,
      onProgress: (progress) => {
        this.#progress = progress;
        for (const caller of this.#callers) caller.onProgress?.(progress);
      },
      onFits: (fits) => {
        this.#fits = fits;
        for (const caller of this.#callers) caller.onFits?.(fits);
      },
    });
  }

  get calledOff(): boolean {
    return this.#controller.signal.aborted;
  }

  follow(caller: FitsControl): Promise<FitsResponse> {
    this.#callers.add(caller);
    // Whoever comes later is told first how far it has come.
    if (this.#progress) caller.onProgress?.(this.#progress);
    if (this.#fits) caller.onFits?.(this.#fits);
    return new Promise((resolve, reject) => {
      const leave = () => {
        this.#callers.delete(caller);
        reject(caller.signal?.reason);
        if (this.#callers.size === 0) this.#controller.abort(caller.signal?.reason);
      };
      caller.signal?.addEventListener("abort", leave, { once: true });
      const stay = () => caller.signal?.removeEventListener("abort", leave);
      this.answer.then(resolve, reject).finally(stay);
    });
  }
}
