import { describe, expect, it } from "vitest";
import { highCorner, millerPoles, transferSquared } from "#shared/bias/high-corner";
import {
  type CoupledStage,
  capacitorResistances,
  coupledSquared,
  lowCorner,
  smallestCapacitors,
} from "#shared/bias/low-corner";

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

const COUPLED: CoupledStage = {
  gm: 5e-3,
  gds: 0,
  drain: 4.7e3,
  load: 10e3,
  source: { signal: 0, bypassed: 1e3 },
  gate: 470e3,
  feedback: null,
  output: "drain",
  sourceImpedance: 10e3,
};

/** A source resistor of which only the upper tenth is in the signal's way, and a device with an ro. */
const SPLIT: CoupledStage = { ...COUPLED, gds: 4e-5, source: { signal: 100, bypassed: 900 } };
const FOLLOWER: CoupledStage = {
  ...COUPLED,
  drain: 0,
  source: { signal: 1e3, bypassed: 0 },
  output: "source",
};
const FEEDBACK: CoupledStage = {
  ...COUPLED,
  gds: 4e-5,
  gate: Number.POSITIVE_INFINITY,
  feedback: 220e3,
};

describe("the low corner", () => {
  const LARGE = 1e6;

  it("has the three sections of the textbook multiplied where ro is infinite and nothing feeds back", () => {
    const capacitors = { input: 20e-9, output: 1e-6, bypass: 47e-6 };
    const atSource = 1 / (1 / 1e3 + 5e-3);
    for (const hertz of [1, 20, 400]) {
      const omega = 2 * Math.PI * hertz;
      const highPass = (ohms: number, farads: number) => 1 / (1 + (omega * ohms * farads) ** -2);
      const bypass =
        ((atSource / 1e3) ** 2 * (1 + (omega * 1e3 * 47e-6) ** 2)) / (1 + (omega * atSource * 47e-6) ** 2);
      const expected = highPass(480e3, 20e-9) * highPass(14.7e3, 1e-6) * bypass;
      const response = coupledSquared(COUPLED, capacitors, hertz) / coupledSquared(COUPLED, null, hertz);
      expect(response / expected).toBeCloseTo(1, 9);
    }
  });

  it("has the gain of the exact nodes at mid-band", () => {
    // gm rL with the divider of source impedance and gate in front.
    const expected = ((5e-3 * 4.7e3 * 10e3) / 14.7e3) * (470 / 480);
    expect(Math.sqrt(coupledSquared(COUPLED, null, 1))).toBeCloseTo(expected, 9);
    const follower = (5e-3 * 1e3 * 10e3) / 11e3;
    expect(Math.sqrt(coupledSquared(FOLLOWER, null, 1))).toBeCloseTo(
      (follower / (1 + follower)) * (470 / 480),
      9,
    );
  });

  it.each([
    { name: "a bypassed stage", stage: COUPLED },
    { name: "a split source resistor", stage: SPLIT },
    { name: "a follower", stage: FOLLOWER },
    { name: "drain feedback", stage: FEEDBACK },
  ])("is 1/(2π R C) of a coupling capacitor beside large ones in $name", ({ stage }) => {
    const { input, output } = capacitorResistances(stage);
    const bypass = stage.source.bypassed > 0 ? LARGE : null;
    const alone = (ohms: number | null) => 1 / (2 * Math.PI * (ohms ?? 0) * 1e-6);
    expect(lowCorner(stage, { input: 1e-6, output: LARGE, bypass }) / alone(input)).toBeCloseTo(1, 5);
    expect(lowCorner(stage, { input: LARGE, output: 1e-6, bypass }) / alone(output)).toBeCloseTo(1, 5);
  });

  it.each([
    { name: "all three capacitors", stage: COUPLED },
    { name: "no load", stage: { ...COUPLED, load: null } },
    { name: "no bypass", stage: { ...COUPLED, source: { signal: 1e3, bypassed: 0 } } },
    { name: "the input alone", stage: { ...FOLLOWER, load: null } },
    { name: "a follower", stage: FOLLOWER },
    { name: "a bypass that hardly matters", stage: { ...SPLIT, source: { signal: 1e3, bypassed: 50 } } },
    { name: "a split source resistor", stage: SPLIT },
    { name: "drain feedback", stage: FEEDBACK },
    { name: "drain feedback from a source without impedance", stage: { ...FEEDBACK, sourceImpedance: 0 } },
  ])("is met exactly by the smallest capacitors with $name", ({ stage }) => {
    for (const hertz of [0.5, 20, 3000]) {
      const capacitors = smallestCapacitors(stage, hertz);
      const target = coupledSquared(stage, null, hertz) / 2;
      expect(coupledSquared(stage, capacitors, hertz) / target).toBeCloseTo(1, 6);
      // Above the corner the response stays within 3 dB.
      for (let above = 1.05 * hertz; above < 1e4 * hertz; above *= 1.3) {
        expect(coupledSquared(stage, capacitors, above)).toBeGreaterThan(target);
      }
    }
  });

  it("leaves a bypass capacitor to set the corner, with the coupling capacitors a decade below", () => {
    const { input, output } = smallestCapacitors(COUPLED, 20);
    expect(input).toBeCloseTo(1 / (2 * Math.PI * 480e3 * 2), 15);
    expect(output).toBeCloseTo(1 / (2 * Math.PI * 14.7e3 * 2), 15);
  });

  it("is the textbook 1/(2π R C) for a single coupling capacitor", () => {
    const { input } = smallestCapacitors({ ...FOLLOWER, load: null }, 20);
    expect(input).toBeCloseTo(1 / (2 * Math.PI * 480e3 * 20), 15);
  });
});
