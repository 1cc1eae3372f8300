import { readFileSync } from "node:fs";
import { readTable } from "./columns";
import type { CapacitorRecord, MosfetRecord, ResistorRecord } from "./records";
import { capacitorColumns, mosfetColumns, resistorColumns } from "./tables";

/** Where the committed data files are. */
export const dataFolder = new URL("../data/", import.meta.url);

/**
 * Reads the MOSFET catalog.
 *
 * @param folder where mosfets.csv is
 * @throws {RangeError} where a line does not read
 */
export function readMosfets(folder: URL = dataFolder): MosfetRecord[] {
  return readTable(mosfetColumns, readFileSync(new URL("mosfets.csv", folder), "utf8"));
}

/**
 * Reads the resistors that can be ordered.
 *
 * @param folder where resistors.csv is
 * @throws {RangeError} where a line does not read
 */
export function readResistors(folder: URL = dataFolder): ResistorRecord[] {
  return readTable(resistorColumns, readFileSync(new URL("resistors.csv", folder), "utf8"));
}

/**
 * Reads the capacitors that can be ordered.
 *
 * @param folder where capacitors.csv is
 * @throws {RangeError} where a line does not read
 */
export function readCapacitors(folder: URL = dataFolder): CapacitorRecord[] {
  return readTable(capacitorColumns, readFileSync(new URL("capacitors.csv", folder), "utf8"));
}
