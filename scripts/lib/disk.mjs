import { existsSync } from "node:fs";
import { statfs } from "node:fs/promises";
import { dirname } from "node:path";
import { Trouble } from "./trouble.mjs";

const NEEDED_MB = 500;

/**
 * Makes sure that there is room for packages and a database.
 *
 * @param {string} folder which may not be there yet
 * @param {number} [neededMb]
 * @returns {Promise<number>} free megabytes
 * @throws {Trouble} where there are less than 500 MB
 */
export async function requireFreeSpace(folder, neededMb = NEEDED_MB) {
  let existing = folder;
  while (!existsSync(existing)) existing = dirname(existing);
  const { bavail, bsize } = await statfs(existing);
  const freeMb = Math.floor((bavail * bsize) / 1e6);
  if (freeMb < neededMb) {
    throw new Trouble(
      `Only ${freeMb} MB are free on the disk of ${existing}; ${neededMb} MB are needed. Make room and try again.`,
    );
  }
  return freeMb;
}
