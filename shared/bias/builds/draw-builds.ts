import { RESISTOR_KEYS } from "#shared/schemas/circuit";
import type { BuildParameter } from "#shared/schemas/yield";
import { kelvin, thresholdAt } from "../device";
import type { BuildBox } from "../spread";
import { BLOCK, type BuildColumns, type Column } from "./columns";
import { RandomStream } from "./random-stream";

/** Threshold and conduction parameter of one piece of a lot, measured at 25 °C: volts, A/V². */
export type LotReading = { vt: number; k: number };

const REFERENCE_CELSIUS = 25;

/**
 * Draws builds of a box, block by block.
 *
 * VT and K at 25 °C are independent and normal around the middle of their ranges, truncated to them, with a standard
 * deviation of a sixth of the range. With readings of a lot they are drawn as the pairs that were measured, every
 * pair as likely as another. Resistors and rails are uniform within their tolerance, the ambient temperature uniform
 * in its range; VT and K then follow it. All are drawn in the same order whatever is held, so that the same seed gives
 * the same builds but for what is held.
 *
 * @param readings a lot's; null or none to draw from the part's ranges
 * @param held what stays at its typical or nominal value: VT and K those of the typical device (with readings, their
 *   mean), the ambient temperature 25 °C or the end of the range next to it
 * @returns fills the columns with the next builds, `BLOCK` at most
 */
export function buildDrawer(
  box: BuildBox,
  readings: readonly LotReading[] | null,
  seed: number,
  held: BuildParameter | null,
): (into: BuildColumns, count: number) => void {
  const { device, stage, tolerance, ambient } = box;
  const stream = new RandomStream(seed);
  const pieces = new Float64Array(BLOCK);
  const resistors = RESISTOR_KEYS.filter((key) => stage[key] > 0);
  const lot = readings && readings.length > 0 ? readings : null;
  const lotVt = Float64Array.from(lot ?? [], ({ vt }) => vt);
  const lotK = Float64Array.from(lot ?? [], ({ k }) => k);
  const steady = Math.min(ambient.max, Math.max(ambient.min, REFERENCE_CELSIUS));

  const isReference = ambient.min === REFERENCE_CELSIUS && ambient.max === REFERENCE_CELSIUS;

  const fillDevices = ({ vt, k }: BuildColumns, count: number) => {
    if (lot) {
      stream.fillUniform(pieces, count, 0, lotVt.length);
      for (let at = 0; at < count; at++) {
        const piece = Math.floor(pieces[at]);
        vt[at] = lotVt[piece];
        k[at] = lotK[piece];
      }
    } else {
      stream.fillNormal(vt, count, device.vtMin, device.vtMax);
      stream.fillNormal(k, count, device.kMin, device.kMax);
    }
    if (held === "vt") vt.fill(lot ? meanOf(lotVt) : device.vtTyp, 0, count);
    if (held === "k") k.fill(lot ? meanOf(lotK) : device.kTyp, 0, count);
  };

  const fillWithin = (column: Column, count: number, low: number, high: number) => {
    if (low === high) column.fill(low, 0, count);
    else stream.fillUniform(column, count, low, high);
  };
  const fillAround = (column: Column, count: number, nominal: number, share: number, isHeld: boolean) => {
    fillWithin(column, count, nominal * (1 - share), nominal * (1 + share));
    if (isHeld) column.fill(nominal, 0, count);
  };

  return (into, count) => {
    fillDevices(into, count);
    fillWithin(into.celsius, count, ambient.min, ambient.max);
    if (held === "ambient") into.celsius.fill(steady, 0, count);
    if (!isReference) heat(into, count, device.tcVt);
    fillAround(into.rail, count, stage.vdd, tolerance.rail, held === "rail");
    if (stage.vss > 0) {
      fillAround(into.negativeRail, count, stage.vss, tolerance.rail, held === "rail");
    }
    for (const key of resistors) {
      fillAround(into.resistors[key], count, stage[key], tolerance.resistors, held === "resistors");
    }
  };
}

/** Brings VT and K from 25 °C to each build's temperature; `conductionAt` with its power spelt out. */
function heat({ vt, k, celsius }: BuildColumns, count: number, tcVt: number): void {
  const reference = kelvin(REFERENCE_CELSIUS);
  for (let at = 0; at < count; at++) {
    const heated = kelvin(celsius[at]) / reference;
    vt[at] = thresholdAt(vt[at], tcVt, celsius[at]);
    k[at] /= heated * Math.sqrt(heated);
  }
}

function meanOf(values: Float64Array): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}
