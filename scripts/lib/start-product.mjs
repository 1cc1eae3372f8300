import { join } from "node:path";
import { parseArgs } from "node:util";
import { installMissing } from "./apt.mjs";
import { buildProduct } from "./build.mjs";
import { migrate, seed } from "./data.mjs";
import { describeDemo } from "./demo.mjs";
import { requireFreeSpace } from "./disk.mjs";
import { readEnvFile } from "./environment.mjs";
import { keepRunning } from "./keep-running.mjs";
import { runScript } from "./lifetime.mjs";
import { installPackages } from "./npm.mjs";
import { takeFolder } from "./one-at-a-time.mjs";
import { fillOnce, openDatabase } from "./own-database.mjs";
import { dataFolder, root } from "./paths.mjs";
import { freePortFrom, readPort } from "./ports.mjs";
import { startServer } from "./server.mjs";
import { numberedSteps, seconds } from "./steps.mjs";
import { Trouble } from "./trouble.mjs";

const DEFAULT_PORT = 8080;
const USAGE = `npm start                   install what is missing, build, and run Evenswing on 127.0.0.1
npm start -- --fresh        the same, with the demo database built anew

PORT, DATABASE_URL and the other variables are explained in .env.example.`;

/**
 * From a fresh checkout, or a warm one, to a running product.
 *
 * @param {string[]} args
 */
export async function startProduct(args) {
  await runScript(() => start(args), { interrupted: 0 });
}

/** @param {string[]} args */
async function start(args) {
  const { fresh, help } = readArguments(args);
  if (help) {
    console.log(USAGE);
    return 0;
  }
  const begun = performance.now();
  readEnvFile();
  const wished = readPort(process.env.PORT, DEFAULT_PORT);
  const folder = await takeFolder("npm start");
  const step = numberedSteps(8);

  await step("Room on the disk", async (say) => say(`${await requireFreeSpace(root)} MB free`));
  await step("Debian packages", async (say) => {
    const installed = process.env.DATABASE_URL ? [] : await installMissing(["mariadbd"]);
    say(installed.length > 0 ? `installed ${installed.join(" ")}` : "nothing missing");
  });
  await step("Node packages", async (say) => {
    say((await installPackages(root)) ? "installed from package-lock.json" : "as in package-lock.json");
  });
  await step("Build", async (say) => {
    const built = await buildProduct();
    say(built.length > 0 ? `built ${built.join(" and ")}` : "sources unchanged");
  });
  const database = await step("Database", async (say) => {
    const opened = await openDatabase({ fresh });
    say(opened.words);
    return opened;
  });
  const env = {
    DEMO_MODE: "1",
    ...process.env,
    NODE_ENV: "production",
    DATABASE_URL: database.url,
  };
  await step("Tables", async (say) => {
    await migrate(env, "built");
    say("up to date");
  });
  await step(env.DEMO_MODE === "1" ? "Catalog and demo story" : "Catalog", async (say) => {
    say((await fillOnce(database, env, () => seed(env))) ? "loaded" : "there already");
  });
  const { port, server, startAgain } = await step("Server", async (say) => {
    const free = await freePortFrom(wished);
    const serve = () =>
      startServer({ port: free, env, keptIn: dataFolder, log: join(dataFolder, "server.log") });
    const started = await serve();
    const moved = `port ${wished} is taken by another program, so it listens on ${free}`;
    say(free === wished ? `listens on 127.0.0.1:${free}` : moved);
    return { port: free, server: started, startAgain: serve };
  });

  const address = `http://127.0.0.1:${port}`;
  folder.answersAt(address);
  console.log(`\nEvenswing is at ${address} (ready after ${seconds(begun)}).`);
  if (port !== wished)
    console.log(`Port ${wished} was taken by another program; ${port} is the next free one.`);
  if (env.DEMO_MODE === "1") console.log(describeDemo());
  console.log("Its log is .data/server.log. Ctrl-C stops it.");

  await Promise.race([
    keepRunning("The server", server, startAgain),
    ...(database.server ? [keepRunning("The database", database.server, database.startAgain)] : []),
  ]);
  return 1;
}

/** @param {string[]} args */
function readArguments(args) {
  try {
    const { values } = parseArgs({
      args,
      options: { fresh: { type: "boolean" }, help: { type: "boolean", short: "h" } },
    });
    return { fresh: values.fresh ?? false, help: values.help ?? false };
  } catch {
    throw new Trouble(`"${args.join(" ")}" is not understood.\n\n${USAGE}`);
  }
}
