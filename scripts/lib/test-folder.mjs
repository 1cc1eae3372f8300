import { mkdirSync, mkdtempSync, readdirSync, realpathSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { whenEnding } from "./lifetime.mjs";
import { takeLock } from "./lock.mjs";
import { endProcesses, processesKeptIn } from "./proc.mjs";

const PREFIX = "evenswing-test-";
const GRACE_MS = 5000;

/**
 * Makes the folder in which one test run keeps everything that is thrown away afterwards, and clears away what
 * earlier runs that were killed left behind. Runs that are still going are left alone.
 *
 * @param {string} [parent]
 * @returns {Promise<{ folder: string, cleared: number }>}
 */
export async function makeTestFolder(parent = realpathSync(tmpdir())) {
  const cleared = await clearKilledRuns(parent);
  const folder = mkdtempSync(join(parent, PREFIX));
  const lock = await takeLock(folder, () => ({ pid: process.pid }));
  whenEnding(async () => {
    await endProcesses(processesKeptIn(folder), GRACE_MS);
    rmSync(folder, { recursive: true, force: true, maxRetries: 5 });
    if ("release" in lock) await lock.release();
  });
  mkdirSync(join(folder, "tmp"));
  return { folder, cleared };
}

/**
 * @param {string} parent
 * @returns {Promise<number>} how many were cleared away
 */
export async function clearKilledRuns(parent) {
  let cleared = 0;
  for (const name of readdirSync(parent).filter((entry) => entry.startsWith(PREFIX))) {
    const folder = join(parent, name);
    const lock = await takeLock(folder, () => ({ pid: process.pid }));
    if ("holder" in lock) continue;
    await endProcesses(processesKeptIn(folder), GRACE_MS);
    rmSync(folder, { recursive: true, force: true, maxRetries: 5 });
    await lock.release();
    cleared += 1;
  }
  return cleared;
}
