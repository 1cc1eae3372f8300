import { circuitOf } from "#shared/bias/circuits/registry";
import type { Brief } from "#shared/schemas/brief";
import { type CircuitName, type ResistorKey, resistorsOf } from "#shared/schemas/circuit";

const list = new Intl.ListFormat("en");

/** A circuit's title as it reads inside a sentence: four-resistor common source. */
export function circuitInWords(circuit: CircuitName): string {
  const { title } = circuitOf(circuit);
  return title.charAt(0).toLowerCase() + title.slice(1);
}

/** Resistors as the circuit's drawing names them: R1 and R2. */
export function resistorsInWords(resistors: readonly ResistorKey[]): string {
  return list.format(resistors.map((name) => name.toUpperCase()));
}

export type RangeName = "divider" | "drain" | "source";

/** The brief's ranges of values that its circuit draws on, each with the resistors that it serves. */
export function rangesOf({
  circuit,
  sourceResistor,
}: Pick<Brief, "circuit" | "sourceResistor">): { range: RangeName; resistors: ResistorKey[] }[] {
  const { ranges } = circuitOf(circuit);
  const present = resistorsOf(circuit).filter((name) => name !== "rs" || sourceResistor !== "none");
  return (["divider", "drain", "source"] as const)
    .map((range) => ({ range, resistors: present.filter((name) => ranges[name] === range) }))
    .filter(({ resistors }) => resistors.length > 0);
}

/** The resistors between source and ground, whose drop a brief may limit: RS, or RS and RS2. */
export function sourceInWords(brief: Pick<Brief, "circuit" | "sourceResistor">): string {
  const source = rangesOf(brief).find(({ range }) => range === "source");
  return resistorsInWords(source?.resistors ?? ["rs"]);
}
