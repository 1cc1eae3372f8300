import { spawn } from "node:child_process";
import { accessSync, constants } from "node:fs";
import { delimiter, join } from "node:path";
import { createInterface } from "node:readline";
import { stripVTControlCharacters } from "node:util";
import { isEnding, whenEnding } from "./lifetime.mjs";
import { Trouble } from "./trouble.mjs";

const KEPT_LINES = 25;
const GRACE_MS = 10_000;

/**
 * @typedef {object} Program a running program
 * @property {number} pid
 * @property {() => boolean} isRunning
 * @property {Promise<{ code: number | null, signal: NodeJS.Signals | null }>} exited
 * @property {() => string[]} lastLines what it wrote last, where its output is caught
 * @property {() => Promise<void>} stop asks it to end, makes it after the time of grace
 */

/**
 * Finds a program; system programs count even where the search path leaves out /usr/sbin.
 *
 * @param {string} name
 * @returns {string | null} its path
 */
export function findProgram(name) {
  const folders = [...(process.env.PATH ?? "").split(delimiter), "/usr/local/sbin", "/usr/sbin", "/sbin"];
  for (const folder of folders.filter(Boolean)) {
    try {
      accessSync(join(folder, name), constants.X_OK);
      return join(folder, name);
    } catch {
      // Not in this folder.
    }
  }
  return null;
}

/**
 * Starts a program in a process group of its own, so that Ctrl-C reaches it through this script alone, in order.
 * The system ends it if this script is killed.
 *
 * @param {string} command
 * @param {string[]} args
 * @param {object} [options]
 * @param {string} [options.cwd]
 * @param {NodeJS.ProcessEnv} [options.env] instead of this script's own
 * @param {"catch" | "show" | number | ((line: string, stream: "out" | "err") => void)} [options.output] a number is an open file
 * @param {number} [options.keptLines] how many of its last lines are kept
 * @param {number} [options.graceMs] how long it may take to end once it is asked to
 * @returns {Program}
 * @throws {Trouble} while the script is being ended
 */
export function launch(
  command,
  args,
  { cwd, env, output = "catch", keptLines = KEPT_LINES, graceMs = GRACE_MS } = {},
) {
  if (isEnding()) throw new Trouble("Nothing new is started while everything is being stopped.");
  const reaper = findProgram("setpriv");
  const [file, all] = reaper ? [reaper, ["--pdeathsig", "TERM", "--", command, ...args]] : [command, args];
  const sink = output === "show" ? "inherit" : typeof output === "number" ? output : "pipe";
  const plain = sink === "inherit" && process.stdout.isTTY ? {} : { NO_COLOR: "1", FORCE_COLOR: undefined };
  const child = spawn(file, all, {
    cwd,
    env: { ...(env ?? process.env), ...plain },
    detached: true,
    stdio: ["ignore", sink, sink],
  });

  /** @type {string[]} */
  const lines = [];
  const streams = /** @type {const} */ ([
    ["out", child.stdout],
    ["err", child.stderr],
  ]);
  for (const [name, stream] of streams) {
    if (!stream) continue;
    createInterface({ input: stream }).on("line", (line) => {
      if (typeof output === "function") output(line, name);
      // Some programs colour what they say even where nobody sees it.
      lines.push(stripVTControlCharacters(line));
      if (lines.length > keptLines) lines.shift();
    });
  }

  let running = true;
  /** @type {Program["exited"]} */
  const exited = new Promise((resolve) => {
    child.on("error", (error) => {
      lines.push(error.message);
      running = false;
      resolve({ code: 127, signal: null });
    });
    child.on("close", (code, signal) => {
      running = false;
      resolve({ code, signal });
    });
  });

  /** @type {Program["stop"]} */
  const stop = async () => {
    if (!running || child.pid === undefined) return;
    const force = setTimeout(() => signalGroup(child.pid, "SIGKILL"), graceMs);
    signalGroup(child.pid, "SIGTERM");
    await exited;
    clearTimeout(force);
  };
  const forget = whenEnding(stop);
  exited.then(forget);
  return { pid: child.pid ?? -1, isRunning: () => running, exited, lastLines: () => [...lines], stop };
}

/**
 * @param {number | undefined} pid
 * @param {NodeJS.Signals} signal
 */
function signalGroup(pid, signal) {
  try {
    if (pid) process.kill(-pid, signal);
  } catch {
    // It has ended already.
  }
}

/**
 * Runs a program to its end.
 *
 * @param {string} command
 * @param {string[]} args
 * @param {Parameters<typeof launch>[2] & { failure?: string }} [options] `failure`: the sentence for a bad end
 * @throws {Trouble} with the sentence and the program's last lines, where it fails and a sentence is given; while the script is being ended
 */
export async function run(command, args, options = {}) {
  const program = launch(command, args, options);
  const { code, signal } = await program.exited;
  if (isEnding()) throw new Trouble(`${command} was stopped.`);
  if (code !== 0 && options.failure) throw new Trouble(options.failure, program.lastLines());
  return { code: code ?? 1, signal, lines: program.lastLines() };
}
