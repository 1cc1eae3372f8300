import type { PassedOverReason } from "#shared/schemas/fits";
import type { Catalog } from "./catalog";
import type { Problem } from "./problem";
import { BestCandidates, type Candidate } from "./search/order";
import { buildRatioTable, type RatioTable } from "./search/ratio-table";
import { Search } from "./search/search-part";

/** A run of catalog rows for one thread. */
export type RankingTask = {
  /** The same for every task of one search, so that a thread prepares it once. */
  searchId: string;
  problem: Problem;
  catalog: Catalog;
  from: number;
  to: number;
  /** `each`: the best fit of every part. `top`: the best of all combinations of these parts together. */
  mode: "each" | "top";
  limit: number;
  bar: Candidate | null;
  /** Element 0 becomes 1 when the search is called off. */
  cancelled: Int32Array;
  /** Milliseconds since the epoch after which no further part is begun. */
  deadline: number;
};

export type RankingOutcome = {
  candidates: Candidate[];
  /** In mode `each`: why each part that was searched in vain has no fit. */
  passedOver: { row: number; reason: PassedOverReason }[];
  /** Rows from `from` up to here were searched. */
  searchedTo: number;
};

const KEPT_TABLES = 8;
/** The clock is dear beside a block of lines, so it is not read for each. */
const ASKED_PER_LOOK_AT_CLOCK = 256;
const tables = new Map<string, RatioTable>();
let prepared: { searchId: string; search: Search } | null = null;

/** Searches a run of parts: what a thread of the pool does. */
export default function searchParts(task: RankingTask): RankingOutcome {
  const search = prepare(task);
  const top = new BestCandidates(task.limit, task.bar);
  const outcome: RankingOutcome = { candidates: [], passedOver: [], searchedTo: task.to };
  for (let row = task.from; row < task.to; row++) {
    const best = task.mode === "top" ? top : new BestCandidates(1);
    const reason = search.part(task.catalog, row, best);
    if (reason === null) {
      outcome.searchedTo = row;
      break;
    }
    if (task.mode === "top") continue;
    const [candidate] = best.sorted();
    if (candidate) outcome.candidates.push(candidate);
    else outcome.passedOver.push({ row, reason });
  }
  if (task.mode === "top") outcome.candidates = top.sorted();
  return outcome;
}

function prepare({ searchId, problem, cancelled, deadline }: RankingTask): Search {
  if (prepared?.searchId === searchId) return prepared.search;
  const key = problem.divider.join(" ");
  let table = tables.get(key);
  if (!table) {
    table = buildRatioTable(problem.divider);
    if (tables.size >= KEPT_TABLES) tables.delete(tables.keys().next().value as string);
    tables.set(key, table);
  }
  let asked = 0;
  const shouldStop = () =>
    Atomics.load(cancelled, 0) === 1 || (++asked % ASKED_PER_LOOK_AT_CLOCK === 0 && Date.now() > deadline);
  prepared = { searchId, search: new Search(problem, table, shouldStop) };
  return prepared.search;
}
