import { z } from "zod";
import type { Brief } from "#shared/schemas/brief";
import { RESISTOR_KEYS, type Resistors, resistorIssues, resistorsSchema } from "#shared/schemas/circuit";
import { readBriefParameter, writeBriefParameter } from "./brief-link";

/** A resistor as an address writes it; those that the circuit doesn't have are left out. */
const resistor = z.coerce.number().default(0).pipe(resistorsSchema.shape.r1.unwrap());

/** A fit that is looked at before it is kept: everything its sheet needs, in the address. */
const fitSchema = z.object({
  part: z.coerce.number().int().positive(),
  r1: resistor,
  r2: resistor,
  rg: resistor,
  rd: resistor,
  rs: resistor,
  rs2: resistor,
  brief: z.coerce.number().int().positive().optional(),
  fit: z.coerce.number().int().positive().optional(),
});

export type LinkedFit = {
  partId: number;
  resistors: Resistors;
  brief: Brief;
  /** The saved brief it was ranked for, when there is one. */
  briefId: number | null;
  /** Its place in the ranking. */
  place: number | null;
};

export function stageLink({ partId, resistors, brief, briefId, place }: LinkedFit): string {
  const search = new URLSearchParams({ part: String(partId) });
  for (const name of RESISTOR_KEYS) if (resistors[name] > 0) search.set(name, String(resistors[name]));
  if (briefId !== null) search.set("brief", String(briefId));
  if (place !== null) search.set("fit", String(place));
  const written = writeBriefParameter(brief);
  if (written) search.set("b", written);
  return `/stages/new?${search}`;
}

/** Reads such an address; null when it doesn't hold a fit. */
export function readStageLink(search: URLSearchParams): LinkedFit | null {
  const parsed = fitSchema.safeParse(Object.fromEntries(search));
  const brief = readBriefParameter(search.get("b"));
  if (!parsed.success || !brief) return null;
  const { part, brief: briefId = null, fit = null, ...resistors } = parsed.data;
  if (resistorIssues(brief.circuit, resistors).length > 0) return null;
  return { partId: part, resistors, brief, briefId, place: fit };
}
