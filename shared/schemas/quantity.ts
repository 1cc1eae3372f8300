import { z } from "zod";
import { SERIES_NAMES } from "#shared/values/e-series";

/** The limits that every request is held to; outside them the answer is 422 with the field's path. */
export const LIMITS = {
  rail: { min: 0.5, max: 450 },
  resistor: { min: 0.1, max: 100e6 },
} as const;

const finite = (what: string) => z.number({ error: `${what} must be a number` });

/** A resistor's value in ohms, 0.1 Ω to 100 MΩ. */
export const ohms = finite("A resistance")
  .min(LIMITS.resistor.min, "Resistors go from 0.1 Ω to 100 MΩ")
  .max(LIMITS.resistor.max, "Resistors go from 0.1 Ω to 100 MΩ");

/** A load in ohms; null stands for no load. */
export const loadOhms = ohms.nullable();

/** A supply rail in volts, 0.5 V to 450 V. */
export const railVolts = finite("A rail")
  .min(LIMITS.rail.min, "Rails go from 0.5 V to 450 V")
  .max(LIMITS.rail.max, "Rails go from 0.5 V to 450 V");

/** A tolerance as a fraction: 0.05 is ± 5 %. */
export const tolerance = finite("A tolerance")
  .min(0, "A tolerance can't be negative")
  .max(0.5, "A tolerance can't be above 50 %");

/** An ambient temperature in °C. */
export const celsius = finite("A temperature")
  .min(-65, "Temperatures go from -65 to 175 °C")
  .max(175, "Temperatures go from -65 to 175 °C");

export const positive = (what: string) => finite(what).positive(`${what} must be above zero`);
export const notNegative = (what: string) => finite(what).min(0, `${what} can't be negative`);

export const seriesName = z.enum(SERIES_NAMES, { error: "Choose a series from E3 to E192" });
export const polarity = z.enum(["n", "p"], { error: 'Polarity is "n" or "p"' });
export const mounting = z.enum(["surface", "through-hole"], {
  error: 'Mounting is "surface" or "through-hole"',
});

export type Polarity = z.infer<typeof polarity>;
export type Mounting = z.infer<typeof mounting>;
