import { distortionPeak } from "#shared/bias/stage-sheet";
import type { Condition, Margin } from "#shared/bias/why/margins";
import type { Brief } from "#shared/schemas/brief";
import { formatPercent, formatQuantity } from "#shared/values/engineering";
import type { Unit } from "#shared/values/units";
import { sourceInWords } from "../../lib/circuit-words";

/** What each condition is measured in. */
const UNITS: Record<Condition, Unit> = {
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

const NAMES: Record<Exclude<Condition, "source-drop" | "distortion">, string> = {
  swing: "swing",
  "assured-swing": "assured swing",
  gain: "gain",
  "input-resistance": "input resistance",
  "supply-current": "supply current",
  "high-corner": "high corner",
  "rail-rating": "drain-source rating",
  "power-rating": "dissipation",
};

/** What a condition is called in a sentence, with the figures of the brief that belong to it. */
export function nameOfCondition(condition: Condition, brief: Brief): string {
  if (condition === "source-drop") return `drop across ${sourceInWords(brief)}`;
  if (condition === "distortion") {
    return `second harmonic at ${formatQuantity(distortionPeak(brief), "V", { exact: true })} peak`;
  }
  return NAMES[condition];
}

/** A limit as it was stated, every digit it has; what follows from a rating at a temperature is worked out, and rounded. */
export function statedInWords({ condition, stated }: Pick<Margin, "condition" | "stated">): string {
  const digits = condition === "power-rating" ? 3 : undefined;
  return formatQuantity(stated, UNITS[condition], { exact: true, digits });
}

/** What a stage has of what a condition asks for. */
export function actualInWords({ condition, actual }: Pick<Margin, "condition" | "actual">): string {
  return condition === "distortion" ? formatPercent(actual, 2) : formatQuantity(actual, UNITS[condition]);
}

/** From here on a share of the limit says less than how many times as much there is. */
const MANY = 10;

/** A margin with its sign, as a column shows it: a tenth of a per cent counts where there are few of them. */
export function marginInWords(margin: number): string {
  if (!Number.isFinite(margin)) return margin > 0 ? "no limit" : "past";
  if (margin >= MANY) return `× ${formatQuantity(margin + 1, "", { digits: 2 })}`;
  const sign = margin > 0 ? "+" : "";
  return `${sign}${shareInWords(margin)}`;
}

/** Where a stage stands to a limit: "3.2 % inside", "3.2 % past". */
export function placeInWords(margin: number): string {
  if (!Number.isFinite(margin)) return margin > 0 ? "far inside" : "past";
  return `${shareInWords(Math.abs(margin))} ${margin < 0 ? "past" : "inside"}`;
}

function shareInWords(share: number): string {
  return formatPercent(share, Math.abs(share) < 0.0995 ? 1 : 0);
}
