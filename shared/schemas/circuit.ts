import { z } from "zod";
import { ohms } from "./quantity";

/** A resistor as a stage has it, ohms; 0 where the circuit has none there (or a wire). */
const resistor = z.union([z.literal(0), ohms], { error: "Resistors go from 0.1 Ω to 100 MΩ" }).default(0);

/**
 * Every resistor that some circuit has, in the order of the ranking's ties. `r1` and `r2` divide for the gate, `rg`
 * ties it to ground or to the drain, `rd` stands at the drain, `rs` at the source, and `rs2` is the bypassed lower part of a split
 * source resistor.
 */
export const resistorsSchema = z.strictObject({
  r1: resistor,
  r2: resistor,
  rg: resistor,
  rd: resistor,
  rs: resistor,
  rs2: resistor,
});

export type Resistors = z.infer<typeof resistorsSchema>;
export type ResistorKey = keyof Resistors;

export const RESISTOR_KEYS = Object.keys(resistorsSchema.shape) as ResistorKey[];

/** The circuits that a brief may ask for, each with the resistors it needs and those it may do without. */
export const CIRCUIT_RESISTORS = {
  "four-resistor": { needs: ["r1", "r2", "rd"], optional: ["rs"] },
  "split-source": { needs: ["r1", "r2", "rd", "rs", "rs2"], optional: [] },
  follower: { needs: ["r1", "r2", "rs"], optional: [] },
  "drain-feedback": { needs: ["rg", "rd"], optional: ["r2", "rs"] },
  "negative-rail": { needs: ["rg", "rd", "rs"], optional: [] },
} as const satisfies Record<string, { needs: readonly ResistorKey[]; optional: readonly ResistorKey[] }>;

export type CircuitName = keyof typeof CIRCUIT_RESISTORS;

export const CIRCUITS = Object.keys(CIRCUIT_RESISTORS) as CircuitName[];

export const circuitName = z.enum(CIRCUITS, { error: `A circuit is one of ${CIRCUITS.join(", ")}` });

/** The resistors that a circuit has, or only those it needs or may do without, in the order of the ranking's ties. */
export function resistorsOf(
  circuit: CircuitName,
  which: "all" | "needs" | "optional" = "all",
): ResistorKey[] {
  const { needs, optional }: Record<string, readonly ResistorKey[]> = CIRCUIT_RESISTORS[circuit];
  const wanted = which === "all" ? [...needs, ...optional] : which === "needs" ? needs : optional;
  return RESISTOR_KEYS.filter((key) => wanted.includes(key));
}

/** What is wrong with a circuit's resistors: one that it needs and lacks, or one that it doesn't have. */
export function resistorIssues(
  circuit: CircuitName,
  resistors: Resistors,
): { key: ResistorKey; message: string }[] {
  const needs = resistorsOf(circuit, "needs");
  const has = resistorsOf(circuit);
  return RESISTOR_KEYS.flatMap((key) => {
    const name = key.toUpperCase();
    if (needs.includes(key) && resistors[key] === 0) return { key, message: `This circuit needs ${name}` };
    if (!has.includes(key) && resistors[key] !== 0) return { key, message: `This circuit has no ${name}` };
    return [];
  });
}

/** The resistors of a record that holds them among other things, such as a fit. */
export function pickResistors({ r1, r2, rg, rd, rs, rs2 }: Resistors): Resistors {
  return { r1, r2, rg, rd, rs, rs2 };
}
