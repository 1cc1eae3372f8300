import type { Brief } from "#shared/schemas/brief";
import { RESISTOR_KEYS, type ResistorKey, type Resistors } from "#shared/schemas/circuit";
import type { Part } from "#shared/schemas/part";
import { unitPriceAt } from "./filters";

/** One size of a resistor: what it stands, and what it costs for the whole build. */
export type ResistorSize = {
  /** Power rating, W. */
  power: number;
  /** Voltage rating, V. */
  voltage: number;
  /** Integer cents for the build quantity, at the deepest price break reached. */
  lineCents: number;
};

/** The sizes that each value is sold in, the smallest first; by ohms. */
export type ResistorPrices = ReadonlyMap<number, readonly ResistorSize[]>;

/** Which line of the cost something is: the transistor or a resistor. */
export type CostLine = { key: "q" | ResistorKey; cents: number };

/** What so many of a part cost, integer cents; null without a price. */
export function partLineCents(part: Pick<Part, "priceBreaks">, quantity: number): number | null {
  const each = unitPriceAt(part, quantity);
  return each === null ? null : each * quantity;
}

/**
 * What the smallest size costs whose derated power and voltage ratings hold.
 *
 * @param watts what the resistor dissipates
 * @param volts what stands across it
 * @param derating share of both ratings that may be used
 * @returns integer cents for the whole build; null where no size holds
 */
export function lineCentsFor(
  sizes: readonly ResistorSize[] | undefined,
  watts: number,
  volts: number,
  derating: number,
): number | null {
  const fits = sizes?.find(({ power, voltage }) => watts <= derating * power && volts <= derating * voltage);
  return fits ? fits.lineCents : null;
}

/**
 * What a build costs: the transistors and the resistors of all its stages, each line in whole cents at the deepest
 * price break that the build quantity reaches.
 *
 * @param volts the voltage across each resistor
 * @returns integer cents, with the lines; null where one has no price
 */
export function costOfBuild(
  part: Part,
  brief: Brief,
  prices: ResistorPrices,
  resistors: Resistors,
  volts: Partial<Resistors>,
): { cents: number; lines: CostLine[] } | null {
  const transistors = partLineCents(part, brief.buildQuantity);
  if (transistors === null) return null;
  const lines: CostLine[] = [{ key: "q", cents: transistors }];
  for (const key of RESISTOR_KEYS) {
    const ohms = resistors[key];
    if (ohms === 0) continue;
    const across = volts[key] ?? 0;
    const cents = lineCentsFor(prices.get(ohms), across ** 2 / ohms, across, brief.derating.resistorPower);
    if (cents === null) return null;
    lines.push({ key, cents });
  }
  return { cents: lines.reduce((sum, line) => sum + line.cents, 0), lines };
}
