import { createHash } from "node:crypto";
import { existsSync, mkdirSync, readdirSync, readFileSync, rmSync, statSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { alone } from "./lock.mjs";
import { packaged, root } from "./paths.mjs";
import { run } from "./programs.mjs";

const stampFile = join(root, "dist", "sources.json");

/** What a change of must lead to a new build, and what has to be there afterwards. */
const parts = {
  server: {
    sources: ["api", "shared", "package-lock.json", "package.json", "scripts/lib/build.mjs"],
    results: [
      "dist/server/main.js",
      "dist/server/ranking/worker.js",
      "dist/server/simulation/worker.js",
      "dist/server/db/migrate.js",
    ],
    build: buildServer,
  },
  web: {
    sources: ["web", "shared", "vite.config.ts", "package-lock.json", "scripts/lib/build.mjs"],
    results: ["dist/web/index.html"],
    build: buildWeb,
  },
};

/** @typedef {keyof typeof parts} Part */

/**
 * Builds server and web application into dist, each only where its sources changed.
 *
 * @returns {Promise<Part[]>} what was built
 * @throws {import("./trouble.mjs").Trouble} with the last lines of the builder, where it fails
 */
export function buildProduct() {
  return alone(`${root} build`, async () => {
    const stamps = readStamps();
    /** @type {Part[]} */
    const stale = [];
    for (const name of /** @type {Part[]} */ (Object.keys(parts))) {
      const { sources, results } = parts[name];
      const stamp = fingerprint(root, sources);
      if (stamps[name] === stamp && results.every((file) => existsSync(join(root, file)))) continue;
      stale.push(name);
      // No stamp while it is being built: a build that was killed half-way doesn't count.
      writeStamps({ ...stamps, [name]: undefined });
      await parts[name].build();
      stamps[name] = stamp;
      writeStamps(stamps);
    }
    return stale;
  });
}

async function buildServer() {
  rmSync(join(root, "dist", "server"), { recursive: true, force: true });
  const args = [
    "main=api/main.ts",
    "ranking/worker=api/ranking/worker.ts",
    "simulation/worker=api/simulation/worker.ts",
    "db/migrate=api/db/migrate.ts",
    "--bundle",
    "--outdir=dist/server",
    // Packages stay where they are: worker threads and native modules break inside a bundle.
    "--packages=external",
    "--platform=node",
    "--format=esm",
    "--target=node20",
    "--sourcemap",
    "--log-level=warning",
  ];
  await run(packaged(".bin/esbuild"), args, {
    cwd: root,
    keptLines: 60,
    failure: "The server could not be built. esbuild said last:",
  });
}

async function buildWeb() {
  await run(process.execPath, [packaged("vite/bin/vite.js"), "build", "--logLevel", "warn"], {
    cwd: root,
    env: { ...process.env, NODE_ENV: "production" },
    keptLines: 60,
    failure: "The web application could not be built. Vite said last:",
  });
}

/**
 * One short text for all contents of files and folders: it changes when a file is changed, added, moved or removed.
 *
 * @param {string} folder
 * @param {string[]} sources paths inside the folder; one that isn't there counts as empty
 */
export function fingerprint(folder, sources) {
  const hash = createHash("sha256");
  for (const path of sources.flatMap((source) => filesUnder(folder, source)).sort()) {
    const contents = readFileSync(join(folder, path));
    hash.update(`${path}\0${contents.length}\0`).update(contents);
  }
  return hash.digest("hex");
}

/**
 * @param {string} folder
 * @param {string} path
 * @returns {string[]}
 */
function filesUnder(folder, path) {
  const stats = statSync(join(folder, path), { throwIfNoEntry: false });
  if (!stats) return [];
  if (stats.isFile()) return [path];
  return readdirSync(join(folder, path)).flatMap((name) => filesUnder(folder, `${path}/${name}`));
}

/** @returns {Partial<Record<Part, string>>} */
function readStamps() {
  try {
    return JSON.parse(readFileSync(stampFile, "utf8"));
  } catch {
    return {};
  }
}

/** @param {Partial<Record<Part, string>>} stamps */
function writeStamps(stamps) {
  mkdirSync(join(root, "dist"), { recursive: true });
  writeFileSync(stampFile, JSON.stringify(stamps));
}
