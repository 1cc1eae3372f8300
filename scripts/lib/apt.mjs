import { findProgram, run } from "./programs.mjs";
import { Trouble } from "./trouble.mjs";

/** The Debian packages this project uses, by the program that shows that one is there. */
const packageOf = { mariadbd: "mariadb-server", chromium: "chromium", ngspice: "ngspice" };

/** @typedef {keyof typeof packageOf} NeededProgram */

const environment = { ...process.env, DEBIAN_FRONTEND: "noninteractive", NEEDRESTART_MODE: "l" };

/**
 * Installs the Debian packages of those programs that aren't there.
 *
 * @param {NeededProgram[]} programs
 * @returns {Promise<string[]>} the packages that were installed
 * @throws {Trouble} where there is no apt-get, no right to install, or apt-get fails
 */
export async function installMissing(programs) {
  const packages = programs.filter((program) => !findProgram(program)).map((program) => packageOf[program]);
  if (packages.length === 0) return [];
  const names = packages.join(" ");
  if (!findProgram("apt-get")) {
    throw new Trouble(
      `Missing: ${names}. This system has no apt-get: install them its own way and try again.`,
    );
  }
  if (process.getuid?.() !== 0) {
    throw new Trouble(
      `Missing: ${names}. Installing needs root: run "sudo apt-get install --no-install-recommends ${names}" and try again.`,
    );
  }
  await finishInterruptedInstall();
  const install = ["-o", "DPkg::Lock::Timeout=120", "install", "-y", "--no-install-recommends", ...packages];
  const first = await run("apt-get", install, { env: environment });
  if (first.code !== 0) {
    const stale = `apt-get could not install ${names}, and could not read its package lists anew either.`;
    await run("apt-get", ["update"], { env: environment, failure: `${stale} It said last:` });
    const failure = `apt-get could not install ${names}. It said last:`;
    await run("apt-get", install, { env: environment, failure });
  }
  const missing = programs.filter((program) => !findProgram(program));
  if (missing.length > 0) {
    throw new Trouble(`apt-get installed ${names}, but ${missing.join(" and ")} can't be found.`);
  }
  return packages;
}

/** An install that was killed half-way leaves packages unpacked but not set up; apt-get refuses until they are. */
async function finishInterruptedInstall() {
  const { lines } = await run("dpkg", ["--audit"], { env: environment });
  if (lines.length > 0) await run("dpkg", ["--configure", "-a"], { env: environment });
}
