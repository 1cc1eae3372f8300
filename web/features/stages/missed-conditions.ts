import { distortionPeak, type StageSheet } from "#shared/bias/stage-sheet";
import { type Condition, type Margin, requiredMargins } from "#shared/bias/why/margins";
import type { Brief } from "#shared/schemas/brief";
import type { Part } from "#shared/schemas/part";
import { formatPercent, formatQuantity } from "#shared/values/engineering";
import type { Unit } from "#shared/values/units";

const exact = { exact: true } as const;

/** What each condition is called in a sentence. */
export const CONDITION_WORDS: Record<Condition, string> = {
  swing: "swing",
  "assured-swing": "assured swing",
  gain: "gain",
  "input-resistance": "input resistance",
  "supply-current": "supply current",
  "source-drop": "drop across RS",
  "high-corner": "high corner",
  distortion: "second harmonic",
  "rail-rating": "rail against the drain-source rating",
  "power-rating": "dissipation",
};

/** What each condition is measured in. */
export const CONDITION_UNITS: Record<Condition, Unit> = {
  swing: "V",
  "assured-swing": "V",
  gain: "",
  "input-resistance": "Ω",
  "supply-current": "A",
  "source-drop": "V",
  "high-corner": "Hz",
  distortion: "%",
  "rail-rating": "V",
  "power-rating": "W",
};

/** Which of its brief's conditions a stage misses with the values it has now, each in words with both figures. */
export function missedConditions(part: Part, brief: Brief, sheet: StageSheet): string[] {
  const { bias } = sheet;
  if (bias.region === "cutoff") return [OFF_ADVICE[brief.circuit]];
  if (bias.region === "ohmic") {
    return [`The device is in the ohmic region and can't swing. ${ohmicAdvice(brief, sheet)}`];
  }
  return requiredMargins(part, brief, sheet)
    .filter(({ margin }) => margin < 0)
    .map((margin) => missedInWords(part, brief, margin));
}

function missedInWords(part: Part, brief: Brief, { condition, bound, stated, actual }: Margin): string {
  const unit = CONDITION_UNITS[condition];
  const allowed = formatQuantity(stated, unit, exact);
  if (condition === "distortion") {
    const peak = formatQuantity(distortionPeak(brief), "V", exact);
    return `The second harmonic at ${peak} peak is ${formatPercent(actual, 2)}, above the ${allowed} allowed.`;
  }
  if (condition === "rail-rating") {
    const share = formatQuantity(brief.derating.vds, "%", exact);
    return `The rail is above ${share} of the ${formatQuantity(part.vdss, "V", exact)} drain-source rating.`;
  }
  const missed = bound === "least" ? `below the ${allowed} asked for` : `above the ${allowed} allowed`;
  return `The ${CONDITION_WORDS[condition]} is ${formatQuantity(actual, unit)}, ${missed}.`;
}

const DIVIDED_OFF = "The gate sits below the threshold: the device is off. Raise R2 or lower R1.";

const OFF_ADVICE: Record<Brief["circuit"], string> = {
  "four-resistor": DIVIDED_OFF,
  "split-source": DIVIDED_OFF,
  follower: DIVIDED_OFF,
  "drain-feedback": "The gate sits below the threshold: the device is off. Raise R2 or lower RG.",
  "negative-rail":
    "The negative rail is below the threshold: the device is off. It takes a part with a lower threshold.",
};

/** What takes the drain current down, and so lifts the drain. */
function ohmicAdvice({ circuit }: Brief, { values }: StageSheet): string {
  if (circuit === "negative-rail") return "Lower RD, or raise RS.";
  // A source resistor that isn't there can't be stepped.
  const source = values.rs > 0 ? " or RS" : "";
  if (circuit === "follower") return `Lower R2, or raise R1${source}.`;
  const top = circuit === "drain-feedback" ? "RG" : "R1";
  return `Lower R2 or RD, or raise ${top}${source}.`;
}
