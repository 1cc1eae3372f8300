import { LINE_CIRCUITS } from "#shared/bias/circuits/lines";
import type { CircuitName, Resistors } from "#shared/schemas/circuit";
import type { Catalog } from "../catalog";
import type { Problem } from "../problem";
import type { Condition } from "./conditions";
import { FeedbackSearch } from "./feedback-search";
import { LineSearch } from "./line-search";
import type { Best, Candidate } from "./order";
import { buildRatioTable, type RatioTable, singleRatioTable } from "./ratio-table";

/** The exact search of one brief, part by part. */
export type Search = {
  /**
   * Adds a part's combinations to the list of the best, as far as they can enter it.
   *
   * @returns why the part has no fit, only meaningful when nothing was added; null when the search was stopped and
   * the part is not done
   */
  part: (catalog: Catalog, row: number, best: Best) => Condition | null;
};

/** The resistors of a candidate by name. */
export function resistorsOfCandidate(circuit: CircuitName, candidate: Candidate): Resistors {
  const resistors: Resistors = { r1: 0, r2: 0, rg: 0, rd: 0, rs: 0, rs2: 0 };
  if (circuit === "drain-feedback") {
    const { first: r2, second: rg, a: rd, b: rs } = candidate;
    return { ...resistors, r2, rg, rd, rs };
  }
  const { gate, axes } = LINE_CIRCUITS[circuit];
  const [last] = gate.slice(-1);
  if (gate.length === 2) resistors.r1 = candidate.first;
  resistors[last] = candidate.second;
  axes.forEach((key, axis) => {
    resistors[key] = [candidate.a, candidate.b, candidate.c][axis];
  });
  return resistors;
}

const KEPT_TABLES = 8;
const tables = new Map<string, RatioTable>();

/** Prepares the search of a problem's circuit. */
export function createSearch(problem: Problem, shouldStop?: () => boolean): Search {
  if (problem.circuit === "drain-feedback") return new FeedbackSearch(problem, shouldStop);
  const { gate } = LINE_CIRCUITS[problem.circuit];
  const table = gate.length === 1 ? singleRatioTable(problem.values.rg) : ratioTableOf(problem.values.r1);
  return new LineSearch(problem, table, shouldStop);
}

/** Tables are kept, as sorting the ratios of a fine series takes as long as a search. */
function ratioTableOf(values: readonly number[]): RatioTable {
  const key = values.join(" ");
  let table = tables.get(key);
  if (!table) {
    table = buildRatioTable(values);
    if (tables.size >= KEPT_TABLES) tables.delete(tables.keys().next().value as string);
    tables.set(key, table);
  }
  return table;
}
