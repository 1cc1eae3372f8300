import type { Brief } from "#shared/schemas/brief";
import type { Part } from "#shared/schemas/part";
import { type Ranking, rankParts } from "../../api/ranking/rank-parts";
import type { LoopObjective } from "./loops";

const SUPPLY = { rating: 1, stocked: null, prices: new Map() };
const LIMIT = 100;
const TIME_LIMIT_MS = 600_000;

/**
 * Ranks the best fit of each part as the product does, the first hundred of them.
 *
 * @throws Error when it doesn't end within ten minutes
 */
export async function rankExactly(
  brief: Brief,
  objective: LoopObjective,
  parts: readonly Part[],
  threads: number,
): Promise<Ranking> {
  const request = { brief, objective, distinct: "part" as const, limit: LIMIT };
  const ranking = await rankParts(request, parts, SUPPLY, { deadline: Date.now() + TIME_LIMIT_MS, threads });
  if (!ranking.complete) throw new Error("The exact search did not end within its time limit.");
  return ranking;
}

/** The same, timed in ms. */
export async function timeExact(...work: Parameters<typeof rankExactly>): Promise<number> {
  const started = performance.now();
  await rankExactly(...work);
  return performance.now() - started;
}
