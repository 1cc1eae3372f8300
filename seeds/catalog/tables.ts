import { LIFECYCLES } from "#shared/schemas/part";
import { type Columns, flag, number, oneOf, priceBreaks, text } from "./columns";
import {
  type CapacitorRecord,
  capacitorFamilies,
  type MosfetRecord,
  type ResistorRecord,
  resistorFamilies,
  resistorSeries,
} from "./records";

/** The columns of mosfets.csv. */
export const mosfetColumns: Columns<MosfetRecord> = {
  partNumber: text,
  maker: text,
  polarity: oneOf(["n", "p"]),
  package: text,
  mounting: oneOf(["surface", "through-hole"]),
  vtMin: number,
  vtTyp: number,
  vtMax: number,
  kMin: number,
  kTyp: number,
  kMax: number,
  lambda: number,
  tcVt: number,
  ciss: number,
  coss: number,
  crss: number,
  vdss: number,
  vgss: number,
  idMax: number,
  pd25: number,
  rthJa: number,
  tjMax: number,
  lifecycle: oneOf(LIFECYCLES),
  stock: number,
  leadTimeWeeks: number,
  priceBreaks: priceBreaks("unitPrice"),
};

/** The columns of resistors.csv. */
export const resistorColumns: Columns<ResistorRecord> = {
  orderableNumber: text,
  maker: text,
  family: oneOf(resistorFamilies),
  series: oneOf(resistorSeries),
  ohms: number,
  tolerance: number,
  size: text,
  powerRating: number,
  voltageRating: number,
  ppmPerKelvin: number,
  stock: number,
  leadTimeWeeks: number,
  priceBreaks: priceBreaks("centsPerThousand"),
};

/** The columns of capacitors.csv. */
export const capacitorColumns: Columns<CapacitorRecord> = {
  orderableNumber: text,
  maker: text,
  family: oneOf(capacitorFamilies),
  farads: number,
  tolerance: number,
  voltageRating: number,
  size: text,
  polarised: flag,
  stock: number,
  leadTimeWeeks: number,
  priceBreaks: priceBreaks("centsPerThousand"),
};
