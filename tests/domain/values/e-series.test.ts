import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  isInSeries,
  mantissas,
  nearestInSeries,
  SERIES_NAMES,
  stepInSeries,
  toMantissa,
  valuesBetween,
} from "#shared/values/e-series";
import preferred from "../../reference/checks/preferred-numbers.json";
import { E192_TABLE } from "./e192-table";

const every = (list: readonly number[], step: number) => list.filter((_, index) => index % step === 0);
const series = fc.constantFrom(...SERIES_NAMES);
/** Resistances the product takes, 0.1 Ω to 100 MΩ, evenly by ratio. */
const ohms = fc.double({ min: -1, max: 8, noNaN: true }).map((power) => 10 ** power);
/** A preferred value built from its decimal text. */
const preferredValue = series.chain((name) =>
  fc
    .tuple(fc.constantFrom(...mantissas(name)), fc.integer({ min: -3, max: 5 }))
    .map(([mantissa, exponent]) => ({ name, value: Number(`${mantissa}e${exponent}`) })),
);

describe("the preferred values of a decade", () => {
  // Source: IEC 60063, E24 as in two published tables.
  it.each([
    ["E3", every(preferred.E24, 8)],
    ["E6", every(preferred.E24, 4)],
    ["E12", every(preferred.E24, 2)],
    ["E24", preferred.E24],
    ["E48", every(E192_TABLE, 4)],
    ["E96", every(E192_TABLE, 2)],
    ["E192", E192_TABLE],
  ] as const)("of %s are the standard's", (name, expected) => {
    expect(mantissas(name)).toEqual(expected);
  });

  it("have 920 in E192, where the rounding rule gives 919", () => {
    const { k, standard } = preferred.E192exception;
    expect(mantissas("E192")[k]).toBe(standard);
  });

  it("are shared by E24 and E96 only where the standard says", () => {
    const e96 = new Set(mantissas("E96"));
    expect(mantissas("E24").filter((value) => e96.has(value * 10))).toEqual(preferred.commonToE24AndE96);
  });

  it("of every series up to E24 and from E48 on hold those of the coarser ones", () => {
    for (const [coarse, fine] of [
      ["E3", "E6"],
      ["E6", "E12"],
      ["E12", "E24"],
      ["E48", "E96"],
      ["E96", "E192"],
    ] as const) {
      expect(mantissas(fine)).toEqual(expect.arrayContaining([...mantissas(coarse)]));
    }
  });
});

describe("the values between two bounds", () => {
  it("include both bounds and are the doubles that the decimals mean", () => {
    expect(valuesBetween("E6", 0.47, 4700)).toEqual([
      0.47, 0.68, 1, 1.5, 2.2, 3.3, 4.7, 6.8, 10, 15, 22, 33, 47, 68, 100, 150, 220, 330, 470, 680, 1000,
      1500, 2200, 3300, 4700,
    ]);
    expect(valuesBetween("E12", 4.7e-9, 10e-9)).toEqual([4.7e-9, 5.6e-9, 6.8e-9, 8.2e-9, 10e-9]);
  });

  it("include a bound that a multiplication left beside its decimal", () => {
    const [below, above] = [4.7 * (1 - 2 ** -52), 4.7 * (1 + 2 ** -51)];
    expect(valuesBetween("E24", above, 5)).toEqual([4.7]);
    expect(valuesBetween("E24", 4.5, below)).toEqual([4.7]);
  });

  it("are none where no value lies between, or the bounds are crossed", () => {
    expect(valuesBetween("E3", 2.3, 4.6)).toEqual([]);
    expect(valuesBetween("E24", 100, 10)).toEqual([]);
  });

  it("count as many to a decade as the series is named after", () => {
    for (const name of SERIES_NAMES) {
      expect(valuesBetween(name, 10, 9999.9)).toHaveLength(3 * Number(name.slice(1)));
    }
  });

  it.each([0, -1, Number.NaN, Number.POSITIVE_INFINITY])("are refused for the bound %s", (bound) => {
    expect(() => valuesBetween("E24", bound, 10)).toThrow(RangeError);
    expect(() => valuesBetween("E24", 10, bound)).toThrow(RangeError);
  });

  it("are those that testing every mantissa in every decade finds", () => {
    fc.assert(
      fc.property(series, ohms, ohms, (name, a, b) => {
        const [min, max] = a < b ? [a, b] : [b, a];
        const all: number[] = [];
        for (let exponent = -4; exponent <= 8; exponent++) {
          for (const mantissa of mantissas(name)) {
            const value = Number(`${mantissa}e${exponent}`);
            if (value >= min * (1 - 1e-9) && value <= max * (1 + 1e-9)) all.push(value);
          }
        }
        const expected = [...new Set(all)].sort((left, right) => left - right);
        expect(valuesBetween(name, min, max)).toEqual(expected);
      }),
    );
  });
});

describe("stepping through a series", () => {
  it("goes to the neighbour, across decades too", () => {
    expect(stepInSeries("E24", 1.8e6, 1)).toBe(2e6);
    expect(stepInSeries("E24", 1.8e6, -1)).toBe(1.6e6);
    expect(stepInSeries("E24", 9100, 1)).toBe(10_000);
    expect(stepInSeries("E96", 1000, -1)).toBe(976);
    expect(stepInSeries("E3", 0.1, -2)).toBe(0.022);
    expect(stepInSeries("E12", 1000, 12)).toBe(10_000);
  });

  it("goes from a value between two to the neighbour on that side", () => {
    expect(stepInSeries("E24", 5000, 1)).toBe(5100);
    expect(stepInSeries("E24", 5000, -1)).toBe(4700);
    expect(stepInSeries("E24", 5000, 2)).toBe(5600);
    expect(stepInSeries("E24", 5000, 0)).toBe(5100);
  });

  it("up and then down as far comes back to a preferred value", () => {
    fc.assert(
      fc.property(preferredValue, fc.integer({ min: -300, max: 300 }), ({ name, value }, steps) => {
        expect(stepInSeries(name, stepInSeries(name, value, steps), -steps)).toBe(value);
      }),
    );
  });

  it("up goes to the least value above, down to the greatest below", () => {
    fc.assert(
      fc.property(series, ohms, (name, value) => {
        const above = valuesBetween(name, value, value * 20).find((each) => each > value * (1 + 1e-9));
        const below = valuesBetween(name, value / 20, value).findLast((each) => each < value * (1 - 1e-9));
        expect(stepInSeries(name, value, 1)).toBe(above);
        expect(stepInSeries(name, value, -1)).toBe(below);
      }),
    );
  });

  it("refuses half a step and a value that has no place in a series", () => {
    expect(() => stepInSeries("E24", 10, 0.5)).toThrow("expected a whole number of steps, got 0.5");
    expect(() => stepInSeries("E24", 0, 1)).toThrow("expected a finite value above zero, got 0");
  });
});

describe("the nearest preferred value", () => {
  it("is nearest by ratio and not by difference", () => {
    // 1 and 2.2 have their middle at 1.6 by difference and at √2.2 = 1.483 by ratio.
    expect(nearestInSeries("E3", 1.5)).toBe(2.2);
    expect(nearestInSeries("E3", 1.48)).toBe(1);
    expect(nearestInSeries("E96", 5000)).toBe(4990);
  });

  it("has no value of the series nearer", () => {
    fc.assert(
      fc.property(series, ohms, (name, value) => {
        const distance = (to: number) => Math.abs(Math.log(to / value));
        const least = Math.min(...valuesBetween(name, value / 20, value * 20).map(distance));
        expect(distance(nearestInSeries(name, value))).toBeCloseTo(least, 12);
      }),
    );
  });
});

describe("belonging to a series", () => {
  it("holds for its values and for float noise beside them", () => {
    fc.assert(
      fc.property(
        preferredValue,
        fc.constantFrom(1, 1 + 2 ** -50, 1 - 2 ** -50),
        ({ name, value }, noise) => {
          expect(isInSeries(name, value * noise)).toBe(true);
        },
      ),
    );
  });

  it.each([
    ["E12", 51],
    ["E24", 4990],
    ["E96", 4700],
    ["E192", 919],
    ["E24", 4701],
    ["E24", 0],
    ["E24", -47],
    ["E24", Number.NaN],
    ["E24", Number.POSITIVE_INFINITY],
  ] as const)("is refused in %s to %s", (name, value) => {
    expect(isInSeries(name, value)).toBe(false);
  });
});

describe("a value as whole digits", () => {
  it.each([
    [4700, 470, 1],
    [0.47, 470, -3],
    [1, 100, -2],
    [9.76e6, 976, 4],
    [4.7e-9, 470, -11],
    [999.6, 100, 1],
  ])("%s is %s × 10^%s", (value, digits, exponent) => {
    expect(toMantissa(value)).toEqual({ digits, exponent });
  });

  it("gives every preferred value back exactly", () => {
    fc.assert(
      fc.property(preferredValue, ({ value }) => {
        const { digits, exponent } = toMantissa(value);
        expect(Number(`${digits}e${exponent}`)).toBe(value);
      }),
    );
  });

  it("is refused where there is no value above zero", () => {
    expect(() => toMantissa(0)).toThrow(RangeError);
  });
});
