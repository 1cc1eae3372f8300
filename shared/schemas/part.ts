import { z } from "zod";
import { mounting, polarity } from "./quantity";

export const LIFECYCLES = ["active", "not-recommended", "last-time-buy", "obsolete"] as const;

/** What one piece costs from a quantity up; money in integer cents. */
export const priceBreakSchema = z.object({
  quantity: z.int().positive(),
  unitPrice: z.int().nonnegative(),
});

/** A MOSFET in the catalog, shared by all teams or the team's own. SI units; P-channel figures are magnitudes. */
export const partSchema = z.object({
  id: z.int().positive(),
  partNumber: z.string(),
  maker: z.string(),
  polarity,
  package: z.string(),
  mounting,
  vtMin: z.number(),
  vtTyp: z.number(),
  vtMax: z.number(),
  kMin: z.number(),
  kTyp: z.number(),
  kMax: z.number(),
  lambda: z.number(),
  tcVt: z.number(),
  ciss: z.number(),
  coss: z.number(),
  crss: z.number(),
  vdss: z.number(),
  vgss: z.number(),
  idMax: z.number(),
  pd25: z.number(),
  rthJa: z.number(),
  tjMax: z.number(),
  lifecycle: z.enum(LIFECYCLES),
  stock: z.int(),
  leadTimeWeeks: z.int(),
  priceBreaks: z.array(priceBreakSchema),
});

export const listPartsQuery = z.strictObject({
  cursor: z.string().max(200).optional(),
  limit: z.coerce.number().int().min(1, "At least one").max(200, "At most 200 at a time").default(50),
  polarity: polarity.optional(),
  package: z.string().max(40).optional(),
  q: z.string().max(100).optional(),
});

export const partPageSchema = z.object({
  items: z.array(partSchema),
  nextCursor: z.string().nullable(),
});

export type Part = z.infer<typeof partSchema>;
export type PriceBreak = z.infer<typeof priceBreakSchema>;
export type ListPartsQuery = z.infer<typeof listPartsQuery>;
export type PartPage = z.infer<typeof partPageSchema>;
