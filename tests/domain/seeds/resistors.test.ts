import { describe, expect, it } from "vitest";
import { readResistors } from "../../../seeds/catalog/read";
import preferred from "../../reference/checks/preferred-numbers.json";
import { breaking, fallsInWholeCents } from "./checks";

const resistors = readResistors();
type Resistor = (typeof resistors)[number];
const nameOf = ({ orderableNumber }: Resistor) => orderableNumber;

/** The three leading digits of a value, found through its decimal text and not through logarithms. */
const digits = (value: number) => Number(value.toExponential(2).slice(0, 4).replace(".", ""));

const e24 = new Set(preferred.E24.map((value) => value * 10));
const e96 = new Set(Array.from({ length: 96 }, (_, step) => Math.round(100 * 10 ** (step / 96))));

describe("the resistors that can be ordered", () => {
  it("have values of their stated series and no other", () => {
    const holds = ({ series, ohms }: Resistor) => {
      if (Number(ohms.toPrecision(3)) !== ohms) return false;
      return series === "E24" ? e24.has(digits(ohms)) : e96.has(digits(ohms)) && !e24.has(digits(ohms));
    };
    expect(breaking(resistors, nameOf, holds)).toEqual([]);
  });

  it("have one order number each, and each value once in a family, size and tolerance", () => {
    expect(new Set(resistors.map((each) => each.orderableNumber.toLowerCase())).size).toBe(resistors.length);
    const places = resistors.map(({ family, size, tolerance, ohms }) =>
      [family, size, tolerance, ohms].join(),
    );
    expect(new Set(places).size).toBe(resistors.length);
  });

  // 24 values a decade in E24, 96 - 6 more in E96, and the last decade's first value.
  it.each([
    ["thick film", "0402", 0.05, 1, 10e6, 7 * 24 + 1],
    ["thick film", "0402", 0.01, 1, 10e6, 7 * 114 + 1],
    ["thick film", "0603", 0.05, 1, 10e6, 7 * 24 + 1],
    ["thick film", "0603", 0.01, 1, 10e6, 7 * 114 + 1],
    ["thick film", "0805", 0.05, 1, 10e6, 7 * 24 + 1],
    ["thick film", "0805", 0.01, 1, 10e6, 7 * 114 + 1],
    ["thick film", "1206", 0.05, 1, 10e6, 7 * 24 + 1],
    ["thick film", "1206", 0.01, 1, 10e6, 7 * 114 + 1],
    ["thick film", "2512", 0.05, 1, 1e6, 6 * 24 + 1],
    ["thick film", "2512", 0.01, 1, 1e6, 6 * 24 + 1],
    ["thin film", "0603", 0.01, 10, 1e6, 5 * 114 + 1],
    ["thin film", "0805", 0.01, 10, 1e6, 5 * 114 + 1],
    ["metal film", "axial 3.6 mm", 0.01, 10, 1e6, 5 * 114 + 1],
    ["metal film", "axial 6.3 mm", 0.01, 10, 1e6, 5 * 114 + 1],
  ])(
    "cover %s %s at %d from %d Ω to %d Ω in %i values",
    (family, size, tolerance, least, greatest, count) => {
      const line = resistors.filter(
        (each) => each.family === family && each.size === size && each.tolerance === tolerance,
      );
      const ohms = line.map((each) => each.ohms);
      expect([line.length, Math.min(...ohms), Math.max(...ohms)]).toEqual([count, least, greatest]);
    },
  );

  it("are out of stock about one time in fifteen", () => {
    const empty = resistors.filter((each) => each.stock === 0).length;
    expect(resistors.length / empty).toBeGreaterThan(13);
    expect(resistors.length / empty).toBeLessThan(17);
  });

  it("are priced by the thousand in whole cents from one piece on, never rising with the quantity", () => {
    const holds = ({ priceBreaks }: Resistor) =>
      fallsInWholeCents(
        priceBreaks.map(({ quantity, centsPerThousand }) => ({ quantity, cents: centsPerThousand })),
      );
    expect(breaking(resistors, nameOf, holds)).toEqual([]);
  });

  it("carry ratings above zero and whole pieces and weeks", () => {
    const holds = (each: Resistor) =>
      each.powerRating > 0 &&
      each.voltageRating > 0 &&
      each.ppmPerKelvin > 0 &&
      Number.isInteger(each.stock) &&
      Number.isInteger(each.leadTimeWeeks) &&
      each.leadTimeWeeks > 0;
    expect(breaking(resistors, nameOf, holds)).toEqual([]);
  });

  it("name the value in the order number as it is marked on the part", () => {
    const find = (ohms: number) =>
      resistors.find((each) => each.size === "0603" && each.tolerance === 0.01 && each.ohms === ohms)
        ?.orderableNumber;
    expect([1.8e6, 750e3, 2700, 1200, 470, 4.7, 10.2e3].map(find)).toEqual([
      "FX06-1M8-F",
      "FX06-750K-F",
      "FX06-2K7-F",
      "FX06-1K2-F",
      "FX06-470R-F",
      "FX06-4R7-F",
      "FX06-10K2-F",
    ]);
  });
});
