import { describeError } from "./trouble.mjs";

/** @type {(() => unknown)[]} */
const endings = [];
let ending = false;

/**
 * Has something done when this script ends, however it ends; the latest is done first.
 *
 * @param {() => unknown} work
 * @returns {() => void} takes it off the list again
 */
export function whenEnding(work) {
  endings.push(work);
  return () => {
    const at = endings.lastIndexOf(work);
    if (at >= 0) endings.splice(at, 1);
  };
}

/** Whether the script is being ended. */
export function isEnding() {
  return ending;
}

async function endEverything() {
  ending = true;
  for (let work = endings.pop(); work; work = endings.pop()) {
    try {
      await work();
    } catch (error) {
      console.error(describeError(error));
    }
  }
}

/**
 * Runs a script from here to its end: whatever was begun is stopped, after success, failure, Ctrl-C or SIGTERM.
 *
 * @param {() => Promise<number>} main answers with the exit code
 * @param {{ interrupted: number, onTrouble?: () => void }} options the exit code after Ctrl-C or SIGTERM, and what
 *   to add after a failure was told
 */
export async function runScript(main, { interrupted, onTrouble }) {
  for (const signal of /** @type {const} */ (["SIGINT", "SIGTERM", "SIGHUP"])) {
    process.on(signal, async () => {
      if (ending) return;
      console.log("Stopping ...");
      await endEverything();
      console.log("Stopped.");
      process.exit(interrupted);
    });
  }
  let code = 1;
  try {
    code = await main();
  } catch (error) {
    // While a signal ends everything, steps fail because their programs were stopped: that's no news.
    if (ending) return;
    console.error(describeError(error));
    await endEverything();
    onTrouble?.();
    process.exit(1);
  }
  if (ending) return;
  await endEverything();
  process.exit(code);
}
