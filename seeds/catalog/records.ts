import type { Part } from "#shared/schemas/part";

export type Lifecycle = Part["lifecycle"];

/** What stands in a shop for any orderable thing: pieces on the shelf, and whole weeks until more arrive. */
export type Availability = Pick<Part, "stock" | "leadTimeWeeks">;

/** One MOSFET of the shared catalog, before the database numbers it. */
export type MosfetRecord = Omit<Part, "id">;

/** From this many pieces on, a thousand pieces cost this many US cents (one of them costs less than a cent). */
interface ThousandPriceBreak {
  quantity: number;
  centsPerThousand: number;
}

export const resistorFamilies = ["thick film", "thin film", "metal film"] as const;
export type ResistorFamily = (typeof resistorFamilies)[number];

export const resistorSeries = ["E24", "E96"] as const;
export type ResistorSeries = (typeof resistorSeries)[number];

/** One resistor that can be ordered. */
export interface ResistorRecord extends Availability {
  orderableNumber: string;
  maker: string;
  family: ResistorFamily;
  /** The coarser of the two series that hold the value. */
  series: ResistorSeries;
  /** Ω. */
  ohms: number;
  /** A fraction: 0.01 is ± 1 %. */
  tolerance: number;
  /** Outline: an imperial chip size, or the body length of a leaded part. */
  size: string;
  /** W at 70 °C. */
  powerRating: number;
  /** V. */
  voltageRating: number;
  /** Temperature coefficient, ± parts per million per kelvin. */
  ppmPerKelvin: number;
  priceBreaks: ThousandPriceBreak[];
}

export const capacitorFamilies = ["C0G", "X7R", "film", "electrolytic"] as const;
export type CapacitorFamily = (typeof capacitorFamilies)[number];

/** One capacitor that can be ordered. */
export interface CapacitorRecord extends Availability {
  orderableNumber: string;
  maker: string;
  family: CapacitorFamily;
  /** F. */
  farads: number;
  /** A fraction: 0.1 is ± 10 %. */
  tolerance: number;
  /** V d.c. */
  voltageRating: number;
  /** Outline: an imperial chip size, the lead spacing of a box, or the diameter of a can. */
  size: string;
  polarised: boolean;
  priceBreaks: ThousandPriceBreak[];
}
