import type { Brief } from "#shared/schemas/brief";
import { type CircuitName, resistorsOf } from "#shared/schemas/circuit";
import { STARTING_BRIEF } from "../../lib/brief-link";
import { rangesOf } from "../../lib/circuit-words";

/** A brief for another circuit: what that circuit doesn't have is dropped, all else stays. */
export function adaptBrief(brief: Brief, circuit: CircuitName): Brief {
  const { negative, ...rail } = brief.rail;
  const mayLackSource = resistorsOf(circuit, "optional").includes("rs");
  const sourceResistor =
    brief.sourceResistor === "none" && !mayLackSource ? "bypassed" : brief.sourceResistor;
  const adapted: Brief = {
    ...brief,
    circuit,
    sourceResistor,
    rail: circuit === "negative-rail" && negative !== undefined ? { ...rail, negative } : rail,
    resistors: { ...brief.resistors },
  };
  const used = rangesOf(adapted).map(({ range }) => range);
  for (const range of ["divider", "drain", "source"] as const) {
    const { min, max } = brief.resistors[range];
    // A range out of sight must not hold the form up.
    if (!used.includes(range) && !(min <= max)) {
      const { series } = brief.resistors[range];
      adapted.resistors[range] = { ...STARTING_BRIEF.resistors[range], series };
    }
  }
  return adapted;
}

/** Whether the form shows a field for such a brief. */
export function isOffered(path: string, brief: Pick<Brief, "circuit" | "sourceResistor">): boolean {
  if (path === "rail.negative") return brief.circuit === "negative-rail";
  const range = path.match(/^resistors\.(divider|drain|source)\./)?.[1];
  return range === undefined || rangesOf(brief).some((offered) => offered.range === range);
}
