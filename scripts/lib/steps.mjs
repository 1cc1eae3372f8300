import { isEnding } from "./lifetime.mjs";

const SHOW_AFTER_MS = 400;
const REMIND_EVERY_MS = 10_000;

/**
 * Says seconds with one decimal.
 *
 * @param {number} sinceMs a reading of performance.now()
 */
export function seconds(sinceMs) {
  return `${((performance.now() - sinceMs) / 1000).toFixed(1)} s`;
}

/**
 * Makes a function that runs the steps of one script in order, numbered, each with its result and its time.
 * A step that takes a while is announced first and says every ten seconds that it goes on.
 *
 * @param {number} count how many steps there will be
 * @param {(line: string) => void} [print]
 */
export function numberedSteps(count, print = console.log) {
  let number = 0;
  /**
   * @template T
   * @param {string} title what is being done
   * @param {(say: (result: string) => void) => T | Promise<T>} work calls `say` with what came of it
   * @param {{ speaks?: boolean }} [options] `speaks`: the work prints lines of its own
   * @returns {Promise<T>}
   */
  return async function step(title, work, { speaks = false } = {}) {
    number += 1;
    const label = `[${number}/${count}] ${title}`;
    const begun = performance.now();
    const announce = setTimeout(() => print(`${label} ...`), speaks ? 0 : SHOW_AFTER_MS);
    const remind = setInterval(() => {
      if (!speaks) print(`${label} ... (${seconds(begun)} so far)`);
    }, REMIND_EVERY_MS);
    let result = "done";
    try {
      const value = await work((text) => {
        result = text;
      });
      print(`${label}: ${result} (${seconds(begun)})`);
      return value;
    } catch (error) {
      if (!isEnding()) print(`${label}: failed (${seconds(begun)})`);
      throw error;
    } finally {
      clearTimeout(announce);
      clearInterval(remind);
    }
  };
}
