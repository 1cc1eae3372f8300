import type { LineCircuit } from "#shared/bias/circuits/line";
import { circuitOf } from "#shared/bias/circuits/registry";
import type { CircuitName } from "#shared/schemas/circuit";
import type { Problem } from "../problem";

/**
 * One corner of the values around a device, without the device: which way the rails and the resistors of a line lie.
 * The gate's resistors lie so that they pull toward the side the corner is for.
 */
export type LineEnd = {
  /** What falls across the line, V. */
  supply: number;
  /** What the gate's resistors divide, V. */
  gateSupply: number;
  /** Factors on the resistors of the line. */
  scale: readonly [number, number, number];
};

/** The corners of a problem's box that can hold the least room, by side; VT and K come with each part. */
export type SpreadEnds = { cutoff: LineEnd[]; ohmic: LineEnd[] };

/** Turns what a circuit has proved about its worst builds into corners of a problem. */
export function spreadEnds(problem: Problem, name: CircuitName, { axes }: LineCircuit): SpreadEnds {
  const { worst } = circuitOf(name);
  const side = ({ fixed, either }: typeof worst.cutoff): LineEnd[] => {
    const open = [...axes, "rail" as const, "negativeRail" as const].filter((value) =>
      either.includes(value),
    );
    return Array.from({ length: 1 << open.length }, (_, bits) => {
      const end = (value: (typeof open)[number]) => {
        const at = open.indexOf(value);
        if (at >= 0) return bits & (1 << at) ? 1 : -1;
        return fixed[value] ?? 0;
      };
      const vdd = problem.vdd * (1 + end("rail") * problem.railTolerance);
      const vss = problem.vss * (1 + end("negativeRail") * problem.railTolerance);
      const scale = (axis: number) =>
        axis < axes.length ? 1 + end(axes[axis]) * problem.resistorTolerance : 1;
      return {
        supply: vdd + vss,
        gateSupply: problem.vss > 0 ? vss : vdd,
        scale: [scale(0), scale(1), scale(2)],
      };
    });
  };
  return { cutoff: side(worst.cutoff), ohmic: side(worst.ohmic) };
}

/** Of the corners toward the ohmic region those that mostly bind, at both ends of the rail: RD high, RS low. */
export function likeliest(ends: readonly LineEnd[]): LineEnd[] {
  const lean = ({ scale }: LineEnd) => scale[0] - scale[1] - scale[2];
  const most = Math.max(...ends.map(lean));
  return ends.filter((end) => lean(end) === most);
}
