import { z } from "zod";
import { buildsSchema, seedSchema, yieldSchema } from "./bias";
import { briefSchema } from "./brief";
import { resistorIssues, resistorsSchema } from "./circuit";

/** What may be held at its typical or nominal value while the rest differs from build to build. */
export const BUILD_PARAMETERS = ["vt", "k", "rail", "resistors", "ambient"] as const;

const MOST_BUILDS = 200_000;
const builds = buildsSchema.max(MOST_BUILDS, "At most 200,000 builds");

export const fitYieldsRequestSchema = z
  .strictObject({
    brief: briefSchema,
    fits: z
      .array(z.strictObject({ partId: z.int().positive(), resistors: resistorsSchema }))
      .min(1, "Name at least one fit")
      .max(100, "At most 100 fits at a time"),
    builds: builds.default(10_000),
    seed: seedSchema.default(1),
  })
  .superRefine(({ brief, fits }, context) => {
    fits.forEach(({ resistors }, at) => {
      for (const { key, message } of resistorIssues(brief.circuit, resistors)) {
        context.addIssue({ code: "custom", path: ["fits", at, "resistors", key], message });
      }
    });
  });

export const fitYieldsResponseSchema = z.object({
  /** In the order of the fits asked for. */
  yields: z.array(yieldSchema),
});

export const stageYieldRequestSchema = z.strictObject({
  /** Values to try in place of the stage's own. */
  resistors: resistorsSchema.optional(),
  builds: builds.default(10_000),
  seed: seedSchema.default(1),
});

/** The parameter whose spread costs the most yield, and the yield with it held at its typical or nominal value. */
export const costliestParameterSchema = z.object({
  parameter: z.enum(BUILD_PARAMETERS),
  fraction: z.number(),
});

export const stageYieldResponseSchema = z.object({
  yield: yieldSchema,
  /** Null where holding one parameter raises nothing. */
  costliest: costliestParameterSchema.nullable(),
});

export type BuildParameter = (typeof BUILD_PARAMETERS)[number];
export type CostliestParameter = z.infer<typeof costliestParameterSchema>;
export type FitYieldsRequest = z.infer<typeof fitYieldsRequestSchema>;
export type FitYieldsResponse = z.infer<typeof fitYieldsResponseSchema>;
export type StageYieldRequest = z.infer<typeof stageYieldRequestSchema>;
export type StageYieldResponse = z.infer<typeof stageYieldResponseSchema>;
