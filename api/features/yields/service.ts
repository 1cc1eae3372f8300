import { conditionsOf } from "#shared/bias/builds/conditions";
import { boxOf } from "#shared/bias/spread";
import { stageValues } from "#shared/bias/stage-sheet";
import type { Simulation } from "#shared/bias/yield";
import type { Brief } from "#shared/schemas/brief";
import { type Resistors, resistorIssues } from "#shared/schemas/circuit";
import type { Part } from "#shared/schemas/part";
import type {
  FitYieldsRequest,
  FitYieldsResponse,
  StageYieldRequest,
  StageYieldResponse,
} from "#shared/schemas/yield";
import type { SignedInContext } from "../../http/context";
import { invalid } from "../../http/problem";
import { simulateStages } from "../../simulation/pool";
import { resistorSupply } from "../orderables/service";
import { getPart } from "../parts/service";
import { getStage } from "../stages/service";

/**
 * The yield of some fits of a brief, in their order.
 *
 * @throws not found for a part that the team may not see; the signal's reason when called off
 */
export async function yieldOfFits(
  context: SignedInContext,
  { brief, fits, builds, seed }: FitYieldsRequest,
  signal: AbortSignal,
): Promise<FitYieldsResponse> {
  const ids = [...new Set(fits.map(({ partId }) => partId))];
  const [supply, ...parts] = await Promise.all([
    resistorSupply(context, brief),
    ...ids.map((id) => getPart(context, id)),
  ]);
  const partOf = new Map(parts.map((part) => [part.id, part]));
  const simulations = fits.flatMap(({ partId, resistors }) => {
    const part = partOf.get(partId);
    return part ? [simulationOf(part, brief, resistors, supply.rating, builds, seed)] : [];
  });
  const outcomes = await simulateStages(simulations, { signal });
  return { yields: outcomes.map((outcome) => outcome.yield) };
}

/**
 * The yield of a kept stage, with its own resistors or with others, and the parameter that costs the most of it.
 *
 * @throws not found for a stage that the team doesn't have; a 422 problem for resistors that are not those of its
 *   circuit; the signal's reason when called off
 */
export async function yieldOfStage(
  context: SignedInContext,
  id: number,
  { resistors, builds, seed }: StageYieldRequest,
  signal: AbortSignal,
): Promise<StageYieldResponse> {
  const stage = await getStage(context, id);
  const { part, brief } = stage;
  const tried = resistors ?? stage.resistors;
  const issues = resistorIssues(brief.circuit, tried).map(({ key, message }) => ({
    path: `resistors.${key}`,
    message,
  }));
  if (issues.length > 0) throw invalid(issues);
  const { rating } = await resistorSupply(context, brief);
  const simulation = simulationOf(part, brief, tried, rating, builds, seed);
  const [outcome] = await simulateStages([simulation], { findCostliest: true, signal });
  return outcome;
}

/** @param rating what a resistor's largest size may dissipate, W */
function simulationOf(
  part: Part,
  brief: Brief,
  resistors: Resistors,
  rating: number,
  builds: number,
  seed: number,
): Simulation {
  return {
    box: boxOf(part, brief, stageValues(brief, resistors)),
    conditions: conditionsOf(part, brief, rating),
    readings: null,
    builds,
    seed,
  };
}
