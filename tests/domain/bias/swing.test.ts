import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { findRoot } from "#shared/bias/find-root";
import { solveStage } from "#shared/bias/solve-stage";
import { distortionAt } from "#shared/bias/wave";
import type { Device, StageValues } from "#shared/schemas/bias";
import { buildStageValues } from "../../support/build-stage";

const decade = (low: number, high: number) =>
  fc.double({ min: Math.log(low), max: Math.log(high), noNaN: true }).map(Math.exp);

const devices: fc.Arbitrary<Device> = fc.record({
  polarity: fc.constantFrom("n" as const, "p" as const),
  vt: fc.double({ min: 0.3, max: 4, noNaN: true }),
  k: decade(1e-4, 0.2),
  lambda: fc.oneof(fc.constant(0), fc.double({ min: 0.001, max: 0.05, noNaN: true })),
});

const stages: fc.Arbitrary<StageValues> = fc
  .record({
    vdd: fc.double({ min: 6, max: 48, noNaN: true }),
    r1: decade(1e4, 1e7),
    r2: decade(1e4, 1e7),
    rd: decade(200, 1e5),
    rs: fc.oneof(fc.constant(0), decade(20, 1e4)),
    rl: fc.oneof(fc.constant(null), decade(1e3, 1e6)),
    sourceBypassed: fc.boolean(),
  })
  .map(buildStageValues);

/** Moves the divider until the stage sits at dead centre; null where no gate voltage does. */
function centred(device: Device, stage: StageValues): StageValues | null {
  const total = stage.r1 + stage.r2;
  const withGate = (vg: number) => ({
    ...stage,
    r1: total * (1 - vg / stage.vdd),
    r2: (total * vg) / stage.vdd,
  });
  const lean = (vg: number) => {
    const bias = solveStage(device, withGate(vg));
    if (bias.region === "cutoff") return -1;
    return bias.swing ? bias.swing.towardCutoff - bias.swing.towardOhmic : 1;
  };
  const low = device.vt + 1e-6;
  const high = stage.vdd * 0.999;
  if (low >= high || lean(low) > 0 || lean(high) < 0) return null;
  const found = withGate(findRoot(lean, low, high));
  const bias = solveStage(device, found);
  return bias.centringError !== null && bias.centringError < 1e-6 ? found : null;
}

describe("a centred Q-point (common practice)", () => {
  it("is as far along the a.c. line from the transition point as from cutoff", () => {
    let tried = 0;
    fc.assert(
      fc.property(devices, stages, (device, stage) => {
        const found = centred(device, stage);
        if (!found) return;
        tried++;
        const { id, vds, transition } = solveStage(device, found);
        const load = found.rl === null ? found.rd : (found.rd * found.rl) / (found.rd + found.rl);
        const slope = load + (found.sourceBypassed ? 0 : found.rs);
        const end = { vds: vds + id * slope, id: 0 };
        // Distances in the output plane, with current scaled by the line's slope so that both axes are volts.
        const distance = (to: { vds: number; id: number }) => Math.hypot(to.vds - vds, (to.id - id) * slope);
        expect(distance(transition ?? end) / distance(end)).toBeCloseTo(1, 5);
      }),
      { numRuns: 400 },
    );
    expect(tried).toBeGreaterThan(100);
  });

  it("swings further than any other Q-point of the same stage: off centre only the nearer end counts", () => {
    fc.assert(
      fc.property(devices, stages, fc.double({ min: 0.8, max: 1.25, noNaN: true }), (device, stage, move) => {
        const found = centred(device, stage);
        if (!found) return;
        const best = solveStage(device, found).swing?.symmetric ?? 0;
        const other = solveStage(device, { ...found, r1: found.r1 * move }).swing;
        if (!other) return;
        expect(other.symmetric).toBe(Math.min(other.towardCutoff, other.towardOhmic));
        expect(other.symmetric).toBeLessThanOrEqual(best * (1 + 1e-6));
      }),
      { numRuns: 300 },
    );
  });

  it("moves toward the ohmic region as the gate voltage rises, and never back", () => {
    fc.assert(
      fc.property(devices, stages, (device, stage) => {
        const before = solveStage(device, stage).swing;
        const after = solveStage(device, { ...stage, r2: stage.r2 * 1.02 }).swing;
        if (!before || !after) return;
        expect(after.towardCutoff).toBeGreaterThan(before.towardCutoff);
        expect(after.towardOhmic).toBeLessThan(before.towardOhmic);
      }),
      { numRuns: 500 },
    );
  });
});

describe("an input small beside twice the overdrive (common practice)", () => {
  it("keeps the second harmonic small: it is A/(4 VOV) for the pure square law", () => {
    fc.assert(
      fc.property(
        decade(1e-4, 0.1),
        fc.double({ min: 0.2, max: 2, noNaN: true }),
        fc.double({ min: 0.01, max: 0.5, noNaN: true }),
        (k, overdrive, share) => {
          const input = share * 2 * overdrive * 0.5;
          const id = k * overdrive * overdrive;
          const path = {
            device: { vt: 1, k, lambda: 0 },
            // A load so small that the drain hardly moves: nothing clips.
            q: { id, vds: 20, vgs: 1 + overdrive },
            network: { output: 1 / id, slope: 1 / id, degeneration: 0, feedthrough: 0 },
          };
          const { secondHarmonic, clipped } = distortionAt(path, input);
          expect(clipped).toBe(false);
          expect(secondHarmonic).toBeCloseTo(input / (4 * overdrive), 9);
        },
      ),
    );
  });
});

describe("regions", () => {
  it("never calls a stage saturated whose VDS is below its overdrive, nor conducting below threshold", () => {
    fc.assert(
      fc.property(devices, stages, (device, stage) => {
        const bias = solveStage(device, stage);
        if (bias.region === "saturation") expect(bias.vds).toBeGreaterThanOrEqual(bias.overdrive);
        if (bias.region === "ohmic") expect(bias.vds).toBeLessThan(bias.overdrive);
        if (bias.region === "cutoff") expect(bias.id).toBe(0);
        else expect(bias.overdrive).toBeGreaterThan(0);
        // Kirchhoff's voltage law round the output loop.
        expect(bias.vds + bias.id * (stage.rd + stage.rs)).toBeCloseTo(stage.vdd, 6);
      }),
      { numRuns: 1000 },
    );
  });
});
