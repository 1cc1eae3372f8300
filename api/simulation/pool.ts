import { availableParallelism } from "node:os";
import { Piscina } from "piscina";
import type { Simulation } from "#shared/bias/yield";
import type { SimulationOutcome, SimulationTask } from "./worker";

/** Threads that simulate, one a core. */
const THREADS = availableParallelism();

// Built, everything sits in one file beside simulation/; from source, the worker is a sibling that needs a loader.
const fromSource = import.meta.url.endsWith(".ts");

let pool: Piscina<SimulationTask, SimulationOutcome> | null = null;

function threads(): Piscina<SimulationTask, SimulationOutcome> {
  pool ??= new Piscina({
    filename: new URL(fromSource ? "./worker.ts" : "./simulation/worker.js", import.meta.url).href,
    minThreads: 1,
    maxThreads: THREADS,
    idleTimeout: 60_000,
    ...(fromSource ? { execArgv: ["--import", "tsx"] } : {}),
  });
  return pool;
}

/**
 * Simulates the builds of some stages on the threads, as many stages at a time as there are threads: requests that
 * come meanwhile get every other turn, instead of waiting behind all of this one.
 *
 * @param signal calls the simulation off
 * @returns in the order of the simulations
 * @throws the signal's reason when called off
 */
export async function simulateStages(
  simulations: readonly Simulation[],
  { findCostliest = false, signal }: { findCostliest?: boolean; signal: AbortSignal },
): Promise<SimulationOutcome[]> {
  signal.throwIfAborted();
  const cancelled = new Int32Array(new SharedArrayBuffer(4));
  const callOff = () => Atomics.store(cancelled, 0, 1);
  signal.addEventListener("abort", callOff, { once: true });
  const outcomes: SimulationOutcome[] = [];
  let next = 0;
  const lane = async () => {
    while (next < simulations.length && !signal.aborted) {
      const at = next++;
      outcomes[at] = await threads().run({ simulation: simulations[at], findCostliest, cancelled });
    }
  };
  try {
    await Promise.all(Array.from({ length: THREADS }, lane));
  } finally {
    signal.removeEventListener("abort", callOff);
  }
  signal.throwIfAborted();
  return outcomes;
}

/** Ends the threads; the next simulation starts new ones. */
export async function closeSimulation(): Promise<void> {
  await pool?.destroy();
  pool = null;
}
