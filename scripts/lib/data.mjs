import { root } from "./paths.mjs";
import { run } from "./programs.mjs";

/**
 * Brings a database's tables up to date.
 *
 * @param {NodeJS.ProcessEnv} env with DATABASE_URL
 * @param {"built" | "source"} from
 */
export async function migrate(env, from) {
  const args = from === "built" ? ["dist/server/db/migrate.js"] : ["--import", "tsx", "api/db/migrate.ts"];
  await run(process.execPath, args, {
    cwd: root,
    env,
    failure: "The database's tables could not be brought up to date. The migration said last:",
  });
}

/**
 * Loads the catalog and, in demo mode, the demo story. Run twice, it changes nothing.
 *
 * @param {NodeJS.ProcessEnv} env with DATABASE_URL
 */
export async function seed(env) {
  await run(process.execPath, ["--import", "tsx", "seeds/load.ts"], {
    cwd: root,
    env,
    failure: "The catalog and the demo story could not be loaded. The loader said last:",
  });
}
