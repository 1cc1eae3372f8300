import { z } from "zod";
import { biasSchema, distortionSchema, swingSchema } from "./bias";
import { briefSchema } from "./brief";
import { cautionSchema } from "./caution";
import { resistorsSchema } from "./circuit";
import { partSchema } from "./part";

export const OBJECTIVES = ["centred", "assured", "cost"] as const;
export const DISTINCTS = ["part", "none"] as const;

export const fitsRequestSchema = z.strictObject({
  brief: briefSchema,
  objective: z.enum(OBJECTIVES, { error: 'Rank by "centred", "assured" or "cost"' }).default("centred"),
  distinct: z.enum(DISTINCTS, { error: 'Distinct is "part" or "none"' }).default("part"),
  limit: z.int().min(1, "At least one").max(20_000, "At most 20,000").default(100),
});

/** Why a part has no fit: the filter or rating that bars it, or the furthest condition any of its combinations reached. */
export const PASSED_OVER_REASONS = [
  "polarity",
  "part-filter",
  "stock",
  "unit-price",
  "rail-rating",
  "swing",
  "assured-swing",
  "supply-current",
  "source-drop",
  "power-rating",
  "resistor-rating",
  "gain",
  "resistor-values",
  "input-resistance",
  "high-corner",
  "distortion",
  "no-price",
] as const;

export const fitPartSchema = partSchema
  .pick({
    id: true,
    partNumber: true,
    maker: true,
    polarity: true,
    package: true,
    mounting: true,
    lifecycle: true,
    stock: true,
  })
  .extend({
    /** Integer cents for one piece at the brief's build quantity; null when the part has no price. */
    unitPrice: z.int().nullable(),
  });

export const fitSchema = z.object({
  part: fitPartSchema,
  /** Ohms; 0 where the circuit has none there. */
  ...z.object(resistorsSchema.shape).shape,
  bias: biasSchema,
  /** Supply current of the whole stage, drain and divider, in amperes. */
  supplyCurrent: z.number(),
  /** −3 dB high corner in hertz; null where nothing limits it. */
  highCorner: z.number().nullable(),
  /** At the brief's output peak; null when the brief states none. */
  distortion: distortionSchema.nullable(),
  /** The least room of any build inside the spread; 0 where one leaves saturation or doesn't conduct. */
  assured: swingSchema,
  /** Integer cents for the transistor and the resistors of the whole build; null where one has no price. */
  cost: z.int().nullable(),
  cautions: z.array(cautionSchema),
});

/** The condition that, alone relaxed, lets the most parts in. */
export const relaxationSchema = z.object({
  condition: z.enum(PASSED_OVER_REASONS),
  /** The brief's field, as a dotted path. */
  path: z.string(),
  /** How many parts have a fit once the condition is dropped. */
  parts: z.int(),
  /** The limit as stated, and the nearest one that gives a fit; null for a condition that isn't a number. */
  stated: z.number().nullable(),
  needed: z.number().nullable(),
  message: z.string(),
});

export const fitsResponseSchema = z.object({
  fits: z.array(fitSchema),
  /** Part × resistor combinations that the answer speaks for. */
  considered: z.number(),
  /** Parts that have at least one fit. */
  partsThatFit: z.int(),
  complete: z.boolean(),
  /**
   * With `complete: false`, the best that an unsearched combination could still have: the least centring error, the
   * greatest assured swing in volts, or the least cost in cents.
   */
  remainingBound: z.number().optional(),
  passedOver: z.array(z.object({ reason: z.enum(PASSED_OVER_REASONS), parts: z.int(), message: z.string() })),
  relax: relaxationSchema.nullable(),
  elapsedMs: z.number(),
});

/**
 * One line of the streamed answer (`Accept: application/x-ndjson`): progress lines, the first rows as they are found
 * (they may still change), then the result.
 */
export const fitsEventSchema = z.union([
  z.object({ progress: z.object({ partsDone: z.int(), partsTotal: z.int() }) }),
  z.object({ fits: z.array(fitSchema) }),
  z.object({ result: fitsResponseSchema }),
]);

export type Objective = (typeof OBJECTIVES)[number];
export type FitsRequest = z.infer<typeof fitsRequestSchema>;
export type Fit = z.infer<typeof fitSchema>;
export type FitsResponse = z.infer<typeof fitsResponseSchema>;
export type FitsEvent = z.infer<typeof fitsEventSchema>;
export type PassedOverReason = (typeof PASSED_OVER_REASONS)[number];
export type Relaxation = z.infer<typeof relaxationSchema>;
