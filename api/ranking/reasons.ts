import type { Brief } from "#shared/schemas/brief";
import type { FitsResponse, PassedOverReason } from "#shared/schemas/fits";
import { PASSED_OVER_REASONS } from "#shared/schemas/fits";
import { formatCents, formatPercent, formatQuantity } from "#shared/values/engineering";
import type { Unit } from "#shared/values/units";

const quantity = (value: number | undefined, unit: Unit) =>
  formatQuantity(value ?? null, unit, { exact: true });

/** Says in words why parts were passed over, with the brief's own figure. */
const WORDS: Record<PassedOverReason, (brief: Brief) => string> = {
  polarity: (brief) => `Not ${brief.polarity === "n" ? "N" : "P"}-channel.`,
  "part-filter": () => "Outside the packages, mounting, makers or parts asked for.",
  stock: () => "Not in stock.",
  "unit-price": (brief) =>
    `More than ${formatCents(brief.parts.maxUnitPrice ?? 0)} each at ${brief.buildQuantity.toLocaleString("en-US")}.`,
  "rail-rating": (brief) =>
    `The ${quantity(brief.rail.volts, "V")} rail is above ${formatPercent(brief.derating.vds, 0)} of the drain-source rating.`,
  swing: (brief) => `No resistors give ${quantity(brief.swing.peak, "V")} peak both ways.`,
  "assured-swing": (brief) =>
    `No stage still swings ${quantity(brief.swing.peak, "V")} peak in every build of the spread.`,
  "supply-current": (brief) =>
    `Every stage that swings far enough draws more than ${quantity(brief.supplyCurrent.max, "A")}.`,
  "source-drop": (brief) => `The drop across RS stays below ${quantity(brief.sourceDrop.min, "V")}.`,
  "power-rating": (brief) =>
    `The device would dissipate more than ${formatPercent(brief.derating.power, 0)} of its rating at ${quantity(brief.ambient.max, "°C")}.`,
  "resistor-rating": (brief) =>
    `A resistor would dissipate more than ${formatPercent(brief.derating.resistorPower, 0)} of the largest size's rating.`,
  gain: (brief) => `No stage that swings far enough has a gain ${gainWords(brief)}.`,
  "resistor-values": (brief) =>
    `No pair of ${brief.resistors.divider.series} values puts the gate where the stage needs it.`,
  "input-resistance": (brief) =>
    `The divider it needs falls below ${quantity(brief.inputResistance.min, "Ω")} input resistance.`,
  "high-corner": (brief) => `The high corner stays below ${quantity(brief.highCorner.min, "Hz")}.`,
  distortion: (brief) =>
    `The second harmonic stays above ${formatPercent(brief.distortion.max ?? 0, 2)} at the stated output peak.`,
  "no-price": (brief) =>
    `The part, or a resistor it needs, isn't sold at ${formatPercent(brief.resistors.tolerance, 1)} in a size that stands its power and voltage.`,
};

function gainWords({ gain }: Brief): string {
  if (gain.min !== undefined && gain.max !== undefined) return `between ${gain.min} and ${gain.max}`;
  return gain.min !== undefined ? `of ${gain.min} or more` : `of ${gain.max} or less`;
}

/** The reasons with their counts and words, the commonest first. */
export function describePassedOver(
  counts: ReadonlyMap<PassedOverReason, number>,
  brief: Brief,
): FitsResponse["passedOver"] {
  return PASSED_OVER_REASONS.filter((reason) => counts.has(reason))
    .map((reason) => ({ reason, parts: counts.get(reason) ?? 0, message: WORDS[reason](brief) }))
    .sort((a, b) => b.parts - a.parts);
}
