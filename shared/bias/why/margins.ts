import type { Brief } from "#shared/schemas/brief";
import type { Resistors } from "#shared/schemas/circuit";
import type { Part } from "#shared/schemas/part";
import { assuredSwing, boxOf } from "../spread";
import { figureSignal, figureStage, type StageFigures } from "../stage-sheet";
import { permittedDissipation } from "../thermal";

/** What a stage is held to: what its brief states, and the part's ratings. */
export type Condition =
  | "swing"
  | "assured-swing"
  | "gain"
  | "input-resistance"
  | "supply-current"
  | "source-drop"
  | "high-corner"
  | "distortion"
  | "rail-rating"
  | "power-rating";

/** How far a stage is from one of its limits. SI units; distortion as a fraction. */
export type Margin = {
  condition: Condition;
  /** Whether the limit is the least or the most that is allowed. */
  bound: "least" | "most";
  stated: number;
  actual: number;
  /** What is left as a share of the stated limit; below zero where the limit is missed. */
  margin: number;
  /** Whether a fit must meet it. The assured swing need not reach the brief's swing, which is that of the typical device. */
  required: boolean;
};

/**
 * The margin to every limit that a brief and the part's ratings set, the least first. The limits are judged as the
 * ranking judges them: the typical device at 25 °C, its dissipation against what the derated rating allows at the
 * brief's highest temperature. What resistors may dissipate depends on the sizes on offer and is not among them.
 */
export function marginsOf(part: Part, brief: Brief, resistors: Resistors): Margin[] {
  const figures = figureStage(part, brief, resistors);
  const margins = requiredMargins(part, brief, figures);
  if (brief.swing.peak > 0) {
    const { symmetric } = assuredSwing(boxOf(part, brief, figures.values)).swing;
    margins.push({ ...atLeast("assured-swing", brief.swing.peak, symmetric), required: false });
  }
  return margins.sort((a, b) => a.margin - b.margin);
}

/** The limit that binds: the nearest of those that must be met. The part's ratings always set one. */
export function bindingLimit(margins: readonly Margin[]): Margin {
  const required = margins.filter((margin) => margin.required);
  return required.reduce((least, margin) => (margin.margin < least.margin ? margin : least));
}

/** The margins to the limits that a fit must meet, in no order. */
export function requiredMargins(part: Part, brief: Brief, figures: StageFigures): Margin[] {
  const { bias, values } = figures;
  const { highCorner, distortion } = figureSignal(part, brief, figures);
  const { gain, inputResistance, supplyCurrent, sourceDrop, derating } = brief;
  const margins: Margin[] = [];
  const least = (condition: Condition, stated: number | undefined, actual: number) => {
    if (stated !== undefined) margins.push(atLeast(condition, stated, actual));
  };
  const most = (condition: Condition, stated: number | undefined, actual: number) => {
    if (stated !== undefined) margins.push(atMost(condition, stated, actual));
  };
  const magnitude = Math.abs(bias.gain);
  least("swing", brief.swing.peak || undefined, bias.swing?.symmetric ?? 0);
  least("gain", gain.min, magnitude);
  most("gain", gain.max, magnitude);
  least("input-resistance", inputResistance.min, bias.inputResistance);
  most("supply-current", supplyCurrent.max, figures.supplyCurrent);
  least("source-drop", sourceDrop.min, bias.id * (values.rs + values.rs2));
  // A stage that amplifies and has no corner passes everything; one that doesn't amplify passes nothing.
  least("high-corner", brief.highCorner.min, highCorner ?? (magnitude > 0 ? Number.POSITIVE_INFINITY : 0));
  if (distortion) most("distortion", brief.distortion.max, distortion.secondHarmonic);
  most("rail-rating", derating.vds * part.vdss, values.vdd + values.vss);
  most("power-rating", derating.power * permittedDissipation(part, brief.ambient.max), bias.power);
  return margins;
}

function atLeast(condition: Condition, stated: number, actual: number): Margin {
  return { condition, bound: "least", stated, actual, margin: (actual - stated) / stated, required: true };
}

function atMost(condition: Condition, stated: number, actual: number): Margin {
  // Above the highest junction temperature nothing may be dissipated: what is, is past any share of that.
  const margin = actual === stated ? 0 : (stated - actual) / stated;
  return { condition, bound: "most", stated, actual, margin, required: true };
}
