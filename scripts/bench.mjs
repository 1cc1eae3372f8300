import { requireNode } from "./lib/node-version.mjs";

requireNode();
const { runScript } = await import("./lib/lifetime.mjs");
const { installPackages } = await import("./lib/npm.mjs");
const { root } = await import("./lib/paths.mjs");
const { run } = await import("./lib/programs.mjs");

await runScript(
  async () => {
    if (await installPackages(root)) console.log("Installed the Node packages of package-lock.json.");
    const args = ["--import", "tsx", "tests/bench/main.ts", ...process.argv.slice(2)];
    return (await run(process.execPath, args, { cwd: root, output: "show" })).code;
  },
  { interrupted: 130 },
);
