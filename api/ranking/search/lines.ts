import type { LineCircuit } from "#shared/bias/circuits/line";
import type { Problem } from "../problem";

/** What the resistors of one line come to, ohms; see `Network`. */
export type Line = {
  gateSlope: number;
  total: number;
  slope: number;
  output: number;
  degeneration: number;
};

/** The resistors of a line, ohms; those that a circuit doesn't have are 0. */
export type Triple = readonly [number, number, number];

/** How a problem's lines come out of their resistors, as numbers to multiply with. */
export class Lines {
  readonly load: number;
  readonly gateB: number;
  readonly gateC: number;
  readonly gateA: number;
  readonly totalB: number;
  readonly totalC: number;
  readonly degenerationB: number;
  readonly degenerationC: number;
  readonly fromSource: boolean;

  constructor(problem: Problem, circuit: LineCircuit) {
    this.load = problem.load ?? Number.POSITIVE_INFINITY;
    [this.gateA, this.gateB, this.gateC] = circuit.gateSlope;
    [, this.totalB, this.totalC] = circuit.total;
    [, this.degenerationB, this.degenerationC] = circuit.degeneration(problem.bypassed);
    this.fromSource = circuit.output === "source";
  }

  /** The a.c. load that the first resistor of a line makes with the load, ohms. */
  outputOf(a: number): number {
    return this.load === Number.POSITIVE_INFINITY ? a : (a * this.load) / (a + this.load);
  }

  /** Works out one line into a record at hand. */
  fill(into: Line, a: number, b: number, c: number): Line {
    const output = this.outputOf(a);
    const inSource = this.degenerationB * b + this.degenerationC * c;
    into.gateSlope = this.gateA * a + this.gateB * b + this.gateC * c;
    into.total = a + this.totalB * b + this.totalC * c;
    into.output = output;
    into.degeneration = this.fromSource ? output : inSource;
    into.slope = this.fromSource ? output : output + inSource;
    return into;
  }
}

/** An empty line to fill. */
export function emptyLine(): Line {
  return { gateSlope: 0.5, total: 0.5, slope: 0.5, output: 0.5, degeneration: 0.5 };
}
