import { z } from "zod";

export const CAUTION_CODES = [
  "high-rail",
  "hot-surface",
  "electrostatic",
  "linear-mode",
  "capacitor-voltage",
  "low-overdrive",
  "gate-voltage",
  "drain-current",
  "lifecycle",
  "verify-on-bench",
] as const;

/** A safety or judgement note computed from a stage; it says its own figure and can't be hidden. */
export const cautionSchema = z.object({ code: z.enum(CAUTION_CODES), message: z.string() });

export type CautionCode = (typeof CAUTION_CODES)[number];
export type Caution = z.infer<typeof cautionSchema>;
