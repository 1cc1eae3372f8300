import { existsSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { alone } from "./lock.mjs";
import { run } from "./programs.mjs";
import { Trouble } from "./trouble.mjs";

/**
 * @typedef {{ version?: string, optional?: boolean, link?: boolean }} LockEntry
 * @typedef {{ packages: Record<string, LockEntry> }} LockFile
 */

/**
 * Whether the installed Node packages are those of package-lock.json. npm writes its own list last, so an install
 * that was interrupted has none.
 *
 * @param {string} folder that holds package-lock.json
 */
export function packagesAreInstalled(folder) {
  const wanted = readLock(join(folder, "package-lock.json"));
  const installed = readLock(join(folder, "node_modules", ".package-lock.json"));
  if (!wanted || !installed) return false;
  const differs = (/** @type {string} */ path, /** @type {LockEntry} */ entry) => {
    const there = installed.packages[path];
    if (!there) return !entry.optional;
    return there.version !== entry.version || !existsSync(join(folder, path));
  };
  return (
    !Object.entries(wanted.packages).some(([path, entry]) => path !== "" && differs(path, entry)) &&
    Object.keys(installed.packages).every((path) => path in wanted.packages)
  );
}

/**
 * Installs the Node packages where they aren't those of package-lock.json.
 *
 * @param {string} folder that holds package-lock.json
 * @returns {Promise<boolean>} whether anything had to be installed
 * @throws {Trouble} with npm's last lines, where npm fails
 */
export function installPackages(folder) {
  return alone(`${folder} packages`, async () => {
    if (packagesAreInstalled(folder)) return false;
    // No package here needs its install script, so none gets to run one.
    const args = ["ci", "--include=dev", "--ignore-scripts", "--no-audit", "--no-fund"];
    await run("npm", args, {
      cwd: folder,
      failure: "npm could not install the Node packages. It said last:",
    });
    if (!packagesAreInstalled(folder)) {
      throw new Trouble(
        "npm ended well, but the Node packages are not those of package-lock.json. Run: npm ci",
      );
    }
    return true;
  });
}

/**
 * @param {string} path
 * @returns {LockFile | null}
 */
function readLock(path) {
  try {
    return JSON.parse(readFileSync(path, "utf8"));
  } catch {
    return null;
  }
}
