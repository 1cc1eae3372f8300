import type { Device, Region } from "#shared/schemas/bias";
import type { Part } from "#shared/schemas/part";

/** The figures of the square law that a current depends on. Magnitudes for both polarities. */
export type SquareLaw = Pick<Device, "vt" | "k" | "lambda">;

/** 25 °C in kelvin: where a part's figures are stated. */
const REFERENCE_KELVIN = 298.15;
const KELVIN_AT_ZERO_CELSIUS = 273.15;

/**
 * The region a device works in.
 *
 * @param vgs gate-source voltage, V
 * @param vds drain-source voltage, V, not negative
 */
export function regionOf(device: SquareLaw, vgs: number, vds: number): Region {
  const overdrive = vgs - device.vt;
  if (overdrive <= 0) return "cutoff";
  return vds >= overdrive ? "saturation" : "ohmic";
}

/**
 * Drain current of the long-channel square law with channel-length modulation in both conducting regions
 * (H. Shichman and D. A. Hodges, "Modeling and simulation of insulated-gate field-effect transistor switching
 * circuits", IEEE Journal of Solid-State Circuits 3, 1968), body tied to source.
 *
 * @param vgs gate-source voltage, V
 * @param vds drain-source voltage, V, not negative
 * @returns amperes
 */
export function drainCurrent(device: SquareLaw, vgs: number, vds: number): number {
  const overdrive = vgs - device.vt;
  if (overdrive <= 0) return 0;
  const modulation = 1 + device.lambda * vds;
  return vds >= overdrive
    ? device.k * overdrive * overdrive * modulation
    : device.k * (2 * overdrive - vds) * vds * modulation;
}

/**
 * Transconductance and output conductance: the derivatives of `drainCurrent` by VGS and VDS.
 *
 * @returns siemens
 */
export function conductances(device: SquareLaw, vgs: number, vds: number): { gm: number; gds: number } {
  const overdrive = vgs - device.vt;
  const { k, lambda } = device;
  if (overdrive <= 0) return { gm: 0, gds: 0 };
  const modulation = 1 + lambda * vds;
  if (vds >= overdrive)
    return { gm: 2 * k * overdrive * modulation, gds: k * overdrive * overdrive * lambda };
  return {
    gm: 2 * k * vds * modulation,
    gds: 2 * k * (overdrive - vds) * modulation + k * (2 * overdrive - vds) * vds * lambda,
  };
}

/** A temperature in °C as kelvin. */
export function kelvin(celsius: number): number {
  return celsius + KELVIN_AT_ZERO_CELSIUS;
}

/**
 * A threshold at another temperature: it falls by its coefficient per kelvin.
 *
 * @param vt25 threshold at 25 °C, V
 * @param tcVt V/K, usually negative
 * @param celsius °C
 */
export function thresholdAt(vt25: number, tcVt: number, celsius: number): number {
  return vt25 + tcVt * (celsius - 25);
}

/**
 * The conduction parameter at another temperature: it follows carrier mobility, T to the power -1.5
 * (the level-1 temperature law of Berkeley SPICE).
 *
 * @param k25 conduction parameter at 25 °C, A/V²
 * @param celsius °C, above absolute zero
 */
export function conductionAt(k25: number, celsius: number): number {
  return k25 * (kelvin(celsius) / REFERENCE_KELVIN) ** -1.5;
}

/** The typical device of a part at an ambient temperature in °C. */
export function typicalDevice(
  part: Pick<Part, "polarity" | "vtTyp" | "kTyp" | "lambda" | "tcVt">,
  celsius = 25,
): Device {
  return {
    polarity: part.polarity,
    vt: thresholdAt(part.vtTyp, part.tcVt, celsius),
    k: conductionAt(part.kTyp, celsius),
    lambda: part.lambda,
  };
}
