import { distortionPeak, type StageSheet } from "#shared/bias/stage-sheet";
import type { Brief } from "#shared/schemas/brief";
import type { Part } from "#shared/schemas/part";
import { formatPercent, formatQuantity } from "#shared/values/engineering";
import type { Unit } from "#shared/values/units";

const exact = { exact: true } as const;

/** Which of its brief's conditions a stage misses with the values it has now, each in words with both figures. */
export function missedConditions(part: Part, brief: Brief, sheet: StageSheet): string[] {
  const { bias } = sheet;
  if (bias.region === "cutoff")
    return ["The gate sits below the threshold: the device is off. Raise R2 or lower R1."];
  if (bias.region === "ohmic") {
    // A larger RS takes drain current away and so lifts the drain; where there is none it can't be stepped.
    const raise = sheet.values.rs > 0 ? "R1 or RS" : "R1";
    return [`The device is in the ohmic region and can't swing. Lower R2 or RD, or raise ${raise}.`];
  }
  const missed: string[] = [];
  const atLeast = (name: string, value: number, limit: number | undefined, unit: Unit) => {
    if (limit !== undefined && value < limit) {
      missed.push(
        `${name} is ${formatQuantity(value, unit)}, below the ${formatQuantity(limit, unit, exact)} asked for.`,
      );
    }
  };
  const atMost = (name: string, value: number, limit: number | undefined, unit: Unit) => {
    if (limit !== undefined && value > limit) {
      missed.push(
        `${name} is ${formatQuantity(value, unit)}, above the ${formatQuantity(limit, unit, exact)} allowed.`,
      );
    }
  };
  const gain = Math.abs(bias.gain);
  atLeast("The swing", bias.swing?.symmetric ?? 0, brief.swing.peak, "V");
  atLeast("The gain", gain, brief.gain.min, "");
  atMost("The gain", gain, brief.gain.max, "");
  atLeast("The input resistance", bias.inputResistance, brief.inputResistance.min, "Ω");
  atMost("The supply current", sheet.supplyCurrent, brief.supplyCurrent.max, "A");
  atLeast("The drop across RS", sheet.nodes.source, brief.sourceDrop.min, "V");
  if (sheet.highCorner !== null) atLeast("The high corner", sheet.highCorner, brief.highCorner.min, "Hz");
  if (
    sheet.distortion &&
    brief.distortion.max !== undefined &&
    sheet.distortion.secondHarmonic > brief.distortion.max
  ) {
    const peak = formatQuantity(distortionPeak(brief), "V", exact);
    missed.push(
      `The second harmonic at ${peak} peak is ${formatPercent(sheet.distortion.secondHarmonic, 2)}, above the ${formatQuantity(brief.distortion.max, "%", exact)} allowed.`,
    );
  }
  if (brief.rail.volts > brief.derating.vds * part.vdss) {
    missed.push(
      `The rail is above ${formatQuantity(brief.derating.vds, "%", exact)} of the ${formatQuantity(part.vdss, "V", exact)} drain-source rating.`,
    );
  }
  atMost("The dissipation", sheet.thermal.power, sheet.thermal.permitted, "W");
  return missed;
}
