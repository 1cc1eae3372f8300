import { spawnSync } from "node:child_process";
import { fileURLToPath } from "node:url";
import { z } from "zod";
import type { Box } from "#shared/bias/spread";
import type { LoopObjective } from "./loops";
import type { PlainDevice, PlainProblem } from "./plain-stage";

const PYTHON = "/usr/bin/python3";
const SCRIPT = fileURLToPath(new URL("./numpy-loops.py", import.meta.url));
/** A run that takes this much longer than it was given is stuck. */
const PATIENCE_SECONDS = 120;

/** One thread, whatever library NumPy does its sums with. */
const ONE_THREAD = Object.fromEntries(
  ["OMP", "OPENBLAS", "MKL", "NUMEXPR", "BLIS"].map((library) => [`${library}_NUM_THREADS`, "1"]),
);

/**
 * Without this the C library hands the memory of every large vector back to the system, and gets it anew page by page:
 * where the system is slow at that, NumPy would be measured at a fraction of what it can do.
 */
const MEMORY_KEPT = {
  MALLOC_TRIM_THRESHOLD_: String(2 ** 32),
  MALLOC_MMAP_THRESHOLD_: String(2 ** 32),
};

export type NumpyTask =
  | {
      task: "search";
      objective: LoopObjective;
      giveUp: boolean;
      problem: PlainProblem;
      devices: readonly PlainDevice[];
      /** Every combination once, for what is found; else pieces at random for so many seconds, for the rate. */
      whole: boolean;
      seconds: number;
      /** About how many combinations a piece has. */
      roundSize: number;
      seed: number;
    }
  | { task: "yield"; box: Box; peak: number; seconds: number; seed: number };

const answerSchema = z.object({
  /** Combinations or builds per second, a round each. */
  rates: z.array(z.number()),
  /** Of each device: centring error in whole per cent (null without a fit, or where it isn't asked), nanovolts. */
  bests: z.array(z.tuple([z.number().nullable(), z.number()])).optional(),
  fraction: z.number().optional(),
  builds: z.number().optional(),
});

/** @returns NumPy's version; null where Debian's Python has none */
export function numpyVersion(): string | null {
  const { status, stdout } = spawnSync(PYTHON, ["-c", "import numpy; print(numpy.__version__)"], {
    encoding: "utf8",
    timeout: 30_000,
  });
  return status === 0 ? stdout.trim() : null;
}

/**
 * Runs one task in NumPy.
 *
 * @param memory `kept`: NumPy at its best; `as it comes`: with the C library's usual settings
 * @throws Error with Python's own words when it fails or takes too long
 */
export function runNumpy(
  task: NumpyTask,
  memory: "kept" | "as it comes" = "kept",
): z.infer<typeof answerSchema> {
  const seconds = task.seconds + PATIENCE_SECONDS;
  const { status, error, stdout, stderr } = spawnSync(PYTHON, [SCRIPT], {
    input: JSON.stringify(task),
    encoding: "utf8",
    env: { ...process.env, ...ONE_THREAD, ...(memory === "kept" ? MEMORY_KEPT : {}) },
    timeout: seconds * 1000,
    maxBuffer: 1 << 26,
  });
  if (error) throw new Error(`NumPy did not end within ${seconds} s.`, { cause: error });
  if (status !== 0) throw new Error(`NumPy failed:\n${stderr.slice(-2000)}`);
  return answerSchema.parse(JSON.parse(stdout));
}
