import type { Part } from "#shared/schemas/part";
import type { Random } from "../support/random";
import { plainDevice } from "./cases";
import { runPlainAssured } from "./plain-assured";
import { runPlainCentred } from "./plain-centred";
import { nothingYet, type PlainProblem, type PlainUnit } from "./plain-stage";

export type LoopObjective = "centred" | "assured";

/** How a loop treats a combination whose box has a corner without room: solve the rest of its corners or leave it. */
export type Corners = "all" | "until-none";

/** A plain loop over some parts that can be run piece by piece, as the middle of a loop over everything would run. */
export class PlainLoop {
  readonly #objective: LoopObjective;
  readonly #corners: Corners;
  readonly #problem: PlainProblem;
  readonly #devices;
  readonly bests;

  constructor(objective: LoopObjective, corners: Corners, problem: PlainProblem, parts: readonly Part[]) {
    this.#objective = objective;
    this.#corners = corners;
    this.#problem = problem;
    this.#devices = parts.map(plainDevice);
    this.bests = parts.map(nothingYet);
  }

  /** @returns how many combinations were solved */
  run(units: readonly PlainUnit[]): number {
    return this.#objective === "centred"
      ? runPlainCentred(this.#problem, this.#devices, units, this.bests)
      : runPlainAssured(this.#problem, this.#devices, units, this.bests, this.#corners === "until-none");
  }

  /** @returns combinations per second over some units */
  rate(units: readonly PlainUnit[]): number {
    const started = performance.now();
    const solved = this.run(units);
    return solved / ((performance.now() - started) / 1000);
  }
}

/** Every unit of a problem, in the order of a loop over everything. */
export function allUnits({ divider }: PlainProblem, parts: number): PlainUnit[] {
  const devices = Array.from({ length: parts }, (_, device) => device);
  return devices.flatMap((device) => divider.flatMap((r1) => divider.map((r2) => ({ device, r1, r2 }))));
}

/** Units of a problem drawn at random, about as many combinations as asked and the same number of each part. */
export function drawUnits(
  random: Random,
  { divider, drain, source }: PlainProblem,
  parts: number,
  combinations: number,
): PlainUnit[] {
  const each = Math.ceil(combinations / (parts * drain.length * source.length));
  const devices = Array.from({ length: parts }, (_, device) => device);
  return devices.flatMap((device) =>
    Array.from({ length: each }, () => ({ device, r1: random.pick(divider), r2: random.pick(divider) })),
  );
}
