import { randomUUID } from "node:crypto";
import type { Brief } from "#shared/schemas/brief";
import type { FitsRequest, PassedOverReason } from "#shared/schemas/fits";
import type { Part } from "#shared/schemas/part";
import { buildCatalog, compareParts } from "./catalog";
import { barredBy } from "./filters";
import { runTasks, THREADS } from "./pool";
import { combinationsPerPart, compileProblem, type Problem, type ResistorSupply } from "./problem";
import { type Candidate, compareCandidates } from "./search/order";
import type { RankingTask } from "./worker";

/** What a search may be told while it runs. */
export type RankingControl = {
  /** Calls the search off; it then throws the signal's reason. */
  signal?: AbortSignal;
  /** Milliseconds since the epoch after which no further part is begun. */
  deadline: number;
  onProgress?: (progress: { partsDone: number; partsTotal: number }) => void;
};

/** The ranking before it is dressed for the answer. */
export type Ranking = {
  /** Parts in rank order; a candidate's `row` is an index into it. */
  parts: Part[];
  candidates: Candidate[];
  considered: number;
  partsThatFit: number;
  complete: boolean;
  passedOver: Map<PassedOverReason, number>;
};

/** Tasks a thread: enough for progress and for cancelling soon, few enough that the passing costs nothing. */
const TASKS_PER_THREAD = 12;
const MOST_PARTS_A_TASK = 64;

/**
 * Ranks every part × resistor combination of a brief, exactly, on the worker threads.
 *
 * @throws the signal's reason when called off
 */
export async function rankParts(
  request: Pick<FitsRequest, "distinct" | "limit"> & { brief: Brief },
  parts: readonly Part[],
  supply: ResistorSupply,
  control: RankingControl,
): Promise<Ranking> {
  const passedOver = new Map<PassedOverReason, number>();
  const count = (reason: PassedOverReason) => passedOver.set(reason, (passedOver.get(reason) ?? 0) + 1);
  const eligible: Part[] = [];
  for (const part of parts) {
    const reason = barredBy(part, request.brief);
    if (reason) count(reason);
    else eligible.push(part);
  }
  eligible.sort(compareParts);
  const problem = compileProblem(request.brief, supply);
  const considered = eligible.length * combinationsPerPart(problem);
  if (considered === 0) {
    for (const _ of eligible) count("resistor-values");
    return { parts: eligible, candidates: [], considered, partsThatFit: 0, complete: true, passedOver };
  }
  const search = startSearch(problem, eligible, control);
  const best = await search.run({ mode: "each", limit: 1, bar: null, rows: eligible.length });
  for (const { reason } of best.passedOver) count(reason);
  const bests = best.candidates.sort(compareCandidates);
  const ranking = { parts: eligible, considered, partsThatFit: bests.length, passedOver };
  if (request.distinct === "part" || bests.length === 0) {
    return { ...ranking, candidates: bests.slice(0, request.limit), complete: best.complete };
  }
  // Each part's best is in the list or nothing of the part is; the worst of the first so many is a bar for the rest.
  const bar = bests.length >= request.limit ? bests[request.limit - 1] : null;
  const top = await search.run({ mode: "top", limit: request.limit, bar, rows: eligible.length });
  const candidates = top.candidates.sort(compareCandidates).slice(0, request.limit);
  return { ...ranking, candidates, complete: best.complete && top.complete };
}

type Pass = Pick<RankingTask, "mode" | "limit" | "bar"> & { rows: number };

/** Prepares a search whose passes share one catalog in memory and one way to call them off. */
function startSearch(problem: Problem, parts: Part[], control: RankingControl) {
  const shared = {
    searchId: randomUUID(),
    problem,
    catalog: buildCatalog(parts),
    cancelled: new Int32Array(new SharedArrayBuffer(4)),
    deadline: control.deadline,
  };
  const run = async ({ rows, ...pass }: Pass) => {
    control.signal?.throwIfAborted();
    const size = Math.min(MOST_PARTS_A_TASK, Math.max(1, Math.ceil(rows / (THREADS * TASKS_PER_THREAD))));
    const tasks: RankingTask[] = [];
    for (let from = 0; from < rows; from += size) {
      tasks.push({ ...shared, ...pass, from, to: Math.min(rows, from + size) });
    }
    const candidates: Candidate[] = [];
    const passedOver: { row: number; reason: PassedOverReason }[] = [];
    let complete = true;
    let partsDone = 0;
    control.onProgress?.({ partsDone, partsTotal: rows });
    const callOff = () => Atomics.store(shared.cancelled, 0, 1);
    control.signal?.addEventListener("abort", callOff, { once: true });
    try {
      await runTasks(tasks, (outcome, task) => {
        candidates.push(...outcome.candidates);
        passedOver.push(...outcome.passedOver);
        if (outcome.searchedTo < task.to) complete = false;
        partsDone += outcome.searchedTo - task.from;
        control.onProgress?.({ partsDone, partsTotal: rows });
      });
    } finally {
      control.signal?.removeEventListener("abort", callOff);
    }
    control.signal?.throwIfAborted();
    return { candidates, passedOver, complete };
  };
  return { run };
}
