import { randomUUID } from "node:crypto";
import type { Brief } from "#shared/schemas/brief";
import type { FitsRequest, PassedOverReason } from "#shared/schemas/fits";
import type { Part } from "#shared/schemas/part";
import { buildCatalog, compareParts } from "./catalog";
import { barredBy } from "./filters";
import { runTasks, THREADS } from "./pool";
import { combinationsPerPart, compileProblem, type Problem, type ResistorSupply } from "./problem";
import { promiseOrder } from "./promise-order";
import { BestCandidates, type Candidate } from "./search/order";
import type { RankingOutcome, RankingTask } from "./worker";

/** What a search may be told while it runs. */
export type RankingControl = {
  /** Calls the search off; it then throws the signal's reason. */
  signal?: AbortSignal;
  /** Milliseconds since the epoch after which no further part is begun. */
  deadline: number;
  onProgress?: (progress: { partsDone: number; partsTotal: number }) => void;
  /** Told the best so far as the search goes on; they may still change. */
  onCandidates?: (candidates: Candidate[], parts: Part[]) => void;
  /** How many threads to use; all there are unless told otherwise. */
  threads?: number;
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
const TASKS_PER_THREAD = 8;
const MOST_PARTS_A_TASK = 128;
/** Until the answer's last place is taken there is no bar, so the threads take turns in small tasks to set it soon. */
const PARTS_A_TASK_WITHOUT_BAR = 8;

/**
 * Ranks every part × resistor combination of a brief, exactly, on the worker threads.
 *
 * @throws the signal's reason when called off
 */
export async function rankParts(
  request: Pick<FitsRequest, "distinct" | "limit" | "objective"> & { brief: Brief },
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
  const problem = compileProblem(request.brief, request.objective, supply);
  const considered = eligible.length * combinationsPerPart(problem);
  if (considered === 0) {
    for (const _ of eligible) count("resistor-values");
    return { parts: eligible, candidates: [], considered, partsThatFit: 0, complete: true, passedOver };
  }
  const search = startSearch(problem, eligible, request.brief.buildQuantity, control);
  const order = promiseOrder(problem, eligible, request.brief.buildQuantity);
  const best = await search.run("each", request.limit, null, order);
  for (const reason of best.passedOver) count(reason);
  const ranking = { parts: eligible, considered, partsThatFit: best.partsThatFit, passedOver };
  if (request.distinct === "part" || best.candidates.length === 0) {
    return { ...ranking, candidates: best.candidates, complete: best.complete };
  }
  // A part whose best is not among the first so many has nothing there, and the last of these is a bar for the rest.
  const bar = best.candidates.length === request.limit ? best.candidates[request.limit - 1] : null;
  const rows = Int32Array.from(best.candidates, ({ row }) => row);
  const top = await search.run("top", request.limit, bar, rows);
  return { ...ranking, candidates: top.candidates, complete: best.complete && top.complete };
}

type Pass = Pick<RankingOutcome, "candidates" | "partsThatFit"> & {
  passedOver: PassedOverReason[];
  complete: boolean;
};

/** Prepares a search whose passes share one catalog in memory and one way to call them off. */
function startSearch(problem: Problem, parts: Part[], buildQuantity: number, control: RankingControl) {
  const threads = control.threads ?? THREADS;
  const shared = {
    searchId: randomUUID(),
    problem,
    catalog: buildCatalog(parts, buildQuantity),
    cancelled: new Int32Array(new SharedArrayBuffer(4)),
    deadline: control.deadline,
  };
  const run = async (
    mode: RankingTask["mode"],
    limit: number,
    bar: Candidate | null,
    rows: Int32Array,
  ): Promise<Pass> => {
    control.signal?.throwIfAborted();
    const total = rows.length;
    const size = Math.min(MOST_PARTS_A_TASK, Math.max(1, Math.ceil(total / (threads * TASKS_PER_THREAD))));
    const best = new BestCandidates(limit, bar);
    const pass: Pass = { candidates: [], partsThatFit: 0, passedOver: [], complete: true };
    let next = 0;
    let partsDone = 0;
    control.onProgress?.({ partsDone, partsTotal: total });
    const callOff = () => Atomics.store(shared.cancelled, 0, 1);
    control.signal?.addEventListener("abort", callOff, { once: true });
    // Each task is made when a thread is free, so that it knows the bar that the tasks before it have set.
    const nextTask = (): RankingTask | null => {
      if (next >= total) return null;
      const from = next;
      next = Math.min(total, from + (best.threshold ? size : Math.min(size, PARTS_A_TASK_WITHOUT_BAR)));
      return { ...shared, mode, limit, bar: best.threshold, rows: rows.slice(from, next) };
    };
    try {
      await runTasks(threads, nextTask, (outcome, task) => {
        for (const candidate of outcome.candidates) best.add(candidate);
        pass.partsThatFit += outcome.partsThatFit;
        for (const { reason } of outcome.passedOver) pass.passedOver.push(reason);
        if (outcome.done < task.rows.length) pass.complete = false;
        partsDone += outcome.done;
        control.onProgress?.({ partsDone, partsTotal: total });
        if (partsDone < total) control.onCandidates?.(best.sorted(), parts);
      });
    } finally {
      control.signal?.removeEventListener("abort", callOff);
    }
    control.signal?.throwIfAborted();
    pass.candidates = best.sorted();
    return pass;
  };
  return { run };
}
