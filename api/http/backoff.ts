/** Failures that cost nothing: a mistyped password is no attack. */
const FREE_FAILURES = 5;
const FIRST_WAIT_MS = 1000;
/** No wait is longer, so that nobody can lock an honest person out for long. */
const LONGEST_WAIT_MS = 60_000;
/** Keys that have been quiet for this long are forgotten. */
const FORGET_AFTER_MS = 15 * 60_000;

type Entry = { failures: number; lastFailure: number };

/** Slows down whoever keeps failing: after a few free tries each failure doubles the wait, from one second to a minute. */
export class Backoff {
  readonly #entries = new Map<string, Entry>();

  /**
   * How long a key still has to wait, ms; 0 when it may try.
   *
   * @param now ms since the epoch
   */
  waitFor(key: string, now: number): number {
    const entry = this.#entries.get(key);
    if (!entry || entry.failures < FREE_FAILURES) return 0;
    const wait = Math.min(LONGEST_WAIT_MS, FIRST_WAIT_MS * 2 ** (entry.failures - FREE_FAILURES));
    return Math.max(0, entry.lastFailure + wait - now);
  }

  fail(key: string, now: number): void {
    for (const [other, entry] of this.#entries) {
      if (now - entry.lastFailure > FORGET_AFTER_MS) this.#entries.delete(other);
    }
    const failures = (this.#entries.get(key)?.failures ?? 0) + 1;
    this.#entries.set(key, { failures, lastFailure: now });
  }

  succeed(key: string): void {
    this.#entries.delete(key);
  }
}
