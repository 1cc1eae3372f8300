import { mkdirSync, renameSync, rmSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { expect, test } from "vitest";
import { fingerprint } from "../../scripts/lib/build.mjs";
import { requireFreeSpace } from "../../scripts/lib/disk.mjs";
import { packagesAreInstalled } from "../../scripts/lib/npm.mjs";
import { temporaryFolder } from "./snippet";

type Packages = Record<string, { version?: string; optional?: boolean }>;

function treeWith(wanted: Packages, installed: Packages | null): string {
  const folder = temporaryFolder();
  writeFileSync(join(folder, "package-lock.json"), JSON.stringify({ packages: { "": {}, ...wanted } }));
  if (installed) {
    for (const path of Object.keys(installed)) mkdirSync(join(folder, path), { recursive: true });
    mkdirSync(join(folder, "node_modules"), { recursive: true });
    writeFileSync(join(folder, "node_modules/.package-lock.json"), JSON.stringify({ packages: installed }));
  }
  return folder;
}

const one = { "node_modules/one": { version: "1.0.0" } };
const two = { "node_modules/two": { version: "2.0.0" } };

test.each([
  ["as in the lock file", { ...one, ...two }, { ...one, ...two }, true],
  ["never installed, or killed before npm wrote its list", one, null, false],
  ["one package missing", { ...one, ...two }, one, false],
  ["one package too many", one, { ...one, ...two }, false],
  ["another version", one, { "node_modules/one": { version: "1.0.1" } }, false],
  ["without one that is for another system", { ...one, "node_modules/mac": { optional: true } }, one, true],
])("Node packages: %s", (_, wanted, installed, expected) => {
  expect(packagesAreInstalled(treeWith(wanted, installed))).toBe(expected);
});

test("Node packages: one folder deleted by hand", () => {
  const folder = treeWith(one, one);
  rmSync(join(folder, "node_modules/one"), { recursive: true });
  expect(packagesAreInstalled(folder)).toBe(false);
});

test("says how much room there is where it isn't enough", async () => {
  const folder = join(temporaryFolder(), "not", "yet");
  await expect(requireFreeSpace(folder, 1e9)).rejects.toThrow(
    /^Only \d+ MB are free .* 1000000000 MB are needed\./,
  );
  expect(await requireFreeSpace(folder, 0)).toBeGreaterThan(0);
});

test("a build counts as old when a source is changed, added, renamed or removed", () => {
  const folder = temporaryFolder();
  mkdirSync(join(folder, "api/deep"), { recursive: true });
  writeFileSync(join(folder, "api/deep/a.ts"), "a");
  writeFileSync(join(folder, "single.ts"), "s");
  const look = () => fingerprint(folder, ["api", "single.ts", "not-there.ts"]);
  const seen = [look()];
  writeFileSync(join(folder, "api/deep/a.ts"), "b");
  seen.push(look());
  writeFileSync(join(folder, "api/deep/b.ts"), "");
  seen.push(look());
  renameSync(join(folder, "api/deep/b.ts"), join(folder, "api/b.ts"));
  seen.push(look());
  rmSync(join(folder, "single.ts"));
  seen.push(look());
  expect(new Set(seen).size).toBe(5);

  writeFileSync(join(folder, "single.ts"), "s");
  rmSync(join(folder, "api/b.ts"));
  writeFileSync(join(folder, "api/deep/a.ts"), "a");
  expect(look()).toBe(seen[0]);
});
