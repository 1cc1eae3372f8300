import { circuitOf } from "#shared/bias/circuits/registry";
import type { Brief } from "#shared/schemas/brief";
import { formatPercent, formatQuantity } from "#shared/values/engineering";
import { circuitInWords, sourceInWords } from "./circuit-words";

const exact = { exact: true } as const;

/** A brief in one line for a list: source follower, 12 V ± 5 %, 10 kΩ, 1.5 V peak. */
export function briefInWords({ circuit, rail, load, swing }: Brief): string {
  const volts = formatQuantity(rail.volts, "V", exact);
  const below =
    circuit === "negative-rail" ? ` and −${formatQuantity(rail.negative ?? rail.volts, "V", exact)}` : "";
  const words = [`${volts}${below} ± ${formatQuantity(rail.tolerance, "%", exact)}`];
  if (circuit !== "four-resistor") words.unshift(circuitInWords(circuit));
  words.push(load.ohms === null ? "no load" : `into ${formatQuantity(load.ohms, "Ω", exact)}`);
  if (swing.peak > 0) words.push(`${formatQuantity(swing.peak, "V", exact)} peak`);
  return words.join(", ");
}

/** The conditions beyond the sentence, each in a few words. */
export function conditionsInWords(brief: Brief): string[] {
  const { gain, inputResistance, supplyCurrent, highCorner, distortion, sourceDrop, parts, source } = brief;
  const words: string[] = [];
  if (gain.min !== undefined) words.push(`gain at least ${gain.min}`);
  if (gain.max !== undefined) words.push(`gain at most ${gain.max}`);
  if (inputResistance.min !== undefined)
    words.push(`input at least ${formatQuantity(inputResistance.min, "Ω", exact)}`);
  if (supplyCurrent.max !== undefined)
    words.push(`at most ${formatQuantity(supplyCurrent.max, "A", exact)} from the rail`);
  if (sourceDrop.min !== undefined)
    words.push(`at least ${formatQuantity(sourceDrop.min, "V", exact)} across ${sourceInWords(brief)}`);
  if (highCorner.min !== undefined) words.push(`flat to ${formatQuantity(highCorner.min, "Hz", exact)}`);
  if (distortion.max !== undefined) {
    const peak =
      distortion.atPeak === undefined ? "" : ` at ${formatQuantity(distortion.atPeak, "V", exact)} peak`;
    words.push(`second harmonic at most ${formatPercent(distortion.max, 2)}${peak}`);
  }
  if (circuitOf(brief.circuit).sourceResistors.length > 1) {
    if (brief.sourceResistor === "unbypassed") words.push("RS not bypassed");
    if (brief.sourceResistor === "none") words.push("no RS");
  }
  if (source.ohms > 0) words.push(`from ${formatQuantity(source.ohms, "Ω", exact)}`);
  words.push([polarityInWords(brief), mountingInWords(brief)].filter(Boolean).join(", "));
  if (parts.packages) words.push(parts.packages.join(" or "));
  if (parts.makers) words.push(parts.makers.join(" or "));
  if (parts.stockedOnly) words.push("in stock");
  return words;
}

function polarityInWords({ polarity }: Brief): string {
  return { n: "N-channel", p: "P-channel", either: "either polarity" }[polarity];
}

function mountingInWords({ parts }: Brief): string | null {
  return parts.mounting ? { surface: "surface mount", "through-hole": "through-hole" }[parts.mounting] : null;
}
