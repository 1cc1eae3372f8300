import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { formatRkm, formatRkmFarads, parseRkm, parseRkmFarads, TOLERANCE_LETTERS } from "#shared/values/rkm";
import preferred from "../../reference/checks/preferred-numbers.json";

/** Three digits and a power of ten, read from decimal text. */
const threeDigits = (least: number, greatest: number) =>
  fc
    .tuple(fc.integer({ min: 100, max: 999 }), fc.integer({ min: least, max: greatest }))
    .map(([digits, exponent]) => Number(`${digits}e${exponent}`));

describe("a resistance marking", () => {
  // Source: IEC 60062's examples; the standard writes K, the product k.
  it.each(Object.entries(preferred.rkm))("%s is read and written as the standard has it", (text, ohms) => {
    expect(parseRkm(text)).toBe(ohms);
    expect(formatRkm(ohms)).toBe(text.replace("K", "k"));
  });

  it.each([
    [1000, "1k"],
    [750_000, "750k"],
    [820, "820R"],
    [2.2e6, "2M2"],
    [100e6, "100M"],
    [0.1, "R1"],
    [0.047, "R047"],
    [1e9, "1G"],
    [2.2e12, "2T2"],
    [4.7 * (1 + 2 ** -51) * 1000, "4k7"],
    [1234, "1k234"],
    [0, "0R"],
  ])("of %s Ω is %s", (ohms, text) => {
    expect(formatRkm(ohms)).toBe(text);
  });

  it("of a computed resistance is rounded to the digits asked for", () => {
    expect(formatRkm(529_412, 3)).toBe("529k");
    expect(formatRkm(999_600, 3)).toBe("1M");
  });

  it.each([
    ["4k7", 4700],
    ["4K7", 4700],
    [" 4k7 ", 4700],
    ["r47", 0.47],
    ["0R47", 0.47],
    ["k47", 470],
    ["10k", 10_000],
    ["2M2", 2.2e6],
  ])("%s is read", (text, ohms) => {
    expect(parseRkm(text)).toBe(ohms);
  });

  it.each(["", "R", "470", "4m7", "4k7k", "4.7k", "-4k7", "4 k7", "four"])("%j is none", (text) => {
    expect(parseRkm(text)).toBeNull();
  });

  it("is none where its number is beyond any double", () => {
    expect(parseRkm(`${"9".repeat(400)}R`)).toBeNull();
  });

  it("is a dash where there is no resistance, and refused where there can be none", () => {
    expect(formatRkm(null)).toBe("—");
    expect(formatRkm(Number.NaN)).toBe("—");
    expect(() => formatRkm(-1)).toThrow("expected a finite value of zero or more to mark, got -1");
    expect(() => formatRkm(Number.POSITIVE_INFINITY)).toThrow(RangeError);
  });

  it("reads back as the very value it was written from", () => {
    fc.assert(
      fc.property(threeDigits(-4, 10), (ohms) => {
        expect(parseRkm(formatRkm(ohms))).toBe(ohms);
      }),
    );
  });
});

describe("a capacitance marking", () => {
  // Source: IEC 60062's letters p, n, µ, m, F from memory; u stands for µ.
  it.each([
    [4.7e-9, "4n7"],
    [100e-9, "100n"],
    [10e-6, "10u"],
    [4.7e-12, "4p7"],
    [0.47e-12, "p47"],
    [2.2e-3, "2m2"],
    [1, "1F"],
    [0, "0F"],
  ])("of %s F is %s", (farads, text) => {
    expect(formatRkmFarads(farads)).toBe(text);
  });

  it.each([
    ["10µ", 10e-6],
    ["10\u03bc", 10e-6],
    ["4U7", 4.7e-6],
    ["100N", 100e-9],
    ["p47", 0.47e-12],
  ])("%s is read", (text, farads) => {
    expect(parseRkmFarads(text)).toBe(farads);
  });

  it.each(["10M", "10k", "4R7", "100"])("%s is none", (text) => {
    expect(parseRkmFarads(text)).toBeNull();
  });

  it("reads back as the very value it was written from", () => {
    fc.assert(
      fc.property(threeDigits(-14, -1), (farads) => {
        expect(parseRkmFarads(formatRkmFarads(farads))).toBe(farads);
      }),
    );
  });
});

describe("the tolerance letters", () => {
  // Source: IEC 60062, the letters of the reference file.
  it.each(Object.entries(preferred.toleranceLetters))("%s is ± %s %", (letter, percent) => {
    expect(TOLERANCE_LETTERS[letter as keyof typeof TOLERANCE_LETTERS]).toBe(Number(`${percent}e-2`));
  });

  // Source: IEC 60062 from memory; not in the reference file.
  it.each([
    ["E", 0.00005],
    ["L", 0.0001],
    ["P", 0.0002],
    ["W", 0.0005],
    ["H", 0.03],
    ["N", 0.3],
  ] as const)("%s is ± %s as a fraction", (letter, fraction) => {
    expect(TOLERANCE_LETTERS[letter]).toBe(fraction);
  });
});
