import { z } from "zod";
import type { Brief } from "#shared/schemas/brief";
import { ohms, sourceOhms } from "#shared/schemas/quantity";
import { readBriefParameter, writeBriefParameter } from "./brief-link";

/** A fit that is looked at before it is kept: everything its sheet needs, in the address. */
const fitSchema = z.object({
  part: z.coerce.number().int().positive(),
  r1: z.coerce.number().pipe(ohms),
  r2: z.coerce.number().pipe(ohms),
  rd: z.coerce.number().pipe(ohms),
  rs: z.coerce.number().pipe(sourceOhms),
  brief: z.coerce.number().int().positive().optional(),
  fit: z.coerce.number().int().positive().optional(),
});

export type LinkedFit = {
  partId: number;
  resistors: { r1: number; r2: number; rd: number; rs: number };
  brief: Brief;
  /** The saved brief it was ranked for, when there is one. */
  briefId: number | null;
  /** Its place in the ranking. */
  place: number | null;
};

export function stageLink({ partId, resistors, brief, briefId, place }: LinkedFit): string {
  const search = new URLSearchParams({ part: String(partId) });
  for (const [name, value] of Object.entries(resistors)) search.set(name, String(value));
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
  return { partId: part, resistors, brief, briefId, place: fit };
}
