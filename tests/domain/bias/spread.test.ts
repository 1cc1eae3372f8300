import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { solveStage } from "#shared/bias/solve-stage";
import { assuredSwing, type Box, cornerQPoints } from "#shared/bias/spread";
import { buildResistors, buildStageValues } from "../../support/build-stage";

const DEVICE = { vtMin: 1.1, vtMax: 1.3, kMin: 8e-3, kMax: 12e-3, lambda: 0.01, tcVt: -2e-3 };
const STAGE = buildStageValues({
  ...buildResistors({ r1: 680_000, r2: 180_000, rd: 2700, rs: 470 }),
  rl: 10_000,
});

function buildBox(overrides: Partial<Box> = {}): Box {
  return {
    device: DEVICE,
    stage: STAGE,
    tolerance: { resistors: 0.01, rail: 0.05 },
    ambient: { min: -10, max: 50 },
    ...overrides,
  };
}

const share = (max: number) => fc.double({ min: 0, max, noNaN: true });

describe("the assured swing", () => {
  it("is the stage's own swing where nothing differs", () => {
    const box = buildBox({
      device: { ...DEVICE, vtMin: 1.2, vtMax: 1.2, kMin: 0.01, kMax: 0.01 },
      tolerance: { resistors: 0, rail: 0 },
      ambient: { min: 25, max: 25 },
    });
    const { swing } = solveStage({ vt: 1.2, k: 0.01, lambda: 0.01 }, STAGE);
    expect(assuredSwing(box).swing.towardCutoff).toBeCloseTo(swing?.towardCutoff ?? 0, 12);
    expect(assuredSwing(box).swing.towardOhmic).toBeCloseTo(swing?.towardOhmic ?? 0, 12);
  });

  it("names the builds that set it: each, solved on its own, has just that room", () => {
    const { swing, worst } = assuredSwing(buildBox());
    for (const [side, room] of [
      ["cutoff", swing.towardCutoff],
      ["ohmic", swing.towardOhmic],
    ] as const) {
      const { vt, k, celsius, stage } = worst[side];
      const device = {
        vt: vt - 2e-3 * (celsius - 25),
        k: k * ((celsius + 273.15) / 298.15) ** -1.5,
        lambda: 0.01,
      };
      const own = solveStage(device, stage).swing;
      expect(side === "cutoff" ? own?.towardCutoff : own?.towardOhmic).toBeCloseTo(room, 12);
      expect(worst[side].room).toBe(room);
    }
  });

  it("never grows with the spread", () => {
    fc.assert(
      fc.property(share(0.2), share(0.5), share(0.1), share(0.1), share(60), (vt, k, ohms, rail, celsius) => {
        const at = (part: number) =>
          assuredSwing(
            buildBox({
              device: {
                ...DEVICE,
                ...{ vtMin: 1.2 - part * vt, vtMax: 1.2 + part * vt },
                ...{ kMin: 0.01 * (1 - part * k), kMax: 0.01 * (1 + part * k) },
              },
              tolerance: { resistors: part * ohms, rail: part * rail },
              ambient: { min: 25 - part * celsius, max: 25 + part * celsius },
            }),
          ).swing;
        expect(at(1).towardCutoff).toBeLessThanOrEqual(at(0.5).towardCutoff * (1 + 1e-12));
        expect(at(1).towardOhmic).toBeLessThanOrEqual(at(0.5).towardOhmic * (1 + 1e-12));
      }),
    );
  });

  it("looks inside the ambient range, where the drain current can be least", () => {
    // An overdrive of (4/3) · 2 mV/K · T = 0.8 V at 25 °C: the gate stands that and ID RS above VT.
    const steady = {
      device: { ...DEVICE, vtMin: 1.2, vtMax: 1.2, kMin: 3e-3, kMax: 3e-3, lambda: 0 },
      tolerance: { resistors: 0, rail: 0 },
    };
    const overdrive = (4 / 3) * 2e-3 * 298.15;
    const id = 3e-3 * overdrive ** 2;
    const gate = 1.2 + overdrive + id * 470;
    const stage = { ...STAGE, r1: 1e6 * (1 - gate / 12), r2: (1e6 * gate) / 12 };
    const box = buildBox({ ...steady, stage, ambient: { min: -25, max: 75 } });
    const { swing, worst } = assuredSwing(box);
    expect(worst.cutoff.celsius).toBeCloseTo(25, 6);
    expect(swing.towardCutoff).toBeCloseTo((id * 2700 * 10_000) / 12_700, 9);
    for (const celsius of [-25, 75]) {
      const atEnd = assuredSwing({ ...box, ambient: { min: celsius, max: celsius } }).swing;
      expect(atEnd.towardCutoff).toBeGreaterThan(swing.towardCutoff * 1.001);
    }
  });

  it("is 0 where some build doesn't conduct, or leaves saturation", () => {
    const off = assuredSwing(buildBox({ device: { ...DEVICE, vtMax: 2.6 } })).swing;
    expect(off).toMatchObject({ towardCutoff: 0, symmetric: 0 });
    expect(off.towardOhmic).toBeGreaterThan(0);
    const ohmic = assuredSwing(buildBox({ device: { ...DEVICE, vtMin: 0 } })).swing;
    expect(ohmic).toMatchObject({ towardOhmic: 0, symmetric: 0 });
    expect(ohmic.towardCutoff).toBeGreaterThan(0);
  });

  it("is 0 both ways, and no infinity, where every build is past one side", () => {
    const nothing = { towardCutoff: 0, towardOhmic: 0, symmetric: 0 };
    const allOff = assuredSwing(buildBox({ device: { ...DEVICE, vtMin: 20, vtMax: 21 } }));
    expect(allOff.swing).toEqual(nothing);
    expect(allOff.worst.ohmic.room).toBe(0);
    const allOhmic = assuredSwing(buildBox({ device: { ...DEVICE, vtMin: -9, vtMax: -8 } }));
    expect(allOhmic.swing).toEqual(nothing);
    expect(allOhmic.worst.cutoff.room).toBe(0);
  });

  it("counts each end of the values that may lie anywhere once in the figure's outline", () => {
    // K, rail and four resistors at two ends, two thresholds, two temperatures.
    expect(cornerQPoints(buildBox())).toHaveLength(2 ** 8);
  });
});
