import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  formatCents,
  formatCount,
  formatPercent,
  formatQuantity,
  formatResistance,
} from "#shared/values/engineering";
import { parseQuantity } from "#shared/values/parse-quantity";
import { PREFIXES, UNITS, type Unit } from "#shared/values/units";

const UNIT_NAMES = Object.keys(UNITS) as Unit[];
/** Values of either sign over the magnitudes that circuits have. */
const values = fc
  .tuple(fc.double({ min: -11, max: 9, noNaN: true }), fc.constantFrom(1, -1))
  .map(([power, sign]) => sign * 10 ** power);

describe("a computed quantity", () => {
  it.each([
    [2.8296, "V", "2.83 V"],
    [2.8, "V", "2.80 V"],
    [1.8874e-3, "A", "1.89 mA"],
    [0.35777, "V", "0.358 V"],
    [0.1, "V", "0.100 V"],
    [0.0358, "V", "35.8 mV"],
    [8.7e-3, "W", "8.70 mW"],
    [4700, "Ω", "4.70 kΩ"],
    [529_412, "Ω", "529 kΩ"],
    [0.47, "Ω", "0.470 Ω"],
    [0.5e-12, "F", "0.500 pF"],
    [100e-9, "F", "100 nF"],
    [10e-6, "F", "10.0 µF"],
    [0.5, "Hz", "0.500 Hz"],
    [17, "Hz", "17.0 Hz"],
    [0.0222, "A/V²", "22.2 mA/V²"],
    [-0.002, "V/K", "−2.00 mV/K"],
    [0.02, "1/V", "0.0200 1/V"],
    [-21.894, "", "−21.9"],
    [0.09, "s", "90.0 ms"],
    [0.009, "%", "0.900 %"],
    [53.2, "°C", "53 °C"],
    [-10, "°C", "−10 °C"],
    [125.4, "°C", "125 °C"],
    [1250, "K/W", "1250 K/W"],
  ] as const)("%s %s reads %s", (value, unit, text) => {
    expect(formatQuantity(value, unit)).toBe(text);
  });

  it.each([
    [0.9996, "A", "1.00 A"],
    [0.09996, "V", "0.100 V"],
    [999.6e-9, "A", "1.00 µA"],
    [999_600, "Ω", "1.00 MΩ"],
    [-0.9996e-3, "A", "−1.00 mA"],
    [99.96, "°C", "100 °C"],
    [999.4, "Ω", "999 Ω"],
  ] as const)("%s %s that rounds into the next prefix reads %s", (value, unit, text) => {
    expect(formatQuantity(value, unit)).toBe(text);
  });

  it("has the digits asked for, and never a zero in place of a digit before the point", () => {
    expect(formatQuantity(8.7e-3, "W", { digits: 2 })).toBe("8.7 mW");
    expect(formatQuantity(-21.894, "", { digits: 4 })).toBe("−21.89");
    expect(formatQuantity(0.1234, "W", { digits: 2 })).toBe("123 mW");
    expect(formatQuantity(53.24, "°C", { digits: 3 })).toBe("53.2 °C");
    expect(formatQuantity(1234.6, "A", { digits: 2 })).toBe("1235 A");
    expect(() => formatQuantity(1, "V", { digits: 0 })).toThrow(RangeError);
  });

  it("takes no prefix that its unit doesn't have", () => {
    expect(formatQuantity(5e6, "V")).toBe("5000 kV");
    expect(formatQuantity(2000, "A")).toBe("2000 A");
    expect(formatQuantity(2e-14, "A")).toBe("0.0200 pA");
  });

  it("keeps the bare unit down to where it is asked to", () => {
    expect(formatQuantity(0.0358, "V", { unprefixedFrom: 0.01 })).toBe("0.0358 V");
    expect(formatQuantity(0.0358, "A", { unprefixedFrom: 0.1 })).toBe("35.8 mA");
    expect(formatQuantity(0.358, "V", { unprefixedFrom: 1 })).toBe("358 mV");
  });

  it("shows a plus where a difference is meant", () => {
    expect(formatQuantity(0.12, "V", { sign: true })).toBe("+0.120 V");
    expect(formatQuantity(-0.12, "V", { sign: true })).toBe("−0.120 V");
    expect(formatQuantity(0, "V", { sign: true })).toBe("0 V");
  });

  it("reads as a sign of its own where there is no number", () => {
    expect(formatQuantity(null, "V")).toBe("—");
    expect(formatQuantity(undefined, "V")).toBe("—");
    expect(formatQuantity(Number.NaN, "V")).toBe("—");
    expect(formatQuantity(Number.POSITIVE_INFINITY, "Ω")).toBe("∞");
    expect(formatQuantity(Number.NEGATIVE_INFINITY, "Ω")).toBe("−∞");
  });

  it("is zero where only the residue of a subtraction is left", () => {
    expect(formatQuantity(0, "V")).toBe("0 V");
    expect(formatQuantity(-0, "V")).toBe("0 V");
    expect(formatQuantity(0.1 + 0.2 - 0.3, "V")).toBe("0 V");
    expect(formatQuantity(Number.MIN_VALUE, "°C")).toBe("0 °C");
  });

  it("is within half of its last digit of the value", () => {
    fc.assert(
      fc.property(
        values,
        fc.constantFrom(...UNIT_NAMES),
        fc.integer({ min: 1, max: 6 }),
        (value, unit, digits) => {
          const read = parseQuantity(formatQuantity(value, unit, { digits }), unit);
          const power = Math.floor(Math.log10(Math.abs(value)));
          expect(read.ok && Math.abs(read.value - value)).toBeLessThanOrEqual(
            0.5000001 * 10 ** (power - digits + 1),
          );
        },
      ),
    );
  });

  it("has one to three digits before the point wherever its unit's prefixes reach", () => {
    fc.assert(
      fc.property(values, fc.constantFrom<Unit>("V", "A", "W", "Ω", "F", "Hz"), (value, unit) => {
        const powers = UNITS[unit].prefixes.map((prefix) => PREFIXES[prefix]);
        fc.pre(
          Math.abs(value) >= 10 ** Math.min(...powers) &&
            Math.abs(value) < 0.999 * 10 ** (Math.max(...powers) + 3),
        );
        expect(formatQuantity(value, unit)).toMatch(/^−?(\d\.\d\d|\d\d\.\d|\d\d\d|0\.\d\d\d) /);
      }),
    );
  });
});

describe("a stated quantity", () => {
  it.each([
    [12, "V", "12 V"],
    [10_000, "Ω", "10 kΩ"],
    [13.8, "V", "13.8 V"],
    [12.345, "V", "12.345 V"],
    [0.5, "V", "0.5 V"],
    [0.035, "V", "35 mV"],
    [100, "Ω", "100 Ω"],
    [4.7 * (1 + 2 ** -51) * 1000, "Ω", "4.7 kΩ"],
    [27.5, "°C", "27.5 °C"],
    [0.05, "%", "5 %"],
    [0.07, "%", "7 %"],
    [0.0025, "%", "0.25 %"],
    [1, "%", "100 %"],
    [10, "", "10"],
  ] as const)("%s %s keeps every digit and no idle zero: %s", (value, unit, text) => {
    expect(formatQuantity(value, unit, { exact: true })).toBe(text);
  });

  it("can still be rounded", () => {
    expect(formatQuantity(12.345, "V", { exact: true, digits: 3 })).toBe("12.3 V");
    expect(formatQuantity(12.02, "V", { exact: true, digits: 3 })).toBe("12 V");
  });

  it("reads back as itself", () => {
    fc.assert(
      fc.property(values, fc.constantFrom(...UNIT_NAMES), (value, unit) => {
        const read = parseQuantity(formatQuantity(value, unit, { exact: true }), unit);
        expect(read.ok && Math.abs(read.value / value - 1)).toBeLessThan(1e-11);
      }),
    );
  });
});

describe("a percentage in a column", () => {
  it.each([
    [0.009, 1, "0.9 %"],
    [0.999, 1, "99.9 %"],
    [0.05, 1, "5.0 %"],
    [0.8, 0, "80 %"],
    [0.285, 0, "29 %"],
    [0.01006, 2, "1.01 %"],
    [-0.0213, 1, "−2.1 %"],
    [-0.0004, 1, "0.0 %"],
    [0, 1, "0.0 %"],
  ])("%s with %s places reads %s", (fraction, decimals, text) => {
    expect(formatPercent(fraction, decimals)).toBe(text);
  });

  it("has one place where nobody asks, and a dash where there is no figure", () => {
    expect(formatPercent(0.024)).toBe("2.4 %");
    expect(formatPercent(null)).toBe("—");
    expect(formatPercent(Number.NaN)).toBe("—");
  });
});

describe("a resistance in the reader's style", () => {
  it.each([
    [4700, "4k7", "4.7 kΩ"],
    [1.8e6, "1M8", "1.8 MΩ"],
    [820, "820R", "820 Ω"],
    [0.47, "R47", "0.47 Ω"],
    [10_000, "10k", "10 kΩ"],
  ])("%s Ω reads %s or %s", (ohms, marked, spelled) => {
    expect(formatResistance(ohms, "rkm")).toBe(marked);
    expect(formatResistance(ohms, "spelled")).toBe(spelled);
  });

  it("is rounded where it was computed", () => {
    expect(formatResistance(529_412, "rkm", 3)).toBe("529k");
    expect(formatResistance(529_412, "spelled", 3)).toBe("529 kΩ");
  });

  it("reads the same in both styles where there is none", () => {
    for (const style of ["rkm", "spelled"] as const) {
      expect(formatResistance(null, style)).toBe("—");
      expect(formatResistance(Number.POSITIVE_INFINITY, style)).toBe("∞");
    }
  });
});

describe("money and counts", () => {
  it.each([
    [27_840, "$278.40"],
    [55, "$0.55"],
    [0, "$0.00"],
    [0.4, "$0.004"],
    [12.345, "$0.12345"],
    [123_456_789, "$1,234,567.89"],
    [-500, "−$5.00"],
    [null, "—"],
  ])("%s cents read %s", (cents, text) => {
    expect(formatCents(cents)).toBe(text);
  });

  it("show the currency they are in", () => {
    expect(formatCents(27_840, "EUR")).toBe("€278.40");
  });

  it.each([
    [35_437_621_248, "35,437,621,248"],
    [4200, "4,200"],
    [0, "0"],
    [-130, "−130"],
    [null, "—"],
    [Number.NaN, "—"],
    [Number.POSITIVE_INFINITY, "∞"],
  ])("a count of %s reads %s", (count, text) => {
    expect(formatCount(count)).toBe(text);
  });
});
