import { join } from "node:path";
import { fileURLToPath } from "node:url";

/** The folder that holds package.json. */
export const root = fileURLToPath(new URL("../..", import.meta.url)).replace(/\/$/, "");

/** What the product keeps on this machine: database, password, logs. */
export const dataFolder = join(root, ".data");

/**
 * The path of a program that came with the Node packages.
 *
 * @param {string} path inside node_modules
 */
export function packaged(path) {
  return join(root, "node_modules", path);
}
