import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { parseQuantity } from "#shared/values/parse-quantity";
import { formatRkm, formatRkmFarads } from "#shared/values/rkm";
import { UNITS, type Unit } from "#shared/values/units";

const UNIT_NAMES = Object.keys(UNITS) as Unit[];
const read = (text: string, unit: Unit) => {
  const parsed = parseQuantity(text, unit);
  return parsed.ok ? parsed.value : parsed.message;
};

describe("what people type", () => {
  it.each([
    [
      "V",
      [
        "12",
        "12 V",
        "12V",
        "12 v",
        " 12  volts ",
        "12 VDC",
        "12,0 V",
        "0.012 kV",
        "12000 mV",
        "1.2e1 V",
        "+12",
        "１２ V",
      ],
      12,
    ],
    ["V", ["1.5 V", "1,5 V", "1V5", "1500 mV", "1500mV"], 1.5],
    ["V", [".358", "0,358", "0.358 V", "358 mV"], 0.358],
    ["V", ["-3 V", "−3 V", "–3 V", "- 3 V"], -3],
    [
      "Ω",
      [
        "10k",
        "10K",
        "10 k",
        "10 kΩ",
        "10 k\u2126",
        "10kohm",
        "10 kohms",
        "10 KOhm",
        "10000",
        "10 000",
        "10\u202f000 Ω",
        "1e4",
        "10e3",
        "0.01M",
      ],
      10_000,
    ],
    ["Ω", ["4k7", "4K7", "4k7Ω", "4k7 ohm", "4.7k", "4,7 kΩ", "4700R", "4700"], 4700],
    ["Ω", ["2M2", "2.2M", "2.2 MΩ", "2.2meg", "2.2 Megohm", "2200k"], 2.2e6],
    ["Ω", ["R47", "0R47", "0.47", "470 mΩ", ".47R"], 0.47],
    ["Ω", ["220 kΩ", "220k"], 220_000],
    ["A", ["3 mA", "3mA", "3 ma", "3000 uA", "3000 µA", "3000 \u03bcA", "0.003", "3m"], 0.003],
    ["F", ["100 uF", "100 µF", "100 \u03bcF", "100uF", "100 uf", "100u", "100µ", "0.1 mF", "100e-6"], 100e-6],
    ["F", ["4n7", "4.7n", "4.7 nF", "4N7", "4700p", "4n7F"], 4.7e-9],
    ["F", ["p47", "0.47 pF"], 0.47e-12],
    ["Hz", ["20 kHz", "20k", "20 khz", "20000", "0.02 MHz"], 20_000],
    ["Hz", ["500 mHz", "0.5"], 0.5],
    ["°C", ["-10", "−10", "-10 °C", "−10°C", "-10 C", "-10 ºC", "-10 ℃", "-10 degC", "-10°"], -10],
    ["%", ["5", "5 %", "5%", "5,0 %", "± 5 %", "±5%", "+/-5 %", "5 percent", "5 per cent"], 0.05],
    ["%", ["0.9", "0.9 %"], 0.009],
    ["s", ["150 ms", "0.15 s", "0.15"], 0.15],
    ["S", ["8 mS", "8m", "0.008 S"], 0.008],
    ["A/V²", ["22 mA/V²", "22 mA/V2", "22mA/V^2", "0.022"], 0.022],
    ["V/K", ["-2 mV/K", "−2 mV/°C", "-0.002"], -0.002],
    ["1/V", ["0.02", "0.02 1/V", "0.02 /V", "0.02 V⁻¹"], 0.02],
    ["K/W", ["350", "350 K/W", "350 °C/W"], 350],
    ["ppm/K", ["50", "50 ppm", "50 ppm/°C"], 50],
    ["", ["10", "1e1"], 10],
  ] as const)("in %s is read, each of %j as %s", (unit, texts, value) => {
    expect(texts.map((text) => [text, read(text, unit)])).toEqual(texts.map((text) => [text, value]));
  });

  it("as minus zero is plain zero", () => {
    expect(read("-0 V", "V")).toBe(0);
  });

  it("as a marking is read as the value it marks", () => {
    const digits = fc.integer({ min: 100, max: 999 });
    fc.assert(
      fc.property(digits, fc.integer({ min: -3, max: 7 }), (mantissa, exponent) => {
        const value = Number(`${mantissa}e${exponent}`);
        expect(read(formatRkm(value), "Ω")).toBe(value);
      }),
    );
    fc.assert(
      fc.property(digits, fc.integer({ min: -14, max: -4 }), (mantissa, exponent) => {
        const value = Number(`${mantissa}e${exponent}`);
        expect(read(formatRkmFarads(value), "F")).toBe(value);
      }),
    );
  });
});

describe("what can't be read gets a message that", () => {
  it.each([
    ["", "V", "Write a voltage, such as 12 V or 350 mV."],
    ["twelve", "V", "“twelve” can't be read as a voltage. Write, for example, 12 V or 350 mV."],
    ["12 X", "V", "“12 X” can't be read as a voltage. Write, for example, 12 V or 350 mV."],
    ["300 K", "°C", "“300 K” can't be read as a temperature in °C. Write, for example, 25 °C or −10."],
    ["10 k", "%", "“10 k” can't be read as a percentage. Write, for example, 5 % or 0.5."],
  ] as const)("shows how to write it: %j in %s", (text, unit, message) => {
    expect(read(text, unit)).toBe(message);
  });

  it.each([
    ["12 mA", "V", "“12 mA” is a current, and a voltage is expected. Write, for example, 12 V or 350 mV."],
    [
      "470R",
      "F",
      "“470R” is a resistance, and a capacitance is expected. Write, for example, 100 nF, 4n7 or 10 uF.",
    ],
    ["8 ms", "S", "“8 ms” is a time, and a conductance is expected. Write, for example, 8 mS or 0.02 S."],
    ["5 %", "", "“5 %” is a percentage, and a plain number is expected. Write, for example, 10 or 2.5."],
  ] as const)("names the other unit: %s in %s", (text, unit, message) => {
    expect(read(text, unit)).toBe(message);
  });

  it.each([
    ["3 MA", "A", "“3 MA” says mega: M is mega, m is milli, u is micro. Write 3 mA or 3 A."],
    ["350 M", "V", "“350 M” says mega: M is mega, m is milli, u is micro. Write 350 mV or 350 V."],
    ["10m", "Ω", "“10m” could be milli or mega. Write 10 MΩ or 10 mΩ."],
    ["2m2", "Ω", "“2m2” could be milli or mega. Write 2.2 MΩ or 2.2 mΩ."],
    ["1 mhz", "Hz", "“1 mhz” could be milli or mega. Write 1 MHz or 1 mHz."],
  ] as const)("tells milli from mega: %s in %s", (text, unit, message) => {
    expect(read(text, unit)).toBe(message);
  });

  it("asks which number is meant by a comma before three digits", () => {
    expect(read("10,000 Ω", "Ω")).toBe("“10,000 Ω” could be 10.000 or 10000: write it without the comma.");
    expect(read("1,000,000", "Ω")).toBe(
      "“1,000,000” has more than one point or comma. Leave out thousands separators, as in 1234.5.",
    );
  });

  it("says so where the number is too large, or the text too long", () => {
    expect(read("1e999", "V")).toBe(
      "“1e999” is too large for a voltage. Write, for example, 12 V or 350 mV.",
    );
    expect(read("9".repeat(5000), "V")).toMatch(/^“9{40}…” can't be read as a voltage\./);
  });
});

describe("whatever is typed", () => {
  const pieces = fc.constantFrom(
    ..."0123456789.,+-−eE kKmMuµnpGTRVAWΩFHzsS%°C/²^±".split(""),
    "ohm",
    "meg",
    "\u00a0",
    "∞",
    "NaN",
  );
  const texts = fc.oneof(
    fc.string({ unit: "binary" }),
    fc.array(pieces, { maxLength: 12 }).map((list) => list.join("")),
  );

  it("gives a finite number, or a message that names what is expected", () => {
    fc.assert(
      fc.property(texts, fc.constantFrom(...UNIT_NAMES), (text, unit) => {
        const parsed = parseQuantity(text, unit);
        if (parsed.ok) expect(Number.isFinite(parsed.value)).toBe(true);
        else expect(parsed.message).toMatch(/Write|write|as in/);
      }),
      { numRuns: 2000 },
    );
  });

  it("is read the same with the unit written out where it was left off", () => {
    fc.assert(
      fc.property(fc.integer({ min: -9999, max: 9999 }), fc.constantFrom(...UNIT_NAMES), (number, unit) => {
        expect(read(`${number} ${unit}`, unit)).toBe(read(`${number}`, unit));
      }),
    );
  });

  it("each unit's own examples are read", () => {
    for (const unit of UNIT_NAMES) {
      for (const example of UNITS[unit].example.split(/ or |, /)) {
        expect([example, parseQuantity(example, unit).ok]).toEqual([example, true]);
      }
    }
  });
});
