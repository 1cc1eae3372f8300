import { z } from "zod";
import { circuitName, resistorsOf } from "./circuit";
import {
  celsius,
  loadOhms,
  mounting,
  notNegative,
  ohms,
  polarity,
  positive,
  railVolts,
  seriesName,
  tolerance,
} from "./quantity";

const valueRange = (min: number, max: number) =>
  z
    .strictObject({ series: seriesName.default("E24"), min: ohms.default(min), max: ohms.default(max) })
    .refine((range) => range.min <= range.max, {
      path: ["min"],
      message: "The smallest value is above the largest",
    })
    .prefault({});

const fraction = (what: string) =>
  z
    .number({ error: `${what} must be a number` })
    .gt(0, `${what} must be above zero`)
    .max(1, `${what} can't be above 1`);

/**
 * What a stage must do: every field is a hard limit on the fits. SI units, tolerances and deratings as fractions.
 * Fields left out take the defaults below, which are those of a new brief.
 */
export const briefSchema = z
  .strictObject({
    polarity: z
      .union([polarity, z.literal("either")], { error: 'Polarity is "n", "p" or "either"' })
      .default("n"),
    circuit: circuitName.default("four-resistor"),
    rail: z.strictObject({
      volts: railVolts,
      /** Magnitude of the negative rail where the circuit has one; left out, the same volts. */
      negative: railVolts.optional(),
      tolerance: tolerance.default(0.05),
    }),
    load: z.strictObject({ ohms: loadOhms }).default({ ohms: null }),
    source: z
      .strictObject({ ohms: notNegative("The source impedance").max(100e6, "At most 100 MΩ").default(0) })
      .prefault({}),
    swing: z.strictObject({ peak: notNegative("The swing").default(0) }).prefault({}),
    gain: z
      .strictObject({
        min: positive("The least gain").optional(),
        max: positive("The greatest gain").optional(),
      })
      .refine((gain) => gain.min === undefined || gain.max === undefined || gain.min <= gain.max, {
        path: ["min"],
        message: "The least gain is above the greatest",
      })
      .prefault({}),
    inputResistance: z.strictObject({ min: ohms.optional() }).prefault({}),
    supplyCurrent: z.strictObject({ max: positive("The supply current").optional() }).prefault({}),
    lowCorner: z.strictObject({ hertz: positive("The low corner").default(20) }).prefault({}),
    highCorner: z.strictObject({ min: positive("The high corner").optional() }).prefault({}),
    distortion: z
      .strictObject({
        max: fraction("The distortion limit").optional(),
        /** Output peak in volts at which the limit holds; left out, the brief's swing. */
        atPeak: positive("The output peak").optional(),
      })
      .prefault({}),
    ambient: z
      .strictObject({ min: celsius.default(25), max: celsius.default(25) })
      .refine((ambient) => ambient.min <= ambient.max, {
        path: ["min"],
        message: "The lowest temperature is above the highest",
      })
      .prefault({}),
    sourceResistor: z
      .enum(["bypassed", "unbypassed", "none"], {
        error: 'The source resistor is "bypassed", "unbypassed" or "none"',
      })
      .default("bypassed"),
    sourceDrop: z.strictObject({ min: positive("The drop across RS").optional() }).prefault({}),
    resistors: z
      .strictObject({
        tolerance: tolerance.default(0.01),
        divider: valueRange(10e3, 10e6),
        drain: valueRange(100, 100e3),
        source: valueRange(10, 10e3),
        stockedOnly: z.boolean().default(false),
      })
      .prefault({}),
    parts: z
      .strictObject({
        packages: z.array(z.string().max(40)).max(50).optional(),
        mounting: mounting.optional(),
        makers: z.array(z.string().max(120)).max(100).optional(),
        ids: z.array(z.int().positive()).max(10_000).optional(),
        stockedOnly: z.boolean().default(false),
        /** Integer cents for one piece at the build quantity. */
        maxUnitPrice: z.int("Prices are whole cents").nonnegative("A price can't be negative").optional(),
      })
      .prefault({}),
    derating: z
      .strictObject({
        vds: fraction("The drain-source derating").default(0.8),
        power: fraction("The power derating").default(0.5),
        resistorPower: fraction("The resistor derating").default(0.5),
      })
      .prefault({}),
    buildQuantity: z
      .int("The build quantity is a whole number")
      .min(1, "Build at least one")
      .max(10_000_000, "At most ten million")
      .default(100),
  })
  .superRefine((brief, context) => {
    if (brief.sourceResistor === "none" && !resistorsOf(brief.circuit, "optional").includes("rs")) {
      const message = "This circuit needs its source resistor";
      context.addIssue({ code: "custom", path: ["sourceResistor"], message });
    }
    if (brief.rail.negative !== undefined && brief.circuit !== "negative-rail") {
      const message = "This circuit has no negative rail";
      context.addIssue({ code: "custom", path: ["rail", "negative"], message });
    }
  });

export const briefName = z.string().trim().min(1, "Give the brief a name").max(120, "At most 120 characters");

export const createBriefSchema = z.strictObject({ name: briefName, brief: briefSchema });
export const updateBriefSchema = z.strictObject({
  name: briefName,
  brief: briefSchema,
  version: z.int().positive(),
});

const person = z.object({ id: z.string(), name: z.string() });

/** A saved brief. Each change makes a new version; a stage remembers the version it came from. */
export const savedBriefSchema = z.object({
  id: z.int().positive(),
  name: z.string(),
  version: z.int().positive(),
  brief: briefSchema,
  createdBy: person,
  updatedBy: person,
  createdAt: z.iso.datetime(),
  updatedAt: z.iso.datetime(),
});

export const briefListSchema = z.object({ items: z.array(savedBriefSchema) });

export type Brief = z.infer<typeof briefSchema>;
export type BriefInput = z.input<typeof briefSchema>;
export type SavedBrief = z.infer<typeof savedBriefSchema>;
export type CreateBrief = z.infer<typeof createBriefSchema>;
export type UpdateBrief = z.infer<typeof updateBriefSchema>;
