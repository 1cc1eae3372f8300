import type { FitsRequest, FitsResponse } from "#shared/schemas/fits";
import type { Database } from "../../db/client";
import type { SignedInContext } from "../../http/context";
import { rankFits } from "../../ranking/rank-fits";
import { catalogVersion } from "../catalog/service";
import { resistorSupply } from "../orderables/service";
import { usableParts } from "../parts/service";
import { Answers } from "./answers";
import { type FitsControl, SharedSearches } from "./shared-searches";

const memories = new WeakMap<Database, { answers: Answers; searches: SharedSearches }>();

/**
 * Ranks the fits of a brief over the parts that the actor's team may use. The same brief is answered from memory as
 * long as nothing in the catalog has changed, and whoever asks for it while it is ranked waits for that ranking.
 *
 * @throws the signal's reason when called off
 */
export async function findFits(
  context: SignedInContext,
  request: FitsRequest,
  control: FitsControl,
): Promise<FitsResponse> {
  const { answers, searches } = memoryOf(context.db);
  const { shared, own } = await catalogVersion(context);
  // The schema has put the fields in one order, so equal requests are equal text.
  const key = JSON.stringify([context.actor.team.id, shared, own, request]);
  const known = answers.get(key);
  if (known) return known;
  return searches.join(key, control, async (all) => {
    const [parts, supply] = await Promise.all([usableParts(context), resistorSupply(context, request.brief)]);
    const answer = await rankFits(request, parts, supply, all);
    answers.keep(key, answer);
    return answer;
  });
}

function memoryOf(db: Database) {
  const memory = memories.get(db) ?? { answers: new Answers(), searches: new SharedSearches() };
  memories.set(db, memory);
  return memory;
}
