import { costliestParameter, type Simulation, simulateBuilds } from "#shared/bias/yield";
import type { Yield } from "#shared/schemas/bias";
import type { CostliestParameter } from "#shared/schemas/yield";

/** One stage to simulate. */
export type SimulationTask = {
  simulation: Simulation;
  /** Whether to find the parameter that costs the most, which takes up to five simulations more. */
  findCostliest: boolean;
  /** Element 0 becomes 1 when the simulation is called off. */
  cancelled: Int32Array;
};

export type SimulationOutcome = { yield: Yield; costliest: CostliestParameter | null };

/** Simulates the builds of one stage: what a thread of the pool does. */
export default function simulateStage({
  simulation,
  findCostliest,
  cancelled,
}: SimulationTask): SimulationOutcome {
  const shouldStop = () => Atomics.load(cancelled, 0) === 1;
  const found = simulateBuilds(simulation, null, shouldStop);
  const costliest = findCostliest ? costliestParameter(simulation, found.fraction, shouldStop) : null;
  return { yield: found, costliest };
}
