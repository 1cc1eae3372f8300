import type { PassedOverReason } from "#shared/schemas/fits";
import type { Catalog } from "./catalog";
import type { Problem } from "./problem";
import { createSearch, type Search } from "./search/create-search";
import { BestCandidates, type Candidate, PartBest } from "./search/order";

/** Some catalog rows for one thread. */
export type RankingTask = {
  /** The same for every task of one search, so that a thread prepares it once. */
  searchId: string;
  problem: Problem;
  catalog: Catalog;
  /** The rows, in the order in which to search them. */
  rows: Int32Array;
  /** `each`: the best fit of every part. `top`: the best of all combinations of these parts together. */
  mode: "each" | "top";
  /** How many places the answer has. */
  limit: number;
  /** A candidate known to be in the answer, or to take its last place: whatever comes after it is of no interest. */
  bar: Candidate | null;
  /** Element 0 becomes 1 when the search is called off. */
  cancelled: Int32Array;
  /** Milliseconds since the epoch after which no further part is begun. */
  deadline: number;
};

export type RankingOutcome = {
  /** The best there is, best first; in mode `each` at most one of each part, and none that comes after the bar. */
  candidates: Candidate[];
  /** In mode `each`: how many of the parts have a fit, and why each of the others has none. */
  partsThatFit: number;
  passedOver: { row: number; reason: PassedOverReason }[];
  /** How many of the rows were searched. */
  done: number;
};

/** The clock is dear beside a block of lines, so it is not read for each. */
const ASKED_PER_LOOK_AT_CLOCK = 256;
let prepared: { searchId: string; search: Search } | null = null;

/** Searches some parts: what a thread of the pool does. */
export default function searchParts(task: RankingTask): RankingOutcome {
  const search = prepare(task);
  const top = new BestCandidates(task.limit, task.bar);
  const outcome: RankingOutcome = { candidates: [], partsThatFit: 0, passedOver: [], done: 0 };
  for (const row of task.rows) {
    const best = task.mode === "top" ? top : new PartBest(top.threshold);
    const reason = search.part(task.catalog, row, best);
    if (reason === null) break;
    outcome.done++;
    if (!(best instanceof PartBest)) continue;
    if (best.found) {
      outcome.partsThatFit++;
      top.add(best.found);
    } else {
      outcome.passedOver.push({ row, reason });
    }
  }
  outcome.candidates = top.sorted();
  return outcome;
}

function prepare({ searchId, problem, cancelled, deadline }: RankingTask): Search {
  if (prepared?.searchId === searchId) return prepared.search;
  let asked = 0;
  const shouldStop = () =>
    Atomics.load(cancelled, 0) === 1 || (++asked % ASKED_PER_LOOK_AT_CLOCK === 0 && Date.now() > deadline);
  prepared = { searchId, search: createSearch(problem, shouldStop) };
  return prepared.search;
}
