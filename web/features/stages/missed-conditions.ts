import { figureStage } from "#shared/bias/stage-sheet";
import type { Margin } from "#shared/bias/why/margins";
import { wayToSaturation } from "#shared/bias/why/way-to-saturation";
import type { Region } from "#shared/schemas/bias";
import type { Brief } from "#shared/schemas/brief";
import type { ResistorKey, Resistors } from "#shared/schemas/circuit";
import type { Part } from "#shared/schemas/part";
import { formatQuantity } from "#shared/values/engineering";
import { actualInWords, nameOfCondition, statedInWords } from "./condition-words";

/**
 * Which of its brief's conditions a stage misses with the values it has now, each in words with both figures.
 *
 * @param margins those of the stage
 */
export function missedConditions(
  part: Part,
  brief: Brief,
  resistors: Resistors,
  margins: readonly Margin[],
): string[] {
  const { region } = figureStage(part, brief, resistors).bias;
  if (region !== "saturation") return [outOfSaturation(part, brief, resistors, region)];
  return margins
    .filter(({ required, margin }) => required && margin < 0)
    .map((margin) => missedInWords(part, brief, margin));
}

function missedInWords(part: Part, brief: Brief, margin: Margin): string {
  if (margin.condition === "rail-rating") {
    const share = formatQuantity(brief.derating.vds, "%", { exact: true });
    return `The supply is above ${share} of the ${formatQuantity(part.vdss, "V", { exact: true })} drain-source rating.`;
  }
  const is = `The ${nameOfCondition(margin.condition, brief)} is ${actualInWords(margin)}`;
  return margin.bound === "least"
    ? `${is}, below the ${statedInWords(margin)} asked for.`
    : `${is}, above the ${statedInWords(margin)} allowed.`;
}

/** Says that a stage is off or ohmic, and which resistors bring it back. */
function outOfSaturation(part: Part, brief: Brief, resistors: Resistors, region: Region): string {
  const { lower, raise } = wayToSaturation(part, brief, resistors);
  if (region === "ohmic") {
    const way = [inWords("lower", lower), inWords("raise", raise)];
    return `The device is in the ohmic region and can't swing. ${asSentence(way, lower, raise)}`;
  }
  const off = "The gate sits below the threshold: the device is off.";
  if (lower.length + raise.length === 0) {
    const rail = brief.circuit === "negative-rail" ? "negative rail" : "rail";
    return `${off} No resistor turns it on: raise the ${rail}, or take a part with a lower threshold.`;
  }
  return `${off} ${asSentence([inWords("raise", raise), inWords("lower", lower)], lower, raise)}`;
}

const orList = new Intl.ListFormat("en", { type: "disjunction" });

function inWords(verb: string, keys: readonly ResistorKey[]): string | null {
  return keys.length > 0 ? `${verb} ${orList.format(keys.map((key) => key.toUpperCase()))}` : null;
}

/** "Raise R2 or lower R1."; a comma where the parts have an "or" of their own. */
function asSentence(parts: (string | null)[], ...lists: (readonly ResistorKey[])[]): string {
  const joint = lists.some((keys) => keys.length > 1) ? ", or " : " or ";
  const words = parts.filter((part) => part !== null).join(joint);
  return `${words.charAt(0).toUpperCase()}${words.slice(1)}.`;
}
