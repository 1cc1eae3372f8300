import { SATURATED } from "#shared/bias/builds/conditions";
import { assuredSwing } from "#shared/bias/spread";
import type { SpreadRequest, SpreadResponse } from "#shared/schemas/bias";
import { simulateStages } from "../../simulation/pool";

/**
 * What the spread does to one stage: the swing that every build has, the builds that set it, and the share of
 * simulated builds that conduct and are saturated at their Q-point.
 *
 * @throws the signal's reason when called off
 */
export async function analyseSpread(request: SpreadRequest, signal: AbortSignal): Promise<SpreadResponse> {
  const { builds, seed, ...box } = request;
  const { swing, worst } = assuredSwing(box);
  const simulation = { box, conditions: SATURATED, readings: null, builds, seed };
  const [outcome] = await simulateStages([simulation], { signal });
  return {
    assured: swing,
    corners: [
      { ...worst.cutoff, toward: "cutoff" },
      { ...worst.ohmic, toward: "ohmic" },
    ],
    yield: outcome.yield,
  };
}
