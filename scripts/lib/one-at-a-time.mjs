import { whenEnding } from "./lifetime.mjs";
import { takeLock } from "./lock.mjs";
import { dataFolder } from "./paths.mjs";
import { endProcesses, processesKeptIn } from "./proc.mjs";
import { Trouble } from "./trouble.mjs";

const GRACE_MS = 30_000;

/**
 * Makes sure that this checkout runs once, and ends what an earlier, killed run left behind.
 *
 * @param {string} command for the other's message
 * @param {string} [folder] what must not be used twice at a time
 * @returns {Promise<{ answersAt: (address: string) => void }>} tells others where it runs
 * @throws {Trouble} where it runs already, with its address
 */
export async function takeFolder(command, folder = dataFolder) {
  /** @type {import("./lock.mjs").Holder} */
  const self = { pid: process.pid, command };
  const lock = await takeLock(folder, () => self);
  if ("holder" in lock) throw new Trouble(describeHolder(lock.holder));
  whenEnding(lock.release);
  await endProcesses(processesKeptIn(folder), GRACE_MS);
  return {
    answersAt: (address) => {
      self.address = address;
    },
  };
}

/** @param {import("./lock.mjs").Holder} holder */
function describeHolder({ pid, address, command = "another run" }) {
  const where = address ? `Evenswing already runs at ${address}` : "Evenswing is already being started";
  const who = pid ? ` by "${command}" (process ${pid}). To stop that one: kill ${pid}` : "";
  return `${where} from this folder${who}.`;
}
