import type { FitsRequest, FitsResponse } from "#shared/schemas/fits";
import type { SignedInContext } from "../../http/context";
import { rankFits } from "../../ranking/rank-fits";
import type { RankingControl } from "../../ranking/rank-parts";
import { resistorSupply } from "../orderables/service";
import { usableParts } from "../parts/service";

/** Ranks the fits of a brief over the parts that the actor's team may use. */
export async function findFits(
  context: SignedInContext,
  request: FitsRequest,
  control: Pick<RankingControl, "signal" | "onProgress">,
): Promise<FitsResponse> {
  const [parts, supply] = await Promise.all([usableParts(context), resistorSupply(context, request.brief)]);
  return rankFits(request, parts, supply, control);
}
