import { createServer } from "node:net";
import { Trouble } from "./trouble.mjs";

const TRIED = 50;

/**
 * Whether a port of this machine can be listened on.
 *
 * @param {number} port
 * @returns {Promise<"free" | "taken" | "forbidden">}
 */
function tryPort(port) {
  return new Promise((resolve) => {
    const server = createServer();
    server.once("error", (error) =>
      resolve("code" in error && error.code === "EACCES" ? "forbidden" : "taken"),
    );
    server.listen({ port, host: "127.0.0.1" }, () => server.close(() => resolve("free")));
  });
}

/**
 * The wished port, or the next free one above it.
 *
 * @param {number} wished
 * @throws {Trouble} where the port needs more rights, or none is free in the next fifty
 */
export async function freePortFrom(wished) {
  for (let port = wished; port < wished + TRIED && port <= 65_535; port++) {
    const state = await tryPort(port);
    if (state === "free") return port;
    if (state === "forbidden") {
      throw new Trouble(`Port ${port} needs more rights than this user has: set PORT to one above 1023.`);
    }
  }
  throw new Trouble(`No port from ${wished} to ${wished + TRIED - 1} is free: set PORT to one that is.`);
}

/**
 * A port the system says is free.
 *
 * @returns {Promise<number>}
 */
export function anyFreePort() {
  return new Promise((resolve, reject) => {
    const server = createServer();
    server.once("error", reject);
    server.listen({ port: 0, host: "127.0.0.1" }, () => {
      const address = server.address();
      server.close(() => resolve(address && typeof address === "object" ? address.port : 0));
    });
  });
}

/**
 * Reads a port as it was set in the environment.
 *
 * @param {string | undefined} text
 * @param {number} otherwise where none was set
 * @throws {Trouble} where it's no port
 */
export function readPort(text, otherwise) {
  if (text === undefined || text.trim() === "") return otherwise;
  const port = Number(text);
  if (!Number.isInteger(port) || port < 1 || port > 65_535) {
    throw new Trouble(`PORT must be a whole number from 1 to 65535; it's "${text}".`);
  }
  return port;
}
