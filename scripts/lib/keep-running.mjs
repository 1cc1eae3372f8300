import { isEnding } from "./lifetime.mjs";
import { Trouble } from "./trouble.mjs";

const TIMES = 3;
const WITHIN_MS = 60_000;

/**
 * Starts a program again whenever it ends by itself.
 *
 * @param {string} title
 * @param {import("./programs.mjs").Program} program
 * @param {() => Promise<import("./programs.mjs").Program>} startAgain
 * @returns {Promise<never>}
 * @throws {Trouble} when it has ended a fourth time within a minute
 */
export async function keepRunning(title, program, startAgain) {
  /** @type {number[]} */
  let ends = [];
  for (;;) {
    const { code, signal } = await program.exited;
    if (isEnding()) return new Promise(() => undefined);
    const now = performance.now();
    ends = [...ends.filter((end) => now - end < WITHIN_MS), now];
    const how = signal ?? `exit code ${code}`;
    if (ends.length > TIMES) throw new Trouble(`${title} ends again and again (last: ${how}).`);
    console.log(`${title} ended unexpectedly (${how}): starting it again.`);
    program = await startAgain();
    console.log(`${title} runs again.`);
  }
}
