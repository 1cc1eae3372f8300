import { installMissing } from "./apt.mjs";
import { migrate, seed } from "./data.mjs";
import { readEnvFile } from "./environment.mjs";
import { isEnding, runScript } from "./lifetime.mjs";
import { installPackages } from "./npm.mjs";
import { takeFolder } from "./one-at-a-time.mjs";
import { fillOnce, openDatabase } from "./own-database.mjs";
import { dataFolder, packaged, root } from "./paths.mjs";
import { freePortFrom, readPort } from "./ports.mjs";
import { launch } from "./programs.mjs";
import { numberedSteps } from "./steps.mjs";

const DEFAULT_PORT = 8080;
const FIRST_API_PORT = 8181;

/** Runs the product from its sources: server and interface follow every change of a file. */
export async function developProduct() {
  await runScript(develop, { interrupted: 0 });
}

async function develop() {
  readEnvFile();
  const wished = readPort(process.env.PORT, DEFAULT_PORT);
  const folder = await takeFolder("npm run dev");
  const step = numberedSteps(5);

  await step("Debian packages", async (say) => {
    const installed = process.env.DATABASE_URL ? [] : await installMissing(["mariadbd"]);
    say(installed.length > 0 ? `installed ${installed.join(" ")}` : "nothing missing");
  });
  await step("Node packages", async (say) => {
    say((await installPackages(root)) ? "installed from package-lock.json" : "as in package-lock.json");
  });
  const database = await step("Database", async (say) => {
    const opened = await openDatabase({ fresh: false });
    say(opened.words);
    return opened;
  });
  const env = { DEMO_MODE: "1", ...process.env, NODE_ENV: "development", DATABASE_URL: database.url };
  await step("Tables", async (say) => {
    await migrate(env, "source");
    say("up to date");
  });
  await step(env.DEMO_MODE === "1" ? "Catalog and demo story" : "Catalog", async (say) => {
    say((await fillOnce(database, env, () => seed(env))) ? "loaded" : "there already");
  });

  const apiPort = await freePortFrom(FIRST_API_PORT);
  const port = await freePortFrom(wished);
  const address = `http://127.0.0.1:${port}`;
  const keptIn = `--kept-in=${dataFolder}`;
  const server = launch(process.execPath, [packaged("tsx/dist/cli.mjs"), "watch", "api/main.ts", keptIn], {
    cwd: root,
    // The browser talks to the interface's server, which passes requests on.
    env: { PUBLIC_ORIGIN: address, ...env, PORT: String(apiPort) },
    output: prefixed("api"),
  });
  const viteArgs = ["--host", "127.0.0.1", "--port", String(port), "--strictPort", "--clearScreen", "false"];
  const interfaceServer = launch(process.execPath, [packaged("vite/bin/vite.js"), ...viteArgs], {
    cwd: root,
    env: { ...process.env, EVENSWING_API_PORT: String(apiPort) },
    output: prefixed("web"),
  });
  folder.answersAt(address);
  console.log(`\nOpen ${address}; the API is at http://127.0.0.1:${apiPort}. Ctrl-C stops both.\n`);

  const programs = {
    "The server": server,
    "The interface": interfaceServer,
    "The database": database.server,
  };
  const title = await Promise.race(
    Object.entries(programs).flatMap(([name, program]) => (program ? [program.exited.then(() => name)] : [])),
  );
  if (!isEnding()) console.error(`${title} ended by itself.`);
  return 1;
}

/** @param {string} name */
function prefixed(name) {
  return (/** @type {string} */ line) => console.log(`${name} | ${line}`);
}
