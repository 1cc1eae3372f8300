import { existsSync, readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { packaged } from "./paths.mjs";
import { run } from "./programs.mjs";
import { Trouble } from "./trouble.mjs";

const FOLDERS = /^(api|shared|web|seeds|scripts|[a-z]+-fake)$/;
const MODULES = /\.(ts|tsx|mjs)$/;

/** Laws about what a file says, not about what it imports. */
const TEXT_LAWS = [
  {
    name: "environment-only-in-env",
    files: /^api\/(?!env\.ts$)/,
    text: /\bprocess\s*\.\s*env\b/,
    comment: "Only api/env.ts reads the environment.",
  },
  {
    name: "primitives-know-no-feature",
    files: /^web\/(ui|figures)\//,
    text: /\bfetch\s*\(/,
    comment: "ui/ and figures/ know no feature, no route and no fetch.",
  },
];

/** @typedef {{ law: string, file: string, sentence: string }} Violation */

/**
 * Reads all imports of a source tree and says where they break the laws in its .dependency-cruiser.cjs.
 *
 * @param {string} folder the tree's root
 * @returns {Promise<{ modules: number, violations: Violation[] }>}
 * @throws {Trouble} where dependency-cruiser doesn't run, or read fewer modules than the tree has
 */
export async function checkBoundaries(folder) {
  const folders = readdirSync(folder).filter((name) => FOLDERS.test(name));
  const files = folders.flatMap((name) => modulesUnder(folder, name));
  const report = await cruise(folder, folders);
  const read = new Set(report.modules.map(({ source }) => source));
  // With a TypeScript it doesn't know, dependency-cruiser reads no file, finds nothing wrong, and ends well.
  const unread = files.filter((file) => !read.has(file));
  if (unread.length > 0 || files.length === 0) {
    throw new Trouble(
      `dependency-cruiser read ${files.length - unread.length} of ${files.length} modules. It left out:`,
      unread.slice(0, 10),
    );
  }
  const violations = [
    ...report.summary.violations.map(({ rule, from, to, cycle }) => ({
      law: rule.name,
      file: from,
      sentence: `${from} -> ${cycle ? cycle.map(({ name }) => name).join(" -> ") : to}`,
    })),
    ...files.flatMap((file) => readTextLaws(folder, file)),
    ...files
      .filter((file) => /(^|\/)index\.\w+$/.test(file))
      .map((file) => ({ law: "no-barrels", file, sentence: `${file} is an index file` })),
  ];
  return { modules: files.length, violations };
}

/**
 * @typedef {object} CruiseReport the part of dependency-cruiser's report that is used here
 * @property {{ source: string }[]} modules
 * @property {{ violations: { rule: { name: string }, from: string, to: string, cycle?: { name: string }[] }[] }} summary
 */

/**
 * @param {string} folder
 * @param {string[]} folders
 * @returns {Promise<CruiseReport>}
 */
async function cruise(folder, folders) {
  /** @type {string[]} */
  const json = [];
  const program = packaged("dependency-cruiser/bin/dependency-cruise.mjs");
  const args = ["--config", join(folder, ".dependency-cruiser.cjs"), "--output-type", "json", ...folders];
  const { lines } = await run(process.execPath, [program, ...args], {
    cwd: folder,
    output: (line, stream) => stream === "out" && json.push(line),
  });
  try {
    return JSON.parse(json.join("\n"));
  } catch {
    throw new Trouble("dependency-cruiser gave no report. It said last:", lines);
  }
}

/**
 * @param {string} folder
 * @param {string} file
 * @returns {Violation[]}
 */
function readTextLaws(folder, file) {
  const laws = TEXT_LAWS.filter(({ files }) => files.test(file));
  if (laws.length === 0) return [];
  const lines = readFileSync(join(folder, file), "utf8").split("\n");
  return laws.flatMap(({ name, text, comment }) =>
    lines.flatMap((line, index) =>
      text.test(line) ? [{ law: name, file, sentence: `${file}:${index + 1}: ${comment}` }] : [],
    ),
  );
}

/**
 * @param {string} folder
 * @param {string} path
 * @returns {string[]}
 */
function modulesUnder(folder, path) {
  if (!existsSync(join(folder, path))) return [];
  return readdirSync(join(folder, path), { withFileTypes: true }).flatMap((entry) => {
    const inside = `${path}/${entry.name}`;
    if (entry.isDirectory()) return modulesUnder(folder, inside);
    return MODULES.test(entry.name) && !entry.name.endsWith(".d.ts") ? [inside] : [];
  });
}
