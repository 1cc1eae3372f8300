import { availableParallelism } from "node:os";
import { Piscina } from "piscina";
import type { RankingOutcome, RankingTask } from "./worker";

/** Threads that search, one a core. */
export const THREADS = availableParallelism();

// Built, everything sits in one file beside ranking/; from source, the worker is a sibling that needs a loader.
const fromSource = import.meta.url.endsWith(".ts");

let pool: Piscina<RankingTask, RankingOutcome> | null = null;

/** Starts the threads, so that the first search doesn't wait for them. */
export function startPool(): void {
  threads();
}

function threads(): Piscina<RankingTask, RankingOutcome> {
  pool ??= new Piscina({
    filename: new URL(fromSource ? "./worker.ts" : "./ranking/worker.js", import.meta.url).href,
    minThreads: THREADS,
    maxThreads: THREADS,
    ...(fromSource ? { execArgv: ["--import", "tsx"] } : {}),
  });
  return pool;
}

/**
 * Runs tasks on the pool, as many at a time as there are threads: further searches that come meanwhile get every
 * other turn, instead of waiting behind all of this one.
 *
 * @param lanes how many tasks at a time
 * @param nextTask makes the next task; null when there are no more
 * @param onDone called after each task with its outcome
 */
export async function runTasks(
  lanes: number,
  nextTask: () => RankingTask | null,
  onDone: (outcome: RankingOutcome, task: RankingTask) => void,
): Promise<void> {
  const lane = async () => {
    for (let task = nextTask(); task; task = nextTask()) onDone(await threads().run(task), task);
  };
  await Promise.all(Array.from({ length: lanes }, lane));
}

/** Ends the threads; the next search starts new ones. */
export async function closePool(): Promise<void> {
  await pool?.destroy();
  pool = null;
}
