import { describe, expect, it } from "vitest";
import { readCapacitors } from "../../../seeds/catalog/read";
import preferred from "../../reference/checks/preferred-numbers.json";
import { breaking, fallsInWholeCents } from "./checks";

const capacitors = readCapacitors();
type Capacitor = (typeof capacitors)[number];
const nameOf = ({ orderableNumber }: Capacitor) => orderableNumber;

const e12 = new Set(preferred.E24.filter((_, index) => index % 2 === 0));
const e6 = new Set(preferred.E24.filter((_, index) => index % 4 === 0));
const digits = (value: number) => Number(value.toExponential(1).slice(0, 3).replace(".", ""));

describe("the capacitors that can be ordered", () => {
  it("have E12 values where C0G or electrolytic, E6 values where X7R or film", () => {
    const holds = ({ family, farads }: Capacitor) => {
      const series = family === "C0G" || family === "electrolytic" ? e12 : e6;
      return Number(farads.toPrecision(2)) === farads && series.has(digits(farads));
    };
    expect(breaking(capacitors, nameOf, holds)).toEqual([]);
  });

  it("have one order number each, and each value once in a family, size and voltage", () => {
    expect(new Set(capacitors.map((each) => each.orderableNumber.toLowerCase())).size).toBe(
      capacitors.length,
    );
    const places = capacitors.map(({ family, size, voltageRating, farads }) =>
      [family, size, voltageRating, farads].join(),
    );
    expect(new Set(places).size).toBe(capacitors.length);
  });

  it("are polarised where electrolytic and nowhere else", () => {
    expect(
      breaking(capacitors, nameOf, ({ family, polarised }) => polarised === (family === "electrolytic")),
    ).toEqual([]);
  });

  it.each([
    ["C0G", 1e-12, 10e-9, 0.05],
    ["X7R", 220e-12, 10e-6, 0.1],
    ["film", 1e-9, 1e-6, 0.05],
    ["electrolytic", 1e-6, 2200e-6, 0.2],
  ])("cover %s from %d F to %d F at a tolerance of %d", (family, least, greatest, tolerance) => {
    const line = capacitors.filter((each) => each.family === family);
    const farads = line.map((each) => each.farads);
    expect([Math.min(...farads), Math.max(...farads)]).toEqual([least, greatest]);
    expect(new Set(line.map((each) => each.tolerance))).toEqual(new Set([tolerance]));
  });

  it("need a larger can for more charge at the same voltage", () => {
    const cans = capacitors.filter((each) => each.family === "electrolytic");
    const smaller = (each: Capacitor) =>
      cans.some(
        (other) =>
          other.voltageRating === each.voltageRating &&
          other.farads < each.farads &&
          Number.parseFloat(other.size) > Number.parseFloat(each.size),
      );
    expect(breaking(cans, nameOf, (each) => !smaller(each))).toEqual([]);
  });

  it("offer couplings for a 12 V stage as the catalog's own order numbers", () => {
    const numbers = new Set(capacitors.map(nameOf));
    for (const wanted of ["PM1206-100N-50", "EL5-10U-25", "EL6-47U-25", "EL6-56U-25"]) {
      expect(numbers).toContain(wanted);
    }
  });

  it("are priced by the thousand in whole cents from one piece on, never rising with the quantity", () => {
    const holds = ({ priceBreaks, stock, leadTimeWeeks }: Capacitor) =>
      fallsInWholeCents(
        priceBreaks.map(({ quantity, centsPerThousand }) => ({ quantity, cents: centsPerThousand })),
      ) &&
      Number.isInteger(stock) &&
      Number.isInteger(leadTimeWeeks);
    expect(breaking(capacitors, nameOf, holds)).toEqual([]);
  });
});
