import type { Fit, FitsRequest, FitsResponse } from "#shared/schemas/fits";
import type { Database } from "../../db/client";
import type { SignedInContext } from "../../http/context";
import { rankFits } from "../../ranking/rank-fits";
import type { RankingControl } from "../../ranking/rank-parts";
import { catalogVersion } from "../catalog/service";
import { resistorSupply } from "../orderables/service";
import { usableParts } from "../parts/service";
import { Answers } from "./answers";

const answersOf = new WeakMap<Database, Answers>();

/**
 * Ranks the fits of a brief over the parts that the actor's team may use. The same brief is answered from memory as
 * long as nothing in the catalog has changed.
 */
export async function findFits(
  context: SignedInContext,
  request: FitsRequest,
  control: Pick<RankingControl, "signal" | "onProgress"> & { onFits?: (fits: Fit[]) => void },
): Promise<FitsResponse> {
  const answers = answersOf.get(context.db) ?? new Answers();
  answersOf.set(context.db, answers);
  const version = await catalogVersion(context);
  // The schema has put the fields in one order, so equal requests are equal text.
  const key = JSON.stringify([context.actor.team.id, version, request]);
  const known = answers.get(key);
  if (known) return known;
  const [parts, supply] = await Promise.all([usableParts(context), resistorSupply(context, request.brief)]);
  const answer = await rankFits(request, parts, supply, control);
  answers.keep(key, answer);
  return answer;
}
