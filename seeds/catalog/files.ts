import { inventCapacitors } from "./capacitors";
import { writeTable } from "./columns";
import { inventMosfets } from "./mosfets";
import { inventResistors } from "./resistors";
import { capacitorColumns, mosfetColumns, resistorColumns } from "./tables";

/** Every data file of the catalog, by name, as it should stand in the data folder. */
export function catalogFiles(): Map<string, string> {
  return new Map([
    ["mosfets.csv", writeTable(mosfetColumns, inventMosfets())],
    ["resistors.csv", writeTable(resistorColumns, inventResistors())],
    ["capacitors.csv", writeTable(capacitorColumns, inventCapacitors())],
  ]);
}
