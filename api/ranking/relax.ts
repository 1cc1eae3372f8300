import type { Brief } from "#shared/schemas/brief";
import type { FitsRequest, PassedOverReason, Relaxation } from "#shared/schemas/fits";
import type { Part } from "#shared/schemas/part";
import { formatPercent, formatQuantity } from "#shared/values/engineering";
import type { Unit } from "#shared/values/units";
import type { ResistorSupply } from "./problem";
import { type RankingControl, rankParts } from "./rank-parts";

/** A limit of the brief that can be eased: where it stands, how to set it, and the value at which it says nothing. */
type Limit = {
  condition: PassedOverReason;
  path: string;
  name: string;
  unit: Unit;
  stated: (brief: Brief) => number | undefined;
  /** The brief with this limit at another value; undefined drops it. */
  at: (brief: Brief, value: number | undefined) => Brief;
  /** A value so easy that it no longer binds. */
  easiest: number;
};

const LIMITS: readonly Limit[] = [
  {
    condition: "swing",
    path: "swing.peak",
    name: "the swing",
    unit: "V",
    stated: (brief) => brief.swing.peak || undefined,
    at: (brief, value) => ({
      ...brief,
      swing: { peak: value ?? 0 },
      // The distortion limit follows the swing unless it has a peak of its own.
      distortion: { ...brief.distortion, atPeak: brief.distortion.atPeak ?? (brief.swing.peak || undefined) },
    }),
    easiest: 1e-3,
  },
  {
    condition: "gain",
    path: "gain.min",
    name: "the least gain",
    unit: "",
    stated: (brief) => brief.gain.min,
    at: (brief, value) => ({ ...brief, gain: { ...brief.gain, min: value } }),
    easiest: 1e-3,
  },
  {
    condition: "gain",
    path: "gain.max",
    name: "the greatest gain",
    unit: "",
    stated: (brief) => brief.gain.max,
    at: (brief, value) => ({ ...brief, gain: { ...brief.gain, max: value } }),
    easiest: 1e5,
  },
  {
    condition: "input-resistance",
    path: "inputResistance.min",
    name: "the input resistance",
    unit: "Ω",
    stated: (brief) => brief.inputResistance.min,
    at: (brief, value) => ({ ...brief, inputResistance: { min: value } }),
    easiest: 0.1,
  },
  {
    condition: "supply-current",
    path: "supplyCurrent.max",
    name: "the supply current",
    unit: "A",
    stated: (brief) => brief.supplyCurrent.max,
    at: (brief, value) => ({ ...brief, supplyCurrent: { max: value } }),
    easiest: 1e4,
  },
  {
    condition: "source-drop",
    path: "sourceDrop.min",
    name: "the drop across RS",
    unit: "V",
    stated: (brief) => brief.sourceDrop.min,
    at: (brief, value) => ({ ...brief, sourceDrop: { min: value } }),
    easiest: 1e-6,
  },
  {
    condition: "high-corner",
    path: "highCorner.min",
    name: "the high corner",
    unit: "Hz",
    stated: (brief) => brief.highCorner.min,
    at: (brief, value) => ({ ...brief, highCorner: { min: value } }),
    easiest: 1,
  },
  {
    condition: "distortion",
    path: "distortion.max",
    name: "the distortion limit",
    unit: "%",
    stated: (brief) => brief.distortion.max,
    at: (brief, value) => ({ ...brief, distortion: { ...brief.distortion, max: value } }),
    easiest: 1,
  },
  {
    condition: "rail-rating",
    path: "derating.vds",
    name: "the drain-source derating",
    unit: "%",
    stated: (brief) => brief.derating.vds,
    at: (brief, value) => ({ ...brief, derating: { ...brief.derating, vds: value ?? 1 } }),
    easiest: 1,
  },
  {
    condition: "power-rating",
    path: "derating.power",
    name: "the power derating",
    unit: "%",
    stated: (brief) => brief.derating.power,
    at: (brief, value) => ({ ...brief, derating: { ...brief.derating, power: value ?? 1 } }),
    easiest: 1,
  },
  {
    condition: "resistor-rating",
    path: "derating.resistorPower",
    name: "the resistor derating",
    unit: "%",
    stated: (brief) => brief.derating.resistorPower,
    at: (brief, value) => ({ ...brief, derating: { ...brief.derating, resistorPower: value ?? 1 } }),
    easiest: 1,
  },
];

/** A filter that is on or off. */
type Filter = {
  condition: PassedOverReason;
  path: string;
  isOn: (brief: Brief) => boolean;
  off: (brief: Brief) => Brief;
  message: string;
};

const FILTERS: readonly Filter[] = [
  {
    condition: "polarity",
    path: "polarity",
    isOn: (brief) => brief.polarity !== "either",
    off: (brief) => ({ ...brief, polarity: "either" }),
    message: "Allow both polarities",
  },
  {
    condition: "part-filter",
    path: "parts",
    isOn: ({ parts }) => Boolean(parts.packages || parts.mounting || parts.makers || parts.ids),
    off: ({ parts: { stockedOnly, maxUnitPrice }, ...brief }) => ({
      ...brief,
      parts: { stockedOnly, maxUnitPrice },
    }),
    message: "Allow other packages, mountings, makers and parts",
  },
  {
    condition: "stock",
    path: "parts.stockedOnly",
    isOn: ({ parts }) => parts.stockedOnly,
    off: (brief) => ({ ...brief, parts: { ...brief.parts, stockedOnly: false } }),
    message: "Allow parts that are not in stock",
  },
  {
    condition: "unit-price",
    path: "parts.maxUnitPrice",
    isOn: ({ parts }) => parts.maxUnitPrice !== undefined,
    off: (brief) => ({ ...brief, parts: { ...brief.parts, maxUnitPrice: undefined } }),
    message: "Drop the price limit",
  },
  {
    condition: "source-drop",
    path: "sourceDrop.min",
    isOn: ({ sourceResistor, sourceDrop }) => sourceResistor === "none" && sourceDrop.min !== undefined,
    off: (brief) => ({ ...brief, sourceDrop: {} }),
    message: "Ask for no drop across RS, as the stage has none",
  },
];

/** How close the needed value is brought to the true one: 12 halvings on a logarithmic scale. */
const HALVINGS = 12;
const SIGNIFICANT_DIGITS = 3;

/**
 * Finds the condition that, alone relaxed, would let the most parts in, and how far it has to give. Every answer has
 * been tried: the relaxed brief has a fit.
 *
 * @returns null when no single condition helps
 */
export async function findRelaxation(
  { brief, objective }: Pick<FitsRequest, "brief" | "objective">,
  parts: readonly Part[],
  supply: ResistorSupply,
  control: RankingControl,
): Promise<Relaxation | null> {
  const quiet = { signal: control.signal, deadline: control.deadline };
  const partsThatFit = async (eased: Brief) =>
    (await rankParts({ brief: eased, objective, distinct: "part", limit: 1 }, parts, supply, quiet))
      .partsThatFit;
  let best: { parts: number; limit?: Limit; filter?: Filter } = { parts: 0 };
  for (const limit of LIMITS) {
    const stated = limit.stated(brief);
    if (stated === undefined || stated === limit.easiest) continue;
    const found = await partsThatFit(limit.at(brief, limit.easiest));
    if (found > best.parts) best = { parts: found, limit };
  }
  for (const filter of FILTERS) {
    if (!filter.isOn(brief)) continue;
    const found = await partsThatFit(filter.off(brief));
    if (found > best.parts) best = { parts: found, filter };
  }
  const { limit, filter } = best;
  if (filter) {
    const { condition, path, message } = filter;
    const words = `${message}: ${countOf(best.parts)} would fit.`;
    return { condition, path, parts: best.parts, stated: null, needed: null, message: words };
  }
  const stated = limit?.stated(brief);
  if (!limit || stated === undefined) return null;
  const needed = await nearestValue(
    limit,
    stated,
    async (value) => (await partsThatFit(limit.at(brief, value))) > 0,
  );
  const show = (value: number) =>
    limit.unit === "%" ? formatPercent(value, 3) : formatQuantity(value, limit.unit, { exact: true });
  const verb = limit.easiest < stated ? "Lower" : "Raise";
  return {
    condition: limit.condition,
    path: limit.path,
    parts: best.parts,
    stated,
    needed,
    message: `${verb} ${limit.name} from ${show(stated)} to ${show(needed)}; without it ${countOf(best.parts)} would fit.`,
  };
}

/** The value nearest to the stated one that still gives a fit, rounded to the easy side and tried. */
async function nearestValue(
  limit: Limit,
  stated: number,
  fits: (value: number) => Promise<boolean>,
): Promise<number> {
  let hard = Math.log(stated);
  let easy = Math.log(limit.easiest);
  for (let step = 0; step < HALVINGS; step++) {
    const middle = 0.5 * (hard + easy);
    if (await fits(Math.exp(middle))) easy = middle;
    else hard = middle;
  }
  const rounded = roundToward(Math.exp(easy), limit.easiest < stated);
  const allowed = limit.easiest < stated ? rounded >= limit.easiest : rounded <= limit.easiest;
  return allowed && (await fits(rounded)) ? rounded : limit.easiest;
}

/** Rounds to three significant digits, downward or upward. */
function roundToward(value: number, down: boolean): number {
  const scale = 10 ** (Math.floor(Math.log10(value)) - SIGNIFICANT_DIGITS + 1);
  const digits = value / scale;
  return Number(((down ? Math.floor(digits) : Math.ceil(digits)) * scale).toPrecision(SIGNIFICANT_DIGITS));
}

function countOf(parts: number): string {
  return parts === 1 ? "one part" : `${parts.toLocaleString("en-US")} parts`;
}
