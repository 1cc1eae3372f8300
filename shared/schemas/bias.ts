import { z } from "zod";
import { loadOhms, notNegative, ohms, polarity, positive, railVolts, sourceOhms } from "./quantity";

/** A device as the square law sees it; magnitudes for both polarities. */
export const deviceSchema = z.strictObject({
  polarity,
  vt: z.number().min(-50, "Thresholds go from -50 V to 50 V").max(50, "Thresholds go from -50 V to 50 V"),
  k: positive("The conduction parameter").max(1e4, "The conduction parameter can't be above 10 kA/V²"),
  lambda: notNegative("Channel-length modulation").max(
    1,
    "Channel-length modulation can't be above 1 per volt",
  ),
});

/** The four-resistor common-source stage. */
export const stageValuesSchema = z.strictObject({
  vdd: railVolts,
  r1: ohms,
  r2: ohms,
  rd: ohms,
  rs: sourceOhms,
  rl: loadOhms,
  sourceBypassed: z.boolean(),
});

export const solveRequestSchema = z.strictObject({
  device: deviceSchema,
  stage: stageValuesSchema,
  inputPeak: positive("The input peak").max(450, "The input peak can't be above 450 V").optional(),
});

export const REGIONS = ["saturation", "ohmic", "cutoff"] as const;

export const swingSchema = z.object({
  towardCutoff: z.number(),
  towardOhmic: z.number(),
  symmetric: z.number(),
});

export const distortionSchema = z.object({
  secondHarmonic: z.number(),
  thirdHarmonic: z.number(),
  outputPeak: z.number(),
  clipped: z.boolean(),
});

/** The Q-point and what follows from it. Magnitudes for both polarities; `gain` is signed. */
export const biasSchema = z.object({
  region: z.enum(REGIONS),
  vg: z.number(),
  vgs: z.number(),
  overdrive: z.number(),
  id: z.number(),
  vds: z.number(),
  transition: z.object({ id: z.number(), vds: z.number() }).nullable(),
  swing: swingSchema.nullable(),
  centringError: z.number().nullable(),
  gm: z.number(),
  ro: z.number().nullable(),
  gain: z.number(),
  inputResistance: z.number(),
  outputResistance: z.number(),
  power: z.number(),
  distortion: distortionSchema.optional(),
});

export type Device = z.infer<typeof deviceSchema>;
export type StageValues = z.infer<typeof stageValuesSchema>;
export type Region = (typeof REGIONS)[number];
export type Swing = z.infer<typeof swingSchema>;
export type Distortion = z.infer<typeof distortionSchema>;
export type Bias = z.infer<typeof biasSchema>;
