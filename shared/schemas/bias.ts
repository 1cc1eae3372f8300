import { z } from "zod";
import { circuitName, resistorIssues, resistorsSchema } from "./circuit";
import { celsius, loadOhms, notNegative, polarity, positive, railVolts, tolerance } from "./quantity";

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

/** A stage: which circuit, its rails, its resistors (0 where the circuit has none) and its load. */
export const stageValuesSchema = z
  .strictObject({
    circuit: circuitName.default("four-resistor"),
    vdd: railVolts,
    /** Magnitude of the negative rail, V; 0 where the circuit has none. */
    vss: z.union([z.literal(0), railVolts], { error: "Rails go from 0.5 V to 450 V" }).default(0),
    ...resistorsSchema.shape,
    rl: loadOhms,
    sourceBypassed: z.boolean().default(true),
  })
  .superRefine((stage, context) => {
    for (const { key, message } of resistorIssues(stage.circuit, stage)) {
      context.addIssue({ code: "custom", path: [key], message });
    }
    if ((stage.circuit === "negative-rail") !== stage.vss > 0) {
      const message =
        stage.vss > 0 ? "This circuit has no negative rail" : "This circuit needs a negative rail";
      context.addIssue({ code: "custom", path: ["vss"], message });
    }
  });

export const solveRequestSchema = z.strictObject({
  device: deviceSchema,
  stage: stageValuesSchema,
  inputPeak: positive("The input peak").max(450, "The input peak can't be above 450 V").optional(),
});

/** A part's spread as the square law sees it, at 25 °C. */
export const deviceSpreadSchema = z
  .strictObject({
    polarity,
    vtMin: deviceSchema.shape.vt,
    vtTyp: deviceSchema.shape.vt,
    vtMax: deviceSchema.shape.vt,
    kMin: deviceSchema.shape.k,
    kTyp: deviceSchema.shape.k,
    kMax: deviceSchema.shape.k,
    lambda: deviceSchema.shape.lambda,
    tcVt: z.number().min(-0.1, "At most 100 mV/K").max(0.1, "At most 100 mV/K").default(0),
  })
  .superRefine((device, context) => {
    for (const [low, high] of [
      ["vtMin", "vtTyp"],
      ["vtTyp", "vtMax"],
      ["kMin", "kTyp"],
      ["kTyp", "kMax"],
    ] as const) {
      if (device[low] > device[high]) {
        context.addIssue({ code: "custom", path: [low], message: `${low} is above ${high}` });
      }
    }
  });

/** How many builds to simulate. */
export const buildsSchema = z.int("Builds are whole numbers").min(1, "Build at least one");

/** Where the random numbers start: the same seed draws the same builds. */
export const seedSchema = z
  .int("Seeds are whole numbers")
  .min(0, "Seeds are whole numbers from 0")
  .max(4_294_967_295, "At most 4,294,967,295");

export const spreadRequestSchema = z.strictObject({
  device: deviceSpreadSchema,
  stage: stageValuesSchema,
  tolerance: z
    .strictObject({ resistors: tolerance.default(0.01), rail: tolerance.default(0.05) })
    .prefault({}),
  ambient: z
    .strictObject({ min: celsius.default(25), max: celsius.default(25) })
    .refine(({ min, max }) => min <= max, {
      path: ["min"],
      message: "The lowest temperature is above the highest",
    })
    .prefault({}),
  builds: buildsSchema.max(1_000_000, "At most a million builds").default(10_000),
  seed: seedSchema.default(1),
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

/** One build of a stage: what its device and resistors turned out to be, and how far it swings. */
export const buildSchema = z.object({
  vt: z.number(),
  k: z.number(),
  celsius: z.number(),
  stage: stageValuesSchema,
  /** Room of this build toward the limit that it is the worst for, V. */
  room: z.number(),
});

/** A share of simulated builds with its 95 % interval (Wilson). */
export const yieldSchema = z.object({
  fraction: z.number(),
  low: z.number(),
  high: z.number(),
  builds: z.int(),
});

export const spreadResponseSchema = z.object({
  /** The least room of any build inside the spread; 0 where one leaves saturation or doesn't conduct. */
  assured: swingSchema,
  /** The builds that set it: the worst toward cutoff and the worst toward the ohmic region. */
  corners: z.array(buildSchema.extend({ toward: z.enum(["cutoff", "ohmic"]) })),
  yield: yieldSchema,
});

export type Device = z.infer<typeof deviceSchema>;
export type StageValues = z.infer<typeof stageValuesSchema>;
export type DeviceSpread = z.infer<typeof deviceSpreadSchema>;
export type SpreadRequest = z.infer<typeof spreadRequestSchema>;
export type SpreadResponse = z.infer<typeof spreadResponseSchema>;
export type Build = z.infer<typeof buildSchema>;
export type Yield = z.infer<typeof yieldSchema>;
export type Region = (typeof REGIONS)[number];
export type Swing = z.infer<typeof swingSchema>;
export type Distortion = z.infer<typeof distortionSchema>;
export type Bias = z.infer<typeof biasSchema>;
