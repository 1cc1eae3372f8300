import { createHash } from "node:crypto";
import { connect, createServer } from "node:net";
import { setTimeout as wait } from "node:timers/promises";

const ANSWER_WITHIN_MS = 2000;

/**
 * @typedef {object} Holder who holds a lock
 * @property {number} pid
 * @property {string} [command] what was run
 * @property {string} [address] where the product answers
 */

/**
 * A lock's name in Linux's abstract socket names: they leave no file behind, and the kernel frees one at once when
 * its process ends, even by SIGKILL, so a lock is never stale.
 *
 * @param {string} name a folder's path, or a path and a purpose
 */
function socketName(name) {
  return `\0evenswing-${createHash("sha256").update(name).digest("hex").slice(0, 32)}`;
}

/**
 * Takes a lock, or says who has it.
 *
 * @param {string} name the same for all that exclude each other
 * @param {() => Holder} aboutSelf asked whenever somebody else wants the lock
 * @returns {Promise<{ release: () => Promise<void> } | { holder: Holder }>}
 */
export async function takeLock(name, aboutSelf) {
  for (;;) {
    const release = await listen(name, aboutSelf);
    if (release) return { release };
    const holder = await askHolder(name);
    if (holder) return { holder };
    // It was given up between the two looks.
    await wait(50);
  }
}

/**
 * Who holds a lock.
 *
 * @param {string} name
 * @returns {Promise<Holder | null>} null where nobody does
 */
export function askHolder(name) {
  return new Promise((resolve) => {
    let answer = "";
    const socket = connect(socketName(name));
    socket.setEncoding("utf8");
    socket.setTimeout(ANSWER_WITHIN_MS, () => socket.destroy());
    socket.on("data", (part) => {
      answer += part;
    });
    let reached = false;
    socket.on("connect", () => {
      reached = true;
    });
    socket.on("error", () => undefined);
    socket.on("close", () => {
      if (answer) resolve(JSON.parse(answer));
      // A holder that is there but says nothing is busy or stopped: it still holds the lock.
      else resolve(reached ? { pid: 0 } : null);
    });
  });
}

/**
 * Does something that two processes mustn't do at once, after waiting for the other if there is one.
 *
 * @template T
 * @param {string} name
 * @param {() => Promise<T>} work
 */
export async function alone(name, work) {
  for (;;) {
    const lock = await takeLock(name, () => ({ pid: process.pid }));
    if ("release" in lock) {
      try {
        return await work();
      } finally {
        await lock.release();
      }
    }
    await wait(200);
  }
}

/**
 * @param {string} name
 * @param {() => Holder} aboutSelf
 * @returns {Promise<(() => Promise<void>) | null>}
 */
function listen(name, aboutSelf) {
  return new Promise((resolve, reject) => {
    const server = createServer((socket) => {
      socket.on("error", () => undefined);
      socket.end(JSON.stringify(aboutSelf()));
    });
    server.once("error", (error) => {
      if ("code" in error && error.code === "EADDRINUSE") resolve(null);
      else reject(error);
    });
    server.listen(socketName(name), () => {
      server.unref();
      resolve(() => new Promise((done) => server.close(() => done())));
    });
  });
}
