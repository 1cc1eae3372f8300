import { describe, expect, it } from "vitest";
import { highCorner, millerPoles, transferSquared } from "#shared/bias/high-corner";
import { lowCorner, resistanceAtSource, smallestCapacitors } from "#shared/bias/low-corner";

const STAGE = {
  gm: 5e-3,
  gds: 2e-5,
  drain: 4.7e3,
  source: 0,
  gate: 470e3,
  feedback: null,
  output: "drain" as const,
  sourceImpedance: 10e3,
};
const CAPACITANCES = { cgs: 30e-12, cgd: 5e-12, cds: 8e-12 };

describe("the high corner", () => {
  it("is a single pole's 1/(2π R C) where only the output has a capacitance", () => {
    const stage = { ...STAGE, sourceImpedance: 0 };
    const expected = 1 / (2 * Math.PI * (1 / (1 / 4.7e3 + 2e-5)) * 8e-12);
    expect(highCorner(stage, { cgs: 0, cgd: 0, cds: 8e-12 })).toBeCloseTo(expected, -3);
  });

  it("lies at the Miller pole where the source impedance dominates", () => {
    const gain = Math.sqrt(transferSquared({ ...STAGE, sourceImpedance: 0 }, CAPACITANCES, 0));
    const poles = millerPoles(STAGE, CAPACITANCES, gain, 1 / (1 / STAGE.drain + STAGE.gds));
    const corner = highCorner(STAGE, CAPACITANCES) ?? 0;
    expect(poles.input ?? 0).toBeLessThan((poles.output ?? 0) / 10);
    // Miller's approximation leaves the output pole out, so the true corner is a little lower.
    expect(corner / (poles.input ?? 1)).toBeGreaterThan(0.9);
    expect(corner / (poles.input ?? 1)).toBeLessThan(1);
  });

  it("is where the gain has fallen by 3 dB, with and without source degeneration", () => {
    for (const source of [0, 330]) {
      const stage = { ...STAGE, source };
      const corner = highCorner(stage, CAPACITANCES) ?? 0;
      const ratio = transferSquared(stage, CAPACITANCES, corner) / transferSquared(stage, CAPACITANCES, 0);
      expect(10 * Math.log10(ratio)).toBeCloseTo(-3.0103, 4);
    }
  });

  it("does not exist without capacitances", () => {
    expect(highCorner(STAGE, { cgs: 0, cgd: 0, cds: 0 })).toBeNull();
  });
});

describe("the low corner", () => {
  const rs = 1e3;
  const bypass = { rs, seen: resistanceAtSource(5e-3, 0, 4.7e3, rs) };

  it("takes the source terminal's resistance as 1/gm beside RS where ro is infinite", () => {
    expect(bypass.seen).toBeCloseTo(1 / (1 / 1e3 + 5e-3), 9);
  });

  it.each([
    { name: "all three capacitors", resistances: { input: 480e3, output: 14e3, bypass } },
    { name: "no load", resistances: { input: 480e3, output: null, bypass } },
    { name: "no bypass", resistances: { input: 480e3, output: 14e3, bypass: null } },
    { name: "the input alone", resistances: { input: 480e3, output: null, bypass: null } },
  ])("is met exactly by the smallest capacitors with $name", ({ resistances }) => {
    for (const hertz of [0.5, 20, 3000]) {
      const capacitors = smallestCapacitors(resistances, hertz);
      expect(lowCorner(resistances, capacitors) / hertz).toBeCloseTo(1, 6);
    }
  });

  it("is the textbook 1/(2π R C) for a single coupling capacitor", () => {
    const { input } = smallestCapacitors({ input: 100e3, output: null, bypass: null }, 20);
    expect(input).toBeCloseTo(1 / (2 * Math.PI * 100e3 * 20), 15);
  });
});
