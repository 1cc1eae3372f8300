import { closeSync, openSync, readFileSync, renameSync } from "node:fs";
import { join } from "node:path";
import { setTimeout as wait } from "node:timers/promises";
import { root } from "./paths.mjs";
import { listensOn } from "./proc.mjs";
import { launch } from "./programs.mjs";
import { Trouble } from "./trouble.mjs";

const READY_WITHIN_MS = 60_000;
const LOG_LINES = 15;

/**
 * Starts the built server and waits until it says that it is well.
 *
 * @param {object} options
 * @param {number} options.port
 * @param {NodeJS.ProcessEnv} options.env with DATABASE_URL
 * @param {string} options.keptIn the folder of this run: a later run finds the process by it, if this one is killed
 * @param {string} options.log the file it writes to
 * @param {string} [options.program] another script than the built server
 * @returns {Promise<import("./programs.mjs").Program>}
 * @throws {Trouble} with the last lines of its log, as soon as it ends by itself, or after a minute
 */
export async function startServer({ port, env, keptIn, log, program = join(root, "dist/server/main.js") }) {
  keepEarlierLog(log);
  const file = openSync(log, "w", 0o600);
  const server = launch(process.execPath, ["--enable-source-maps", program, `--kept-in=${keptIn}`], {
    cwd: root,
    env: { ...env, PORT: String(port) },
    output: file,
  });
  closeSync(file);
  const until = performance.now() + READY_WITHIN_MS;
  let trouble = "did not get ready within a minute";
  while (performance.now() < until) {
    if (!server.isRunning()) {
      trouble = "ended instead of starting";
      break;
    }
    // Another program's answer on this port must not pass for ours.
    if (listensOn(server.pid, port) && (await isWell(port))) return server;
    await wait(40);
  }
  await server.stop();
  throw new Trouble(`The server ${trouble}. Its log (${log}) says last:`, lastLines(log));
}

/** @param {number} port */
async function isWell(port) {
  try {
    const response = await fetch(`http://127.0.0.1:${port}/healthz`, { signal: AbortSignal.timeout(2000) });
    return response.status === 200;
  } catch {
    return false;
  }
}

/** @param {string} log */
function keepEarlierLog(log) {
  try {
    renameSync(log, `${log}.earlier`);
  } catch {
    // There is none.
  }
}

/** @param {string} log */
function lastLines(log) {
  return readFileSync(log, "utf8").trimEnd().split("\n").slice(-LOG_LINES);
}
