import { randomBytes } from "node:crypto";
import {
  chmodSync,
  existsSync,
  mkdirSync,
  readdirSync,
  readFileSync,
  renameSync,
  rmSync,
  writeFileSync,
} from "node:fs";
import { connect } from "node:net";
import { join } from "node:path";
import { setTimeout as wait } from "node:timers/promises";
import { isEnding } from "./lifetime.mjs";
import { endProcesses, listensOn, processesKeptIn } from "./proc.mjs";
import { findProgram, launch, run } from "./programs.mjs";
import { Trouble } from "./trouble.mjs";

const READY_WITHIN_MS = 120_000;
const GRACE_MS = 30_000;

/** The usual 96 MB would be most of what a new data folder takes, in time and in room. */
const LOG_SIZE = "--innodb-log-file-size=32M";

/** For data that is thrown away afterwards: nothing waits for the disk. */
const CARELESS = [
  "--innodb-flush-log-at-trx-commit=0",
  "--innodb-flush-method=nosync",
  "--innodb-doublewrite=0",
  "--innodb-file-per-table=0",
  "--max-connections=500",
];

/**
 * @typedef {object} Account the only one that can sign in to the server
 * @property {string} user
 * @property {string} password letters, digits, - and _
 * @property {string} databases a name, or a pattern for GRANT
 */

/** A password nobody has to remember. */
export function randomPassword() {
  return randomBytes(24).toString("base64url");
}

/**
 * Starts a private MariaDB: on 127.0.0.1 only, its data in a folder of ours, one account that reaches its own
 * databases and nothing else. A server that an earlier, killed run left behind on the same folder is ended first.
 *
 * @param {object} options
 * @param {string} options.folder the data folder; made where it isn't there
 * @param {number} options.port
 * @param {Account} options.account
 * @param {string[]} [options.statements] SQL to run before anybody can connect, a statement a line
 * @param {boolean} [options.careless] quick, and the data may be lost if the machine stops
 * @returns {Promise<import("./programs.mjs").Program>} once it answers
 * @throws {Trouble} with the last lines of its log, where it doesn't start
 */
export async function startMariadb({ folder, port, account, statements = [], careless = false }) {
  await endProcesses(processesKeptIn(folder), GRACE_MS);
  await makeDataFolder(folder, careless);
  const log = join(folder, "server.log");
  const setUp = join(folder, "set-up.sql");
  writePrivate(setUp, [...accountStatements(account), ...statements].join("\n"));
  rmSync(log, { force: true });
  const args = [
    // First of all: the machine's own configuration is for the machine's own server.
    "--no-defaults",
    ...asRoot(),
    `--datadir=${folder}`,
    "--bind-address=127.0.0.1",
    `--port=${port}`,
    // Relative to the data folder: private, and never too long for a socket's path.
    "--socket=server.sock",
    "--pid-file=server.pid",
    `--init-file=${setUp}`,
    `--log-error=${log}`,
    "--skip-name-resolve",
    "--local-infile=0",
    "--default-time-zone=+00:00",
    "--character-set-server=utf8mb4",
    "--collation-server=utf8mb4_unicode_ci",
    LOG_SIZE,
    ...(careless ? CARELESS : []),
  ];
  const server = launch(serverProgram(), args, { graceMs: GRACE_MS });
  await waitUntilReady(server, port, log);
  return server;
}

/** @param {Account} account */
function accountStatements({ user, password, databases }) {
  const name = `'${user}'@'127.0.0.1'`;
  return [
    // A new data folder has accounts without a password. They go at every start, before the first connection.
    "DELETE FROM mysql.global_priv WHERE User <> 'mariadb.sys';",
    "DELETE FROM mysql.db WHERE User <> 'mariadb.sys';",
    "DELETE FROM mysql.proxies_priv;",
    "FLUSH PRIVILEGES;",
    `CREATE OR REPLACE USER ${name} IDENTIFIED BY '${password}';`,
    `GRANT ALL PRIVILEGES ON \`${databases}\`.* TO ${name};`,
  ];
}

/**
 * @param {string} folder
 * @param {boolean} careless
 */
async function makeDataFolder(folder, careless) {
  if (existsSync(join(folder, "mysql"))) return;
  if (existsSync(folder) && readdirSync(folder).length > 0) {
    throw new Trouble(
      `${folder} is damaged: its system tables are gone. Move it away to start with an empty one.`,
    );
  }
  // Made under another name first, so that a folder is either whole or not there.
  const unfinished = `${folder}.unfinished`;
  rmSync(unfinished, { recursive: true, force: true });
  mkdirSync(unfinished, { recursive: true, mode: 0o700 });
  const installer = findProgram("mariadb-install-db");
  if (!installer)
    throw new Trouble("mariadb-install-db is missing: install the Debian package mariadb-server.");
  const args = [
    "--no-defaults",
    ...asRoot(),
    `--datadir=${unfinished}`,
    "--auth-root-authentication-method=normal",
    "--skip-test-db",
    LOG_SIZE,
    ...(careless ? CARELESS : []),
  ];
  await run(installer, args, { failure: "MariaDB could not make its data folder. It said last:" });
  chmodSync(unfinished, 0o700);
  renameSync(unfinished, folder);
}

function asRoot() {
  return process.getuid?.() === 0 ? ["--user=root"] : [];
}

function serverProgram() {
  const program = findProgram("mariadbd");
  if (!program) throw new Trouble("mariadbd is missing: install the Debian package mariadb-server.");
  return program;
}

/**
 * @param {import("./programs.mjs").Program} server
 * @param {number} port
 * @param {string} log
 */
async function waitUntilReady(server, port, log) {
  const until = performance.now() + READY_WITHIN_MS;
  while (performance.now() < until && !isEnding()) {
    if (!server.isRunning()) {
      throw new Trouble("MariaDB ended instead of starting. Its log says last:", lastLines(log, server));
    }
    if (listensOn(server.pid, port) && (await greets("127.0.0.1", port))) return;
    await wait(30);
  }
  await server.stop();
  throw new Trouble(
    "MariaDB did not get ready within two minutes. Its log says last:",
    lastLines(log, server),
  );
}

/**
 * Whether a database answers: MariaDB speaks first, and only once its set-up statements are done.
 *
 * @param {string} host
 * @param {number} port
 * @returns {Promise<boolean>}
 */
export function greets(host, port) {
  return new Promise((resolve) => {
    const socket = connect({ port, host });
    const answer = (/** @type {boolean} */ greeted) => {
      socket.destroy();
      resolve(greeted);
    };
    socket.setTimeout(1000, () => answer(false));
    socket.once("data", () => answer(true));
    socket.once("error", () => answer(false));
    socket.once("end", () => answer(false));
  });
}

/**
 * @param {string} log
 * @param {import("./programs.mjs").Program} server
 */
function lastLines(log, server) {
  try {
    return readFileSync(log, "utf8").trimEnd().split("\n").slice(-12);
  } catch {
    return server.lastLines();
  }
}

/**
 * Writes a file that only this user may read.
 *
 * @param {string} path
 * @param {string} text
 */
export function writePrivate(path, text) {
  writeFileSync(path, `${text}\n`, { mode: 0o600 });
  // The mode above counts for new files only.
  chmodSync(path, 0o600);
}
