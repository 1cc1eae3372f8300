import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { briefSchema } from "#shared/schemas/brief";
import { costOfBuild, lineCentsFor, partLineCents, type ResistorSize } from "../../api/ranking/cost";
import { buildPart } from "../support/build-part";

const SMALL = { power: 0.1, voltage: 75, lineCents: 40 };
const MIDDLE = { power: 0.125, voltage: 150, lineCents: 55 };
const LARGE = { power: 0.25, voltage: 200, lineCents: 90 };
const SIZES = [SMALL, MIDDLE, LARGE];

describe("the size of a resistor", () => {
  it.each([
    { watts: 0.05, volts: 10, cents: 40, why: "stands exactly half its power" },
    { watts: 0.0501, volts: 10, cents: 55, why: "is the next one where half the power is passed" },
    { watts: 0.01, volts: 37.5, cents: 40, why: "stands exactly half its voltage" },
    { watts: 0.01, volts: 38, cents: 55, why: "is the next one where half the voltage is passed" },
    { watts: 0.01, volts: 80, cents: 90, why: "is the largest where only its voltage holds" },
  ])("$why", ({ watts, volts, cents }) => {
    expect(lineCentsFor(SIZES, watts, volts, 0.5)).toBe(cents);
  });

  it("is none where neither rating holds, or where the value isn't sold", () => {
    expect(lineCentsFor(SIZES, 0.126, 1, 0.5)).toBeNull();
    expect(lineCentsFor(SIZES, 0.001, 101, 0.5)).toBeNull();
    expect(lineCentsFor([], 0.001, 1, 0.5)).toBeNull();
    expect(lineCentsFor(undefined, 0.001, 1, 0.5)).toBeNull();
  });

  it("is the smallest that holds even where a larger one is cheaper", () => {
    expect(lineCentsFor([{ ...SMALL, lineCents: 99 }, LARGE], 0.01, 1, 0.5)).toBe(99);
  });

  it("never gets smaller as the resistor has to stand more", () => {
    const rating = fc.double({ min: 0, max: 1, noNaN: true });
    // Each size stands more than the one before and costs more, so that the price tells the size.
    const sizes: ResistorSize[] = [1, 2, 3, 4, 5].map((step) => ({
      power: step / 10,
      voltage: 40 * step,
      lineCents: step,
    }));
    fc.assert(
      fc.property(rating, rating, rating, rating, (watts, volts, moreWatts, moreVolts) => {
        const price = lineCentsFor(sizes, watts, 200 * volts, 0.5) ?? Number.POSITIVE_INFINITY;
        const harder = lineCentsFor(sizes, watts + moreWatts, 200 * (volts + moreVolts), 0.5);
        expect(harder ?? Number.POSITIVE_INFINITY).toBeGreaterThanOrEqual(price);
      }),
    );
  });
});

describe("what the transistors cost", () => {
  const breaks = [
    { quantity: 1, unitPrice: 30 },
    { quantity: 100, unitPrice: 12 },
    { quantity: 1000, unitPrice: 7 },
  ];

  it.each([
    [1, 30],
    [99, 2970],
    [100, 1200],
    [999, 11_988],
    [1000, 7000],
    [10_000_000, 70_000_000],
  ])("for %i builds is %i cents, at the deepest break reached", (quantity, cents) => {
    expect(partLineCents({ priceBreaks: breaks }, quantity)).toBe(cents);
  });

  it("is at the first break for fewer than the maker sells at once", () => {
    expect(partLineCents({ priceBreaks: [{ quantity: 500, unitPrice: 9 }] }, 10)).toBe(90);
  });

  it("is unknown without a price", () => {
    expect(partLineCents({ priceBreaks: [] }, 100)).toBeNull();
  });
});

describe("what a build costs", () => {
  const brief = briefSchema.parse({ rail: { volts: 12 }, load: { ohms: 10_000 }, buildQuantity: 250 });
  const part = buildPart({ priceBreaks: [{ quantity: 1, unitPrice: 12 }] });
  const prices = new Map([
    [680_000, SIZES],
    [180_000, [{ ...SMALL, lineCents: 41 }]],
    [200, SIZES],
    [470, [{ ...SMALL, lineCents: 43 }]],
  ]);
  const resistors = { r1: 680_000, r2: 180_000, rg: 0, rd: 200, rs: 470, rs2: 0 };
  // 4 V across 200 Ω are 80 mW: past half of 0.125 W, so the drain resistor is the largest.
  const volts = { r1: 9.5, r2: 2.5, rd: 4, rs: 0.5 };

  it("is the sum of its lines, one for the transistor and one for each resistor the circuit has", () => {
    expect(costOfBuild(part, brief, prices, resistors, volts)).toEqual({
      cents: 3000 + 40 + 41 + 90 + 43,
      lines: [
        { key: "q", cents: 3000 },
        { key: "r1", cents: 40 },
        { key: "r2", cents: 41 },
        { key: "rd", cents: 90 },
        { key: "rs", cents: 43 },
      ],
    });
  });

  it("leaves out a source resistor that is a wire", () => {
    const cost = costOfBuild(part, brief, prices, { ...resistors, rs: 0 }, volts);
    expect(cost?.cents).toBe(3000 + 40 + 41 + 90);
    expect(cost?.lines.map(({ key }) => key)).toEqual(["q", "r1", "r2", "rd"]);
  });

  it("follows the brief's derating", () => {
    const eased = { ...brief, derating: { ...brief.derating, resistorPower: 0.8 } };
    // 80 mW are just 0.8 of the smallest size's 0.1 W.
    const cost = costOfBuild(part, eased, prices, resistors, volts);
    expect(cost?.lines.find(({ key }) => key === "rd")?.cents).toBe(40);
  });

  it("is unknown where the transistor, a value or a size has no price", () => {
    expect(costOfBuild(buildPart({ priceBreaks: [] }), brief, prices, resistors, volts)).toBeNull();
    expect(costOfBuild(part, brief, prices, { ...resistors, r2: 150_000 }, volts)).toBeNull();
    expect(costOfBuild(part, brief, prices, resistors, { ...volts, rd: 12 })).toBeNull();
  });
});
