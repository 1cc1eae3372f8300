import type { FigurePoint, LoadLineData } from "#shared/bias/figure-data";
import { formatQuantity } from "#shared/values/engineering";

const volts = (value: number) => formatQuantity(value, "V");
const point = ({ vds, id }: FigurePoint) => `${volts(vds)} and ${formatQuantity(id, "A")}`;

/** What VDS and VGS are called: a P-channel stage is drawn in magnitudes and says so. */
export function axisNames(polarity: LoadLineData["polarity"]) {
  return polarity === "p"
    ? { before: "|V", drain: "DS", gate: "GS", after: "|" }
    : { before: "V", drain: "DS", gate: "GS", after: "" };
}

/** The load-line figure in sentences: what a reader would take from it. */
export function describeLoadLine(data: LoadLineData): string {
  const { q, transition, cutoff, room, spread, corners, polarity } = data;
  const sentences = [
    `Load lines on a ${volts(data.vdd)} rail${polarity === "p" ? ", P-channel, in magnitudes" : ""}.`,
    `The Q-point rests at ${point(q)}.`,
  ];
  if (transition && cutoff && room) {
    sentences.push(
      `The a.c. line runs from the edge of saturation at ${point(transition)} to cutoff at ${volts(cutoff.vds)}.`,
      `Room at the output: ${volts(room.towardOhmic)} toward the ohmic region, ${volts(room.towardCutoff)} toward cutoff.`,
      clippingWords(data.clipped),
    );
  } else {
    sentences.push("The transistor carries no signal here: its Q-point is not in saturation.");
  }
  const landing = [...(spread ?? []), ...corners];
  if (landing.length > 0) {
    const vds = landing.map((corner) => corner.vds);
    const id = landing.map((corner) => corner.id);
    sentences.push(
      `Over the spread the Q-point lies between ${volts(Math.min(...vds))} and ${volts(Math.max(...vds))},`,
      `${formatQuantity(Math.min(...id), "A")} and ${formatQuantity(Math.max(...id), "A")}.`,
    );
  }
  return sentences.filter(Boolean).join(" ");
}

function clippingWords({ towardOhmic, towardCutoff }: LoadLineData["clipped"]): string {
  if (towardOhmic && towardCutoff) return "The wave drawn clips on both sides.";
  if (towardOhmic) return "The wave drawn clips in the ohmic region.";
  return towardCutoff ? "The wave drawn clips at cutoff." : "";
}

/** A voltage with its sign: the output's distance from rest. */
export function signedVolts(value: number): string {
  const text = volts(Math.abs(value));
  if (Number.parseFloat(text) === 0) return text;
  return value < 0 ? `−${text}` : `+${text}`;
}

/** How far the output is from rest when the drain is at a voltage; without a signal it is at rest. */
export function outputAt({ q, cutoff, room }: LoadLineData, vds: number): number {
  if (!cutoff || !room || cutoff.vds === q.vds) return 0;
  return ((vds - q.vds) / (cutoff.vds - q.vds)) * room.towardCutoff;
}
