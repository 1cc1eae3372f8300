import { readdirSync, readFileSync, readlinkSync } from "node:fs";
import { setTimeout as wait } from "node:timers/promises";

/**
 * Reads one of the system's files about processes, which may be gone the next moment.
 *
 * @param {string} path
 */
function readOrEmpty(path) {
  try {
    return readFileSync(path, "utf8");
  } catch {
    return "";
  }
}

/**
 * The processes that were started to keep their things in a folder: those with an option `--name=folder...`.
 *
 * @param {string} folder absolute
 * @returns {number[]} process ids, never this one
 */
export function processesKeptIn(folder) {
  const option = /^--[\w.-]+=(.*)$/;
  return readdirSync("/proc")
    .filter((name) => /^\d+$/.test(name) && Number(name) !== process.pid)
    .filter((pid) =>
      readOrEmpty(`/proc/${pid}/cmdline`)
        .split("\0")
        .some((argument) => {
          const value = option.exec(argument)?.[1];
          return value === folder || value?.startsWith(`${folder}/`);
        }),
    )
    .map(Number);
}

/**
 * Whether a process runs; one that has ended and only waits for its parent doesn't.
 *
 * @param {number} pid
 */
export function runs(pid) {
  const state = /\) (\w)/.exec(readOrEmpty(`/proc/${pid}/stat`))?.[1];
  return state !== undefined && state !== "Z" && state !== "X";
}

/**
 * Ends processes: asks first, and makes them after the time of grace.
 *
 * @param {number[]} pids
 * @param {number} graceMs
 */
export async function endProcesses(pids, graceMs) {
  for (const signal of /** @type {const} */ (["SIGTERM", "SIGKILL"])) {
    const left = pids.filter(runs);
    for (const pid of left) {
      try {
        process.kill(pid, signal);
      } catch {
        // It ended between the look and the signal.
      }
    }
    const until = performance.now() + graceMs;
    while (left.some(runs) && performance.now() < until) await wait(20);
  }
}

/**
 * Whether a process itself listens on a TCP port, so that an answer there is its own.
 *
 * @param {number} pid
 * @param {number} port
 */
export function listensOn(pid, port) {
  const LISTENING = "0A";
  const hexPort = port.toString(16).toUpperCase().padStart(4, "0");
  const inodes = new Set(
    ["/proc/net/tcp", "/proc/net/tcp6"]
      .flatMap((table) => readOrEmpty(table).split("\n").slice(1))
      .map((line) => line.trim().split(/\s+/))
      .filter((columns) => columns[1]?.endsWith(`:${hexPort}`) && columns[3] === LISTENING)
      .map((columns) => `socket:[${columns[9]}]`),
  );
  try {
    return readdirSync(`/proc/${pid}/fd`).some((fd) => {
      try {
        return inodes.has(readlinkSync(`/proc/${pid}/fd/${fd}`));
      } catch {
        return false;
      }
    });
  } catch {
    return false;
  }
}
