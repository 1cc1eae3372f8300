import type { LineCircuit } from "#shared/bias/circuits/line";
import { lineCentsFor } from "../cost";
import type { Problem } from "../problem";
import type { Triple } from "./lines";

/** What the combinations of one problem cost, part by part; nothing at all where the cost is no objective. */
export class Prices {
  readonly #problem: Problem;
  readonly #axes: number;
  readonly #leastResistors: number;
  #part = 0;

  constructor(problem: Problem, { axes, gate }: LineCircuit) {
    this.#problem = problem;
    this.#axes = axes.length;
    const leastOf = (values: readonly number[]) =>
      Math.min(
        ...values.map((ohms) => (ohms === 0 ? 0 : (this.#cheapest(ohms) ?? Number.POSITIVE_INFINITY))),
      );
    const keys = [...gate, ...axes];
    this.#leastResistors =
      problem.objective === "cost" ? keys.reduce((sum, key) => sum + leastOf(problem.values[key]), 0) : 0;
  }

  #cheapest(ohms: number): number | null {
    const sizes = this.#problem.prices.get(ohms);
    return sizes && sizes.length > 0 ? Math.min(...sizes.map(({ lineCents }) => lineCents)) : null;
  }

  /**
   * Takes up a part.
   *
   * @param cents for its transistors; NaN without a price
   * @returns false where the cost is the objective and the part has none
   */
  startPart(cents: number): boolean {
    this.#part = cents;
    return this.#problem.objective !== "cost" || !Number.isNaN(cents);
  }

  /** No combination of the part costs less, integer cents. */
  get least(): number {
    return this.#part + this.#leastResistors;
  }

  /** Transistors and the resistors of a line at a drain current, integer cents; null where one isn't sold. */
  lineCents(triple: Triple, current: number): number | null {
    let cents = this.#part;
    for (let axis = 0; axis < this.#axes; axis++) {
      const ohms = triple[axis];
      if (ohms === 0) continue;
      const line = this.#cents(ohms, current * ohms);
      if (line === null) return null;
      cents += line;
    }
    return cents;
  }

  /** The resistors at the gate, integer cents; null where one isn't sold. */
  gateCents(first: number, second: number): number | null {
    if (first === 0) return this.#cents(second, 0);
    const low = this.#problem.vdd / (1 + first / second);
    const high = this.#cents(first, this.#problem.vdd - low);
    const bottom = this.#cents(second, low);
    return high === null || bottom === null ? null : high + bottom;
  }

  #cents(ohms: number, volts: number): number | null {
    const { prices, resistorDerating } = this.#problem;
    return lineCentsFor(prices.get(ohms), volts ** 2 / ohms, volts, resistorDerating);
  }
}
