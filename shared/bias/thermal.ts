import type { Part } from "#shared/schemas/part";

type ThermalFigures = Pick<Part, "pd25" | "rthJa" | "tjMax">;

/**
 * Permitted dissipation at an ambient temperature: full up to 25 °C, then falling in a straight line to zero at the
 * highest junction temperature (the derating line every datasheet draws).
 *
 * @param celsius ambient, °C
 * @returns watts
 */
export function permittedDissipation(part: ThermalFigures, celsius: number): number {
  if (celsius <= 25) return part.pd25;
  return Math.max(0, (part.pd25 * (part.tjMax - celsius)) / (part.tjMax - 25));
}

/**
 * Junction temperature in still air: ambient plus RthJA times the dissipation.
 *
 * @param power W
 * @param celsius ambient, °C
 * @returns °C
 */
export function junctionTemperature(part: Pick<Part, "rthJa">, power: number, celsius: number): number {
  return celsius + part.rthJa * power;
}
